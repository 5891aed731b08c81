/**
 * Files that nobody should write, through the whole of the command line in JSON and in text: a clear finding each, with the exit
 * status of the language reference; never an exception, never a wait, never NaN or infinity in the answer.
 */
import assert from 'node:assert/strict';
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { after, describe, it } from 'node:test';
import { run } from '../../server/src/cli/run';
import { checkSchema } from '../../server/src/cli/checkSchema';
import { findingsOf, rules } from '../../server/src/rules/index';
import type { Rule } from '../../server/src/rules/rule';
import { evaluated, rootPath } from '../support/evaluated';
import { seeded } from '../support/seeded';

const folder = mkdtempSync(path.join(tmpdir(), 'quietrun-text-'));
after(() => rmSync(folder, { recursive: true, force: true }));

async function quietrun(words: readonly string[], input = '') {
  let out = '';
  let complaints = '';
  const status = await run(words, { workingDirectory: folder, version: '0.0.0', coloured: false, write: (text) => { out += text; }, complain: (text) => { complaints += text; }, readStandardInput: async () => new TextEncoder().encode(input), serve: async () => {} });
  assert.equal(complaints, '', 'no rule fails');
  return { status, out };
}

/** Rules found, after both formats were looked at for what must not be in them. */
async function rulesIn(file: string, expectedStatus: number): Promise<readonly string[]> {
  const text = await quietrun(['check', file]);
  assert.doesNotMatch(text.out, /[\u0000-\u0009\u000b-\u001f\u007f-\u009f]|NaN|Infinity|undefined|\[object/);
  const json = await quietrun(['check', file, '--format', 'json']);
  assert.deepEqual([text.status, json.status], [expectedStatus, expectedStatus], text.out.slice(0, 500));
  // The schema demands every key and a finite number or null.
  const report = checkSchema.parse(JSON.parse(json.out));
  const lines = [...(report.files[0]!.findings.map(({ range }) => range))];
  assert.ok(lines.every(({ start, end }) => start.line < end.line || start.character < end.character), 'a range is never empty');
  return report.files[0]!.findings.map(({ rule }) => rule);
}

function put(name: string, content: string | Uint8Array): string {
  writeFileSync(path.join(folder, name), content);
  return name;
}

const stackup = 'stackup { copper TOP 35 um; prepreg 0.2 mm er 4.2; plane GND 18 um }\n';
const nets = 'net A { swing 3.3 V; rise 1 ns; source 50 ohm; load 50 ohm }\nnet V { source 50 ohm; load 50 ohm; tolerates 1 V peak }\n';
const beside = 'run r on TOP for 30 mm { trace A 0.2 mm; gap 0.2 mm; trace V 0.2 mm }\n';

describe('a file that is no board', () => {
  it('is empty, or holds nothing that is said', async () => {
    for (const [at, text] of ['', '\ufeff', '\n\n', '# nothing\n', ';;;;', '\r\n\t \u00a0'].entries()) assert.deepEqual(await rulesIn(put(`empty${at}.quiet`, text), 0), []);
  });

  it('is a megabyte of random bytes', async () => {
    const random = seeded(7);
    const bytes = Uint8Array.from({ length: 1 << 20 }, () => Math.floor(random() * 256));
    assert.ok((await rulesIn(put('random.quiet', bytes), 1)).every((rule) => ['syntax', 'duplicate-name', 'missing-value', 'unit', 'unknown-name', 'include', 'bad-value'].includes(rule)));
  });

  it('is UTF-16, or not UTF-8', async () => {
    assert.ok((await rulesIn(put('utf16.quiet', Buffer.from(`\ufeff${stackup}`, 'utf16le')), 1)).includes('syntax'));
    assert.ok((await rulesIn(put('latin1.quiet', Buffer.from(`${stackup}net \xe9 { swing 1 V; rise 1 ns }\nR\xe9 x\n`, 'latin1')), 1)).includes('syntax'));
  });

  it('is a hundred thousand braces, one way or the other, or both', async () => {
    const many = 1e5;
    for (const [name, text] of [['open', '{'.repeat(many)], ['closed', '}'.repeat(many)], ['both', '{'.repeat(many) + '}'.repeat(many)], ['heads', 'net A {'.repeat(many / 10)], ['rounds', `loop l { path ${'('.repeat(many)}`], ['quotes', '"'.repeat(many)]]) {
      assert.ok((await rulesIn(put(`${name}.quiet`, text!), 1)).includes('syntax'), name);
    }
  });

  it('is one line of a megabyte', async () => {
    assert.ok((await rulesIn(put('line.quiet', 'stray '.repeat(1 << 18)), 1)).includes('syntax'));
    assert.ok((await rulesIn(put('words.quiet', 'net '.repeat(1 << 13)), 1)).includes('duplicate-name'));
    assert.deepEqual(await rulesIn(put('comment.quiet', `# ${'x'.repeat(1 << 20)}`), 0), []);
  });
});

describe('a file of mistakes', () => {
  it('has all findings of a rule, however many: more than a call has arguments', () => {
    const { evaluation } = evaluated(new Map([[rootPath, '# nothing']]));
    const often: Rule = { ...rules[0]!, *find() { for (let at = 0; at < 2e5; at += 1) yield { at: { path: rootPath, span: { start: at, end: at + 1 } }, subject: null }; }, message: () => 'often' };
    assert.equal(findingsOf(evaluation, { rules: [often], log: (_, error) => { throw error; } }).length, 2e5);
  });

  it('is answered in a time that grows with it, not with its square', async () => {
    const name = put('mistakes.quiet', 'net A is b\nfoo\n'.repeat(15_000));
    const begin = performance.now();
    assert.equal((await quietrun(['check', name])).status, 1);
    // Its square took ten seconds and more; what it takes now is a fraction of one.
    assert.ok(performance.now() - begin < 8000, `${performance.now() - begin} ms`);
  });
});

describe('a board with numbers that cannot be', () => {
  const cannot: readonly (readonly [string, string])[] = [
    ['width of zero', 'trace A 0 mm; gap 0.2 mm; trace V 0.2 mm'],
    ['gap of zero', 'trace A 0.2 mm; gap 0 mm; trace V 0.2 mm'],
    ['gap below zero', 'trace A 0.2 mm; gap -0.2 mm; trace V 0.2 mm'],
    ['width below zero', 'trace A -0.2 mm; gap 0.2 mm; trace V 0.2 mm'],
  ];
  for (const [what, row] of cannot) {
    it(`a ${what} is a bad value`, async () => {
      const rules = await rulesIn(put('bad.quiet', `${stackup}${nets}run r on TOP for 30 mm { ${row} }\n`), 1);
      assert.ok(rules.includes('bad-value'), rules.join());
      assert.ok(rules.length <= 3, 'one mistake gives at most two findings, and the budget that it makes incomplete one');
    });
  }

  it('a number of any size is answered', async () => {
    const numbers = ['1e300', '1e-300', '1e400', '-1e400', '1e-400', '0', '-0', '99999999999999999999999999', '1e99999999999', '.5', '0.0000000000000000001'];
    for (const number of numbers) {
      const boards = [
        `${stackup}${nets}${beside.replace('30 mm', `${number} mm`)}`,
        `${stackup}${nets}${beside.replace('gap 0.2', `gap ${number}`)}`,
        `${stackup}${nets}${beside.replace('V 0.2', `V ${number}`)}`,
        `${stackup.replace('0.2 mm', `${number} mm`)}${nets}${beside}`,
        `${stackup.replace('er 4.2', `er ${number}`)}${nets}${beside}`,
        `${stackup.replace('35 um', `${number} um`)}${nets}${beside}`,
        `${stackup}${nets.replace('3.3 V', `${number} V`)}${beside}`,
        `${stackup}${nets.replace('1 ns', `${number} ns`)}${beside}`,
        `${stackup}${nets.replace('50 ohm', `${number} ohm`)}${beside}`,
        `${stackup}${nets.replace('load 50 ohm', `load 50 ohm, ${number} F`)}${beside}`,
        `${stackup}${nets.replace('1 V peak', `${number} V peak`)}${beside}`,
        `${stackup}${nets.replace('1 V peak', `1 V peak; length ${number} m`)}${beside}`,
        `${stackup}${nets}${beside.replace('trace V 0.2 mm', `trace V 0.2 mm after ${number} mm`)}`,
        `board b { headroom ${number} dB; clearance ${number} mm; temperature ${number} degC }\n${stackup}${nets}${beside}`,
      ];
      for (const text of boards) {
        const { status, out } = await quietrun(['check', '-', '--format', 'json'], text);
        assert.ok(status === 0 || status === 1, text);
        const { files: [file], summary } = checkSchema.parse(JSON.parse(out));
        assert.equal(status === 1, 0 < summary.errors, text);
        // Nobody may read "within budget" where nothing was computed.
        const [budget] = file!.budgets;
        if (budget !== undefined && budget.total === null) assert.notEqual(budget.verdict, 'pass', text);
        assert.ok(file!.findings.length <= 6, `${file!.findings.length} findings for one number of\n${text}\n${file!.findings.map(({ rule, message }) => `${rule}: ${message}`).join('\n')}`);
      }
    }
  });
});

describe('names that something else might stumble over', () => {
  const names = ['__proto__', 'constructor', 'toString', 'hasOwnProperty', '3V3', 'RESET#', '"a b"', '"{"', '"a""b"', '"\u001b[31m"', 'é', '電源', '"\u202egnp"', 'x'.repeat(5000)];
  it('are names of nets like any other', async () => {
    for (const name of names) {
      const { status, out } = await quietrun(['check', '-', '--format', 'json'], `${stackup}${nets.replace('net V', `net ${name}`)}${beside.replace('trace V', `trace ${name}`)}`);
      const file = checkSchema.parse(JSON.parse(out)).files[0]!;
      assert.equal(status, 0, `${name.slice(0, 50)}: ${out.slice(0, 600)}`);
      const plain = name.startsWith('"') ? name.slice(1, -1).replaceAll('""', '"') : name;
      assert.deepEqual([file.runs[0]!.conductors, file.budgets[0]!.net, file.budgets[0]!.verdict], [['A', plain], plain, 'pass']);
      assert.doesNotMatch((await quietrun(['check', '-'], `${stackup}${nets.replace('net V', `net ${name}`)}${beside.replace('trace V', `trace ${name}`)}`)).out, /[\u0000-\u0009\u000b-\u001f\u007f-\u009f\u202e]/);
    }
  });

  it('of files may hold line ends and escapes, which stay out of the terminal and are whole in JSON', async () => {
    if (process.platform === 'win32') return;
    const name = put('odd\n\u001b[2J\u009b.quiet', `${stackup}nett x\n`);
    assert.ok((await rulesIn(name, 1)).includes('syntax'));
    const { files } = JSON.parse((await quietrun(['check', name, '--format', 'json'])).out);
    assert.equal(files[0].path, name);
    const { out } = await quietrun(['check', name]);
    assert.equal(out.split('\n')[0]!.includes('.quiet'), true, 'the name stays on its line');
  });
});
