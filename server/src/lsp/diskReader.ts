/** Reads the files that a board uses from the disk, for a client that does not offer to. Node only. */
import { readdir } from 'node:fs/promises';
import path from 'node:path';
import { URI } from 'vscode-uri';
import { usedFile } from '../disk/usedFile';
import type { FileReader } from './reader';

const mostFiles = 1000;
const mostFolders = 2000;

export const diskReader: FileReader = {
  async read(uri, inside) {
    const address = URI.parse(uri);
    if (address.scheme !== 'file') return { problem: 'missing' };
    return usedFile(address.fsPath, inside.map((folder) => URI.parse(folder).fsPath));
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
