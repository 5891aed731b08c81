/** What `findingsOf` does with what the rules yield: order, keys, waivers, and a rule that breaks. */
import assert from 'node:assert/strict';
import { describe, it } from 'node:test';
import { findingsOf, rules } from '../../server/src/rules/index';
import { defineRule, type Fault } from '../../server/src/rules/rule';
import { evaluated, rootPath } from '../support/evaluated';

const board = `stackup { copper TOP 35 um; prepreg 0.2 mm er 4.2; plane GND1 18 um }
net A { swing 3.3 V; rise 5 ns; source 33 ohm; load 1 kohm }
net B { source 100 ohm; load 1 kohm; tolerates 1 mV peak; waive over-budget because "as measured" }
run r on TOP for 20 mm { trace A 0.15 mm; gap 0.05 mm; trace B 0.15 mm }
`;
const { evaluation, findings } = evaluated(new Map([[rootPath, board]]));

function faultAt(start: number, name = 'A'): Fault {
  return { at: { path: rootPath, span: { start, end: start + 1 } }, subject: { kind: 'net', name } };
}

function ruleOf(name: 'low-margin' | 'over-budget', faults: () => Iterable<Fault>) {
  return defineRule({ name, severity: 'warning', documentation: rules[0]!.documentation, find: faults, message: ({ at }) => `at ${at.span.start}` });
}

describe('findings', () => {
  it('stand in the order of path, place, rule and words', () => {
    const found = findingsOf(evaluation, { rules: [ruleOf('over-budget', () => [faultAt(9), faultAt(3)]), ruleOf('low-margin', () => [faultAt(9), { ...faultAt(5), at: { path: 'a', span: { start: 5, end: 6 } } }])] });
    assert.deepEqual(found.map(({ at, rule }) => `${at.path} ${at.span.start} ${rule}`), ['a 5 low-margin', 'board.quiet 3 over-budget', 'board.quiet 9 low-margin', 'board.quiet 9 over-budget']);
  });

  it('say one fault once', () => {
    assert.equal(findingsOf(evaluation, { rules: [ruleOf('low-margin', () => [faultAt(3), faultAt(3)])] }).length, 1);
  });

  it('have keys of rule and names, which do not move with the text', () => {
    const keys = (text: string) => evaluated(new Map([[rootPath, text]])).findings.map(({ key }) => key);
    assert.deepEqual(keys(`\n# moved\n${board.replace('gap 0.05 mm', 'gap 0.06 mm')}`), findings.map(({ key }) => key));
    assert.ok(findings.some(({ key }) => key === 'gap-below-clearance run r A B'));
  });

  it('keep what is waived, with its reason', () => {
    const over = findings.filter(({ rule }) => rule === 'over-budget');
    assert.deepEqual(over.map(({ waived }) => waived), ['as measured']);
    assert.ok(findings.some(({ rule, waived }) => rule === 'dominant-coupling' && waived === null), 'another rule on another subject is not hidden');
  });

  it('are those of the other rules where one breaks, and an error that says so', () => {
    const logged: string[] = [];
    const broken = ruleOf('low-margin', () => { throw new Error('no such thing'); });
    const found = findingsOf(evaluation, { rules: [broken, ruleOf('over-budget', () => [faultAt(3)])], log: (rule) => logged.push(rule) });
    assert.deepEqual(found.map(({ rule, severity }) => `${severity} ${rule}`).sort(), ['error low-margin', 'warning over-budget']);
    assert.match(found.find(({ rule }) => rule === 'low-margin')!.message, /fault in Quietrun itself: no such thing/);
    assert.deepEqual(logged, ['low-margin']);
  });

  it('lead to where both sides stand', () => {
    const [over] = findings.filter(({ rule }) => rule === 'over-budget');
    const texts = over!.related.map(({ place: { span } }) => board.slice(span.start, span.end));
    assert.deepEqual(texts.slice(0, 2), ['1 mV', 'trace A 0.15 mm']);
    assert.equal(over!.unit, 'V');
    assert.equal(over!.limit, 1e-3);
    assert.ok(1e-3 < over!.value!);
  });
});
