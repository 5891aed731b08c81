/** The built command as any editor starts it: a process that speaks the protocol over its standard streams. */
import assert from 'node:assert/strict';
import { spawn, type ChildProcessWithoutNullStreams } from 'node:child_process';
import { once } from 'node:events';
import { describe, it } from 'node:test';
import { createProtocolConnection, StreamMessageReader, StreamMessageWriter, type Diagnostic, type InitializeResult, type PublishDiagnosticsParams } from 'vscode-languageserver-protocol/node';
import { starterBoard } from '../../client/src/starterBoard';

describe('quietrun serve --stdio', () => {
  it('serves a client that knows nothing of us: findings, hover, fixes, and an orderly end', async () => {
    const server = spawn(process.execPath, ['dist/cli.cjs', 'serve', '--stdio'], { stdio: ['pipe', 'pipe', 'pipe'] });
    let complaints = '';
    server.stderr.on('data', (more) => { complaints += String(more); });
    const ended = once(server, 'exit');
    try {
      await served(server);
    } catch (error) {
      server.kill(); // a test that has failed must not wait for it
      throw error;
    }
    const [status] = await ended;
    assert.equal(status, 0);
    assert.equal(complaints, '');
  });
});

/** What a person does, message by message. */
async function served(server: ChildProcessWithoutNullStreams): Promise<void> {
  const connection = createProtocolConnection(new StreamMessageReader(server.stdout), new StreamMessageWriter(server.stdin));
  const published = new Promise<PublishDiagnosticsParams>((resolve) => connection.onNotification('textDocument/publishDiagnostics', (params: PublishDiagnosticsParams) => { if (0 < params.diagnostics.length) resolve(params); }));
  connection.listen();

  const uri = 'file:///boards/first.quiet';
  const { capabilities } = await connection.sendRequest<InitializeResult>('initialize', { processId: process.pid, rootUri: null, capabilities: {} });
  assert.equal(capabilities.hoverProvider, true);
  await connection.sendNotification('initialized', {});
  await connection.sendNotification('textDocument/didOpen', { textDocument: { uri, languageId: 'quietrun', version: 1, text: starterBoard } });

  const { diagnostics, version } = await published;
  assert.equal(version, 1);
  const over = diagnostics.find(({ code }: Diagnostic) => code === 'over-budget');
  assert.ok(over, JSON.stringify(diagnostics));
  const hover = await connection.sendRequest<{ contents: { value: string } }>('textDocument/hover', { textDocument: { uri }, position: over.range.start });
  assert.match(hover.contents.value, /SENSE/);
  assert.doesNotMatch(hover.contents.value, /<\w/, 'no markup that a plain client would show as it is');
  const fixes = await connection.sendRequest<{ title: string; edit: { changes: Record<string, unknown[]> } }[]>('textDocument/codeAction', { textDocument: { uri }, range: over.range, context: { diagnostics: [over] } });
  assert.ok(fixes.some(({ title, edit }) => /gap/.test(title) && edit.changes[uri].length === 1), fixes.map(({ title }) => title).join(' | '));

  await connection.sendRequest('shutdown');
  await connection.sendNotification('exit');
  connection.dispose();
}
