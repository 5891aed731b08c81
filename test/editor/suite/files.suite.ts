/** Boards of several files, wherever those are. */
import * as vscode from 'vscode';
import { equal, eventually, match, ok } from './assert';
import { findingsOf, newBoard, openBoard, replace, revertAndClose, ruleOf, waitForFindings } from './boards';

const inWorkspace = (path: string) => vscode.Uri.joinPath(vscode.workspace.workspaceFolders![0].uri, path);

describe('files', () => {
  afterEach(revertAndClose);

  it('are read where a board uses them', async () => {
    const { document } = await openBoard('valve/valve.quiet');
    await waitForFindings(document, 'over-budget', 'some');
    equal(findingsOf(document).map(ruleOf).filter((rule) => rule === 'include' || rule === 'unknown-name'), []);
  });

  it('are read again when they change on the disk', async () => {
    const parts = inWorkspace('valve/parts.quiet');
    const text = new TextDecoder().decode(await vscode.workspace.fs.readFile(parts));
    const { document } = await openBoard('valve/valve.quiet');
    await waitForFindings(document, 'over-budget', 'some');
    try {
      await vscode.workspace.fs.writeFile(parts, new TextEncoder().encode(text.replace('rise 30 ns', 'rise 3000 ns')));
      await waitForFindings(document, 'over-budget', 'none');
    } finally {
      await vscode.workspace.fs.writeFile(parts, new TextEncoder().encode(text));
    }
    await waitForFindings(document, 'over-budget', 'some');
  });

  it('count as they are edited, before they are saved', async () => {
    const parts = await openBoard('valve/parts.quiet');
    await replace(parts, 'rise 30 ns', 'rise 3000 ns');
    const { document } = await openBoard('valve/valve.quiet');
    await waitForFindings(document, 'dominant-coupling', 'none');
    await vscode.window.showTextDocument(parts.document);
    await revertAndClose();
    await vscode.window.showTextDocument(document);
    await waitForFindings(document, 'over-budget', 'some');
  });

  it('may be used by a board that was never saved', async () => {
    const { document } = await newBoard('use "valve/parts.quiet"\nnet A is gate-drive\nnet B { tolerates 1 mV peak }\nrun r on TOP for 30 mm { trace A 0.2 mm; gap 0.2 mm; trace B 0.2 mm }\n');
    const [found] = await waitForFindings(document, 'over-budget', 'some');
    match(found.message, /\bB\b/);
  });

  it('outside the folder are refused, however the way there is written', async () => {
    // Each longer than the one before, so that a finding of the text as it was cannot span it.
    const ways = ['../secret.quiet', '%2e%2e/secret.quiet', 'valve/../../secret.quiet'];
    const board = await newBoard(`use "${ways[0]}"\n`);
    for (const [at, way] of ways.entries()) {
      if (0 < at) await replace(board, ways[at - 1], way);
      const found = await eventually(() => findingsOf(board.document, 'include').find(({ range }) => board.document.getText(range).includes(way)), `a finding at ${way}`);
      match(found.message, /outside the workspace folder/);
    }
  });

  it('spelt in another case are said to be, with the right spelling as a fix', async () => {
    const { document } = await newBoard('use "valve/Parts.quiet"\n');
    const [found] = await waitForFindings(document, 'include', 'some');
    match(found.message, /case/);
    const fixes = await vscode.commands.executeCommand<vscode.CodeAction[]>('vscode.executeCodeActionProvider', document.uri, found.range, vscode.CodeActionKind.QuickFix.value, 5);
    const [fix] = fixes.filter(({ edit }) => edit !== undefined);
    ok(fix?.edit, fixes.map(({ title }) => title).join(' | '));
    await vscode.workspace.applyEdit(fix.edit);
    equal(document.lineAt(0).text, 'use "valve/parts.quiet"');
    await waitForFindings(document, 'include', 'none');
  });

  it('that are not open are checked too', async () => {
    await openBoard('quiet-corner.quiet');
    await eventually(() => {
      const found = vscode.languages.getDiagnostics(inWorkspace('buoy/listening-post.quiet')).map(ruleOf);
      return found.includes('over-budget') ? true : undefined;
    }, 'findings of a board that is not open');
  });

  it('that only hold parts are not taken for a board', async () => {
    const { document } = await openBoard('common/parts.quiet');
    await vscode.commands.executeCommand('vscode.executeDocumentSymbolProvider', document.uri);
    await eventually(() => (findingsOf(document).every((found) => ruleOf(found) !== 'unused-declaration') ? true : undefined), 'no unused declarations');
  });
});

describe('the server', () => {
  afterEach(revertAndClose);

  it('starts again when it is told to, and nothing is lost', async () => {
    const board = await openBoard('valve/valve.quiet');
    await waitForFindings(board.document, 'over-budget', 'some');
    await replace(board, '26 mm', '26 MM');
    await waitForFindings(board.document, 'unit', 'some');
    await vscode.commands.executeCommand('quietrun.restartServer');
    await waitForFindings(board.document, 'unit', 'some');
    await replace(board, '26 MM', '26 mm');
    await waitForFindings(board.document, 'over-budget', 'some');
  });

  it('shows the page of a rule', async () => {
    const document = await vscode.workspace.openTextDocument(vscode.Uri.parse('quietrun-rule:/over-budget.md'));
    match(document.getText(), /^## over-budget/);
    await vscode.window.showTextDocument(document);
  });
});
