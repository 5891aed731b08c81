/**
 * Every sentence of the language reference on the JSON of `check` and on the exit status. The lists of keys below are copied from
 * that page by hand, not from the schema in the code: "every key is always present"; later versions only add keys.
 */
import assert from 'node:assert/strict';
import { mkdirSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { after, describe, it } from 'node:test';
import { run } from '../../server/src/cli/run';

const folder = mkdtempSync(path.join(tmpdir(), 'quietrun-json-'));
after(() => rmSync(folder, { recursive: true, force: true }));

async function quietrun(words: readonly string[], input = '') {
  let out = '';
  let complaints = '';
  const status = await run(words, { workingDirectory: folder, version: '1.2.3', coloured: false, write: (text) => { out += text; }, complain: (text) => { complaints += text; }, readStandardInput: async () => new TextEncoder().encode(input), serve: async () => {} });
  return { status, out, complaints };
}
type Json = { readonly [key: string]: any };
async function report(text: string, ...options: readonly string[]): Promise<Json> {
  return JSON.parse((await quietrun(['check', '-', '--format', 'json', ...options], text)).out);
}

const stackup = 'stackup { copper TOP 35 um; prepreg 0.2 mm er 4.2; plane GND 18 um }\n';
const nets = 'net A { swing 3.3 V; rise 0.4 ns; source 50 ohm; load 50 ohm }\nnet V { source 60 ohm; load 200 ohm; tolerates 1 mV peak }\n';
const run_ = 'run r on TOP for 40 mm { trace A 0.2 mm; gap 0.2 mm; trace V 0.15 mm }\n';
const others = 'loop l on TOP { carries A; rectangle 5 mm by 5 mm; strip 1 mm }\nreturn g { strip 10 mm by 2 mm on TOP; carries A; refers V }\nlink k { between A and V; capacitance 1 pF }\nshield s { covers V; sheet tin 0.2 mm; slot 5 mm; grounded }\n';
const everything = `${stackup}${nets}${run_}${others}`;

const keys: Readonly<Record<string, string>> = {
  report: 'version tool units summary files',
  summary: 'errors warnings information hints waived worst',
  worst: 'file budget marginDb',
  file: 'path uses complete findings runs loops returns links shields budgets',
  finding: 'rule severity message path range subject key value limit unit waived related',
  run: 'name path range length conductors capacitance capacitanceInAir inductance impedance delay errorBar couplings',
  coupling: 'aggressor victim edge model nearEnd farEnd atReceiver peakTime widthHalf capacitivePart inductivePart errorBar bounds',
  loop: 'name path range area perimeter inductance emission mutual',
  return: 'name path range resistance inductance drops',
  link: 'name path range induced',
  shield: 'name path range frequency effectivenessDb',
  budget: 'net kind path range tolerates measure combine total bounds errorBar marginDb verdict complete unaccounted contributions',
  contribution: 'channel from where group value unfiltered bounds method assumptions',
};
function has(thing: Json | undefined, what: string): void {
  assert.ok(thing, `there is no ${what}`);
  const lacking = keys[what]!.split(' ').filter((key) => !(key in thing) || thing[key] === undefined);
  assert.deepEqual(lacking, [], `keys that ${what} lacks`);
}
function lists(thing: Json, ...names: readonly string[]): void {
  for (const name of names) assert.ok(Array.isArray(thing[name]), `${name} is a list, never null`);
}

describe('keys', () => {
  it('are all there, of everything that a report may hold', async () => {
    const found = await report(everything);
    has(found, 'report');
    has(found['summary'], 'summary');
    const [file] = found['files'];
    has(file, 'file');
    lists(file, 'uses', 'findings', 'runs', 'loops', 'returns', 'links', 'shields', 'budgets');
    for (const each of file.findings) has(each, 'finding');
    has(file.runs[0], 'run');
    has(file.runs[0].couplings[0], 'coupling');
    for (const [list, what] of [['loops', 'loop'], ['returns', 'return'], ['links', 'link'], ['shields', 'shield'], ['budgets', 'budget']] as const) has(file[list][0], what);
    has(file.budgets[0].contributions[0], 'contribution');
    lists(file.loops[0], 'emission', 'mutual');
    lists(file.returns[0], 'drops');
    lists(file.links[0], 'induced');
    lists(file.budgets[0], 'unaccounted', 'contributions');
    lists(file.budgets[0].contributions[0], 'assumptions');
    assert.deepEqual([found['version'], found['tool'], found['units']], [1, '1.2.3', 'SI']);
  });

  it('are there where nothing has a value, with null, and lists stay lists', async () => {
    for (const text of ['', 'net', 'run r on TOP for 1 mm { trace A 1 mm }', `${nets}run r on NONE for { trace A; gap; trace V 0.2 mm }`, 'run', everything.replaceAll(/ mm/g, ' furlong')]) {
      const [file] = (await report(text))['files'];
      has(file, 'file');
      lists(file, 'uses', 'findings', 'runs', 'loops', 'returns', 'links', 'shields', 'budgets');
      for (const each of file.runs) { has(each, 'run'); lists(each, 'conductors', 'couplings'); }
      for (const each of file.budgets) { has(each, 'budget'); lists(each, 'unaccounted', 'contributions'); }
      for (const each of file.findings) { has(each, 'finding'); lists(each, 'related'); }
    }
  });

  it('of the worst budget: null without one, the least margin of all files with one', async () => {
    assert.equal((await report(stackup))['summary'].worst, null);
    const board = `${stackup}${nets}${run_}`;
    const found = await report(board);
    has(found['summary'].worst, 'worst');
    assert.deepEqual(found['summary'].worst, { file: '-', budget: 'V', marginDb: found['files'][0].budgets[0].marginDb });
  });

  it('a file of runs without any driven net still reports its matrices', async () => {
    const [file] = (await report(`${stackup}net A {}\nnet V {}\n${run_}`))['files'];
    const [bare] = (await report(`${stackup}${nets}${run_}`))['files'];
    assert.deepEqual([file.runs[0].capacitance, file.runs[0].capacitanceInAir, file.runs[0].inductance], [bare.runs[0].capacitance, bare.runs[0].capacitanceInAir, bare.runs[0].inductance]);
    assert.deepEqual([file.runs[0].couplings, file.budgets, file.runs[0].length], [[], [], 0.04]);
  });
});

describe('places', () => {
  it('count from 0, in UTF-16, end exclusive, never empty', async () => {
    const [file] = (await report(`# \u{1f4a1} one\r\n\u00a0nett "\u{1f4a1}" x\r\nnet A { swing 1 V; rise 1 }\n`))['files'];
    for (const { range: { start, end } } of file.findings) assert.ok(start.line < end.line || start.character < end.character);
    const unit = file.findings.find(({ rule }: Json) => rule === 'unit');
    assert.equal(unit.range.start.line, 2);
    assert.equal('net A { swing 1 V; rise 1 }'.slice(unit.range.start.character, unit.range.end.character).includes('1'), true);
    const after_ = (await report('net "\u{1f4a1}" is none\n'))['files'][0].findings.find(({ rule }: Json) => rule === 'unknown-name');
    assert.deepEqual(after_.range, { start: { line: 0, character: 12 }, end: { line: 0, character: 16 } });
  });

  it('paths are relative to the working directory, with `/`; standard input has its name, else `-`', async () => {
    mkdirSync(path.join(folder, 'sub/common'), { recursive: true });
    writeFileSync(path.join(folder, 'sub/common/rows.quiet'), `${stackup}nett\n`);
    writeFileSync(path.join(folder, 'sub/board.quiet'), `use "common/rows.quiet"\n${nets}${run_}`);
    const { out } = await quietrun(['check', path.join(folder, 'sub/board.quiet'), '--format', 'json']);
    const [file] = JSON.parse(out).files;
    assert.deepEqual([file.path, file.uses], ['sub/board.quiet', ['sub/common/rows.quiet']]);
    assert.deepEqual([...new Set(file.findings.map(({ path: where }: Json) => where))].sort(), ['sub/board.quiet', 'sub/common/rows.quiet']);
    assert.equal((await report('nett'))['files'][0].findings[0].path, '-');
    assert.equal((await report('nett', '--stdin-filename', 'sub/typed.quiet'))['files'][0].findings[0].path, 'sub/typed.quiet');
  });

  it('findings are sorted by path, start, rule, message', async () => {
    const [file] = (await report(`net Z is none\n${everything}net Q is nobody\nnett\nfamily F { rise 1 V }\n`))['files'];
    const order = file.findings.map(({ path: where, range: { start }, rule, message }: Json) => [where, start.line, start.character, rule, message]);
    const before = (a: any[], b: any[]): number => { for (let at = 0; at < 5; at += 1) if (a[at] !== b[at]) return a[at] < b[at] ? -1 : 1; return 0; };
    assert.ok(4 < order.length);
    order.forEach((each: any[], at: number) => assert.ok(at === 0 || before(order[at - 1], each) <= 0, `${order[at - 1]} before ${each}`));
  });

  it('the rest is in the order of the text; contributions largest first', async () => {
    const names = ['zeta', 'alpha', 'mid'];
    const text = `${stackup}${nets}net B { swing 1 V; rise 0.4 ns; source 50 ohm; load 50 ohm }\n${names.map((name) => run_.replace('run r', `run ${name}`).replace('trace A', 'trace B 0.2 mm; gap 0.3 mm; trace A')).join('')}`;
    const [file] = (await report(text))['files'];
    assert.deepEqual(file.runs.map(({ name }: Json) => name), names);
    const sizes = file.budgets[0].contributions.map(({ value }: Json) => value);
    assert.ok(6 <= sizes.length);
    assert.deepEqual(sizes, [...sizes].sort((a, b) => b - a));
  });

  it('a key is of rule and names, no line: it stands when the text moves', async () => {
    const keysOf = async (text: string) => (await report(text))['files'][0].findings.map(({ key }: Json) => key).sort();
    assert.deepEqual(await keysOf(`\n\n# moved\n${everything}`), await keysOf(everything));
  });
});

describe('exit status', () => {
  const within = `${stackup}${nets.replace('1 mV', '1 V')}${run_}`;
  const warned = within.replace('; load 50 ohm', '');
  const failed = `${stackup}${nets}${run_}`;
  for (const [what, text, onError, onWarning] of [['nothing', within, 0, 0], ['a warning', warned, 0, 1], ['an error', failed, 1, 1], ['an error that is waived', `${failed}waive over-budget on V because "seen"\n`, 0, 0], ['a hint', `${within}net UNUSED { swing 1 V; rise 1 ns }\n`, 0, 0]] as const) {
    it(`with ${what}: ${onError} by default, ${onWarning} with --fail-on warning, in both formats`, async () => {
      for (const format of ['text', 'json']) {
        assert.equal((await quietrun(['check', '-', '--format', format], text)).status, onError);
        assert.equal((await quietrun(['check', '-', '--format', format, '--fail-on', 'error'], text)).status, onError);
        assert.equal((await quietrun(['check', '-', '--format', format, '--fail-on', 'warning'], text)).status, onWarning);
      }
      const { summary, files: [file] } = await report(text);
      const counted = (severity: string) => file.findings.filter((each: Json) => each['severity'] === severity && each['waived'] === null).length;
      assert.deepEqual([summary.errors, summary.warnings, summary.information, summary.hints], ['error', 'warning', 'information', 'hint'].map(counted));
    });
  }

  it('2 where the command could not run, and then no half of a report', async () => {
    const { status, out } = await quietrun(['check', 'nowhere.quiet', '--format', 'json']);
    assert.deepEqual([status, out], [2, '']);
  });
});
