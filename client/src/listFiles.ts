/**
 * The board files of the workspace, for the server: it has to know who uses a file before it can say
 * what the file means.
 *
 * The editor's own search does not reach every virtual file system; there, the folders are walked, with
 * a bound that keeps a large remote repository from being read through.
 */
import * as vscode from 'vscode';
import type { ListFilesAnswer } from '../../server/src/lsp/messages';

const mostFiles = 1000;
const mostFolders = 200;
const skipped = new Set(['node_modules', '.git']);

export async function listFiles(): Promise<ListFilesAnswer> {
  const found = await vscode.workspace.findFiles('**/*.quiet', '**/node_modules/**', mostFiles);
  const uris = new Map(found.map((uri) => [uri.toString(), uri]));
  for (const folder of vscode.workspace.workspaceFolders ?? []) {
    const searched = folder.uri.scheme === 'file' || found.some((uri) => uri.scheme === folder.uri.scheme);
    if (!searched) for (const uri of await walk(folder.uri)) uris.set(uri.toString(), uri);
  }
  return { uris: [...uris.keys()].slice(0, mostFiles) };
}

async function walk(root: vscode.Uri): Promise<readonly vscode.Uri[]> {
  const found: vscode.Uri[] = [];
  const folders = [root];
  for (let at = 0; at < folders.length && at < mostFolders; at += 1) {
    for (const [name, type] of await entriesOf(folders[at])) {
      const uri = vscode.Uri.joinPath(folders[at], name);
      if (type === vscode.FileType.Directory && !skipped.has(name)) folders.push(uri);
      if ((type & vscode.FileType.File) !== 0 && name.endsWith('.quiet')) found.push(uri);
    }
  }
  return found;
}

async function entriesOf(folder: vscode.Uri): Promise<readonly [string, vscode.FileType][]> {
  try {
    return await vscode.workspace.fs.readDirectory(folder);
  } catch {
    return []; // a folder that cannot be read holds no board that can
  }
}
