import * as vscode from 'vscode';
import { equal, eventually, ok } from './assert';
import { openBoard, positionOf, revertAndClose, waitForFindings } from './boards';

describe('navigation', () => {
  afterEach(revertAndClose);

  it('goes to a declaration in the same file', async () => {
    const { document } = await openBoard('valve/valve.quiet');
    const [found] = await definitions(document, positionOf(document, 'trace SENSE', 7));
    equal(found.uri.path, document.uri.path);
    equal(document.getText(found.range), 'SENSE');
    equal(document.lineAt(found.range.start.line).text, 'net SENSE {');
  });

  it('goes to a declaration in a file that is used, and from the path to the file', async () => {
    const { document } = await openBoard('valve/valve.quiet');
    const [family] = await definitions(document, positionOf(document, 'is gate-drive', 4));
    ok(family.uri.path.endsWith('/valve/parts.quiet'), family.uri.toString());
    const parts = await vscode.workspace.openTextDocument(family.uri);
    equal(parts.getText(family.range), 'gate-drive');
    const [file] = await definitions(document, positionOf(document, 'parts.quiet', 2));
    equal(file.uri.path, family.uri.path);
  });

  it('finds every place that names a net', async () => {
    const { document } = await openBoard('valve/valve.quiet');
    await waitForFindings(document, 'over-budget', 'some');
    const found = await vscode.commands.executeCommand<vscode.Location[]>('vscode.executeReferenceProvider', document.uri, positionOf(document, 'trace GATE', 7));
    equal(found.map(({ range }) => document.lineAt(range.start.line).text.trim()).sort(), ['net GATE is gate-drive', 'trace GATE  0.25 mm']);
    for (const { range } of found) equal(document.getText(range), 'GATE');
  });

  it('outlines the file', async () => {
    const { document } = await openBoard('valve/valve.quiet');
    const outline = await eventually(async () => vscode.commands.executeCommand<vscode.DocumentSymbol[] | undefined>('vscode.executeDocumentSymbolProvider', document.uri), 'an outline');
    equal(outline.map(({ name }) => name), ['valve', 'GATE', 'SPARE', 'SENSE', 'past-the-sensor']);
    equal(outline[4].children.map(({ name }) => name), ['GATE', 'gap', 'SENSE']);
    for (const { range, selectionRange } of outline) ok(range.contains(selectionRange), 'a name lies outside its declaration');
  });
});

const definitions = (document: vscode.TextDocument, position: vscode.Position) =>
  eventually(async () => {
    const found = await vscode.commands.executeCommand<(vscode.Location | vscode.LocationLink)[]>('vscode.executeDefinitionProvider', document.uri, position);
    return found.length === 0 ? undefined : found.map((each) => ('targetUri' in each ? new vscode.Location(each.targetUri, each.targetSelectionRange ?? each.targetRange) : each));
  }, 'a definition');
