import assert from 'node:assert/strict';
import { describe, it } from 'node:test';
import { stiffLinear, type StiffRun } from '../../server/src/numeric/stiffLinear';
import { near } from '../support/near';

/** x' = -x/constant + e. */
const decay = (constant: number) => ({ order: 1, mass: Float64Array.of(1), stiffness: Float64Array.of(-1 / constant), forcing: Float64Array.of(1) });
const run = (given: Partial<StiffRun>): StiffRun => ({ input: () => 1, kink: 0, until: 10, atLeast: 10, firstStep: 1e-3, leastShare: 0, tolerance: 1e-9, mostSteps: 10_000, ...given });

describe('stiff linear systems', () => {
  it('follows an exponential, and says when it stands still', () => {
    const { count, times, states, rates, finished } = stiffLinear(decay(1), run({ until: 1e9, atLeast: 1 }));
    assert.ok(finished && times[count - 1] < 100);
    for (let n = 0; n < count; n += 1) {
      assert.ok(Math.abs(states[n] - -Math.expm1(-times[n])) < 1e-7);
      assert.ok(Math.abs(rates[n] - Math.exp(-times[n])) < 1e-5);
    }
  });

  it('errs as its tolerance asks, with steps that grow as the fourth root', () => {
    const oscillator = { order: 2, mass: Float64Array.of(1, 0, 0, 1), stiffness: Float64Array.of(0, 1, -1, 0), forcing: Float64Array.of(0, 1) };
    const at = (tolerance: number) => {
      const { count, states } = stiffLinear(oscillator, run({ until: 10, tolerance }));
      return { count, error: Math.abs(states[2 * (count - 1)] - (1 - Math.cos(10))) };
    };
    const [coarse, fine] = [at(1e-6), at(1e-10)];
    // Steps change by twos: a factor of ten in the step is somewhere from five to twenty.
    assert.ok(fine.count / coarse.count < 20 && 5 < fine.count / coarse.count, `${coarse.count} and ${fine.count} steps`);
    assert.ok(fine.error < 2e-3 * coarse.error, `${coarse.error} and ${fine.error}`);
    assert.ok(coarse.error < 1e-4);
  });

  it('crosses twelve decades of time constants in a few hundred steps', () => {
    const system = { order: 2, mass: Float64Array.of(1, 0, 0, 1), stiffness: Float64Array.of(-1e9, 0, 1e-3, -1e-3), forcing: Float64Array.of(1e9, 0) };
    const { count, times, states, finished } = stiffLinear(system, run({ until: 1e9, atLeast: 1e4, firstStep: 1e-12, leastShare: 1 / 32 }));
    assert.ok(finished && count < 1500, `${count} steps`);
    for (let n = 1; n < count; n += 1) {
      if (1e-6 < times[n]) assert.ok(Math.abs(states[2 * n + 1] - -Math.expm1(-1e-3 * times[n])) < 1e-6);
    }
  });

  it('ends a step on the kink of a ramp', () => {
    const { count, times, states } = stiffLinear(decay(1), run({ input: (time) => Math.min(1, time / 0.7), kink: 0.7, until: 3, atLeast: 3 }));
    const at = times.subarray(0, count).indexOf(0.7);
    assert.ok(0 < at);
    near(states[at], (0.7 + Math.expm1(-0.7)) / 0.7, 1e-8);
    const rise = (time: number) => (time + Math.expm1(-time)) / 0.7;
    near(states[count - 1], rise(3) - rise(3 - 0.7), 1e-8);
  });

  it('damps what oscillates faster than the steps it is made to take', () => {
    const oscillator = { order: 2, mass: Float64Array.of(1, 0, 0, 1), stiffness: Float64Array.of(0, 1, -1, 0), forcing: Float64Array.of(0, 1) };
    const { count, states, finished } = stiffLinear(oscillator, run({ until: 1e9, atLeast: 100, leastShare: 1 / 32, mostSteps: 4000 }));
    assert.ok(finished && count < 2000, `${count} steps`);
    near(states[2 * (count - 1)], 1, 1e-6, 'the resting place');
  });

  it('stops when its steps run out, and says so', () => {
    assert.equal(stiffLinear(decay(1), run({ mostSteps: 5 })).finished, false);
  });
});
