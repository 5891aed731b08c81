/**
 * What `band` means (physics.md of the design, "budgets"): sharp for what is rms and for own noise; for peaks of what comes from
 * outside a first-order high and low pass.
 */
import { describe, it } from 'node:test';
import assert from 'node:assert/strict';
import type { Budget } from '../../server/src/budget/results';
import { near } from '../support/near';
import { budgetOf, evaluated, microstrip } from './board';

/** A source that a small capacitance ties to a receiver: what arrives is in proportion to frequency, far below the corner of both. */
const board = (source: string, band: string) => evaluated(`${microstrip}net A { ${source}; source 1 ohm; load 1 Mohm }
  net V { source 100 ohm; load 100 ohm; band ${band}; tolerates 1 V peak; tolerates 1 V rms }
  link c { between A and V; capacitance 0.01 pF }`);

const linked = (source: string, band: string, measure: Budget['measure']) => budgetOf(board(source, band), 'V', measure).contributions.find(({ channel }) => channel === 'link')!;
const own = (band: string, measure: Budget['measure']) => budgetOf(board('sine 1 V peak at 1 MHz', band), 'V', measure).contributions.find(({ channel }) => channel === 'thermal')!;
const sine = (megahertz: number) => `sine 1 V peak at ${megahertz} MHz`;

describe('a band in an rms budget', () => {
  it('is sharp for a sine: whole at its ends and inside, nothing outside', () => {
    const whole = linked(sine(1), '0 Hz to 1 GHz', 'rms').value;
    near(whole, (2 * Math.PI * 1e6 * 0.01e-12 * 50) / Math.SQRT2, 1e-3);
    for (const band of ['1 MHz to 2 MHz', '0.5 MHz to 1 MHz', '999 kHz to 1001 kHz']) near(linked(sine(1), band, 'rms').value, whole, 1e-9, band);
    for (const band of ['1001 kHz to 2 MHz', '0.5 MHz to 999 kHz']) {
      assert.equal(linked(sine(1), band, 'rms').value, 0, band);
      near(linked(sine(1), band, 'rms').unfiltered!, whole, 1e-9, band);
    }
  });

  it('is sharp for what repeats: a harmonic counts whole, or not', () => {
    const edges = 'swing 1 V; rise 10 ns; repeats 1 MHz';
    const harmonics = (band: string) => {
      const { first, rms } = linked(edges, band, 'rms').spectrum!;
      return new Map([...rms].map((value, at) => [first + at, value]));
    };
    const wide = harmonics('0 Hz to 100 MHz');
    for (const [band, first, last] of [['0 Hz to 5 MHz', 1, 5], ['2.9 MHz to 7.1 MHz', 3, 7], ['3.1 MHz to 6.9 MHz', 4, 6], ['3 MHz to 7 MHz', 3, 7]] as const) {
      const found = harmonics(band);
      assert.deepEqual([...found.keys()], Array.from({ length: last - first + 1 }, (_, at) => first + at), band);
      for (const [n, value] of found) if (n % 2 === 1) near(value, wide.get(n)!, 1e-9, `${band}: ${n}`);
      near(linked(edges, band, 'rms').value, Math.hypot(...found.values()), 1e-12);
    }
  });

  it('is sharp for own noise: the width of the band, not that of a filter', () => {
    const kT = 1.380649e-23 * 298.15;
    near(own('0 Hz to 1 MHz', 'rms').value, Math.sqrt(4 * kT * 50 * 1e6), 1e-12);
    near(own('1 MHz to 3 MHz', 'rms').value, Math.sqrt(4 * kT * 50 * 2e6), 1e-12);
  });
});

describe('a band in a peak budget', () => {
  it('is a first-order low pass and high pass for a sine', () => {
    const left = (band: string) => {
      const { value, unfiltered } = linked(sine(1), band, 'peak');
      return value / unfiltered!;
    };
    near(left('0 Hz to 1 MHz'), Math.SQRT1_2, 1e-9);
    near(left('0 Hz to 100 kHz'), 1 / Math.sqrt(101), 1e-9);
    near(left('1 MHz to 1 THz'), Math.SQRT1_2, 1e-9);
    near(left('10 MHz to 1 THz'), 1 / Math.sqrt(101), 1e-9);
    near(left('1 MHz to 1.000001 MHz'), 0.5, 1e-5);
  });

  it('is a first-order low pass for an edge: what is left of a short pulse is its area over the time constant', () => {
    // Through a small capacitance an edge of 1 V is a pulse of C · R · 1 V · s, over long before a filter of 16 µs answers.
    const { value, unfiltered } = linked('swing 1 V; rise 1 ns', '0 Hz to 10 kHz', 'peak');
    near(value, 0.01e-12 * 50 * 2 * Math.PI * 10e3, 1e-3);
    assert.ok(value < 1e-3 * unfiltered!);
  });

  it('is sharp for own noise there, too: 3.29 times the rms in the same band, not of the width of a filter', () => {
    for (const band of ['0 Hz to 1 MHz', '1 MHz to 3 MHz']) near(own(band, 'peak').value, 3.29 * own(band, 'rms').value, 1e-12, band);
  });
});
