/**
 * On the draft of the wave gauge each way in which noise gets in decides another receiver, and the fix that comes first is what
 * good practice names for that way (common practice, no source): less bandwidth against a circuit's own noise, a return of one's own against a
 * shared one, distance against an electric field, a smaller loop against a magnetic one, a grounded shield against radiation.
 */
import assert from 'node:assert/strict';
import { readFileSync } from 'node:fs';
import { describe, it } from 'node:test';
import { fixesFor } from '../../server/src/fixes/index';
import { fixing } from '../support/fixing';

const folder = 'examples';
const root = `${folder}/buoy/wave-gauge.quiet`;
const texts = new Map([root, `${folder}/common/four-layer.quiet`, `${folder}/common/parts.quiet`].map((file) => [file, readFileSync(file, 'utf8')]));

const ways = [
  { receiver: 'STRAIN', channel: 'thermal', fix: /^Narrow the band of STRAIN to 1 Hz to / },
  { receiver: 'PRESSURE', channel: 'shared return', fix: /^Give PRESSURE a return of its own, / },
  { receiver: 'ELECTRODE', channel: 'coupled', fix: /^Widen the gap to / },
  { receiver: 'COIL', channel: 'loop', fix: /^Shrink loop coil-leads to / },
  { receiver: 'SYNC', channel: 'radiated', fix: /^Ground shield lid: / },
] as const;

describe('the five ways in which noise gets in', () => {
  const { evaluation, findings, context } = fixing(texts, undefined, root);
  for (const { receiver, channel, fix } of ways) {
    it(`${receiver} has most of its noise by ${channel}, and is offered what mends that`, () => {
      const { contributions: [largest, ...others], total } = evaluation.budgets.find(({ subject }) => subject.name === receiver)!;
      assert.equal(largest!.channel, channel);
      assert.ok(others.every(({ value }) => value < largest!.value / 3), `${others.map(({ value }) => value)} beside ${largest!.value} of ${total}`);
      const over = findings.find(({ rule, subject }) => rule === 'over-budget' && subject?.name === receiver)!;
      const [first] = fixesFor(over, context);
      assert.match(first!.title, fix);
      assert.ok(first!.preferred);
    });
  }

  it('crosses the gap as an electric field', () => {
    const [largest] = evaluation.budgets.find(({ subject }) => subject.name === 'ELECTRODE')!.contributions;
    assert.ok(20 * Math.abs(largest!.coupling!.inductivePart) < Math.abs(largest!.coupling!.capacitivePart));
  });
});
