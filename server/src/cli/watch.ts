/**
 * Checks again whenever a file that the check rests on has changed. The files are asked for their dates a few times a second, which
 * works on every file system, sees files that are yet to be made, and leaves nothing open.
 */
import { stat } from 'node:fs/promises';
import path from 'node:path';

export interface Watched {
  readonly status: number;
  /** Relative to the working directory: what the check has read, and what it would have read had it been there. */
  readonly files: readonly string[];
}

export interface WatchOptions {
  readonly workingDirectory: string;
  readonly check: () => Promise<Watched>;
  /** Ends the watch. */
  readonly stop: AbortSignal;
  readonly tell: (words: string) => void;
}

/** The status of the last check. */
export async function watch({ workingDirectory, check, stop, tell }: WatchOptions): Promise<number> {
  for (;;) {
    const began = Date.now();
    const { status, files } = await check();
    const { newest, text } = await datesOf(files, workingDirectory);
    if (stop.aborted) return status;
    tell(`Watching ${files.length === 1 ? 'one file' : `${files.length} files`}; Ctrl-C ends.`);
    do {
      await pause(interval, stop);
      if (stop.aborted) return status;
    // What changed while the check ran may have been read before that: it is checked once more.
    } while (newest <= began && (await datesOf(files, workingDirectory)).text === text);
  }
}

/** Milliseconds: what a person takes for at once. */
const interval = 250;

function pause(milliseconds: number, stop: AbortSignal): Promise<void> {
  return new Promise((resolve) => {
    const done = () => {
      clearTimeout(timer);
      stop.removeEventListener('abort', done);
      resolve();
    };
    const timer = setTimeout(done, milliseconds);
    stop.addEventListener('abort', done, { once: true });
  });
}

/** Of what is not there, that it is not. */
async function datesOf(files: readonly string[], folder: string): Promise<{ readonly newest: number; readonly text: string }> {
  const found = await Promise.all(files.map((file) => stat(path.resolve(folder, file)).catch(() => null)));
  return { newest: Math.max(0, ...found.map((each) => each?.mtimeMs ?? 0)), text: found.map((each) => (each === null ? '-' : `${each.mtimeMs} ${each.size}`)).join('\n') };
}
