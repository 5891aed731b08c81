import { describe, it } from 'node:test';
import assert from 'node:assert/strict';
import { gaussianCrest } from '../../../server/src/physics/noise/gaussianCrest';

/** Of the normal distribution, both signs together, summed. */
function beyond(crest: number): number {
  let sum = 0;
  const step = 1e-4;
  for (let x = crest + step / 2; x < 12; x += step) sum += 2 * step * Math.exp((-x * x) / 2) / Math.sqrt(2 * Math.PI);
  return sum;
}

describe('the crest of Gaussian noise', () => {
  it('is exceeded 0.1 % of the time', () => assert.ok(Math.abs(beyond(gaussianCrest) - 1e-3) < 5e-6, `${beyond(gaussianCrest)}`));

  it('is the exact quantile 3.2905 (tables of the normal distribution), to its three digits', () => {
    let [low, high] = [3, 4];
    while (1e-9 < high - low) [low, high] = beyond((low + high) / 2) < 1e-3 ? [low, (low + high) / 2] : [(low + high) / 2, high];
    assert.ok(Math.abs(low - 3.290527) < 1e-5, `${low}`);
    assert.equal(gaussianCrest, Math.round(low * 100) / 100);
  });
});
