/** What is read beside the text: hovers and inlay hints. */
import * as vscode from 'vscode';
import { equal, eventually, match, ok } from './assert';
import { openBoard, positionOf, replace, revertAndClose, waitForFindings, type OpenBoard } from './boards';

describe('hovers', () => {
  afterEach(revertAndClose);

  it('show the budget of a net', async () => {
    const { document } = await openBoard('valve/valve.quiet');
    const text = await hoverText(document, positionOf(document, 'net SENSE', 5));
    match(text, /The sensor, through 200 Ω\./);
    match(text, /2\.00 mV/);
    match(text, /GATE/);
  });

  it('show what a trace gets in its run, at both ends and at the receiver', async () => {
    const { document } = await openBoard('valve/valve.quiet');
    const text = await hoverText(document, positionOf(document, 'trace SENSE', 8));
    for (const word of [/near/i, /far/i, /receiver/i, /capacitive/i, /inductive/i]) match(text, word);
  });

  it('say what a word of the language means', async () => {
    const { document } = await openBoard('valve/valve.quiet');
    match(await hoverText(document, positionOf(document, 'gap   0.35', 1)), /edge to edge/);
    match(await hoverText(document, positionOf(document, 'tolerates 2', 3)), /noise/);
  });

  it('hold no trusted text, and no HTML', async () => {
    const board = await openBoard('valve/valve.quiet');
    await replace(board, '## The sensor, through 200 Ω.', '## <b>bold</b> [run](command:workbench.action.quit) <img src="https://example.invalid/x.png">');
    const found = await hovers(board.document, positionOf(board.document, 'net SENSE', 5));
    for (const content of found.flatMap(({ contents }) => contents) as vscode.MarkdownString[]) {
      ok(content.isTrusted !== true, 'a trusted hover');
      ok(content.supportHtml !== true, 'a hover with HTML');
      ok(!/(?<!\\)\[run\]\(command:/.test(content.value), content.value);
    }
  });
});

describe('inlay hints', () => {
  afterEach(async () => {
    await vscode.workspace.getConfiguration('quietrun').update('inlayHints.noise', undefined, vscode.ConfigurationTarget.Global);
    await revertAndClose();
  });

  it('say what a receiver gets and which gap would do, and lead to the aggressor', async () => {
    const board = await openBoard('valve/valve.quiet');
    await waitForFindings(board.document, 'over-budget', 'some');
    const found = await hintsOf(board);
    const noise = found.find((hint) => /^≈ [\d.]+ mV · \d+ %$/.test(labelOf(hint)));
    ok(noise, found.map(labelOf).join(' | '));
    equal(noise.position.line, positionOf(board.document, 'trace SENSE').line);
    const [first] = noise.label as vscode.InlayHintLabelPart[];
    equal(board.document.lineAt(first.location!.range.start.line).text.trim(), 'trace GATE  0.25 mm');
    const gap = found.find((hint) => /^≥ [\d.]+ mm$/.test(labelOf(hint)));
    ok(gap, found.map(labelOf).join(' | '));
    const { line, character } = positionOf(board.document, '0.35 mm', '0.35 mm'.length);
    equal([gap.position.line, gap.position.character], [line, character]);
  });

  it('follow the text', async () => {
    const board = await openBoard('valve/valve.quiet');
    await waitForFindings(board.document, 'over-budget', 'some');
    const before = (await hintsOf(board)).map(labelOf).find((label) => label.startsWith('≈'));
    await replace(board, '0.35 mm', '1.35 mm');
    const after = await eventually(async () => {
      const label = (await hintsOf(board)).map(labelOf).find((each) => each.startsWith('≈'));
      return label === before ? undefined : label;
    }, 'another number');
    ok(Number.parseFloat(after!.slice(2)) < Number.parseFloat(before!.slice(2)), `${before} and then ${after}`);
  });

  it('can be switched off one kind at a time, at once', async () => {
    const board = await openBoard('valve/valve.quiet');
    await waitForFindings(board.document, 'over-budget', 'some');
    ok((await hintsOf(board)).some((hint) => labelOf(hint).startsWith('≈')), 'no noise before');
    await vscode.workspace.getConfiguration('quietrun').update('inlayHints.noise', false, vscode.ConfigurationTarget.Global);
    await eventually(async () => {
      const labels = (await hintsOf(board)).map(labelOf);
      return labels.some((label) => label.startsWith('≈')) || labels.length === 0 ? undefined : labels;
    }, 'hints without noise');
  });
});

const hovers = (document: vscode.TextDocument, position: vscode.Position) =>
  eventually(async () => {
    const found = await vscode.commands.executeCommand<vscode.Hover[]>('vscode.executeHoverProvider', document.uri, position);
    return found.length === 0 ? undefined : found;
  }, 'a hover');

/** Without the strokes that keep a name's letters from being read as Markdown. */
async function hoverText(document: vscode.TextDocument, position: vscode.Position): Promise<string> {
  const found = await hovers(document, position);
  return found.flatMap(({ contents }) => contents as vscode.MarkdownString[]).map(({ value }) => value.replace(/\\(?=\W)/g, '')).join('\n');
}

const hintsOf = ({ document }: OpenBoard) => vscode.commands.executeCommand<vscode.InlayHint[]>('vscode.executeInlayHintProvider', document.uri, new vscode.Range(0, 0, document.lineCount, 0));

const labelOf = ({ label }: vscode.InlayHint) => (typeof label === 'string' ? label : label.map(({ value }) => value).join(''));
