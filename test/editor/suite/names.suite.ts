/** Names, and what follows them through a board: rename, highlights, who disturbs whom, symbols, links, forms, lenses. */
import * as vscode from 'vscode';
import { equal, eventually, match, ok } from './assert';
import { newBoard, openBoard, positionOf, replace, revertAndClose, waitForFindings } from './boards';

const ask = <T>(command: string, ...rest: readonly unknown[]) => vscode.commands.executeCommand<T>(command, ...rest);

describe('rename', () => {
  afterEach(revertAndClose);

  it('follows a name through every file, there and back', async () => {
    const { document } = await openBoard('valve/valve.quiet');
    await waitForFindings(document, 'over-budget', 'some');
    const at = positionOf(document, 'is gate-drive', 5);
    const target = await ask<{ range: vscode.Range; placeholder: string }>('vscode.prepareRename', document.uri, at);
    equal([target.placeholder, document.getText(target.range)], ['gate-drive', 'gate-drive']);
    const edit = await ask<vscode.WorkspaceEdit>('vscode.executeDocumentRenameProvider', document.uri, at, 'gate drive, µ');
    equal(edit.entries().map(([uri, edits]) => `${uri.path.split('/').at(-1)} ${edits.length}`).sort(), ['parts.quiet 1', 'valve.quiet 2']);
    ok(await vscode.workspace.applyEdit(edit), 'the edit was refused');
    equal(document.lineAt(positionOf(document, 'net GATE').line).text, 'net GATE is "gate drive, µ"');
    const parts = await vscode.workspace.openTextDocument(vscode.Uri.joinPath(document.uri, '../parts.quiet'));
    match(parts.getText(), /family "gate drive, µ" \{/);
    const back = await ask<vscode.WorkspaceEdit>('vscode.executeDocumentRenameProvider', document.uri, positionOf(document, '"gate drive', 3), 'gate-drive');
    ok(await vscode.workspace.applyEdit(back), 'the way back was refused');
    match(parts.getText(), /family gate-drive \{/);
    await vscode.window.showTextDocument(parts);
    await revertAndClose();
    await vscode.window.showTextDocument(document);
  });

  it('says why it cannot be', async () => {
    const { document } = await openBoard('valve/valve.quiet');
    const refused = async (command: string, at: vscode.Position, ...rest: readonly unknown[]) => {
      try {
        await ask(command, document.uri, at, ...rest);
      } catch (error) {
        return String(error);
      }
      return 'it can';
    };
    match(await refused('vscode.executeDocumentRenameProvider', positionOf(document, 'net GATE', 5), 'SENSE'), /There is a net SENSE already \(valve\.quiet, line \d+\)/);
    match(await refused('vscode.prepareRename', positionOf(document, 'tolerates', 3)), /No name that a board declares stands here/);
  });
});

describe('who disturbs whom', () => {
  afterEach(revertAndClose);

  it('is told from the row of a receiver, with the millivolts and the row of the one that does', async () => {
    const { document } = await openBoard('valve/valve.quiet');
    await waitForFindings(document, 'over-budget', 'some');
    const [item] = await ask<vscode.CallHierarchyItem[]>('vscode.prepareCallHierarchy', document.uri, positionOf(document, 'trace SENSE', 2));
    ok(item, 'nothing can be asked of the row');
    equal(item.name, 'SENSE');
    match(item.detail ?? '', /^[\d.]+ mV of 2\.00 mV · [\d.]+ dB too much$/);
    const [incoming] = await ask<vscode.CallHierarchyIncomingCall[]>('vscode.provideIncomingCalls', item);
    equal([incoming?.from.name, document.getText(incoming?.fromRanges[0])], ['GATE', 'trace GATE  0.25 mm']);
    match(incoming!.from.detail ?? '', /^[\d.]+ mV \(\d+ %\) on SENSE in run past-the-sensor$/);
    const [outgoing] = await ask<vscode.CallHierarchyOutgoingCall[]>('vscode.provideOutgoingCalls', incoming!.from);
    equal(outgoing?.to.name, 'SENSE');
    match(outgoing!.to.detail ?? '', /^[\d.]+ mV \(\d+ %\) from GATE in run past-the-sensor$/);
  });
});

describe('names', () => {
  afterEach(revertAndClose);

  it('are highlighted, the declaration otherwise than the uses', async () => {
    const { document } = await openBoard('valve/valve.quiet');
    const found = await eventually(async () => {
      const all = await ask<vscode.DocumentHighlight[] | undefined>('vscode.executeDocumentHighlights', document.uri, positionOf(document, 'trace SENSE', 8));
      return all === undefined || all.length === 0 ? undefined : all;
    }, 'highlights');
    equal(found.map(({ range, kind }) => [document.lineAt(range.start.line).text.trim().split(' ')[0], kind]), [['net', vscode.DocumentHighlightKind.Write], ['trace', vscode.DocumentHighlightKind.Read]]);
  });

  it('are found in the whole workspace, by a few of their letters', async () => {
    await openBoard('quiet-corner.quiet');
    const found = await eventually(async () => {
      const all = (await ask<vscode.SymbolInformation[]>('vscode.executeWorkspaceSymbolProvider', 'gtdrv')).filter(({ location }) => location.uri.path.endsWith('.quiet'));
      return all.length === 0 ? undefined : all;
    }, 'symbols');
    equal([found[0]!.name, found[0]!.containerName, found[0]!.location.uri.path.split('/').at(-1)], ['gate-drive', 'family', 'parts.quiet']);
  });

  it('of files are links to them', async () => {
    const { document } = await openBoard('valve/valve.quiet');
    const [link] = await eventually(async () => {
      const all = await ask<vscode.DocumentLink[]>('vscode.executeLinkProvider', document.uri, 10);
      return all.length === 0 ? undefined : all;
    }, 'links');
    equal([document.getText(link!.range), link!.target?.path.split('/').at(-1), link!.tooltip], ['parts.quiet', 'parts.quiet', '1 stackup, 1 family']);
  });
});

describe('the form of a statement', () => {
  afterEach(revertAndClose);

  it('shows behind its word, and what of it is due', async () => {
    const board = await openBoard('valve/valve.quiet');
    await replace(board, '  tolerates 2 mV peak', '  tolerates ');
    const help = await ask<vscode.SignatureHelp>('vscode.executeSignatureHelpProvider', board.document.uri, positionOf(board.document, '  tolerates ', 12), ' ');
    equal(help.signatures.map(({ label }) => label), ['tolerates VOLTAGE peak|rms', 'tolerates none']);
    const { documentation } = help.signatures[0]!.parameters[help.activeParameter]!;
    match(typeof documentation === 'string' ? documentation : documentation?.value ?? '', /a voltage such as `2 mV`, in V, mV or uV/);
  });

  it('is offered as a snippet where a declaration may begin, and not in a run', async () => {
    const { document } = await newBoard('\nrun r on TOP for 2 mm {\n  \n}\n');
    const snippets = async (line: number, character: number) => {
      const found = await eventually(async () => {
        const all = await ask<vscode.CompletionList>('vscode.executeCompletionItemProvider', document.uri, new vscode.Position(line, character));
        return all.items.some(({ kind }) => kind === vscode.CompletionItemKind.Keyword) ? all.items : undefined;
      }, 'completions');
      return found.filter(({ kind }) => kind === vscode.CompletionItemKind.Snippet).map(({ label }) => (typeof label === 'string' ? label : label.label));
    };
    equal(await snippets(2, 2), []);
    ok((await snippets(0, 0)).includes('net-receiver'), 'no snippet at the top');
  });
});

describe('code lenses', () => {
  const set = (kind: string, value: boolean | undefined) => vscode.workspace.getConfiguration('quietrun').update(`codeLens.${kind}`, value, vscode.ConfigurationTarget.Global);
  afterEach(async () => {
    await set('budgets', undefined);
    await revertAndClose();
  });

  it('are off, and there at once when they are wanted, and lead to those who disturb', async () => {
    const { document } = await openBoard('valve/valve.quiet');
    await waitForFindings(document, 'over-budget', 'some');
    const asked = () => ask<vscode.CodeLens[]>('vscode.executeCodeLensProvider', document.uri, 10);
    equal((await asked()).length, 0);
    await set('budgets', true);
    const [lens] = await eventually(async () => {
      const all = await asked();
      return all.length === 0 ? undefined : all;
    }, 'a code lens');
    equal(document.lineAt(lens!.range.start.line).text, 'net SENSE {');
    match(lens!.command!.title, /^[\d.]+ mV of 2\.00 mV · [\d.]+ dB too much$/);
    equal(lens!.command!.command, 'quietrun.showPlaces');
    await vscode.commands.executeCommand(lens!.command!.command, ...lens!.command!.arguments!);
  });
});
