/**
 * A plain LSP client of the tests: the real server at the other end of two streams, the messages as any
 * editor would send them.
 */
import { PassThrough } from 'node:stream';
import { createConnection, StreamMessageReader, StreamMessageWriter } from 'vscode-languageserver/node';
import { createProtocolConnection, type ClientCapabilities, type Diagnostic, type InitializeResult, type ProtocolConnection, type PublishDiagnosticsParams } from 'vscode-languageserver-protocol/node';
import type { ClientOptions } from '../../server/src/lsp/messages';
import { noReader, type FileReader } from '../../server/src/lsp/reader';
import { startServer } from '../../server/src/lsp/startServer';

export interface ClientSetup {
  readonly capabilities?: ClientCapabilities;
  readonly folders?: readonly string[];
  readonly options?: ClientOptions;
  readonly reader?: FileReader;
  /** Before `initialize`, for the client's own answers. */
  readonly answers?: (connection: ProtocolConnection) => void;
}

export interface TestClient {
  readonly connection: ProtocolConnection;
  readonly initialized: InitializeResult;
  readonly log: readonly string[];
  readonly published: readonly PublishDiagnosticsParams[];
  open(uri: string, text: string): Promise<void>;
  /** The whole text anew, as one change. */
  change(uri: string, version: number, text: string): Promise<void>;
  close(uri: string): Promise<void>;
  diagnostics(uri: string): Promise<readonly Diagnostic[]>;
  stop(): Promise<void>;
}

export const pulling: ClientCapabilities = { textDocument: { diagnostic: {} } };

export async function startClient({ capabilities = pulling, folders = [], options = {}, reader = noReader, answers }: ClientSetup = {}): Promise<TestClient> {
  const [toServer, toClient] = [new PassThrough(), new PassThrough()];
  startServer(createConnection(new StreamMessageReader(toServer), new StreamMessageWriter(toClient)), reader);
  const connection = createProtocolConnection(new StreamMessageReader(toClient), new StreamMessageWriter(toServer));
  const log: string[] = [];
  const published: PublishDiagnosticsParams[] = [];
  connection.onNotification('window/logMessage', ({ message }: { message: string }) => void log.push(message));
  connection.onNotification('textDocument/publishDiagnostics', (params: PublishDiagnosticsParams) => void published.push(params));
  answers?.(connection);
  connection.listen();
  const workspaceFolders = folders.map((uri) => ({ uri, name: uri }));
  const initialized = await connection.sendRequest<InitializeResult>('initialize', { processId: null, rootUri: null, capabilities, workspaceFolders, initializationOptions: options });
  await connection.sendNotification('initialized', {});
  return {
    connection, initialized, log, published,
    open: (uri, text) => connection.sendNotification('textDocument/didOpen', { textDocument: { uri, languageId: 'quietrun', version: 1, text } }),
    change: (uri, version, text) => connection.sendNotification('textDocument/didChange', { textDocument: { uri, version }, contentChanges: [{ text }] }),
    close: (uri) => connection.sendNotification('textDocument/didClose', { textDocument: { uri } }),
    async diagnostics(uri) {
      const report = await connection.sendRequest<{ items: readonly Diagnostic[] }>('textDocument/diagnostic', { textDocument: { uri } });
      return report.items;
    },
    async stop() {
      await connection.sendRequest('shutdown');
      connection.dispose();
      toServer.destroy();
      toClient.destroy();
    },
  };
}

/** Asks until there is an answer: what the server sends of itself comes in its own time. */
export async function eventually<T>(ask: () => T | undefined, what: string): Promise<T> {
  for (let waited = 0; waited < 5000; waited += 20) {
    const answer = ask();
    if (answer !== undefined) return answer;
    await new Promise((resolve) => setTimeout(resolve, 20));
  }
  throw new Error(`waited 5 s for ${what}`);
}

/**
 * What a request is refused with when an edit comes before its answer. A server that is quick may answer first, which is as good: it is
 * asked again, with another edit, until one comes in between.
 */
export async function refusedFor(ask: () => Promise<unknown>, edit: (time: number) => Promise<void>): Promise<{ readonly code: number; readonly data?: unknown }> {
  for (let time = 1; time <= 50; time += 1) {
    const answer = ask().then(() => null, (error: { code: number; data?: unknown }) => error);
    await edit(time);
    const refused = await answer;
    if (refused !== null) return refused;
  }
  throw new Error('no edit came before an answer');
}
