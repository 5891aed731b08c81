/** Comparing revisions over the protocol: the client hands over what the server finds lacking of the other revision. */
import assert from 'node:assert/strict';
import { describe, it } from 'node:test';
import type { CompareAnswer, CompareParams, ReadFileParams } from '../../server/src/lsp/messages';
import { startClient, type TestClient } from './client';

const folder = 'memory://box/boards';
const [board, parts] = [`${folder}/board.quiet`, `${folder}/parts.quiet`];
const stackup = 'stackup { copper TOP 35 um; prepreg 0.2 mm er 4.2; plane GND 18 um }\r\n';
const text = (gap: string, use = 'parts.quiet') => `# 5 µs 🔌\r\nuse "${use}"\r\nnet CLK { swing 3.3 V; rise 3 ns; source 40 ohm; load 1 Mohm, 5 pF }\r\nnet SENSE { source 200 ohm; load 1 Mohm, 8 pF; tolerates 5 mV peak }\r\nrun r on TOP for 20 mm { trace CLK 0.2 mm; gap ${gap}; trace SENSE 0.2 mm }\r\n`;

describe('a comparison over the protocol', () => {
  it('asks for the files of the other revision, each with where it may lie, and answers with a page', async () => {
    const client = await started(text('0.2 mm'));
    const files: CompareParams['before']['files'][number][] = [];
    const ask = () => compare(client, { uri: board, name: 'board.quiet', before: { root: null, name: '4e7e0648', files } });
    assert.deepEqual(await ask(), { missing: [{ uri: board, inside: [`${folder}/`] }] });
    files.push({ uri: board, answer: { text: text('1.5 mm') } });
    assert.deepEqual(await ask(), { missing: [{ uri: parts, inside: [`${folder}/`] }] });
    files.push({ uri: parts, answer: { text: stackup.replace('0.2 mm', '0.3 mm') } });
    const page = markdownOf(await ask());
    assert.match(page, /^### Noise margins: board\.quiet at 4e7e0648 → board\.quiet\n/);
    assert.match(page, /\| SENSE \| .* \| \*\*now over\*\* \| \+[\d.]+ mV run r: gap 1\.5 mm → 0\.2 mm/);
    assert.match(page, /\n- stackup: prepreg 0\.3 mm er 4\.2 → 0\.2 mm er 4\.2\n/);
    // The same files as they are: nothing has moved, whatever is open.
    const same = markdownOf(await compare(client, { uri: board, name: 'board.quiet', before: { root: null, name: 'now', files: [{ uri: board, answer: { text: text('0.2 mm') } }, { uri: parts, answer: { text: stackup } }] } }));
    assert.match(same, /\n\nNo margin has moved\.\n\nNothing that is declared has changed\.\n$/);
    await client.stop();
  });

  it('begins at the boards that use the file', async () => {
    const client = await started(text('0.2 mm'));
    const answer = await compare(client, { uri: parts, name: 'parts.quiet', before: { root: null, name: 'old', files: [] } });
    assert.deepEqual(answer, { missing: [{ uri: board, inside: [`${folder}/`] }] });
    await client.stop();
  });

  it('takes another file for the old board, and counts the edits that are not saved', async () => {
    const client = await started(text('0.2 mm'));
    const other = `${folder}/older/board.quiet`;
    await client.change(board, 2, text('3 mm'));
    const files = [{ uri: other, answer: { text: `${stackup}${text('0.2 mm').replace(/use.*\r\n/, '')}` } }];
    const page = markdownOf(await compare(client, { uri: board, name: 'board.quiet', before: { root: other, name: 'older/board.quiet', files } }));
    assert.match(page, /^### Noise margins: older\/board\.quiet → board\.quiet\n/);
    assert.match(page, /now within/);
    await client.stop();
  });

  it('never asks for what lies outside the folder, and says that the board was not read whole', async () => {
    const client = await started(text('0.2 mm'));
    const page = markdownOf(await compare(client, { uri: board, name: 'board.quiet', before: { root: null, name: 'old', files: [{ uri: board, answer: { text: text('0.2 mm', '../secret.quiet') } }] } }));
    assert.match(page, /\nboard\.quiet at old could not be read whole, and is compared as far as it could\.\n$/);
    await client.stop();
  });

  it('says that there is no other revision, in which names are shown as they are written', async () => {
    const client = await started(text('0.2 mm'));
    const before = { root: null, name: 'old', files: [{ uri: board, answer: { problem: 'missing' as const } }] };
    assert.deepEqual(await compare(client, { uri: board, name: 'board.quiet', before }), { refused: 'There is no board.quiet at old.' });
    const other = await compare(client, { uri: board, name: 'x', before: { root: `${folder}/o.quiet`, name: '<b>[o](x)', files: [{ uri: `${folder}/o.quiet`, answer: { text: stackup } }] } });
    assert.match(markdownOf(other), /^### Noise margins: \\<b\\>\\\[o\\\]\(x\) → x\n/);
    assert.deepEqual(client.log, []);
    await client.stop();
  });
});

const compare = (client: TestClient, params: CompareParams) => client.connection.sendRequest<CompareAnswer>('quietrun/compare', params);

function markdownOf(answer: CompareAnswer): string {
  assert.ok('markdown' in answer, JSON.stringify(answer));
  return answer.markdown;
}

async function started(content: string): Promise<TestClient> {
  const client = await startClient({
    folders: [folder], options: { readsFiles: true },
    answers(connection) {
      connection.onRequest('quietrun/listFiles', () => ({ uris: [] }));
      connection.onRequest('quietrun/readFile', ({ uri }: ReadFileParams) => (uri === parts ? { text: stackup } : { problem: 'missing' }) as never);
    },
  });
  await client.open(board, content);
  return client;
}
