/** The series as IEC 60063 has it (from memory): each number near its place among 24 equal steps of a decade. */
import assert from 'node:assert/strict';
import { describe, it } from 'node:test';
import { e24, e24From } from '../../server/src/units/e24';

describe('the E24 series', () => {
  it('has twenty-four numbers of two figures, none further than 5 % from its place', () => {
    assert.equal(e24.length, 24);
    e24.forEach((value, at) => {
      assert.equal(value, Number(value.toPrecision(2)));
      const place = 10 ** (at / 24);
      assert.ok(Math.abs(value / place - 1) < 0.05, `${value} stands at ${place}`);
    });
  });

  it('is found from any value on, as it is written', () => {
    assert.deepEqual(e24From(46, 3), [47, 51, 56]);
    assert.deepEqual(e24From(47, 1), [47]);
    assert.deepEqual(e24From(9.2e4, 2), [1e5, 1.1e5]);
    assert.deepEqual(e24From(0.0905, 3), [0.091, 0.1, 0.11]);
  });

  it('answers nothing where nothing is asked', () => {
    for (const value of [0, -1, NaN, Infinity]) assert.deepEqual(e24From(value, 3), []);
  });
});
