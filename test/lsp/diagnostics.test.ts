import assert from 'node:assert/strict';
import { describe, it } from 'node:test';
import { DiagnosticSeverity, DiagnosticTag, LSPErrorCodes, type Diagnostic } from 'vscode-languageserver-protocol/node';
import { TextDocument } from 'vscode-languageserver-textdocument';
import { eventually, refusedFor, startClient } from './client';

const uri = 'file:///boards/one.quiet';

describe('diagnostics that the client asks for', () => {
  it('are the findings of the text, and are not sent besides', async () => {
    const client = await startClient();
    assert.deepEqual(client.initialized.capabilities.diagnosticProvider, { identifier: 'quietrun', interFileDependencies: true, workspaceDiagnostics: true });
    await client.open(uri, 'net A { swing 3 }\n');
    const [found] = await client.diagnostics(uri);
    assert.deepEqual({ ...found, message: '' }, { range: range(0, 14, 0, 15), severity: DiagnosticSeverity.Error, source: 'quietrun', code: 'unit', message: '' });
    await client.change(uri, 2, 'net A { swing 3 V }\n');
    assert.deepEqual((await client.diagnostics(uri)).filter(({ code }) => code === 'unit'), []);
    assert.deepEqual(client.published, []);
    await client.stop();
  });

  it('are brought to the notice of a client that does not ask after an edit, and of no other', async () => {
    let reminded = 0;
    const capabilities = { textDocument: { diagnostic: {} }, workspace: { diagnostics: { refreshSupport: true } } };
    const client = await startClient({ capabilities, answers: (connection) => connection.onRequest('workspace/diagnostic/refresh', () => { reminded += 1; return null; }) });
    await eventually(() => (reminded === 1 ? true : undefined), 'the refresh when the workspace was read');
    await client.open(uri, 'net A { swing 3 }\n');
    await client.diagnostics(uri);
    await new Promise((resolve) => setTimeout(resolve, 800));
    assert.equal(reminded, 1, 'it asked: nothing to say');
    await client.change(uri, 2, 'net A { swing 3 V }\n');
    await eventually(() => (reminded === 2 ? true : undefined), 'a reminder of the edit');
    await client.diagnostics(uri);
    await new Promise((resolve) => setTimeout(resolve, 1200));
    assert.equal(reminded, 2, 'it has asked since');
    await client.stop();
  });

  it('are not repeated while they are the same', async () => {
    const client = await startClient();
    await client.open(uri, 'net A { swing 3 }\n');
    const ask = (previousResultId?: string) => client.connection.sendRequest<{ kind: string; resultId: string }>('textDocument/diagnostic', { textDocument: { uri }, previousResultId });
    const first = await ask();
    assert.equal(first.kind, 'full');
    assert.deepEqual(await ask(first.resultId), { kind: 'unchanged', resultId: first.resultId });
    await client.change(uri, 2, 'net A { swing 3 }\n\n# more\n');
    assert.equal((await ask(first.resultId)).kind, 'unchanged');
    await client.change(uri, 3, '\nnet A { swing 3 }\n');
    assert.equal((await ask(first.resultId)).kind, 'full');
    await client.stop();
  });

  it('fade what is never used, link the rule to its page, and lead to related places', async () => {
    const client = await startClient({ options: { rulePages: 'quietrun-rule' } });
    await client.open(uri, 'net A { swing 3 V }\nnet B { once }\nnet B { once }\n');
    const found = await client.diagnostics(uri);
    const unused = of(found, 'unused-declaration')[0];
    assert.equal(unused.severity, DiagnosticSeverity.Hint);
    assert.deepEqual(unused.tags, [DiagnosticTag.Unnecessary]);
    const twice = of(found, 'duplicate-name')[0];
    assert.deepEqual(twice.codeDescription, { href: 'quietrun-rule:/duplicate-name.md' });
    assert.deepEqual(twice.relatedInformation?.map(({ location }) => location), [{ uri, range: range(1, 4, 1, 5) }]);
    await client.stop();
  });

  it('keep a waived finding as a hint, with the reason', async () => {
    const client = await startClient();
    const text = 'stackup { copper TOP 35 um; prepreg 0.2 mm er 4.2; plane G 18 um }\nboard b { clearance 0.2 mm }\nnet A { swing 3 V; rise 5 ns; source 50 ohm; load 1 kohm }\nnet B { source 50 ohm; load 1 kohm }\nrun r on TOP for 10 mm { trace A 0.2 mm; gap 0.1 mm; trace B 0.2 mm; waive gap-below-clearance because "the fabricator agreed" }\n';
    await client.open(uri, text);
    const [found] = of(await client.diagnostics(uri), 'gap-below-clearance');
    assert.equal(found.severity, DiagnosticSeverity.Hint);
    assert.match(String(found.message), /\nwaived: the fabricator agreed$/);
    await client.stop();
  });

  it('stand at the same place whatever ends the lines, and after letters of two code units', async () => {
    const client = await startClient();
    const text = '# 😀 µ Ω\nnet A {\n  swing 3 V # 😀\n  rise 1 µs; load 1 kΩ; fall 3 lightyears # 😀\n}\n';
    const places: string[] = [];
    for (const [version, lines] of [text, text.replace(/\n/g, '\r\n'), `\uFEFF${text}`].entries()) {
      const each = `file:///boards/${version}.quiet`;
      await client.open(each, lines);
      const [found] = of(await client.diagnostics(each), 'unit');
      places.push(JSON.stringify(found.range));
      assert.equal(TextDocument.create(each, 'quietrun', 1, lines).getText(found.range), 'lightyears');
    }
    assert.equal(places[1], places[0]);
    assert.equal(places[2], places[0]);
    await client.stop();
  });

  it('are refused, to be asked for anew, when an edit came first', async () => {
    const client = await startClient();
    await client.open(uri, 'net A { swing 3 }\n');
    const refused = await refusedFor(() => client.diagnostics(uri), (time) => client.change(uri, 1 + time, 'net A { swing 3 V; rise 4 }\n'));
    const late = await client.diagnostics(uri);
    assert.equal(refused.code, LSPErrorCodes.ServerCancelled);
    assert.deepEqual(refused.data, { retriggerRequest: true });
    assert.deepEqual(of(late, 'unit').map(({ range: { start } }) => start.character), [24]);
    await client.stop();
  });

  it('are none for a file that is not open', async () => {
    const client = await startClient();
    assert.deepEqual(await client.diagnostics('file:///boards/other.quiet'), []);
    await client.stop();
  });

  it('leave an old version beside the new one alone', async () => {
    const client = await startClient();
    await client.open('git:/boards/one.quiet?%7B%22ref%22%3A%22HEAD%22%7D', 'net A { swing 3 }\n');
    assert.deepEqual(await client.diagnostics('git:/boards/one.quiet?%7B%22ref%22%3A%22HEAD%22%7D'), []);
    await client.stop();
  });
});

