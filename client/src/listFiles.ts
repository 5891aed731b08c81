/**
 * The board files of the workspace, for the server: it has to know who uses a file before it can say
 * what the file means.
 *
 * The editor's own search does not reach every virtual file system, and asked for one that it does not
 * reach it waits for ever; there, the folders are walked, with a bound that keeps a large remote
 * repository from being read through.
 */
import * as vscode from 'vscode';
import type { ListFilesAnswer } from '../../server/src/lsp/messages';

const mostFiles = 1000;
const mostFolders = 200;
const skipped = new Set(['node_modules', '.git']);

export async function listFiles(): Promise<ListFilesAnswer> {
  const folders = vscode.workspace.workspaceFolders ?? [];
  const found = await Promise.all(folders.map((folder) => (folder.uri.scheme === 'file' ? search(folder) : walk(folder.uri))));
  const uris = new Set(found.flat().map((uri) => uri.toString()));
  return { uris: [...uris].slice(0, mostFiles) };
}

async function search(folder: vscode.WorkspaceFolder): Promise<readonly vscode.Uri[]> {
  return vscode.workspace.findFiles(new vscode.RelativePattern(folder, '**/*.quiet'), '**/node_modules/**', mostFiles);
}

async function walk(root: vscode.Uri): Promise<readonly vscode.Uri[]> {
  const found: vscode.Uri[] = [];
  const folders = [root];
  for (let at = 0; at < folders.length && at < mostFolders && found.length < mostFiles; at += 1) {
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
