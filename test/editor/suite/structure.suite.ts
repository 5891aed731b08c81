import * as vscode from 'vscode';
import { equal, eventually, ok } from './assert';
import { openBoard, positionOf, replace, revertAndClose } from './boards';

describe('structure', () => {
  afterEach(revertAndClose);

  it('folds blocks', async () => {
    const { document } = await openBoard('quiet-corner.quiet');
    const line = positionOf(document, 'run corner').line;
    const fold = await eventually(async () => (await vscode.commands.executeCommand<vscode.FoldingRange[]>('vscode.executeFoldingRangeProvider', document.uri)).find(({ start }) => start === line), 'the fold of the run');
    ok(line < fold.end && document.lineAt(fold.end + 1).text.startsWith('}'), 'its brace stays in view');
  });

  it('grows a selection from a number to its value, its statement and its block', async () => {
    const { document } = await openBoard('quiet-corner.quiet');
    // Until the server is there, the editor answers with ranges of its own, which know no values.
    await eventually(async () => {
      const [first] = await vscode.commands.executeCommand<vscode.SelectionRange[]>('vscode.executeSelectionRangeProvider', document.uri, [positionOf(document, 'gap   0.60 mm', 7)]);
      const texts: string[] = [];
      for (let at: vscode.SelectionRange | undefined = first; at !== undefined; at = at.parent) texts.push(document.getText(at.range));
      return (texts.includes('0.60 mm') && texts.includes('gap   0.60 mm') && texts.some((text) => text.startsWith('run '))) || undefined;
    }, 'number, value, statement and run');
  });

  it('tells what the names stand for, and which net is over its budget', async () => {
    const board = await openBoard('quiet-corner.quiet');
    const legend = await eventually(async () => vscode.commands.executeCommand<vscode.SemanticTokensLegend | undefined>('vscode.provideDocumentSemanticTokensLegend', board.document.uri), 'a legend');
    const over = 1 << legend.tokenModifiers.indexOf('overBudget');
    const marked = async () => {
      const { data } = await vscode.commands.executeCommand<vscode.SemanticTokens>('vscode.provideDocumentSemanticTokens', board.document.uri);
      const found: string[] = [];
      for (let i = 0, line = 0, character = 0; i < data.length; i += 5) {
        [line, character] = data[i] === 0 ? [line, character + data[i + 1]] : [line + data[i], data[i + 1]];
        if ((data[i + 4] & over) !== 0) found.push(board.document.getText(new vscode.Range(line, character, line, character + data[i + 2])));
      }
      return found;
    };
    equal(await marked(), []);
    await replace(board, 'tolerates 20 mV', 'tolerates 1 mV');
    const names = await eventually(async () => ((await marked()).length === 0 ? undefined : marked()), 'a net that is over its budget');
    equal([...new Set(names)], ['SENSE']);
  });
});
