/** Signature help over the protocol: unasked only where a statement has just begun. */
import assert from 'node:assert/strict';
import { describe, it } from 'node:test';
import { SignatureHelpTriggerKind, type ClientCapabilities, type SignatureHelp } from 'vscode-languageserver-protocol/node';
import { startClient, type TestClient } from './client';

const uri = 'file:///boards/a.quiet';
const typed = { triggerKind: SignatureHelpTriggerKind.TriggerCharacter, triggerCharacter: ' ', isRetrigger: false };
const offsets: ClientCapabilities = { textDocument: { diagnostic: {}, signatureHelp: { signatureInformation: { parameterInformation: { labelOffsetSupport: true } } } } };

async function asked(client: TestClient, text: string, version: number, context: object = typed): Promise<SignatureHelp | null> {
  await client.change(uri, version, text);
  const lines = text.split(/\r?\n/);
  return client.connection.sendRequest<SignatureHelp | null>('textDocument/signatureHelp', { textDocument: { uri }, position: { line: lines.length - 1, character: lines.at(-1)!.length }, context });
}

describe('signature help over the protocol', () => {
  it('comes unasked behind the word of a statement, stays while its values are written, and goes', async () => {
    const client = await startClient({ capabilities: offsets });
    await client.open(uri, '');
    const first = await asked(client, '# 🔌 µ\r\nnet A { tolerates ', 2);
    assert.deepEqual(first!.signatures.map(({ label, activeParameter, parameters }) => [label, parameters![activeParameter!]!.label]), [['tolerates VOLTAGE peak|rms', [10, 17]], ['tolerates none', [10, 14]]]);
    assert.equal(first!.activeSignature, 0);
    assert.equal(await asked(client, 'net A { tolerates 2 ', 3), null, 'a space within is no reason to come');
    const later = await asked(client, 'net A { tolerates 2 mV ', 4, { ...typed, isRetrigger: true, activeSignatureHelp: first });
    assert.deepEqual([later!.signatures.length, later!.activeParameter], [1, 1]);
    assert.equal(await asked(client, 'net A { tolerates 2 mV peak ', 5, { ...typed, isRetrigger: true, activeSignatureHelp: later }), null);
    assert.equal((await asked(client, 'net A { tolerates 2 mV ', 6, { triggerKind: SignatureHelpTriggerKind.Invoked, isRetrigger: false }))!.activeParameter, 1);
    await client.stop();
  });

  it('keeps to the form that was looked at', async () => {
    const client = await startClient({ capabilities: offsets });
    await client.open(uri, '');
    const first = await asked(client, 'net A { source ', 2);
    const second = await asked(client, 'net A { source 5', 3, { triggerKind: SignatureHelpTriggerKind.ContentChange, isRetrigger: true, activeSignatureHelp: { ...first!, activeSignature: 1 } });
    assert.equal(second!.activeSignature, 1);
    await client.stop();
  });

  it('names its parameters for a client that cannot count', async () => {
    const client = await startClient();
    await client.open(uri, '');
    assert.deepEqual((await asked(client, 'net A { swing ', 2))!.signatures[0]!.parameters!.map(({ label }) => label), ['VOLTAGE', 'to VOLTAGE']);
    await client.stop();
  });
});
