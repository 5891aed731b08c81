/**
 * Reads a file that a board uses, for the server: through the editor's file systems, so that boards of
 * a virtual workspace can use each other too.
 *
 * The server has checked that the file's name lies in one of the folders. What a name cannot tell is
 * checked here: its case, where symbolic links lead, and its size.
 */
import * as vscode from 'vscode';
import { largestFile, type ReadFileAnswer, type ReadFileParams } from '../../server/src/lsp/messages';

/** Where a file really is; null where the file system cannot say. */
export type RealPath = (uri: vscode.Uri) => Promise<vscode.Uri | null>;

export async function readFile({ uri: written, inside }: ReadFileParams, realPath: RealPath): Promise<ReadFileAnswer> {
  const uri = vscode.Uri.parse(written, true);
  const folders = inside.map((folder) => vscode.Uri.parse(folder, true));
  const folder = folders.find((candidate) => isBelow(uri, candidate));
  if (folder === undefined) return { problem: 'outside' };
  try {
    const spelling = await trueSpelling(uri, folder);
    if (spelling.is !== 'same') return spelling.is === 'missing' ? { problem: 'missing' } : { problem: 'case', spelling: spelling.path };
    if (spelling.linked && !(await staysInside(uri, folders, realPath))) return { problem: 'outside' };
    const found = await vscode.workspace.fs.stat(uri);
    if ((found.type & vscode.FileType.Directory) !== 0) return { problem: 'unreadable' };
    if (largestFile < found.size) return { problem: 'too-large' };
    return { text: new TextDecoder('utf-8').decode(await vscode.workspace.fs.readFile(uri)) };
  } catch (error) {
    return { problem: error instanceof vscode.FileSystemError && error.code === 'FileNotFound' ? 'missing' : 'unreadable' };
  }
}

type Spelling = { readonly is: 'same'; readonly linked: boolean } | { readonly is: 'missing' } | { readonly is: 'other'; readonly path: string };

/** Compares each part of the path below the folder with the directory that holds it. */
async function trueSpelling(uri: vscode.Uri, folder: vscode.Uri): Promise<Spelling> {
  const parts = uri.path.slice(withSlash(folder.path).length).split('/');
  const spelt: string[] = [];
  let linked = false;
  let directory = folder;
  for (const part of parts) {
    const entries = await vscode.workspace.fs.readDirectory(directory);
    const entry = entries.find(([name]) => name === part) ?? entries.find(([name]) => name.toLowerCase() === part.toLowerCase());
    if (entry === undefined) return { is: 'missing' };
    if ((entry[1] & vscode.FileType.SymbolicLink) !== 0) linked = true;
    spelt.push(entry[0]);
    directory = vscode.Uri.joinPath(directory, entry[0]);
  }
  const path = spelt.join('/');
  return path === parts.join('/') ? { is: 'same', linked } : { is: 'other', path };
}

async function staysInside(uri: vscode.Uri, folders: readonly vscode.Uri[], realPath: RealPath): Promise<boolean> {
  const real = await realPath(uri);
  if (real === null) return false;
  for (const folder of folders) {
    const realFolder = await realPath(folder);
    if (realFolder !== null && isBelow(real, realFolder)) return true;
  }
  return false;
}

function isBelow(uri: vscode.Uri, folder: vscode.Uri): boolean {
  return uri.scheme === folder.scheme && uri.authority === folder.authority && uri.path.startsWith(withSlash(folder.path));
}

const withSlash = (path: string) => (path.endsWith('/') ? path : `${path}/`);
