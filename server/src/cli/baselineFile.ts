/** The file of a baseline: read whole or refused, written whole or not at all, and never over anything else. */
import { randomUUID } from 'node:crypto';
import { readFile, rename, rm, writeFile } from 'node:fs/promises';
import path from 'node:path';
import { largestFile } from '../disk/usedFile';
import { baselineText, readBaseline, type Baseline } from './baseline';

export async function loadBaseline(file: string, workingDirectory: string): Promise<{ readonly baseline: Baseline } | { readonly refused: string }> {
  const text = await textOf(path.resolve(workingDirectory, file));
  if ('problem' in text) return { refused: text.problem === 'ENOENT' ? `there is no baseline ${file}; --update-baseline ${file} makes one` : `the baseline ${file} cannot be read (${text.problem})` };
  const baseline = readBaseline(text.text);
  return baseline === null ? { refused: `${file} is no baseline` } : { baseline };
}

/** Null when it is written, else why not. */
export async function saveBaseline(file: string, workingDirectory: string, baseline: Baseline): Promise<string | null> {
  const full = path.resolve(workingDirectory, file);
  const before = await textOf(full);
  if ('problem' in before ? before.problem !== 'ENOENT' : readBaseline(before.text) === null) return `${file} is there and is no baseline: it stays as it is`;
  // Beside it, so that the change of names happens at once.
  const draft = `${full}.${randomUUID()}.tmp`;
  try {
    await writeFile(draft, baselineText(baseline), { flag: 'wx' });
    await rename(draft, full);
    return null;
  } catch (error) {
    await rm(draft, { force: true });
    return `${file} cannot be written (${(error as NodeJS.ErrnoException).code ?? String(error)})`;
  }
}

async function textOf(full: string): Promise<{ readonly text: string } | { readonly problem: string }> {
  try {
    const text = await readFile(full, 'utf8');
    return text.length <= largestFile ? { text } : { problem: 'it is over 8 MiB' };
  } catch (error) {
    return { problem: (error as NodeJS.ErrnoException).code ?? String(error) };
  }
}
