/** Desktop and remote: the server is a process of its own. */
import { LanguageClient, TransportKind } from 'vscode-languageclient/node';
import { realpath } from 'node:fs/promises';
import * as vscode from 'vscode';
import { startClient, type RunningClient } from './startClient';

let running: RunningClient | undefined;

export async function activate(context: vscode.ExtensionContext): Promise<void> {
  const module = vscode.Uri.joinPath(context.extensionUri, 'dist', 'server.node.cjs').fsPath;
  running = await startClient(context, {
    createClient: (options) => new LanguageClient('quietrun', 'Quietrun', { module, transport: TransportKind.ipc }, options),
    realPath: async (uri) => (uri.scheme === 'file' ? vscode.Uri.file(await realpath(uri.fsPath)) : null),
  });
}

export async function deactivate(): Promise<void> {
  await running?.stop();
}
