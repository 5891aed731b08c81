/** Links: against closed forms of one node, a reference circuit of two, and what symmetry demands. */
import { describe, it } from 'node:test';
import assert from 'node:assert/strict';
import { near } from '../support/near';
import reference from '../reference/lumped.json';
import { budgetOf, evaluated } from './board';

const linked = (text: string, name = 'V', measure: 'peak' | 'rms' = 'peak') => budgetOf(evaluated(text), name, measure).contributions.filter(({ channel }) => channel === 'link');
type Numbers = Readonly<Record<string, number>>;

describe('a link', () => {
  it('of a capacitance is the two-node circuit of reference case E-cap-src-1', () => {
    const { inputs_SI: { Rs, Ca, Cm, Cv, Rv, V, tr }, outputs } = reference.cases.find(({ id }) => id === 'E-cap-src-1') as unknown as { inputs_SI: Numbers; outputs: Numbers };
    const text = `net A { swing ${V} V; rise ${0.8 * tr * 1e9} ns; source ${Rs} ohm; load ${Ca * 1e12} pF }
      net V { source ${2 * Rv} ohm; load ${2 * Rv} ohm, ${Cv * 1e12} pF; tolerates 1 V peak }
      link socket { between A and V; capacitance ${Cm * 1e12} pF }`;
    const [found] = linked(text);
    assert.deepEqual([found.from, found.where, found.place?.path], ['A', 'socket', 'board.quiet']);
    near(found.value, outputs.V_peak, 3e-6);
    near(linked(text.replace('between A and V', 'between V and A'))[0].value, found.value, 1e-12);
  });

  it('of a mutual inductance induces M dI/dt, divided by the ends', () => {
    // 1 V/ns into 50 + 50 ohm: 10 mA/ns; 3 nH: 30 mV; a quarter of it at 25 of 100 ohm.
    const [found] = linked(`net A { swing 2 V; rise 1.6 ns; source 50 ohm; load 50 ohm }
      net V { source 75 ohm; load 25 ohm; tolerates 1 V peak }
      link plug { between A and V; mutual 3 nH }`);
    near(found.value, 0.25 * 3e-9 * (1e9 / 100), 1e-6);
  });

  it('adds capacitance and mutual inductance with the sign that makes it worse, and says so', () => {
    const board = (what: string) => `net A { swing 2 V; rise 1.6 ns; source 50 ohm; load 50 ohm }
      net V { source 75 ohm; load 25 ohm; tolerates 1 V peak }
      link plug { between A and V; ${what} }`;
    const [both] = linked(board('capacitance 0.5 pF; mutual 3 nH'));
    // The current that charges the link's own capacitance makes the edge's first moments a little worse than the sum.
    const sum = linked(board('capacitance 0.5 pF'))[0].value + linked(board('mutual 3 nH'))[0].value;
    assert.ok(sum < both.value && both.value < 1.1 * sum, `${both.value} of ${sum}`);
    assert.ok(both.assumptions.some((words) => words.startsWith('the sign of the mutual inductance')));
  });

  it('of a pair’s two nets, one moving against the other, cancels where it is balanced', () => {
    const pair = `net P { source 50 ohm; load 50 ohm }\nnet N { source 50 ohm; load 50 ohm }\npair D { plus P; minus N; swing 1 V; rise 1 ns }
      net V { source 100 ohm; load 100 ohm; tolerates 1 V peak }\nlink one { between P and V; capacitance 1 pF }\n`;
    const [single] = linked(pair);
    const [balanced] = linked(`${pair}link other { between N and V; capacitance 1 pF }`);
    assert.equal(balanced.where, 'one, other');
    assert.ok(balanced.value < 1e-6 * single.value, `${balanced.value} of ${single.value}`);
  });

  it('into a pair: all of it in the difference where one net is hit, half of it in the mean', () => {
    const text = `net A { swing 1 V; rise 1 ns; source 50 ohm; load 50 ohm }\nnet P { source 50 ohm; load 50 ohm }\nnet N { source 50 ohm; load 50 ohm }
      pair D { plus P; minus N; tolerates 1 V peak; common tolerates 1 V peak }\nlink one { between A and P; capacitance 1 pF }`;
    const [difference, mean] = evaluated(text).budgets.map(({ contributions }) => contributions.find(({ channel }) => channel === 'link')!.value);
    near(difference, 2 * mean, 1e-9);
  });

  it('of a sine is the divider of its reactance, in peak and in rms', () => {
    const text = (measure: string) => `net M { sine 325 V peak at 50 Hz; source 1 ohm; load 1 Mohm }
      net V { source 1 kohm; load 1 Gohm; tolerates 1 V ${measure} }\nlink body { between M and V; capacitance 10 pF }`;
    const exact = (2 * Math.PI * 50 * 1e-11 * 1e3 * 325) / Math.hypot(1, 2 * Math.PI * 50 * 1e-11 * 1e3);
    near(linked(text('peak'))[0].value, exact, 1e-5);
    near(linked(text('rms; band 10 Hz to 1 kHz'), 'V', 'rms')[0].value, exact / Math.SQRT2, 1e-5);
    assert.equal(linked(text('rms; band 100 Hz to 1 kHz'), 'V', 'rms')[0].value, 0);
  });

  it('between two quiet nets is none', () => {
    assert.deepEqual(linked('net A { source 50 ohm }\nnet V { source 50 ohm; load 50 ohm; tolerates 1 V peak }\nlink l { between A and V; capacitance 1 pF }'), []);
  });
});
