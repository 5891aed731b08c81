/** The first ten minutes: a board to begin with, and a walkthrough whose steps are done when what they say has happened. */
import * as vscode from 'vscode';
import { starterBoard } from './starterBoard';

export const newBoardCommand = 'quietrun.newBoard';
export const firstStepsCommand = 'quietrun.firstSteps';

export function registerFirstSteps(context: vscode.ExtensionContext): vscode.Disposable {
  return vscode.Disposable.from(
    vscode.commands.registerCommand(newBoardCommand, async () => {
      const document = await vscode.workspace.openTextDocument({ language: 'quietrun', content: starterBoard });
      // Beside the walkthrough where that asked for it: its next step says what to do in the board.
      const beside = vscode.window.activeTextEditor === undefined && 0 < vscode.window.tabGroups.activeTabGroup.tabs.length;
      await vscode.window.showTextDocument(document, beside ? vscode.ViewColumn.Beside : vscode.ViewColumn.Active);
    }),
    vscode.commands.registerCommand(firstStepsCommand, () => vscode.commands.executeCommand('workbench.action.openWalkthrough', `${context.extension.id}#first-steps`, false)),
    tellOfBudgets(),
  );
}

/** Sets the keys that end the steps of the walkthrough; each once, then nothing is listened to any more. */
function tellOfBudgets(): vscode.Disposable {
  const over = new Set<string>();
  const listener = vscode.languages.onDidChangeDiagnostics(({ uris }) => {
    for (const uri of uris) {
      const isOver = vscode.languages.getDiagnostics(uri).some(({ source, code }) => source === 'quietrun' && (typeof code === 'object' ? code.value : code) === 'over-budget');
      if (isOver && over.size === 0) void set('quietrun.overBudgetSeen');
      if (isOver) over.add(uri.toString());
      else if (over.has(uri.toString()) && isOpen(uri)) {
        void set('quietrun.overBudgetMended');
        listener.dispose();
      }
    }
  });
  return listener;
}

/** What is closed has no findings either. */
const isOpen = (uri: vscode.Uri) => vscode.workspace.textDocuments.some((document) => document.uri.toString() === uri.toString());

const set = (key: string) => vscode.commands.executeCommand('setContext', key, true);
