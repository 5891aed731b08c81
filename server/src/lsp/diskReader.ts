/** Reads the files that a board uses from the disk, for a client that does not offer to. Node only. */
import { readdir, readFile, realpath, stat } from 'node:fs/promises';
import path from 'node:path';
import { URI } from 'vscode-uri';
import { largestFile, type ReadFileAnswer } from './messages';
import type { FileReader } from './reader';

const mostFiles = 1000;
const mostFolders = 2000;

export const diskReader: FileReader = {
  async read(uri, inside) {
    const address = URI.parse(uri);
    if (address.scheme !== 'file') return { problem: 'missing' };
    const folders = inside.map((folder) => URI.parse(folder).fsPath);
    try {
      return await readInside(address.fsPath, folders);
    } catch (error) {
      return { problem: /^(ENOENT|ENOTDIR)$/.test((error as NodeJS.ErrnoException).code ?? '') ? 'missing' : 'unread' };
    }
  },

  async list(folders) {
    const found: string[] = [];
    for (const folder of folders) {
      const address = URI.parse(folder);
      if (address.scheme === 'file') await walk(address.fsPath, found);
    }
    return found.map((file) => URI.file(file).toString());
  },
};

async function readInside(file: string, folders: readonly string[]): Promise<ReadFileAnswer> {
  const folder = folders.find((candidate) => isBelow(file, candidate));
  if (folder === undefined) return { problem: 'outside' };
  const spelling = await trueSpelling(file, folder);
  if (spelling === null) return { problem: 'missing' };
  if (spelling !== path.relative(folder, file)) return { problem: 'case', spelling: spelling.split(path.sep).join('/') };
  const real = await realpath(file);
  const realFolders = await Promise.all(folders.map((each) => realpath(each)));
  if (!realFolders.some((each) => isBelow(real, each))) return { problem: 'outside' };
  const found = await stat(real);
  if (!found.isFile()) return { problem: 'unread' };
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

async function walk(root: string, found: string[]): Promise<void> {
  const folders = [root];
  for (let at = 0; at < folders.length && at < mostFolders; at += 1) {
    const entries = await readdir(folders[at], { withFileTypes: true }).catch(() => []);
    for (const entry of entries) {
      const full = path.join(folders[at], entry.name);
      // A link is not followed: its target is found where it is, or lies outside.
      if (entry.isDirectory() && entry.name !== 'node_modules' && !entry.name.startsWith('.')) folders.push(full);
      if (entry.isFile() && entry.name.endsWith('.quiet') && found.length < mostFiles) found.push(full);
    }
  }
}

function isBelow(file: string, folder: string): boolean {
  const relative = path.relative(folder, file);
  return relative !== '' && !relative.startsWith(`..${path.sep}`) && relative !== '..' && !path.isAbsolute(relative);
}
