/** Loops: their numbers against published formulas, what they induce against circuit theory, and what symmetry demands. */
import { describe, it } from 'node:test';
import assert from 'node:assert/strict';
import { near } from '../support/near';
import reference from '../reference/inductance.json';
import { budgetOf, evaluated, microstrip } from './board';

const caseOf = (id: string) => reference.cases.find((each) => each.id === id) as unknown as { inputs_SI: Readonly<Record<string, number>>; outputs: Readonly<Record<string, number>> };
const induced = (text: string, name = 'V', measure: 'peak' | 'rms' = 'peak') => budgetOf(evaluated(text), name, measure).contributions.filter(({ channel }) => channel === 'loop');
const victim = 'net V { source 1 kohm; load 1 Mohm; tolerates 1 V peak }\n';
const carrying = 'net A { swing 3 V; rise 10 ns; source 10 ohm; load 50 ohm }\n';

describe('the numbers of a loop', () => {
  it('are those of reference case C-loop-wire-1, however nets are driven', () => {
    const { inputs_SI: { a, b, radius }, outputs } = caseOf('C-loop-wire-1');
    const [loop] = evaluated(`loop frame { rectangle ${a} m by ${b} m; wire ${2 * radius} m }`).loops;
    near(loop.inductance!, outputs.L_ext_H, 3e-3);
    near(loop.area!, a * b, 1e-12);
    near(loop.perimeter!, 2 * (a + b), 1e-12);
  });

  it('are mutual: coaxial circles of Maxwell’s formula (C-mutual-circles-1), whichever is asked', () => {
    const { inputs_SI: { R1, R2, z }, outputs } = caseOf('C-mutual-circles-1');
    const { loops } = evaluated(`loop one { circle ${2 * R1} m }\nloop other { circle ${2 * R2} m at (0 mm, 0 mm, ${z} m) }`);
    near(loops[0].mutual[0].inductance, outputs.M_H, 1e-9);
    near(loops[1].mutual[0].inductance, outputs.M_H, 1e-9);
    assert.equal(loops[0].inductance, null);
  });

  it('over a plane: that of the section per length (C-trace-over-plane-2), ends aside', () => {
    const { inputs_SI: { w, t, h, l }, outputs } = caseOf('C-trace-over-plane-2');
    const stackup = `stackup { copper TOP ${t} m; prepreg ${h} m er 4.2; plane GND 18 um }\n`;
    const [loop] = evaluated(`${stackup}loop run on TOP { trace ${l} m above GND; strip ${w} m }`).loops;
    // The reference leaves the two end connections out: 1.5 mm of 50.
    assert.ok(outputs.L_H < loop.inductance! && loop.inductance! < 1.08 * outputs.L_H, `${loop.inductance} and ${outputs.L_H}`);
  });
});

