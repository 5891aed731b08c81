import * as vscode from 'vscode';
import { equal, match, ok } from './assert';
import { findingsOf, newBoard, openBoard, replace, revertAndClose, waitForFindings } from './boards';

describe('findings', () => {
  afterEach(revertAndClose);

  it('marks a text that cannot be read, and takes the mark away with the mistake', async () => {
    const board = await openBoard('quiet-corner.quiet');
    await replace(board, 'gap   0.60 mm', 'gap   mm');
    const [found] = await waitForFindings(board.document, 'missing-value', 'some');
    equal(found.severity, vscode.DiagnosticSeverity.Error);
    equal(found.source, 'quietrun');
    await vscode.commands.executeCommand('undo');
    await waitForFindings(board.document, 'missing-value', 'none');
  });

  it('says which units fit when one is missing', async () => {
    const board = await openBoard('quiet-corner.quiet');
    await replace(board, 'rise 40 ns', 'rise 40');
    const [found] = await waitForFindings(board.document, 'unit', 'some');
    match(found.message, /fits: .*ns/);
  });

  it('follows a board that is closed and opened again at once, over and over', async () => {
    for (let time = 0; time < 5; time += 1) {
      const board = await openBoard('quiet-corner.quiet');
      await replace(board, 'rise 40 ns', 'rise 40');
      await waitForFindings(board.document, 'unit', 'some');
      await revertAndClose();
    }
  });

  it('places a finding after µ, Ω and an emoji where it is', async () => {
    const board = await newBoard('net A { swing 3 V; rise 1 µs; source 50 Ω; load 1 kΩ } # 😀\nnet B { /* 😀 */ }\nnet C { swing "😀" 3 V }\n');
    await waitForFindings(board.document, 'syntax', 'some');
    for (const found of findingsOf(board.document)) {
      const text = board.document.getText(found.range);
      ok(0 < text.length && !/\n/.test(text), `${found.message}: ${JSON.stringify(text)}`);
    }
  });
});
