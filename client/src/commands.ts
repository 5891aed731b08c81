import * as vscode from 'vscode';
import type { BaseLanguageClient } from 'vscode-languageclient';

export const restartCommand = 'quietrun.restartServer';
export const showOutputCommand = 'quietrun.showOutput';

export function registerCommands(client: BaseLanguageClient, output: vscode.LogOutputChannel): vscode.Disposable {
  return vscode.Disposable.from(
    vscode.commands.registerCommand(restartCommand, async () => {
      if (client.needsStop()) await client.stop();
      await client.start();
    }),
    vscode.commands.registerCommand(showOutputCommand, () => output.show()),
  );
}
