/** Formatting as the editor does it: a document, a selection, and while someone types. */
import * as vscode from 'vscode';
import { equal, eventually } from './assert';
import { newBoard, openBoard, positionOf, replace, revertAndClose, type OpenBoard } from './boards';

const run = 'run r on TOP for 5 mm { # 5 µs 🔌\ntrace A 0.2mm\ngap 0.3 mm\ntrace SENSE 0.2 mm\n}\n';

describe('formatting', () => {
  afterEach(async () => {
    await vscode.workspace.getConfiguration('editor').update('formatOnType', undefined, vscode.ConfigurationTarget.Global);
    await revertAndClose();
  });

  it('sets a document in order, line ends and all that is said kept', async () => {
    const board = await openBoard('valve/valve.quiet');
    await replace(board, 'trace GATE  0.25 mm', '   trace GATE 0.25mm');
    const before = board.document.getText();
    await eventually(() => edits('vscode.executeFormatDocumentProvider', board), 'a server that formats');
    await vscode.commands.executeCommand('editor.action.formatDocument');
    await eventually(() => (board.document.getText() === before ? undefined : true), 'a formatted document');
    const after = board.document.getText();
    equal(after.replace(/\s/g, ''), before.replace(/\s/g, ''));
    equal(after.match(/\r?\n/g), before.match(/\r?\n/g));
    equal(linesOf(board, 'run past-the-sensor', 4), ['run past-the-sensor on TOP for 26 mm {', '  trace GATE  0.25 mm', '  gap   0.35 mm  # 😀', '  trace SENSE 0.15 mm']);
    equal(await edits('vscode.executeFormatDocumentProvider', board), undefined);
  });

  it('keeps to a selection', async () => {
    const board = await newBoard(run);
    const range = new vscode.Range(positionOf(board.document, 'gap'), positionOf(board.document, '0.3 mm', 6));
    const found = await eventually(() => edits('vscode.executeFormatRangeProvider', board, range), 'edits of a range');
    equal(found.map((edit) => [edit.range.start.line, edit.newText]), [[2, '  '], [2, '  ']]); // the editor makes an edit smaller still
  });

  it('lines up the columns of a run as its rows are typed, and leaves the line that was begun', async () => {
    await vscode.workspace.getConfiguration('editor').update('formatOnType', true, vscode.ConfigurationTarget.Global);
    const board = await newBoard('run r on TOP for 5 mm {\n  trace A 0.2 mm # 5 µs 🔌\n  gap   0.3 mm\n}\n');
    await eventually(() => edits('vscode.executeFormatDocumentProvider', board), 'a server that formats');
    await typeAfter(board, 'gap   0.3 mm', ['\n', 'trace SENSE 0.2 mm', '\n']);
    await becomes(board, 'run r', ['run r on TOP for 5 mm {', '  trace A     0.2 mm  # 5 µs 🔌', '  gap   0.3 mm', '  trace SENSE 0.2 mm', '  ', '}']);
  });

  it('sets a declaration in order when its brace is typed', async () => {
    await vscode.workspace.getConfiguration('editor').update('formatOnType', true, vscode.ConfigurationTarget.Global);
    const board = await newBoard(`net  Z is F\n${run.slice(0, -'\n}\n'.length)}`);
    await eventually(() => edits('vscode.executeFormatDocumentProvider', board), 'a server that formats');
    await typeAfter(board, 'trace SENSE 0.2 mm', ['\n', '}']);
    await becomes(board, 'net', ['net  Z is F', 'run r on TOP for 5 mm {  # 5 µs 🔌', '  trace A     0.2 mm', '  gap   0.3 mm', '  trace SENSE 0.2 mm', '}']);
  });
});

/** The edits of a provider; undefined where there are none. */
async function edits(command: string, { document }: OpenBoard, ...more: unknown[]): Promise<readonly vscode.TextEdit[] | undefined> {
  const found = await vscode.commands.executeCommand<readonly vscode.TextEdit[] | undefined>(command, document.uri, ...more, { tabSize: 4, insertSpaces: true });
  return found === undefined || found.length === 0 ? undefined : found;
}

/** As by the keys; formatting follows in its own time. */
async function typeAfter({ document, editor }: OpenBoard, text: string, keys: readonly string[]): Promise<void> {
  const at = positionOf(document, text, text.length);
  editor.selection = new vscode.Selection(at, at);
  for (const key of keys) await vscode.commands.executeCommand('type', { text: key });
}

async function becomes(board: OpenBoard, first: string, wanted: readonly string[]): Promise<void> {
  const found = () => JSON.stringify(linesOf(board, first, wanted.length));
  await eventually(() => (found() === JSON.stringify(wanted) ? true : undefined), 'formatted lines', 10_000).catch(() => equal(found(), JSON.stringify(wanted)));
}

function linesOf({ document }: OpenBoard, first: string, count: number): readonly string[] {
  const from = positionOf(document, first).line;
  return Array.from({ length: count }, (_, at) => document.lineAt(from + at).text);
}
