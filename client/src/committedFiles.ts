/** Files as they were last committed, asked of the editor's own git extension where there is one: no process is started here. */
import * as vscode from 'vscode';
import { largestFile, type ReadFileAnswer } from '../../server/src/lsp/messages';

export interface Commit {
  /** Its first eight digits. */
  readonly name: string;
  readonly branch: string | null;
  /** Null where no part of the commit's repository: such a file has no other revision. */
  readonly read: (uri: vscode.Uri) => Promise<ReadFileAnswer | null>;
}

/** Of the interface that the extension offers as its version 1, what is used here. */
interface GitExtension {
  readonly enabled: boolean;
  getAPI(version: 1): Git;
}

interface Git {
  readonly state: 'uninitialized' | 'initialized';
  readonly onDidChangeState: vscode.Event<'uninitialized' | 'initialized'>;
  getRepository(uri: vscode.Uri): Repository | null;
}

interface Repository {
  readonly rootUri: vscode.Uri;
  readonly state: { readonly HEAD: { readonly name?: string; readonly commit?: string } | undefined };
  show(ref: string, path: string): Promise<string>;
}

/** The last commit of the repository that holds the file; null where nothing offers one. */
export async function lastCommit(uri: vscode.Uri): Promise<Commit | null> {
  const git = await gitOf();
  const repository = git?.getRepository(uri) ?? null;
  const head = repository?.state.HEAD;
  if (git === null || repository === null || head?.commit === undefined) return null;
  const { commit, name } = head;
  return {
    name: commit.slice(0, 8),
    branch: name ?? null,
    async read(file) {
      if (git.getRepository(file)?.rootUri.toString() !== repository.rootUri.toString()) return null;
      try {
        const text = await repository.show(commit, file.fsPath);
        return largestFile < text.length ? { problem: 'too-large' } : { text };
      } catch {
        return { problem: 'missing' };
      }
    },
  };
}

async function gitOf(): Promise<Git | null> {
  const extension = vscode.extensions.getExtension<GitExtension>('vscode.git');
  if (extension === undefined) return null;
  try {
    const { enabled, getAPI } = bound(await extension.activate());
    if (!enabled) return null;
    const git = getAPI(1);
    await started(git);
    return git;
  } catch {
    return null; // it is there and cannot be used: another file can
  }
}

const bound = (extension: GitExtension) => ({ enabled: extension.enabled, getAPI: extension.getAPI.bind(extension) });

const longestStart = 5000;

/** It finds its repositories first; a folder without one is known as such then. */
async function started(git: Git): Promise<void> {
  if (git.state === 'initialized') return;
  await new Promise<void>((resolve) => {
    const end = () => {
      clearTimeout(timer);
      listener.dispose();
      resolve();
    };
    const timer = setTimeout(end, longestStart);
    const listener = git.onDidChangeState((state) => state === 'initialized' && end());
  });
}
