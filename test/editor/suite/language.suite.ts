import * as vscode from 'vscode';
import { equal, eventually, ok } from './assert';
import { openBoard } from './boards';

describe('the language', () => {
  it('is recognised by the extension of the file', async () => {
    const { document } = await openBoard('quiet-corner.quiet');
    equal(document.languageId, 'quietrun');
  });

  it('starts the extension', async () => {
    await openBoard('quiet-corner.quiet');
    const extension = vscode.extensions.getExtension('quietrun.quietrun');
    ok(extension, 'the extension is not there');
    await eventually(() => (extension.isActive ? true : undefined), 'the extension to start');
  });

  it('has a line comment, and brackets that close', async () => {
    const { editor } = await openBoard('quiet-corner.quiet');
    const first = editor.document.lineAt(0).text;
    editor.selection = new vscode.Selection(0, 0, 0, 0);
    await vscode.commands.executeCommand('editor.action.commentLine');
    equal(editor.document.lineAt(0).text, `# ${first}`);
    await vscode.commands.executeCommand('editor.action.commentLine');
    equal(editor.document.lineAt(0).text, first);
  });

  it('offers its commands, and no more than ten', async () => {
    const extension = vscode.extensions.getExtension('quietrun.quietrun');
    const stated = (extension?.packageJSON.contributes.commands as { command: string; category: string }[]);
    const registered = new Set(await vscode.commands.getCommands(true));
    ok(0 < stated.length && stated.length <= 10, `${stated.length} commands`);
    for (const { command, category } of stated) {
      ok(registered.has(command), `${command} is stated and not registered`);
      equal(category, 'Quietrun', command);
    }
  });
});
