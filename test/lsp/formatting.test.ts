/** Formatting over the protocol: small edits in UTF-16 positions, whatever width of a tab the editor has. */
import assert from 'node:assert/strict';
import { describe, it } from 'node:test';
import { LSPErrorCodes, type TextEdit } from 'vscode-languageserver-protocol/node';
import { refusedFor, startClient, type TestClient } from './client';

const uri = 'untitled:board';
const options = { tabSize: 8, insertSpaces: false, trimTrailingWhitespace: true };
const text = 'net  A { once }  # 5 µs 🔌\r\nnet "🔌1"   is F\r\nrun r for 1 mm {\r\nwithout G }\r\n';

describe('formatting over the protocol', () => {
  it('is offered for files, ranges and typing', async () => {
    const client = await startClient();
    const { documentFormattingProvider, documentRangeFormattingProvider, documentOnTypeFormattingProvider } = client.initialized.capabilities;
    assert.deepEqual([documentFormattingProvider, documentRangeFormattingProvider, documentOnTypeFormattingProvider], [true, true, { firstTriggerCharacter: '}', moreTriggerCharacter: ['\n'] }]);
    await client.stop();
  });

  it('replaces the white space that differs and nothing else', async () => {
    const client = await opened();
    const edits = await client.connection.sendRequest<TextEdit[]>('textDocument/formatting', { textDocument: { uri }, options });
    assert.deepEqual(edits, [edit([0, 3], [0, 5], ' '), edit([1, 9], [1, 12], ' '), edit([3, 0], [3, 0], '  ')]);
    await client.stop();
  });

  it('keeps to the range, and to what a brace closes', async () => {
    const client = await opened();
    const inRange = await client.connection.sendRequest<TextEdit[]>('textDocument/rangeFormatting', { textDocument: { uri }, range: { start: { line: 1, character: 11 }, end: { line: 2, character: 0 } }, options });
    assert.deepEqual(inRange, [edit([1, 9], [1, 12], ' ')]);
    const typed = await client.connection.sendRequest<TextEdit[]>('textDocument/onTypeFormatting', { textDocument: { uri }, position: { line: 3, character: 11 }, ch: '}', options });
    assert.deepEqual(typed, [edit([3, 0], [3, 0], '  ')]);
    await client.stop();
  });

  it('follows a line end', async () => {
    const client = await opened();
    await client.change(uri, 2, 'net  A is F\r\n');
    const typed = await client.connection.sendRequest<TextEdit[]>('textDocument/onTypeFormatting', { textDocument: { uri }, position: { line: 1, character: 0 }, ch: '\n', options });
    assert.deepEqual(typed, [edit([0, 3], [0, 5], ' ')]);
    await client.stop();
  });

  it('is overtaken by an edit, and answers nothing for a file that is not open', async () => {
    const client = await opened();
    const refused = await refusedFor(() => client.connection.sendRequest('textDocument/formatting', { textDocument: { uri }, options }), (time) => client.change(uri, 1 + time, `${'\r\n'.repeat(time)}${text}`));
    assert.equal(refused.code, LSPErrorCodes.ContentModified);
    assert.deepEqual(await client.connection.sendRequest('textDocument/formatting', { textDocument: { uri: 'untitled:other' }, options }), []);
    assert.deepEqual(client.log, []);
    await client.stop();
  });
});

async function opened(): Promise<TestClient> {
  const client = await startClient();
  await client.open(uri, text);
  return client;
}

const edit = ([line, character]: readonly [number, number], [endLine, endCharacter]: readonly [number, number], newText: string): TextEdit => ({ range: { start: { line, character }, end: { line: endLine, character: endCharacter } }, newText });
