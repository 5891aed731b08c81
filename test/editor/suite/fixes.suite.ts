import * as vscode from 'vscode';
import { equal, match, ok } from './assert';
import { openBoard, replace, revertAndClose, waitForFindings, type OpenBoard } from './boards';

describe('quick fixes', () => {
  afterEach(revertAndClose);

  for (const { title, tolerates, words, also } of [
    { title: 'widen the gap', tolerates: '2 mV', words: /^Widen the gap .*: [\d.]+ mV of 2\.00 mV$/, also: /gap {3}[\d.]+ mm # 😀/ },
    { title: 'add a guard', tolerates: '2 mV', words: /^Add a guard .*: [\d.]+ mV of 2\.00 mV$/, also: /guard \S+ +[\d.]+ mm/ },
    { title: 'shorten the run', tolerates: '30 mV', words: /^Shorten .*: [\d.]+ mV of 30\.0 mV$/, also: /on TOP for [\d.]+ mm \{/ },
  ]) {
    it(`${title}: the finding goes, and comes back with undo`, async () => {
      const board = await openBoard('valve/valve.quiet');
      if (tolerates !== '2 mV') await replace(board, 'tolerates 2 mV', `tolerates ${tolerates}`);
      const before = board.document.getText();
      const [finding] = await waitForFindings(board.document, 'over-budget', 'some');
      const fixes = await fixesOf(board, finding.range);
      const fix = fixes.find((each) => words.test(each.title));
      ok(fix, fixes.map((each) => each.title).join(' | '));
      await apply(fix);
      match(board.document.getText(), also);
      equal(comments(board.document.getText()), comments(before), 'comments');
      equal(/\r\n/.test(board.document.getText()), /\r\n/.test(before), 'line ends');
      await waitForFindings(board.document, 'over-budget', 'none');
      await vscode.commands.executeCommand('undo');
      equal(board.document.getText(), before);
      await waitForFindings(board.document, 'over-budget', 'some');
    });
  }

  it('name the finding that they mend, and one of them is preferred', async () => {
    const board = await openBoard('valve/valve.quiet');
    const [finding] = await waitForFindings(board.document, 'over-budget', 'some');
    const fixes = await fixesOf(board, finding.range);
    equal(fixes.filter(({ isPreferred }) => isPreferred === true).length, 1);
    ok(fixes.every(({ kind }) => kind !== undefined && vscode.CodeActionKind.QuickFix.contains(kind)), 'a fix of another kind');
  });

  it('spell a unit right', async () => {
    const board = await openBoard('valve/valve.quiet');
    await replace(board, '26 mm', '26 MM');
    const [finding] = await waitForFindings(board.document, 'unit', 'some');
    const fixes = await fixesOf(board, finding.range);
    const fix = fixes.find(({ title }) => /\bmm\b/.test(title));
    ok(fix, fixes.map(({ title }) => title).join(' | '));
    await apply(fix);
    match(board.document.getText(), /for 26 mm \{/);
    await waitForFindings(board.document, 'unit', 'none');
  });

  it('waive, with a reason to be written', async () => {
    const board = await openBoard('valve/valve.quiet');
    const [finding] = await waitForFindings(board.document, 'over-budget', 'some');
    const fix = (await fixesOf(board, finding.range)).find(({ title }) => title.startsWith('Waive over-budget'));
    ok(fix, 'no fix to waive');
    await apply(fix);
    match(board.document.getText(), /waive over-budget/);
  });
});

const fixesOf = ({ document }: OpenBoard, range: vscode.Range) => vscode.commands.executeCommand<vscode.CodeAction[]>('vscode.executeCodeActionProvider', document.uri, range, vscode.CodeActionKind.QuickFix.value, 20);

async function apply({ edit }: vscode.CodeAction): Promise<void> {
  ok(edit, 'a fix without an edit');
  ok(await vscode.workspace.applyEdit(edit), 'the edit was refused');
}

const comments = (text: string) => text.match(/#.*$/gm);
