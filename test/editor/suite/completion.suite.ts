import * as vscode from 'vscode';
import { equal, eventually, match, ok } from './assert';
import { openBoard, positionOf, replace, revertAndClose, type OpenBoard } from './boards';

describe('completion', () => {
  afterEach(revertAndClose);

  it('offers the statements of a block', async () => {
    const board = await openBoard('valve/valve.quiet');
    await replace(board, '  tolerates 2 mV peak', '  tol');
    const labels = await labelsAt(board, positionOf(board.document, '  tol', 5));
    ok(labels.includes('tolerates'), labels.join(' '));
    ok(!labels.includes('gap'), 'a statement of another block');
  });

  it('offers layers of the file that is used, nets and units where they fit', async () => {
    const board = await openBoard('valve/valve.quiet');
    await replace(board, 'on TOP for 26 mm', 'on T for 26 m');
    ok((await labelsAt(board, positionOf(board.document, 'on T for', 4))).includes('TOP'), 'no layer');
    ok((await labelsAt(board, positionOf(board.document, 'for 26 m', 8))).includes('mm'), 'no unit');
    ok((await labelsAt(board, positionOf(board.document, 'trace GATE', 8))).includes('GATE'), 'no net');
  });

  it('tells what an entry means when it is looked at', async () => {
    const board = await openBoard('valve/valve.quiet');
    await replace(board, '  tolerates 2 mV peak', '  tol');
    const found = await vscode.commands.executeCommand<vscode.CompletionList>('vscode.executeCompletionItemProvider', board.document.uri, positionOf(board.document, '  tol', 5), undefined, 50);
    const item = found.items.find(({ label }) => nameOf(label) === 'tolerates');
    const documentation = item?.documentation;
    match(typeof documentation === 'string' ? documentation : documentation?.value ?? '', /noise/);
  });

  it('replaces the word that is being written', async () => {
    const board = await openBoard('valve/valve.quiet');
    await replace(board, '  tolerates 2 mV peak', '  tol');
    board.editor.selection = new vscode.Selection(positionOf(board.document, '  tol', 5), positionOf(board.document, '  tol', 5));
    await vscode.commands.executeCommand('editor.action.triggerSuggest');
    const before = board.document.version;
    await eventually(async () => {
      await vscode.commands.executeCommand('acceptSelectedSuggestion');
      return before < board.document.version ? true : undefined;
    }, 'an accepted suggestion');
    equal(board.document.lineAt(positionOf(board.document, '  tolerates').line).text, '  tolerates');
  });
});

async function labelsAt({ document }: OpenBoard, position: vscode.Position): Promise<readonly string[]> {
  return eventually(async () => {
    const found = await vscode.commands.executeCommand<vscode.CompletionList>('vscode.executeCompletionItemProvider', document.uri, position);
    return found.items.length === 0 ? undefined : found.items.filter(({ kind }) => kind !== vscode.CompletionItemKind.Text).map(({ label }) => nameOf(label));
  }, 'completions');
}

const nameOf = (label: string | vscode.CompletionItemLabel) => (typeof label === 'string' ? label : label.label);
