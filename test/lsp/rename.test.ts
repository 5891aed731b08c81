/** Rename over the protocol: versioned edits in open files, plain ones for clients that know no versions, refusals with their reason. */
import assert from 'node:assert/strict';
import { describe, it } from 'node:test';
import { LSPErrorCodes, type ClientCapabilities, type TextDocumentEdit, type WorkspaceEdit } from 'vscode-languageserver-protocol/node';
import type { ReadFileParams } from '../../server/src/lsp/messages';
import { refusedFor, startClient, type TestClient } from './client';

const folder = 'memory://box/boards';
const board = `${folder}/board.quiet`;
const parts = `${folder}/parts.quiet`;
const text = '# 5 µs 🔌\r\nuse "parts.quiet"\r\nlink l { between A and B; mutual 1 nH }\r\n';
const position = { line: 2, character: 'link l { between '.length };
const versioned: ClientCapabilities = { textDocument: { diagnostic: {}, rename: { prepareSupport: true } }, workspace: { workspaceEdit: { documentChanges: true } } };

describe('rename over the protocol', () => {
  it('is prepared with the name and what it replaces', async () => {
    const client = await started(versioned);
    assert.deepEqual(client.initialized.capabilities.renameProvider, { prepareProvider: true });
    const target = await client.connection.sendRequest('textDocument/prepareRename', { textDocument: { uri: board }, position });
    assert.deepEqual(target, { range: { start: position, end: { line: 2, character: position.character + 1 } }, placeholder: 'A' });
    await client.stop();
  });

  it('edits the open file in its version and another as it was read', async () => {
    const client = await started(versioned);
    await client.change(board, 7, text);
    const { documentChanges } = await client.connection.sendRequest<WorkspaceEdit>('textDocument/rename', { textDocument: { uri: board }, position, newName: 'the valve' });
    const edits = (documentChanges as TextDocumentEdit[]).map(({ textDocument, edits: of }) => [textDocument.uri, textDocument.version, of]);
    assert.deepEqual(edits, [
      [board, 7, [{ range: { start: position, end: { line: 2, character: position.character + 1 } }, newText: '"the valve"' }]],
      [parts, null, [{ range: { start: { line: 0, character: 4 }, end: { line: 0, character: 5 } }, newText: '"the valve"' }]],
    ]);
    await client.stop();
  });

  it('is plain changes for a client that knows no versions, without a question before', async () => {
    const client = await started({ textDocument: { diagnostic: {} } });
    assert.equal(client.initialized.capabilities.renameProvider, true);
    const { changes, documentChanges } = await client.connection.sendRequest<WorkspaceEdit>('textDocument/rename', { textDocument: { uri: board }, position, newName: 'X' });
    assert.equal(documentChanges, undefined);
    assert.deepEqual(Object.keys(changes!), [board, parts]);
    await client.stop();
  });

  it('is refused with the reason, which is no fault', async () => {
    const client = await started(versioned);
    const at = { textDocument: { uri: board }, position };
    await assert.rejects(client.connection.sendRequest('textDocument/rename', { ...at, newName: 'B' }), { code: LSPErrorCodes.RequestFailed, message: 'There is a net B already (parts.quiet, line 2).' });
    await assert.rejects(client.connection.sendRequest('textDocument/prepareRename', { ...at, position: { line: 2, character: 1 } }), { code: LSPErrorCodes.RequestFailed, message: /No name/ });
    assert.deepEqual(client.log, []);
    await client.stop();
  });

  it('is overtaken by an edit', async () => {
    const client = await started(versioned);
    const refused = await refusedFor(() => client.connection.sendRequest('textDocument/rename', { textDocument: { uri: board }, position, newName: 'X' }), (time) => client.change(board, 1 + time, `${text}${'\r\n'.repeat(time)}`));
    assert.equal(refused.code, LSPErrorCodes.ContentModified);
    await client.stop();
  });
});

async function started(capabilities: ClientCapabilities): Promise<TestClient> {
  const client = await startClient({
    capabilities, folders: [folder], options: { readsFiles: true },
    answers(connection) {
      connection.onRequest('quietrun/listFiles', () => ({ uris: [] }));
      connection.onRequest('quietrun/readFile', ({ uri }: ReadFileParams) => (uri === parts ? { text: 'net A { once }\nnet B { once }\n' } : { problem: 'missing' }) as never);
    },
  });
  await client.open(board, text);
  return client;
}