describe('diagnostics that are sent', () => {
  it('come to a client that cannot ask, with the version they are of, and go with the file', async () => {
    const client = await startClient({ capabilities: {} });
    assert.equal(client.initialized.capabilities.diagnosticProvider, undefined);
    await client.open(uri, 'net A { swing 3 }\n');
    const first = await eventually(() => client.published.at(-1), 'findings');
    assert.equal(first.version, 1);
    assert.equal(of(first.diagnostics, 'unit').length, 1);
    await client.change(uri, 2, 'net A { swing 3 V }\n');
    const second = await eventually(() => client.published.find(({ version }) => version === 2), 'findings of the edit');
    assert.deepEqual(of(second.diagnostics, 'unit'), []);
    await client.change(uri, 3, 'net A { swing 3 }\n');
    await eventually(() => client.published.find(({ version }) => version === 3), 'findings of the second edit');
    await client.close(uri);
    const last = await eventually(() => client.published.find(({ diagnostics, version }) => version === undefined && diagnostics.length === 0), 'none');
    assert.equal(last.uri, uri);
    await client.stop();
  });
});

describe('diagnostics of the workspace', () => {
  it('are those of files that are not open, and wait for something new', async () => {
    const other = 'file:///boards/other.quiet';
    const texts = new Map([[other, 'net A { swing 3 }\n'], [uri, 'use "other.quiet"\n']]);
    const client = await startClient({ folders: ['file:///boards'], reader: { read: async (each) => (texts.has(each) ? { text: texts.get(each)! } : { problem: 'missing' }), list: async () => [...texts.keys()] } });
    await client.open(uri, texts.get(uri)!);
    interface Report { items: { uri: string; resultId: string; items: Diagnostic[] }[] }
    const ask = (previousResultIds: { uri: string; value: string }[]) => client.connection.sendRequest<Report>('workspace/diagnostic', { previousResultIds });
    const first = await ask([]);
    assert.deepEqual(first.items.map((item) => [item.uri, item.items.map(({ code }) => code)]), [[other, ['unit']]]);
    let answered = false;
    const second = ask([{ uri: other, value: first.items[0].resultId }]).finally(() => { answered = true; });
    await new Promise((resolve) => setTimeout(resolve, 100));
    assert.equal(answered, false);
    texts.set(other, 'net A { swing 3 V; rise 4 }\n');
    await client.connection.sendNotification('workspace/didChangeWatchedFiles', { changes: [{ uri: other, type: 2 }] });
    assert.deepEqual((await second).items[0].items.map(({ message }) => String(message).includes('4')), [true]);
    await client.stop();
  });
});

const of = (found: readonly Diagnostic[], rule: string) => found.filter(({ code }) => code === rule);

function range(startLine: number, startCharacter: number, endLine: number, endCharacter: number) {
  return { start: { line: startLine, character: startCharacter }, end: { line: endLine, character: endCharacter } };
}
