/** The command line from its words to its exit status, on files of its own. */
import assert from 'node:assert/strict';
import { mkdirSync, mkdtempSync, rmSync, symlinkSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { after, describe, it } from 'node:test';
import { run } from '../../server/src/cli/run';
import { checkSchema } from '../../server/src/cli/checkSchema';

const folder = mkdtempSync(path.join(tmpdir(), 'quietrun-cli-'));
after(() => rmSync(folder, { recursive: true, force: true }));

function put(name: string, text: string): void {
  mkdirSync(path.dirname(path.join(folder, name)), { recursive: true });
  writeFileSync(path.join(folder, name), text);
}

async function quietrun(words: readonly string[], input = '', coloured = false) {
  let out = '';
  let complaints = '';
  const code = await run(words, {
    workingDirectory: folder,
    version: '0.0.0',
    coloured,
    write: (text) => { out += text; },
    complain: (text) => { complaints += text; },
    readStandardInput: async () => new TextEncoder().encode(input),
    serve: async () => { out += 'served'; },
  });
  return { code, out, complaints };
}

const stackup = 'stackup { copper TOP 35 um; prepreg 0.2 mm er 4.2; plane GND 18 um }\n';
const noisy = 'net CLK { swing 3.3 V; rise 1 ns; source 40 ohm; load 1 Mohm, 5 pF }\n';
const receiver = (tolerates: string) => `net SENSE { source 1 kohm; load 1 Mohm, 20 pF; tolerates ${tolerates} peak }\n`;
const beside = (gap: string) => `run r on TOP for 30 mm { trace CLK 0.2 mm; gap ${gap}; trace SENSE 0.15 mm }\n`;

put('common/stack.quiet', stackup);
put('over.quiet', `use "common/stack.quiet"\n${noisy}${receiver('10 mV')}${beside('0.2 mm')}`);
put('clean.quiet', `use "common/stack.quiet"\n${noisy}${receiver('0.5 V')}${beside('1 mm')}`);
put('outer/secret.quiet', stackup);
put('inner/board.quiet', `use "../outer/secret.quiet"\n`);
put('case.quiet', 'use "common/Stack.quiet"\n');

describe('quietrun check', () => {
  it('exits with 1 on a budget that is exceeded, and underlines it', async () => {
    const { code, out } = await quietrun(['check', 'over.quiet']);
    assert.equal(code, 1);
    assert.match(out, /^over\.quiet\n {2}SENSE {2}[\d.]+ mV of 10\.0 mV peak {2}over by/);
    assert.match(out, /over\.quiet:3:\d+ {2}error\[over-budget\]\n {2}3 \| net SENSE.*\n {4}\| +\^+\n/);
    assert.doesNotMatch(out, /\u001b/);
  });

  it('exits with 0 on a board without findings, and says so', async () => {
    const { code, out } = await quietrun(['check', 'clean.quiet']);
    assert.equal(code, 0);
    assert.match(out, /No findings in this file\. Least margin: SENSE, [\d.]+ dB\.\n$/);
  });

  it('says the same in colour as without', async () => {
    const plain = await quietrun(['check', 'over.quiet']);
    const coloured = await quietrun(['check', 'over.quiet'], '', true);
    assert.match(coloured.out, /\u001b\[31m/);
    assert.equal(coloured.out.replace(/\u001b\[\d+m/g, ''), plain.out);
  });

  it('reads standard input under the name that it is given', async () => {
    const { code, out } = await quietrun(['check', '-', '--stdin-filename', 'typed.quiet', '--format', 'json'], `use "common/stack.quiet"\n${noisy}`);
    const report = checkSchema.parse(JSON.parse(out));
    assert.equal(code, 0);
    assert.deepEqual([report.files[0].path, report.files[0].uses], ['typed.quiet', ['common/stack.quiet']]);
  });

  it('writes JSON that its published schema accepts, in the order of the files given', async () => {
    const { code, out } = await quietrun(['check', 'clean.quiet', 'over.quiet', '--format', 'json']);
    const report = checkSchema.parse(JSON.parse(out));
    assert.equal(code, 1);
    assert.deepEqual(report.files.map((file) => file.path), ['clean.quiet', 'over.quiet']);
    assert.equal(report.summary.worst?.file, 'over.quiet');
    const [run_] = report.files[1].runs;
    assert.deepEqual(run_.conductors, ['CLK', 'SENSE']);
    const [coupling] = run_.couplings;
    assert.deepEqual([coupling.aggressor, coupling.victim], ['CLK', 'SENSE']);
    const [budget] = report.files[1].budgets;
    assert.ok(Math.abs(20 * Math.log10(budget.tolerates / budget.total!) - budget.marginDb!) < 1e-9);
  });

  it('fails on warnings only where it is asked to', async () => {
    const text = `use "common/stack.quiet"\nnet CLK { swing 3.3 V; rise 1 ns }\n${receiver('0.5 V')}${beside('1 mm')}`;
    assert.equal((await quietrun(['check', '-'], text)).code, 0);
    assert.equal((await quietrun(['check', '-', '--fail-on', 'warning'], text)).code, 1);
  });

  it('cannot run on what is not there', async () => {
    const { code, complaints, out } = await quietrun(['check', 'nowhere.quiet']);
    assert.deepEqual([code, complaints, out], [2, 'quietrun: there is no file nowhere.quiet\n', '']);
    assert.equal((await quietrun(['check', 'common'])).code, 2);
  });

  it('says that a used file is spelt otherwise on the disk', async () => {
    const { out } = await quietrun(['check', 'case.quiet']);
    assert.match(out, /error\[include\]/);
    assert.match(out, /stack\.quiet/);
  });

  it('does not read through a link that leaves the folder', async () => {
    const elsewhere = mkdtempSync(path.join(tmpdir(), 'quietrun-elsewhere-'));
    writeFileSync(path.join(elsewhere, 'hidden.quiet'), 'net HIDDEN { swing 1 V; rise 1 ns }\n');
    symlinkSync(path.join(elsewhere, 'hidden.quiet'), path.join(folder, 'link.quiet'));
    const { code, out } = await quietrun(['check', '-'], 'use "link.quiet"\n');
    rmSync(elsewhere, { recursive: true, force: true });
    assert.equal(code, 1);
    assert.match(out, /error\[include\]/);
    assert.doesNotMatch(out, /HIDDEN/);
  });

  it('sends no control character of a name to the terminal', async () => {
    const { out } = await quietrun(['check', '-'], `${stackup}net "A\u001b[2J" is nothing\n`);
    assert.doesNotMatch(out, /\u001b/);
  });
});

describe('quietrun explain', () => {
  it('lists the rules, and prints the page of one', async () => {
    assert.match((await quietrun(['explain'])).out, /^over-budget +error +/);
    assert.match((await quietrun(['explain', 'over-budget'])).out, /^## over-budget\n/);
  });

  it('knows no other', async () => assert.equal((await quietrun(['explain', 'no-such-rule'])).code, 2));
});

describe('quietrun', () => {
  it('serves, helps, says its version', async () => {
    assert.equal((await quietrun(['serve', '--stdio'])).out, 'served');
    assert.match((await quietrun(['--help'])).out, /^quietrun check FILE/);
    assert.equal((await quietrun(['--version'])).out, '0.0.0\n');
  });

  it('says what it did not understand, and exits with 2', async () => {
    const { code, complaints } = await quietrun(['chek']);
    assert.equal(code, 2);
    assert.match(complaints, /^quietrun: no command chek\n/);
  });
});
