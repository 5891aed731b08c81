/** Highlights, workspace symbols and links over the protocol. */
import assert from 'node:assert/strict';
import { describe, it } from 'node:test';
import { DocumentHighlightKind, type DocumentHighlight, type DocumentLink, type SymbolInformation } from 'vscode-languageserver-protocol/node';
import type { ReadFileParams } from '../../server/src/lsp/messages';
import { startClient, type TestClient } from './client';

const folder = 'memory://box/boards';
const board = `${folder}/board.quiet`;
const parts = `${folder}/parts.quiet`;
const outside = 'memory://box/other/secret.quiet';

describe('navigation over the protocol', () => {
  it('highlights where a name is declared and where it is used', async () => {
    const client = await started('net A { once } # 🔌\r\nlink l { between A and B; mutual 1 nH }\r\n');
    const found = await client.connection.sendRequest<DocumentHighlight[]>('textDocument/documentHighlight', { textDocument: { uri: board }, position: { line: 1, character: 18 } });
    assert.deepEqual(found.map(({ range, kind }) => [range.start, kind]), [[{ line: 0, character: 4 }, DocumentHighlightKind.Write], [{ line: 1, character: 17 }, DocumentHighlightKind.Read]]);
    await client.stop();
  });

  it('finds symbols in all files, open or not', async () => {
    const client = await started('use "parts.quiet"\r\nnet "µ VALVE" { once }\r\n');
    const found = await client.connection.sendRequest<SymbolInformation[]>('workspace/symbol', { query: 'val' });
    assert.deepEqual(found.map(({ name, location, containerName }) => [name, location.uri, location.range.start, containerName]), [
      ['VALVE_PWM', parts, { line: 0, character: 4 }, 'net'], ['µ VALVE', board, { line: 1, character: 4 }, 'net'],
    ]);
    await client.stop();
  });

  it('links a path to its file, and nothing outside of the folder, though it is open', async () => {
    const client = await started('use "parts.quiet"\r\nuse "../other/secret.quiet"\r\nuse "missing.quiet"\r\n');
    await client.open(outside, 'net SECRET { once }\n');
    await client.diagnostics(outside);
    const found = await client.connection.sendRequest<DocumentLink[]>('textDocument/documentLink', { textDocument: { uri: board } });
    assert.deepEqual(found, [{ range: { start: { line: 0, character: 5 }, end: { line: 0, character: 16 } }, target: parts, tooltip: '1 net' }]);
    await client.stop();
  });
});

async function started(text: string): Promise<TestClient> {
  const client = await startClient({
    folders: [folder], options: { readsFiles: true },
    answers(connection) {
      connection.onRequest('quietrun/listFiles', () => ({ uris: [parts] }));
      connection.onRequest('quietrun/readFile', ({ uri }: ReadFileParams) => (uri === parts ? { text: 'net VALVE_PWM { once }\n' } : { problem: 'missing' }) as never);
    },
  });
  await client.open(board, text);
  return client;
}
