/** Code lenses over the protocol: off unless they are wanted, at once when they are, and a command only for a client that has it. */
import assert from 'node:assert/strict';
import { describe, it } from 'node:test';
import type { ClientCapabilities, CodeLens } from 'vscode-languageserver-protocol/node';
import { eventually, startClient } from './client';

const uri = 'file:///boards/a.quiet';
const text = `# µ 🔌\r
stackup { copper TOP 35 um; prepreg 0.2 mm er 4.2; plane GND 18 um }\r
net NOISY { swing 5 V; rise 5 ns; source 33 ohm; load 1 Mohm, 5 pF }\r
net V { source 100 ohm; load 1 kohm, 10 pF; tolerates 50 mV peak }\r
run bus on TOP for 20 mm { trace NOISY 0.15 mm; gap 0.3 mm; trace V 0.15 mm }\r
`;
const capabilities: ClientCapabilities = { textDocument: { diagnostic: {} }, workspace: { configuration: true, codeLens: { refreshSupport: true } } };

async function started(options: object, settings: { current: object | null }) {
  let refreshed = 0;
  const client = await startClient({
    capabilities, options,
    answers(connection) {
      connection.onRequest('workspace/configuration', ({ items }: { items: readonly { readonly section: string }[] }) => items.map(({ section }) => (section === 'quietrun.codeLens' ? settings.current : null)));
      connection.onRequest('workspace/codeLens/refresh', () => {
        refreshed += 1;
        return null;
      });
    },
  });
  await client.open(uri, text);
  return { client, refreshed: () => refreshed, asked: () => client.connection.sendRequest<CodeLens[]>('textDocument/codeLens', { textDocument: { uri } }) };
}

describe('code lenses over the protocol', () => {
  it('are off, and there at once when they are switched on', async () => {
    const settings: { current: object | null } = { current: null };
    const { client, refreshed, asked } = await started({}, settings);
    assert.deepEqual(await asked(), []);
    const before = refreshed();
    settings.current = { budgets: true, runs: true };
    await client.connection.sendNotification('workspace/didChangeConfiguration', { settings: null });
    await eventually(() => (before < refreshed() ? true : undefined), 'a refresh');
    const found = await asked();
    assert.deepEqual(found.map(({ range, command }) => [range.start, command!.command]), [[{ line: 3, character: 4 }, ''], [{ line: 4, character: 4 }, '']]);
    assert.match(found[0]!.command!.title, /^[\d.]+ mV of 50\.0 mV · [\d.]+ dB (left|too much)$/);
    settings.current = { budgets: 'yes' };
    await client.connection.sendNotification('workspace/didChangeConfiguration', { settings: null });
    assert.deepEqual(await asked(), []);
    await client.stop();
  });

  it('lead to those who disturb it, for a client that can show them', async () => {
    const { client, asked } = await started({ showPlaces: 'test.show' }, { current: { budgets: true } });
    const [lens] = await asked();
    assert.deepEqual({ ...lens!.command!, title: '' }, { title: '', command: 'test.show', arguments: [uri, { line: 3, character: 4 }, [{ uri, range: { start: { line: 4, character: 33 }, end: { line: 4, character: 38 } } }]] });
    await client.stop();
  });
});
