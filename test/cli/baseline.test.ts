/** A baseline: what it takes in, what it lets pass, and what it never does. */
import assert from 'node:assert/strict';
import { readdirSync } from 'node:fs';
import { describe, it } from 'node:test';
import { commandLine } from './commandLine';

const { folder, put, quietrun, textOf } = commandLine();

const stackup = 'stackup { copper TOP 35 um; prepreg 0.2 mm er 4.2; plane GND 18 um }\n';
const board = (gap: string, more = '') => `${stackup}net CLK { swing 3.3 V; rise 1 ns; source 40 ohm; load 1 Mohm, 5 pF }
net SENSE { source 1 kohm; load 1 Mohm, 20 pF; tolerates 10 mV peak }
run r on TOP for 30 mm { trace CLK 0.2 mm; gap ${gap}; trace SENSE 0.15 mm }
${more}`;

async function check(text: string, ...words: readonly string[]) {
  put('board.quiet', text);
  return quietrun(['check', 'board.quiet', ...words]);
}

describe('a baseline', () => {
  it('is written with what would fail the check, one finding a line', async () => {
    const { code, out } = await check(board('0.2 mm'), '--update-baseline', 'base.json');
    assert.equal(code, 0);
    assert.match(out, /known\[over-budget\][\s\S]*\n1 note, 1 in the baseline\./);
    const lines = textOf('base.json').split('\n');
    assert.equal(lines.length, 7);
    assert.match(lines[3], /^ {4}\{"file":"board\.quiet","key":"over-budget net SENSE peak","value":0\.048\d{0,4}\},?$/);
  });

  it('lets pass what it knows, wherever that stands now', async () => {
    const { code, out } = await check(`# moved\n\n${board('0.2 mm').replace('gap 0.2', 'gap   0.2')}`, '--baseline', 'base.json');
    assert.equal(code, 0);
    assert.match(out, /known\[over-budget\]/);
  });

  it('does not let pass what has become worse by more than a hundredth of the limit', async () => {
    assert.equal((await check(board('0.2 mm').replace('30 mm', '30.01 mm'), '--baseline', 'base.json')).code, 0);
    assert.equal((await check(board('0.19 mm'), '--baseline', 'base.json')).code, 1);
  });

  it('does not let pass another finding of the same rule', async () => {
    const second = 'net OTHER { source 1 kohm; load 1 Mohm, 20 pF; tolerates 10 mV peak }\nrun s on TOP for 30 mm { trace CLK 0.2 mm; gap 0.2 mm; trace OTHER 0.15 mm }\n';
    const { code, out } = await check(board('0.2 mm', second), '--baseline', 'base.json');
    assert.equal(code, 1);
    assert.match(out, /error\[over-budget\]/);
    assert.match(out, /known\[over-budget\]/);
  });

  it('says what no longer occurs, and drops it when it is written anew', async () => {
    const { code, complaints } = await check(board('1 mm'), '--baseline', 'base.json');
    assert.equal(code, 0);
    assert.equal(complaints, 'quietrun: a finding of base.json no longer occurs; --update-baseline base.json drops it\n');
    await check(board('1 mm'), '--update-baseline', 'base.json');
    assert.equal(textOf('base.json'), '{\n  "version": 1,\n  "findings": []\n}\n');
  });

  it('counts known findings in JSON as waived, of which the shape stays', async () => {
    await check(board('0.2 mm'), '--update-baseline', 'base.json');
    const { out } = await check(board('0.2 mm'), '--baseline', 'base.json', '--format', 'json');
    const { summary, files } = JSON.parse(out);
    assert.deepEqual([summary.errors, summary.waived], [0, 1]);
    assert.equal(files[0].findings.find(({ rule }: { rule: string }) => rule === 'over-budget').waived, 'in the baseline');
  });

  it('never takes in what cannot be read', async () => {
    const { code } = await check(`${board('0.2 mm')}net {\n`, '--update-baseline', 'text.json');
    assert.equal(code, 1);
    assert.doesNotMatch(textOf('text.json'), /syntax/);
  });

  it('has paths from its own folder, so that it holds from anywhere', async () => {
    put('sub/base.json', '{ "version": 1, "findings": [] }');
    await check(board('0.2 mm'), '--update-baseline', 'sub/base.json');
    assert.match(textOf('sub/base.json'), /"file":"\.\.\/board\.quiet"/);
  });

  it('is never written over a file that is none, and leaves nothing behind', async () => {
    const before = board('0.2 mm');
    const { code, complaints } = await check(before, '--update-baseline', 'board.quiet');
    assert.equal(code, 2);
    assert.equal(complaints, 'quietrun: board.quiet is there and is no baseline: it stays as it is\n');
    assert.equal(textOf('board.quiet'), before);
    assert.equal((await check(before, '--update-baseline', 'no/such/folder.json')).code, 2);
    assert.deepEqual(readdirSync(folder).filter((name) => name.endsWith('.tmp')), []);
  });

  for (const [what, text] of [['no JSON', '{'], ['another version', '{"version":2,"findings":[]}'], ['something else', '{"version":1,"findings":[{"file":1}]}'], ['nested without end', '['.repeat(100_000)], ['nothing', '']] as const) {
    it(`is refused where it is ${what}`, async () => {
      put('bad.json', text);
      const { code, out, complaints } = await check(board('1 mm'), '--baseline', 'bad.json');
      assert.deepEqual([code, out, complaints], [2, '', 'quietrun: bad.json is no baseline\n']);
    });
  }

  it('is asked for where there is none', async () => {
    const { code, complaints } = await check(board('1 mm'), '--baseline', 'none.json');
    assert.deepEqual([code, complaints], [2, 'quietrun: there is no baseline none.json; --update-baseline none.json makes one\n']);
  });
});

describe('--max-warnings', () => {
  const warned = board('1 mm').replace('10 mV peak', '1 V peak').replace('net SENSE { source 1 kohm; load 1 Mohm, 20 pF; ', 'net SENSE { ');

  it('fails where there are more', async () => {
    assert.equal((await check(warned)).code, 0);
    assert.equal((await check(warned, '--max-warnings', '1')).code, 0);
    assert.equal((await check(warned, '--max-warnings', '0')).code, 1);
  });

  it('does not count what a baseline knows', async () => {
    await check(warned, '--update-baseline', 'warned.json');
    assert.equal((await check(warned, '--baseline', 'warned.json', '--max-warnings', '0')).code, 0);
  });
});
