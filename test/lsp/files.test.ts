/** How files get to the server that no one has open. */
import assert from 'node:assert/strict';
import { describe, it } from 'node:test';
import type { ClientCapabilities } from 'vscode-languageserver-protocol/node';
import type { ReadFileAnswer, ReadFileParams } from '../../server/src/lsp/messages';
import { eventually, pulling, startClient, type ClientSetup, type TestClient } from './client';

const folder = 'memory://box/boards';
const board = `${folder}/board.quiet`;

describe('files that a board uses', () => {
  it('are asked of the client where it offers to read, with the folders that must hold them', async () => {
    const { client, asked } = await reading({ 'memory://box/boards/common/parts.quiet': 'net A { swing 3 }\n' });
    await client.open(board, 'use "common/parts.quiet"\n');
    assert.deepEqual((await client.diagnostics(board)).map(({ code }) => code), []);
    assert.deepEqual(asked, [{ uri: 'memory://box/boards/common/parts.quiet', inside: [`${folder}/`] }]);
    await client.stop();
  });

  it('are asked for once, and again when they have changed', async () => {
    const files: Record<string, string> = { 'memory://box/boards/parts.quiet': '' };
    const { client, asked } = await reading(files);
    await client.open(board, 'use "parts.quiet"\nrun r for 1 mm { on TOP { trace A 1 mm } }\n');
    const first = (await client.diagnostics(board)).map(({ code }) => code);
    await client.change(board, 2, 'use "parts.quiet"\nrun r for 2 mm { on TOP { trace A 1 mm } }\n');
    await client.diagnostics(board);
    assert.equal(asked.length, 1);
    files['memory://box/boards/parts.quiet'] = 'net A { once }\nstackup { copper TOP 35 um; prepreg 1 mm er 4; plane G 18 um }\n';
    await client.connection.sendNotification('workspace/didChangeWatchedFiles', { changes: [{ uri: 'memory://box/boards/parts.quiet', type: 2 }] });
    const second = (await client.diagnostics(board)).map(({ code }) => code);
    assert.equal(asked.length, 2);
    assert.ok(first.includes('unknown-name'));
    assert.ok(!second.includes('unknown-name'));
    await client.stop();
  });

  it('make the client ask anew when they have changed or were closed', async () => {
    let refreshed = 0;
    const parts = 'memory://box/boards/parts.quiet';
    const capabilities = { textDocument: { diagnostic: {} }, workspace: { diagnostics: { refreshSupport: true } } };
    const { client } = await reading({ [parts]: 'net A { once }\n' }, undefined, [], capabilities, () => { refreshed += 1; });
    await client.open(board, 'use "parts.quiet"\n');
    await client.diagnostics(board);
    await eventually(() => (refreshed === 1 ? true : undefined), 'a refresh when the workspace was read');
    await client.connection.sendNotification('workspace/didChangeWatchedFiles', { changes: [{ uri: parts, type: 2 }] });
    await eventually(() => (refreshed === 2 ? true : undefined), 'a refresh after a change');
    await client.open(parts, 'net B { once }\n');
    await client.close(parts);
    await eventually(() => (refreshed === 3 ? true : undefined), 'a refresh after closing');
    await client.open(parts, 'net B { once }\n');
    await client.change(parts, 2, 'net C { once }\n');
    await eventually(() => (refreshed === 4 ? true : undefined), 'a refresh after an edit that another open file shows');
    await client.stop();
  });

  it('are never asked for outside the folder, however the way out is written', async () => {
    for (const way of ['../secret.quiet', 'a/../../secret.quiet', '%2e%2e/secret.quiet', '..%2fsecret.quiet', '%2E%2E%2Fsecret.quiet', '..\\secret.quiet', '/secret.quiet', 'memory://box/secret.quiet', 'memory:/secret.quiet', '../boards/../secret.quiet', '../boardsx/secret.quiet', './/../secret.quiet', '.../../../secret.quiet']) {
      const { client, asked } = await reading({ 'memory://box/secret.quiet': 'net SECRET { once }\n', 'memory://box/boardsx/secret.quiet': 'net SECRET { once }\n' });
      await client.open(board, `use "${way}"\n`);
      const found = await client.diagnostics(board);
      assert.deepEqual(found.map(({ code }) => code), ['include'], way);
      for (const { uri } of asked) assert.ok(new URL(uri).pathname.startsWith('/boards/'), `${way} asked for ${uri}`);
      await client.stop();
    }
  });

  it('are said to be missing, outside, too large or spelt otherwise, as the client says', async () => {
    for (const [answer, words] of [
      [{ problem: 'missing' }, /there is no file/],
      [{ problem: 'outside' }, /outside the workspace folder/],
      [{ problem: 'too-large' }, /larger than 8 MiB/],
      [{ problem: 'case', spelling: 'Common/Parts.quiet' }, /differs in case .*"Common\/Parts\.quiet"/],
    ] as const) {
      const { client } = await reading({}, answer);
      await client.open(board, 'use "common/parts.quiet"\n');
      const [found] = await client.diagnostics(board);
      assert.equal(found.code, 'include');
      assert.match(String(found.message), words);
      await client.stop();
    }
  });

  it('are spelt for the file that uses them, wherever that lies', async () => {
    const { client } = await reading({}, { problem: 'case', spelling: 'Common/Parts.quiet' });
    await client.open(`${folder}/valves/one.quiet`, 'use "../common/./parts.quiet"\nuse "../common/parts.quiet"\n');
    const found = await client.diagnostics(`${folder}/valves/one.quiet`);
    assert.match(String(found[1].message), /"\.\.\/Common\/Parts\.quiet"/);
    await client.stop();
  });

  it('count as they are open, and as they are on the disk once they are closed', async () => {
    const parts = 'memory://box/boards/parts.quiet';
    const { client } = await reading({ [parts]: 'net A { once }\n' });
    const rules = async () => (await client.diagnostics(board)).map(({ code }) => code).filter((code) => code === 'unknown-name' || code === 'unit');
    await client.open(board, 'use "parts.quiet"\nlink l { between A and A; capacitance 1 pF }\n');
    assert.deepEqual(await rules(), []);
    await client.open(parts, 'net B { once }\n');
    assert.deepEqual(await rules(), ['unknown-name', 'unknown-name']);
    await client.close(parts);
    assert.deepEqual(await rules(), []);
    await client.stop();
  });

  it('may be used by a file that was never saved', async () => {
    const { client, asked } = await reading({ 'memory://box/boards/common/parts.quiet': 'net A { once }\n' });
    await client.open('untitled:Untitled-1', 'use "common/parts.quiet"\nlink l { between A and B; capacitance 1 pF }\n');
    const found = await client.diagnostics('untitled:Untitled-1');
    assert.deepEqual(asked.map(({ uri }) => uri), ['memory://box/boards/common/parts.quiet']);
    assert.match(found.map(({ message }) => message).join('\n'), /\bB\b/);
    await client.stop();
  });

  it('are known from the start, so that a part is not taken for a board', async () => {
    const parts = 'memory://box/boards/parts.quiet';
    const files = { [parts]: 'family f { once }\n', [board]: 'use "parts.quiet"\nnet A is f\n' };
    const alone = await reading(files);
    await alone.client.open(parts, files[parts]);
    assert.deepEqual((await alone.client.diagnostics(parts)).map(({ code }) => code), ['unused-declaration']);
    await alone.client.stop();
    const listed = await reading(files, undefined, Object.keys(files));
    await listed.client.open(parts, files[parts]);
    const end = Date.now() + 5000;
    let found = await listed.client.diagnostics(parts);
    while (0 < found.length && Date.now() < end) found = await listed.client.diagnostics(parts);
    assert.deepEqual(found, []);
    await listed.client.stop();
  });
});

async function reading(files: Record<string, string>, answer?: ReadFileAnswer, listed: readonly string[] = [], capabilities: ClientCapabilities = pulling, refreshed: () => void = () => {}): Promise<{ client: TestClient; asked: ReadFileParams[] }> {
  const asked: ReadFileParams[] = [];
  const setup: ClientSetup = {
    capabilities,
    folders: [folder],
    options: { readsFiles: true },
    answers(connection) {
      connection.onRequest('workspace/diagnostic/refresh', () => {
        refreshed();
        return null;
      });
      connection.onRequest('quietrun/listFiles', () => ({ uris: listed }));
      connection.onRequest('quietrun/readFile', (params: ReadFileParams) => {
        asked.push(params);
        const read: ReadFileAnswer = answer ?? (Object.hasOwn(files, params.uri) ? { text: files[params.uri] } : { problem: 'missing' });
        return read as never;
      });
    },
  };
  return { client: await startClient(setup), asked };
}
