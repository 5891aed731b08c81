/** The built command as any editor starts it: a process that speaks the protocol over its standard streams. */
import assert from 'node:assert/strict';
import { spawn } from 'node:child_process';
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
    const connection = createProtocolConnection(new StreamMessageReader(server.stdout), new StreamMessageWriter(server.stdin));
    const published = new Promise<PublishDiagnosticsParams>((resolve) => connection.onNotification('textDocument/publishDiagnostics', (params: PublishDiagnosticsParams) => { if (0 < params.diagnostics.length) resolve(params); }));
    connection.listen();

    const stage = (words: string) => console.error(words);
    const uri = 'file:///boards/first.quiet';
    const { capabilities } = await connection.sendRequest<InitializeResult>('initialize', { processId: process.pid, rootUri: null, capabilities: {} });
    assert.equal(capabilities.hoverProvider, true);
    await connection.sendNotification('initialized', {});
    await connection.sendNotification('textDocument/didOpen', { textDocument: { uri, languageId: 'quietrun', version: 1, text: starterBoard } });

    stage("opened");
    const { diagnostics, version } = await published;
    stage("published");
    assert.equal(version, 1);
    const over = diagnostics.find(({ code }: Diagnostic) => code === 'over-budget');
    assert.ok(over, JSON.stringify(diagnostics));
    const hover = await connection.sendRequest<{ contents: { value: string } }>('textDocument/hover', { textDocument: { uri }, position: over.range.start });
    assert.match(hover.contents.value, /SENSE/);
    assert.doesNotMatch(hover.contents.value, /<\w/, 'no markup that a plain client would show as it is');
    stage("hovered");
    const fixes = await connection.sendRequest<{ title: string; edit: { documentChanges: unknown[] } }[]>('textDocument/codeAction', { textDocument: { uri }, range: over.range, context: { diagnostics: [over] } });
    assert.ok(fixes.some(({ title, edit }) => /gap/.test(title) && edit.documentChanges.length === 1), fixes.map(({ title }) => title).join(' | '));

    stage("fixes");
    await connection.sendRequest("shutdown");
    stage("shut");
    await connection.sendNotification('exit');
    const [status] = await ended;
    connection.dispose();
    assert.equal(status, 0);
    assert.equal(complaints, '');
  });
});
