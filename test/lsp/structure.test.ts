/** Folding, growing selections and semantic tokens as the protocol carries them. */
import assert from 'node:assert/strict';
import { describe, it } from 'node:test';
import type { FoldingRange, SelectionRange, SemanticTokens } from 'vscode-languageserver-protocol/node';
import { eventually, startClient } from './client';

const uri = 'file:///boards/one.quiet';
const text = `# µ Ω 🔌
# two
net A {
  swing 3 V
}
`;

describe('structure over the protocol', () => {
  for (const ends of ['\n', '\r\n']) {
    it(`is that of the text${ends === '\n' ? '' : ', CRLF'}`, async () => {
      const client = await startClient();
      await client.open(uri, text.replaceAll('\n', ends));
      const folding = await client.connection.sendRequest<FoldingRange[]>('textDocument/foldingRange', { textDocument: { uri } });
      assert.deepEqual(folding, [{ startLine: 0, endLine: 1, kind: 'comment' }, { startLine: 2, endLine: 3 }]);
      const [selection] = await client.connection.sendRequest<SelectionRange[]>('textDocument/selectionRange', { textDocument: { uri }, positions: [{ line: 3, character: 9 }] });
      assert.deepEqual(selection.range, { start: { line: 3, character: 8 }, end: { line: 3, character: 9 } });
      assert.deepEqual(selection.parent?.range, { start: { line: 3, character: 8 }, end: { line: 3, character: 11 } });
      const tokens = await client.connection.sendRequest<SemanticTokens>('textDocument/semanticTokens/full', { textDocument: { uri } });
      const { tokenTypes, tokenModifiers } = client.initialized.capabilities.semanticTokensProvider!.legend;
      assert.deepEqual(tokenModifiers, ['declaration', 'overBudget']);
      assert.deepEqual(tokens.data, [2, 4, 1, tokenTypes.indexOf('net'), 1, 1, 8, 1, tokenTypes.indexOf('quantity'), 0, 0, 2, 1, tokenTypes.indexOf('unit'), 0]);
      const part = await client.connection.sendRequest<SemanticTokens>('textDocument/semanticTokens/range', { textDocument: { uri }, range: { start: { line: 3, character: 0 }, end: { line: 4, character: 0 } } });
      assert.deepEqual(part.data, [3, 8, 1, tokenTypes.indexOf('quantity'), 0, 0, 2, 1, tokenTypes.indexOf('unit'), 0]);
      await client.stop();
    });
  }

  it('is nothing for a file that is not open', async () => {
    const client = await startClient();
    for (const method of ['textDocument/foldingRange', 'textDocument/selectionRange']) assert.deepEqual(await client.connection.sendRequest(method, { textDocument: { uri }, positions: [{ line: 0, character: 0 }] }), []);
    assert.deepEqual(await client.connection.sendRequest('textDocument/semanticTokens/full', { textDocument: { uri } }), { data: [] });
    await client.stop();
  });

  it('is asked for anew when another file changes what a net is over', async () => {
    let refreshed = 0;
    const capabilities = { textDocument: { diagnostic: {} }, workspace: { semanticTokens: { refreshSupport: true } } };
    const client = await startClient({ capabilities, answers: (connection) => connection.onRequest('workspace/semanticTokens/refresh', () => { refreshed += 1; return null; }) });
    await eventually(() => (refreshed === 1 ? true : undefined), 'a refresh when the workspace was read');
    await client.open(uri, 'use "two.quiet"\n');
    await client.open('file:///boards/two.quiet', text);
    await client.change('file:///boards/two.quiet', 2, text.replace('3 V', '4 V'));
    await eventually(() => (refreshed === 2 ? true : undefined), 'a refresh after the edit of a file that is used');
    await client.stop();
  });
});
