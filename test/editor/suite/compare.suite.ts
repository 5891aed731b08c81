/** Comparing revisions: with another file in every host, with the last commit where a git extension offers it. */
import * as vscode from 'vscode';
import { eventually, match, ok } from './assert';
import { openBoard, replace, revertAndClose, waitForFindings } from './boards';

const command = 'quietrun.compareRevisions';

describe('comparing revisions', () => {
  afterEach(async () => {
    await vscode.commands.executeCommand('workbench.action.closeEditorsInOtherGroups');
    await revertAndClose();
  });

  it('opens a page beside the board: what changed since another file, and what that did', async () => {
    const board = await openBoard('valve/valve.quiet');
    const older = vscode.Uri.joinPath(board.document.uri, '../older.quiet');
    await vscode.workspace.fs.writeFile(older, new TextEncoder().encode(board.document.getText()));
    try {
      await waitForFindings(board.document, 'over-budget', 'some');
      await replace(board, '26 mm', '2 mm');
      await vscode.commands.executeCommand(command, board.document.uri, older);
      const page = await shownPage();
      match(page, /^### Noise margins: valve\/older\.quiet → valve\/valve\.quiet\n/);
      match(page, /26 mm → /);
      match(page, /\| −[\d.]+ [mµ]V run /);
    } finally {
      await vscode.workspace.fs.delete(older);
    }
  });

  it('goes back to the last commit', async () => {
    const git = vscode.extensions.getExtension<{ readonly enabled: boolean; getAPI(version: 1): Git }>('vscode.git');
    // A host without git has other files to compare with, and the test above.
    if (git === undefined) return;
    const board = await openBoard('valve/valve.quiet');
    const folder = vscode.Uri.joinPath(board.document.uri, '..');
    const exports = await git.activate();
    if (!exports.enabled) return;
    const repository = await exports.getAPI(1).init(folder);
    ok(repository, 'no repository was made');
    try {
      await repository.setConfig('user.name', 'Board');
      await repository.setConfig('user.email', 'board@example.org');
      await repository.add([board.document.uri.fsPath, vscode.Uri.joinPath(folder, 'parts.quiet').fsPath]);
      await repository.commit('First');
      await eventually(() => repository.state.HEAD?.commit, 'a commit');
      await replace(board, '26 mm', '2 mm');
      await vscode.commands.executeCommand(command, board.document.uri, 'commit');
      const page = await shownPage();
      match(page, new RegExp(`^### Noise margins: valve\\.quiet at ${repository.state.HEAD?.commit?.slice(0, 8)} → valve\\.quiet\n`));
      match(page, /26 mm → /);
    } finally {
      await vscode.workspace.fs.delete(vscode.Uri.joinPath(folder, '.git'), { recursive: true });
    }
  });
});

/** Of the git extension's interface, what makes a history. */
interface Git {
  init(root: vscode.Uri): Promise<Repository | null>;
}

interface Repository {
  readonly state: { readonly HEAD: { readonly commit?: string } | undefined };
  setConfig(key: string, value: string): Promise<string>;
  add(paths: string[]): Promise<void>;
  commit(message: string): Promise<void>;
}

async function shownPage(): Promise<string> {
  const uri = await eventually(() => {
    const inputs = vscode.window.tabGroups.all.flatMap(({ tabs }) => tabs).map(({ input }) => (input as { uri?: vscode.Uri } | undefined)?.uri);
    return inputs.find((each) => each?.scheme === 'quietrun-comparison');
  }, 'a page');
  return (await vscode.workspace.openTextDocument(uri)).getText();
}
