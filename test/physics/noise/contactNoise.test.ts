import { describe, it } from 'node:test';
import assert from 'node:assert/strict';
import { contactNoise } from '../../../server/src/physics/noise/contactNoise';
import { decibels, volts } from '../../../server/src/units/quantity';
import { near } from '../../support/near';
import { band } from './networks';

const noise = (index: number, across: number, from: number, to: number) => contactNoise({ index: decibels(index), across: volts(across) }, band(from, to));

describe('contact noise', () => {
  it('of 0 dB is 1 µV in a decade for each volt across, wherever the decade lies (definition of the noise index)', () => {
    for (const from of [1e-3, 1, 100, 1e9]) near(noise(0, 1, from, 10 * from), 1e-6, 1e-13);
    near(noise(20, 1, 1, 10), 1e-5, 1e-13);
    near(noise(-20, 5, 1, 10), 0.5e-6, 1e-13);
    near(noise(0, -5, 1, 10), 5e-6, 1e-13);
  });

  it('of several decades is what each has, unrelated', () => {
    near(noise(-20, 5, 10, 1e5), 0.5e-6 * Math.sqrt(4), 1e-13);
    near(noise(-10, 2, 3, 700), Math.hypot(noise(-10, 2, 3, 20), noise(-10, 2, 20, 700)), 1e-13);
    // A narrow band has the density at its middle, (vn per decade)² / (f ln 10).
    near(noise(0, 1, 1e6, 1e6 + 1), 1e-6 / Math.sqrt((1e6 + 0.5) * Math.LN10), 1e-10);
  });

  it('is none without a voltage across, and endless from 0 Hz', () => {
    assert.equal(noise(0, 0, 0, 1e3), 0);
    assert.equal(noise(0, 1, 0, 1e3), Infinity);
  });
});
