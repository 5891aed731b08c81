/** Web: the server is a worker. */
import { BrowserMessageReader, BrowserMessageWriter, LanguageClient } from 'vscode-languageclient/browser';
import * as vscode from 'vscode';
import { startClient, type RunningClient } from './startClient';

// The browser's own, without the rest of its types, which would be wrong for everything else here.
declare class Worker {
  constructor(address: string);
  terminate(): void;
}

let running: RunningClient | undefined;
let worker: Worker | undefined;

export async function activate(context: vscode.ExtensionContext): Promise<void> {
  const address = vscode.Uri.joinPath(context.extensionUri, 'dist', 'server.browser.js').toString(true);
  running = await startClient(context, {
    createClient: (options) => new LanguageClient('quietrun', 'Quietrun', async () => {
      // A restart has to end the old worker: nothing else does.
      worker?.terminate();
      worker = new Worker(address);
      // Handed over as channels: the web's extension host puts a class of its own in the place of
      // `Worker`, and the client would not know an instance of it.
      return { reader: new BrowserMessageReader(worker as never), writer: new BrowserMessageWriter(worker as never) };
    }, options),
    // A virtual file system says that a file is a link, and not where it leads.
    realPath: async () => null,
  });
}

export async function deactivate(): Promise<void> {
  await running?.stop();
  worker?.terminate();
}
