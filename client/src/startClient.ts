/** Makes the client, answers what the server asks for, and adds what the editor shows of it. */
import * as vscode from 'vscode';
import type { BaseLanguageClient, LanguageClientOptions } from 'vscode-languageclient';
import { listFilesMethod, readFileMethod, statusMethod, type ClientOptions, type ReadFileAnswer, type ReadFileParams, type StatusParams } from '../../server/src/lsp/messages';
import { registerCommands } from './commands';
import { registerCompareRevisions } from './compareRevisions';
import { registerFirstSteps } from './firstSteps';
import { listFiles } from './listFiles';
import { readFile, type RealPath } from './readFile';
import { registerRulePages, rulePagesScheme } from './rulePages';
import { registerShowPlaces, showPlacesCommand } from './showPlaces';
import { createStatusItem } from './statusItem';

export interface RunningClient {
  readonly stop: () => Promise<void>;
}

export interface Host {
  readonly createClient: (options: LanguageClientOptions) => BaseLanguageClient;
  readonly realPath: RealPath;
}

export async function startClient(context: vscode.ExtensionContext, host: Host): Promise<RunningClient> {
  const clientOptions: ClientOptions = { readsFiles: true, rulePages: rulePagesScheme, showsStatus: true, showsPictures: true, showPlaces: showPlacesCommand };
  const output = vscode.window.createOutputChannel('Quietrun', { log: true });
  const client = host.createClient({
    documentSelector: [{ language: 'quietrun' }],
    initializationOptions: clientOptions,
    outputChannel: output,
    // On focus too: an edit in one file changes what another shows, which was not in view then.
    diagnosticPullOptions: { onChange: true, onSave: true, onFocus: true, onTabs: false },
    markdown: { isTrusted: false, supportHtml: false },
  });
  const status = createStatusItem(client);
  client.onRequest<ReadFileAnswer, void>(readFileMethod, (params: ReadFileParams) => readFile(params, host.realPath));
  client.onRequest(listFilesMethod, () => listFiles());
  client.onNotification(statusMethod, (params: StatusParams) => status.show(params));
  context.subscriptions.push(output, status, registerRulePages(client), registerCommands(client, output), registerShowPlaces(), registerCompareRevisions(client, host.realPath), registerFirstSteps(context));
  try {
    await client.start();
  } catch (error) {
    // The status item shows it, with a way to start again; a pop-up would say it once more.
    output.error(`The server did not start: ${String(error)}`);
  }
  return { stop: () => client.dispose() };
}
