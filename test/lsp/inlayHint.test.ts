/** Inlay hints take searches: they stand back for what else is asked, and give up when the text has moved on. */
import assert from 'node:assert/strict';
import { describe, it } from 'node:test';
import { LSPErrorCodes, type InlayHint } from 'vscode-languageserver-protocol/node';
import { TextDocument } from 'vscode-languageserver-textdocument';
import { hints } from '../../server/src/service/hints';
import { Session } from '../../server/src/service/session';
import { largeBoard } from '../bench/largeBoard';
import { startClient } from './client';

const uri = 'file:///boards/large.quiet';
const { text } = largeBoard(16, 3);
const range = { start: { line: 0, character: 0 }, end: { line: 9999, character: 0 } };

describe('inlay hints over the protocol', () => {
  it('are those of the service, and come after the findings that were asked for later', async () => {
    const client = await startClient();
    await client.open(uri, text);
    const order: string[] = [];
    const asked = client.connection.sendRequest<InlayHint[]>('textDocument/inlayHint', { textDocument: { uri }, range }).then((answer) => (order.push('hints'), answer));
    await client.diagnostics(uri);
    order.push('findings');
    const answered = await asked;
    assert.deepEqual(order, ['findings', 'hints']);
    const session = new Session();
    session.setText('large', text);
    const document = TextDocument.create(uri, 'quietrun', 1, text);
    const shown = answered.map(({ position, label }) => [document.offsetAt(position), typeof label === 'string' ? label : label.map(({ value }) => value).join('')]);
    assert.ok(16 < shown.length);
    assert.deepEqual(shown, hints(session, 'large', { start: 0, end: text.length }).map(({ offset, parts }) => [offset, parts.map((part) => part.text).join('')]));
    await client.stop();
  });

  it('are given up for an edit', async () => {
    const client = await startClient();
    await client.open(uri, text);
    const asked = client.connection.sendRequest('textDocument/inlayHint', { textDocument: { uri }, range });
    const refused = assert.rejects(asked, { code: LSPErrorCodes.ContentModified });
    await client.change(uri, 2, `# another line\n${text}`);
    await client.diagnostics(uri);
    await refused;
    await client.stop();
  });
});