describe('what a loop induces', () => {
  const near2 = `loop out { carries A; rectangle 20 mm by 10 mm; wire 0.5 mm }\nloop in { senses V; rectangle 20 mm by 5 mm at (0 mm, 12 mm); wire 0.3 mm }\n`;

  it('is M dI/dt of a stated current at an open receiver', () => {
    const text = `net A { }\n${victim}${near2.replace('carries A', 'carries A 2 A rise 80 ns')}`;
    const [{ mutual: [{ inductance }] }] = evaluated(text).loops;
    const [found] = induced(text);
    near(found.value, (Math.abs(inductance) * 2) / 100e-9 * (1e6 / 1.001e6), 1e-4);
    assert.deepEqual([found.from, found.where, found.channel], ['A', 'out', 'loop']);
  });

  it('of a net without current is that of the series circuit of its ends', () => {
    const text = `${carrying.replace('rise 10 ns', 'rise 800 ns')}${victim}${near2}`;
    const [{ mutual: [{ inductance }] }] = evaluated(text).loops;
    // Slow against L/R: I = 3 V / 60 ohm in 1 us.
    near(induced(text)[0].value, Math.abs(inductance) * (3 / 60 / 1e-6) * (1e6 / 1.001e6), 1e-3);
  });

  it('is less behind the loop’s own inductance, and with a load that divides it', () => {
    const value = (load: string) => induced(`${carrying}net V { source 5 ohm; load ${load}; tolerates 1 V peak }\n${near2}`)[0].value;
    near(value('5 ohm') / value('1 Mohm'), 0.5, 4e-2);
    assert.ok(value('5 ohm') < 0.5 * value('1 Mohm'));
  });

  it('of one current through two loops adds with its sign', () => {
    const turned = `${carrying}${victim}${near2}loop back { carries A; rectangle 20 mm by 10 mm; turned 180 deg about x; wire 0.5 mm }\n`;
    const [both] = induced(turned.replace('loop back', 'loop second').replace('turned 180 deg about x; ', '').replace('loop second { carries A; rectangle 20 mm by 10 mm', 'loop second { carries A; rectangle 20 mm by 10 mm at (0 mm, 0 mm, 1 mm)'));
    const [one] = induced(carrying + victim + near2);
    assert.equal(both.where, 'out, second');
    assert.ok(1.2 * one.value < both.value && both.value < 2 * one.value);
    const [opposed] = induced(turned.replace('turned 180 deg about x', 'turned 180 deg about x').replace('rectangle 20 mm by 10 mm; turned', 'rectangle 20 mm by 10 mm at (0 mm, 0 mm, 1 mm); turned'));
    assert.ok(opposed.value < 0.2 * one.value, `${opposed.value} of ${one.value}`);
  });

  it('is nothing at right angles', () => {
    const text = `${carrying}${victim}loop out { carries A; rectangle 20 mm by 10 mm; wire 0.5 mm }\nloop in { senses V; rectangle 20 mm by 10 mm at (0 mm, 0 mm, 20 mm); turned 90 deg about x; wire 0.3 mm }\n`;
    const open = induced(text.replace('turned 90 deg about x; ', ''))[0].value;
    assert.ok(induced(text)[0].value < 1e-6 * open);
  });

  it('of a far loop is that of two dipoles', () => {
    // Coplanar: M = mu0 A1 A2 / (4 pi r^3). The next term is of order (size/r)².
    const [{ mutual: [{ inductance }] }] = evaluated('loop one { rectangle 10 mm by 10 mm }\nloop other { rectangle 10 mm by 10 mm at (1 m, 0 mm) }').loops;
    near(inductance, -1e-7 * 1e-4 * 1e-4, 1e-3);
  });

  it('into a pair is a difference, and no mean where the pair is balanced', () => {
    const text = `${carrying}net P { source 50 ohm; load 50 ohm }\nnet N { source 50 ohm; load 50 ohm }\npair D { plus P; minus N; tolerates 1 V peak; common tolerates 1 V peak }\n${near2.replace('senses V', 'senses D')}`;
    const [difference, mean] = evaluated(text).budgets.map(({ contributions }) => contributions.find(({ channel }) => channel === 'loop')!.value);
    assert.ok(0 < difference && mean < 1e-9 * difference, `${difference} and ${mean}`);
    const single = induced(`${carrying}net V { source 100 ohm; load 100 ohm; tolerates 1 V peak }\n${near2}`)[0].value;
    near(difference, single, 1e-6);
  });

  it('counts planes: a plane close under both takes most of it away', () => {
    const on = (over: string) => induced(`${microstrip}${carrying}${victim}loop out on TOP { carries A; rectangle 20 mm by 10 mm; strip 0.5 mm; ${over} }\nloop in on TOP { senses V; rectangle 20 mm by 5 mm at (0 mm, 15 mm); strip 0.3 mm }`)[0].value;
    assert.ok(on('over GND') < 0.05 * on(''));
  });

  it('of a sine, in rms', () => {
    const text = `net A { }\nnet V { source 1 kohm; load 1 Mohm; tolerates 1 V rms; band 1 kHz to 1 MHz }\n${near2.replace('carries A', 'carries A 2 A rms at 100 kHz')}`;
    const [{ mutual: [{ inductance }] }] = evaluated(text).loops;
    near(induced(text, 'V', 'rms')[0].value, Math.abs(inductance) * 2 * Math.PI * 1e5 * 2 * (1e6 / 1.001e6), 1e-5);
  });

  it('of two that touch, or of a path that meets itself, is said to be missing', () => {
    const touching = budgetOf(evaluated(`${carrying}${victim}loop out { carries A; rectangle 20 mm by 10 mm; wire 0.5 mm }\nloop in { senses V; rectangle 20 mm by 5 mm at (0 mm, 10 mm); wire 0.3 mm }\n`), 'V');
    assert.deepEqual([touching.verdict, touching.unaccounted.map(({ what }) => what)], ['unknown', ['loop out into loop in is not counted: their conductors touch']]);
    const eight = evaluated(`${carrying}${victim}loop out { carries A; path (0 mm, 0 mm) (9 mm, 9 mm) (9 mm, 0 mm) (0 mm, 9 mm); wire 0.5 mm }\nloop in { senses V; rectangle 20 mm by 5 mm at (0 mm, 12 mm); wire 0.3 mm }\n`);
    assert.equal(budgetOf(eight, 'V').complete, false);
    assert.ok(eight.limits.some(({ message }) => message.startsWith('loop out has no numbers')));
  });
});
