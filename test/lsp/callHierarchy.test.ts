/** Who disturbs whom over the protocol: ranges are those of the file that the protocol wants them in. */
import assert from 'node:assert/strict';
import { describe, it } from 'node:test';
import type { CallHierarchyIncomingCall, CallHierarchyItem, CallHierarchyOutgoingCall, Range } from 'vscode-languageserver-protocol/node';
import { TextDocument } from 'vscode-languageserver-textdocument';
import type { ReadFileParams } from '../../server/src/lsp/messages';
import { startClient, type TestClient } from './client';

const folder = 'memory://box/boards';
const board = `${folder}/board.quiet`;
const parts = `${folder}/parts.quiet`;
const texts: Readonly<Record<string, string>> = {
  [board]: `use "parts.quiet" # 🔌\r
run bus on TOP for 20 mm {\r
  trace NOISY 0.15 mm\r
  gap 0.3 mm\r
  trace V 0.15 mm\r
}\r
`,
  [parts]: `stackup { copper TOP 35 um; prepreg 0.2 mm er 4.2; plane GND 18 um }
net NOISY { swing 5 V; rise 5 ns; source 33 ohm; load 1 Mohm, 5 pF }
net V { source 100 ohm; load 1 kohm, 10 pF; tolerates 50 mV peak }
link body { between NOISY and V; capacitance 1 pF }
`,
};
const textAt = (uri: string, range: Range) => TextDocument.create(uri, 'quietrun', 1, texts[uri]!).getText(range);

describe('call hierarchy', () => {
  it('goes from a row of a run to those who disturb its net, in the rows where they do', async () => {
    const client = await started();
    const [item] = await prepared(client, board, { line: 4, character: 3 });
    assert.deepEqual([item!.name, item!.uri, textAt(board, item!.range), textAt(board, item!.selectionRange)], ['V', board, 'trace V 0.15 mm', 'V']);
    assert.match(item!.detail!, /^[\d.]+ mV of 50\.0 mV · [\d.]+ dB (left|too much)$/);
    const calls = await client.connection.sendRequest<CallHierarchyIncomingCall[]>('callHierarchy/incomingCalls', { item });
    assert.deepEqual(calls.map(({ from, fromRanges }) => [from.name, from.uri, fromRanges.map((range) => textAt(from.uri, range))]), [['NOISY', parts, ['body']], ['NOISY', board, ['trace NOISY 0.15 mm']]]);
    assert.match(calls[0]!.from.detail!, /^[\d.]+ mV \(\d+ %\) on V: [\d.]+ mV in link body, [\d.]+ mV in run bus$/);
    await client.stop();
  });

  it('goes from a declaration to those whom it disturbs, and on from there', async () => {
    const client = await started();
    const [item] = await prepared(client, board, { line: 2, character: 9 });
    const calls = await client.connection.sendRequest<CallHierarchyOutgoingCall[]>('callHierarchy/outgoingCalls', { item });
    assert.deepEqual(calls.map(({ to, fromRanges }) => [to.name, fromRanges.map((range) => textAt(board, range))]), [['V', ['trace NOISY 0.15 mm']]]);
    const back = await client.connection.sendRequest<CallHierarchyIncomingCall[]>('callHierarchy/incomingCalls', { item: calls[0]!.to });
    assert.equal(back[0]!.from.name, 'NOISY');
    assert.deepEqual(await client.connection.sendRequest('callHierarchy/outgoingCalls', { item: calls[0]!.to }), []);
    await client.stop();
  });

  it('answers nothing for what it did not give out', async () => {
    const client = await started();
    const [item] = await prepared(client, board, { line: 2, character: 9 });
    for (const data of [undefined, null, 7, 'x', {}, { root: 'memory://box/boards/none.quiet', kind: 'net', name: 'V' }, { ...(item!.data as object), kind: '__proto__' }]) {
      assert.equal(await client.connection.sendRequest('callHierarchy/incomingCalls', { item: { ...item, data } }), null);
    }
    assert.deepEqual(await client.connection.sendRequest('callHierarchy/incomingCalls', { item: { ...item, data: { ...(item!.data as object), name: 'GONE' } } }), []);
    assert.deepEqual(await prepared(client, board, { line: 3, character: 3 }), []);
    assert.deepEqual(client.log, []);
    await client.stop();
  });
});

async function prepared({ connection }: TestClient, uri: string, position: { line: number; character: number }): Promise<readonly CallHierarchyItem[]> {
  return (await connection.sendRequest<CallHierarchyItem[] | null>('textDocument/prepareCallHierarchy', { textDocument: { uri }, position })) ?? [];
}

async function started(): Promise<TestClient> {
  const client = await startClient({
    folders: [folder], options: { readsFiles: true },
    answers(connection) {
      connection.onRequest('quietrun/listFiles', () => ({ uris: [] }));
      connection.onRequest('quietrun/readFile', ({ uri }: ReadFileParams) => (Object.hasOwn(texts, uri) ? { text: texts[uri] } : { problem: 'missing' }) as never);
    },
  });
  await client.open(board, texts[board]!);
  return client;
}
