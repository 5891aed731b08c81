/** The command line on files of its own: what it writes, what it complains of, and its exit status. */
import { mkdirSync, mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { after } from 'node:test';
import { run } from '../../server/src/cli/run';

export interface Ran {
  readonly code: number;
  readonly out: string;
  readonly complaints: string;
}

/** For what goes on until it is told to stop. */
export interface Watching {
  readonly stop?: AbortSignal;
  readonly heard?: (complaint: string) => void;
}

export function commandLine() {
  const folder = mkdtempSync(path.join(tmpdir(), 'quietrun-cli-'));
  after(() => rmSync(folder, { recursive: true, force: true }));
  return {
    folder,
    put(name: string, text: string | Uint8Array): void {
      mkdirSync(path.dirname(path.join(folder, name)), { recursive: true });
      writeFileSync(path.join(folder, name), text);
    },
    textOf: (name: string): string => readFileSync(path.join(folder, name), 'utf8'),
    async quietrun(words: readonly string[], input: string | Uint8Array = '', { stop, heard }: Watching = {}): Promise<Ran> {
      let out = '';
      let complaints = '';
      const code = await run(words, {
        workingDirectory: folder,
        version: '0.0.0',
        coloured: false,
        ...(stop === undefined ? {} : { stop }),
        write: (text) => { out += text; },
        complain: (text) => {
          complaints += text;
          heard?.(text);
        },
        readStandardInput: async () => (typeof input === 'string' ? new TextEncoder().encode(input) : input),
        serve: async () => { out += 'served'; },
      });
      return { code, out, complaints };
    },
  };
}
