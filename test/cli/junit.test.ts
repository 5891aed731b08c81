/**
 * JUnit's XML as its consumers read it: `testsuites` of `testsuite` of `testcase`, each with at most one of `failure`, `error` and
 * `skipped`, and counts that add up (the schema that the build servers share; from memory).
 */
import assert from 'node:assert/strict';
import { readdirSync, readFileSync } from 'node:fs';
import { describe, it } from 'node:test';
import { readFixture } from '../support/fixture';
import { rootPath } from '../support/evaluated';
import { readXml, type XmlElement } from '../support/wellFormedXml';
import { commandLine } from './commandLine';

const { put, quietrun } = commandLine();

async function junit(...words: readonly string[]) {
  const { code, out } = await quietrun(['check', '--format', 'junit', ...words]);
  const root = readXml(out);
  consumed(root);
  const cases = root.children.flatMap(({ children }) => children);
  const outcomes = new Map(cases.map((each) => [each.attributes.get('name')!, each.children.find(({ name }) => name !== 'system-out')]));
  return { code, root, cases, outcomes };
}

/** What a consumer takes for granted. */
function consumed(root: XmlElement): void {
  assert.equal(root.name, 'testsuites');
  const number = (element: XmlElement, name: string) => {
    assert.match(element.attributes.get(name) ?? '', /^\d+$/, `${element.name} ${name}`);
    return Number(element.attributes.get(name));
  };
  const sums = { tests: 0, failures: 0, errors: 0, skipped: 0 };
  for (const suite of root.children) {
    assert.equal(suite.name, 'testsuite');
    assert.ok(suite.attributes.get('name'));
    const found = { tests: suite.children.length, failures: 0, errors: 0, skipped: 0 };
    const names = new Set<string>();
    for (const one of suite.children) {
      assert.equal(one.name, 'testcase');
      const name = one.attributes.get('name');
      assert.ok(name && one.attributes.get('classname') && !names.has(name), `the name ${name}`);
      names.add(name);
      const outcomes = one.children.filter((each) => each.name !== 'system-out');
      assert.ok(outcomes.length <= 1 && one.children.length - outcomes.length <= 1);
      for (const { name: outcome, attributes } of outcomes) {
        assert.ok(attributes.get('message'), outcome);
        if (outcome === 'failure') found.failures += 1;
        else if (outcome === 'error') found.errors += 1;
        else if (outcome === 'skipped') found.skipped += 1;
        else assert.fail(outcome);
      }
    }
    for (const key of ['tests', 'failures', 'errors', 'skipped'] as const) {
      assert.equal(number(suite, key), found[key], key);
      sums[key] += found[key];
    }
  }
  for (const key of ['tests', 'failures', 'errors', 'skipped'] as const) assert.equal(number(root, key), sums[key], key);
}

const stackup = 'stackup { copper TOP 35 um; prepreg 0.2 mm er 4.2; plane GND 18 um }\n';
const board = `${stackup}net CLK { swing 3.3 V; rise 1 ns; source 40 ohm; load 1 Mohm, 5 pF }
net SENSE { source 1 kohm; load 1 Mohm, 20 pF; tolerates 10 mV peak }
net CALM { source 1 kohm; load 1 Mohm, 20 pF; tolerates 5 V peak }
run r on TOP for 30 mm { trace CLK 0.2 mm; gap 0.2 mm; trace SENSE 0.15 mm; gap 2 mm; trace CALM 0.2 mm }
`;

describe('JUnit', () => {
  for (const file of readdirSync('test/rules').filter((each) => each.endsWith('.quiet'))) {
    it(`is what consumers read, of ${file}`, async () => {
      const { texts } = readFixture(readFileSync(`test/rules/${file}`, 'utf8'));
      for (const [path, text] of texts) put(path, text);
      const { code, cases } = await junit(rootPath);
      const bad = cases.filter(({ children }) => children.some(({ name }) => name === 'failure' || name === 'error'));
      assert.equal(0 < bad.length, code === 1, 'it fails exactly where the check does');
    });
  }

  it('has a case for the text, each budget and each run, passing ones too', async () => {
    put('board.quiet', board);
    const { code, outcomes } = await junit('board.quiet');
    assert.equal(code, 1);
    assert.deepEqual([...outcomes].map(([name, outcome]) => `${name}: ${outcome?.name ?? 'passed'}`), ['the text: passed', 'SENSE within 10.0 mV peak: failure', 'CALM within 5.00 V peak: passed', 'run r: passed']);
    assert.match(outcomes.get('SENSE within 10.0 mV peak')!.text, /^board\.quiet:3:5 error\[over-budget\]: [\d.]+ mV of 10\.0 mV on SENSE/);
  });

  it('skips what is waived, with the reason, and what a baseline knows', async () => {
    put('board.quiet', `${board}waive over-budget on SENSE because "as measured"\n`);
    const waived = await junit('board.quiet');
    assert.equal(waived.code, 0);
    assert.equal(waived.outcomes.get('SENSE within 10.0 mV peak')!.attributes.get('message'), 'as measured');
    put('board.quiet', board);
    await quietrun(['check', 'board.quiet', '--update-baseline', 'base.json']);
    const known = await junit('board.quiet', '--baseline', 'base.json');
    assert.equal(known.code, 0);
    assert.equal(known.outcomes.get('SENSE within 10.0 mV peak')!.name, 'skipped');
  });

  it('calls a text that cannot be read an error, and no budget that lacks something passed', async () => {
    put('board.quiet', board.replace('rise 1 ns', 'rise 1'));
    const { code, outcomes } = await junit('board.quiet');
    assert.equal(code, 1);
    assert.equal(outcomes.get('the text')!.name, 'error');
    assert.equal(outcomes.get('SENSE within 10.0 mV peak')!.name, 'skipped');
  });

  it('fails for warnings where warnings fail the check', async () => {
    put('board.quiet', board.replace('source 1 kohm; load 1 Mohm, 20 pF; tolerates 5 V', 'tolerates 5 V'));
    assert.equal((await junit('board.quiet')).outcomes.get('CALM within 5.00 V peak'), undefined);
    assert.equal((await junit('board.quiet', '--fail-on', 'warning')).outcomes.get('CALM within 5.00 V peak')?.name, 'failure');
  });

  it('replaces what XML forbids, and escapes the rest', async () => {
    put('board.quiet', board.replaceAll('SENSE', '"S<&\u0001\ufffe>"'));
    const { outcomes } = await junit('board.quiet');
    assert.ok([...outcomes.keys()].some((name) => name.startsWith('S<&\ufffd\ufffd> within')), [...outcomes.keys()].join(' | '));
  });
});
