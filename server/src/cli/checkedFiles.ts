/** Reads the files of a check and all that they use, and analyses each as the root of its project. */
import { readFile, realpath, stat } from 'node:fs/promises';
import path from 'node:path';
import { isBelow, largestFile, usedFile } from '../disk/usedFile';
import type { Fix } from '../fixes/fix';
import { mendingFixes } from '../fixes/index';
import type { Finding } from '../rules/rule';
import type { SpacingOptions } from '../spacing/spacing';
import { Session, type Analysis } from '../service/session';
import { tidyFix } from '../service/tidyEdits';

export interface CheckedFile {
  /** Relative to the working directory, with `/`. */
  readonly path: string;
  readonly analysis: Analysis;
  readonly text: (path: string) => string;
  /** Findings that a baseline knows: they are shown, and fail nothing. */
  readonly known: ReadonlySet<Finding>;
  /** Solved for when they are asked for. */
  readonly fixes: (finding: Finding) => readonly Fix[];
  readonly spacing: (options: SpacingOptions) => ReturnType<Session['spacing']>;
}

export interface CheckOptions {
  readonly files: readonly string[];
  readonly stdinFilename: string | null;
  readonly workingDirectory: string;
  readonly readStandardInput: () => Promise<Uint8Array>;
  readonly log: (rule: string, error: unknown) => void;
}

export type CheckedFiles = { readonly checked: readonly CheckedFile[] } | { readonly refused: string };

export async function checkedFiles(options: CheckOptions): Promise<CheckedFiles> {
  const session = new Session({ log: options.log });
  const roots: string[] = [];
  for (const file of options.files) {
    const key = file === '-' ? keyOf(options.stdinFilename ?? '-', options) : keyOf(file, options);
    const text = file === '-' ? await standardInput(options) : await namedFile(file, options);
    if (typeof text !== 'string') return { refused: text.why };
    roots.push(key);
    session.setText(key, text);
  }
  await readUsed(session, roots, options);
  return { checked: roots.map((root) => ({ path: root, analysis: session.analyseFully(root), text: (other) => session.text(other) ?? '', known: new Set(), fixes: (finding) => mendingFixes(finding, session.fixContext(root)).map((fix) => tidyFix(fix, session)), spacing: (wanted) => session.spacing(root, wanted) })) };
}

function keyOf(file: string, { workingDirectory }: CheckOptions): string {
  return path.relative(workingDirectory, path.resolve(workingDirectory, file)).split(path.sep).join('/');
}

async function standardInput({ readStandardInput }: CheckOptions): Promise<string | { readonly why: string }> {
  try {
    const bytes = await readStandardInput();
    return bytes.length <= largestFile ? new TextDecoder('utf-8').decode(bytes) : { why: 'standard input is over 8 MiB' };
  } catch (error) {
    return { why: `standard input cannot be read (${error instanceof Error ? error.message : String(error)})` };
  }
}

/** A file named on the command line may lie anywhere: whoever named it may read it. */
async function namedFile(file: string, { workingDirectory }: CheckOptions): Promise<string | { readonly why: string }> {
  const full = path.resolve(workingDirectory, file);
  try {
    const found = await stat(full);
    if (!found.isFile()) return { why: `${file} is not a file` };
    if (largestFile < found.size) return { why: `${file} is over 8 MiB` };
    return new TextDecoder('utf-8').decode(await readFile(full));
  } catch (error) {
    const { code } = error as NodeJS.ErrnoException;
    return { why: code === 'ENOENT' ? `there is no file ${file}` : `${file} cannot be read (${code ?? String(error)})` };
  }
}

/** Until every file that is used is read or known to be out of reach; each is asked for once. */
async function readUsed(session: Session, roots: readonly string[], { workingDirectory }: CheckOptions): Promise<void> {
  const folders = await foldersOf(roots, workingDirectory);
  for (let wanted = session.missing(); 0 < wanted.length; wanted = session.missing()) {
    for (const key of wanted) {
      const answer = await usedFile(path.resolve(workingDirectory, key), folders);
      if ('text' in answer) session.setText(key, answer.text);
      else session.setProblem(key, { problem: answer.problem, ...(answer.spelling === undefined ? {} : { actual: answer.spelling }) });
    }
  }
}

/** A board may use what lies below the working directory; one that lies elsewhere, what lies below its own folder. */
async function foldersOf(roots: readonly string[], workingDirectory: string): Promise<readonly string[]> {
  const own = await realpath(workingDirectory);
  const outside = roots.map((root) => path.resolve(workingDirectory, root)).filter((file) => !isBelow(file, workingDirectory));
  return [...new Set([workingDirectory, own, ...outside.map((file) => path.dirname(file))])];
}
