/**
 * Reads a file that a board uses, seen through links: it has to lie in one of the folders by its name
 * and by where it really is, and to be spelt as the directories spell it. Node only.
 */
import { readdir, readFile, realpath, stat } from 'node:fs/promises';
import path from 'node:path';
import { sourceLimits } from '../board/sources';

export const largestFile = sourceLimits.bytes;

export type FileAnswer =
  | { readonly text: string }
  | { readonly problem: 'missing' | 'outside' | 'case' | 'too-large' | 'unreadable' | 'unread'; /** As the file system spells it, from the folder. */ readonly spelling?: string };

export async function usedFile(file: string, folders: readonly string[]): Promise<FileAnswer> {
  try {
    return await readInside(file, folders);
  } catch (error) {
    return { problem: /^(ENOENT|ENOTDIR)$/.test((error as NodeJS.ErrnoException).code ?? '') ? 'missing' : 'unreadable' };
  }
}

async function readInside(file: string, folders: readonly string[]): Promise<FileAnswer> {
  const folder = folders.find((candidate) => isBelow(file, candidate));
  if (folder === undefined) return { problem: 'outside' };
  const spelling = await trueSpelling(file, folder);
  if (spelling === null) return { problem: 'missing' };
  if (spelling !== path.relative(folder, file)) return { problem: 'case', spelling: spelling.split(path.sep).join('/') };
  const real = await realpath(file);
  const realFolders = await Promise.all(folders.map((each) => realpath(each)));
  if (!realFolders.some((each) => isBelow(real, each))) return { problem: 'outside' };
  const found = await stat(real);
  if (!found.isFile()) return { problem: 'unreadable' };
  if (largestFile < found.size) return { problem: 'too-large' };
  return { text: new TextDecoder('utf-8').decode(await readFile(real)) };
}

/** The path below the folder as the directories spell it; null where a part is missing. */
async function trueSpelling(file: string, folder: string): Promise<string | null> {
  const spelt: string[] = [];
  for (const part of path.relative(folder, file).split(path.sep)) {
    const names = await readdir(path.join(folder, ...spelt));
    const name = names.includes(part) ? part : names.find((each) => each.toLowerCase() === part.toLowerCase());
    if (name === undefined) return null;
    spelt.push(name);
  }
  return spelt.join(path.sep);
}

export function isBelow(file: string, folder: string): boolean {
  const relative = path.relative(folder, file);
  return relative !== '' && !relative.startsWith(`..${path.sep}`) && relative !== '..' && !path.isAbsolute(relative);
}
