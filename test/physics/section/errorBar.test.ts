/** Error bars on seeded random sections of every kind: they hold the truth, and are not so large as to say nothing. */
import { describe, it } from 'node:test';
import assert from 'node:assert/strict';
import { solveSection } from '../../../server/src/physics/section/solveSection';
import type { Section, SectionMatrices } from '../../../server/src/physics/section/section';
import { randomSections, sectionKinds } from '../../support/randomSection';

const each = 17;
/** Far finer than the default: its own error was at most 1e-6 against the next setting. */
const finest = { effort: 5, mostEffort: 5 };

describe(`error bars of ${each * sectionKinds.length} random sections`, () => {
  for (const kind of sectionKinds) {
    it(`hold the finest setting, and all entries of C and L that matter come within 1e-4 of it: ${kind}`, () => {
      for (const section of randomSections(kind, 11, each)) {
        const usual = solved(section);
        const truth = solved(section, finest);
        for (const [name, bars] of [['capacitance', 'capacitanceError'], ['inductance', 'inductanceError']] as const) {
          usual[name].forEach((value, at) => {
            const exact = truth[name][at];
            const error = Math.abs(value - exact);
            const entry = `${name} ${at} of ${JSON.stringify(section)}`;
            assert.ok(error <= usual[bars][at] * Math.abs(value), `${entry}: error ${(error / Math.abs(exact)).toExponential(1)}, bar ${usual[bars][at].toExponential(1)}`);
            const { order } = usual;
            const strength = Math.abs(exact) / Math.sqrt(truth[name][Math.floor(at / order) * (order + 1)] * truth[name][(at % order) * (order + 1)]);
            if (strength < 1e-4) return;
            assert.ok(error <= 1e-4 * Math.abs(exact), `${entry}: error ${(error / Math.abs(exact)).toExponential(1)}`);
            assert.ok(usual[bars][at] < 1e-3, `${entry}: bar ${usual[bars][at].toExponential(1)}`);
          });
        }
      }
    });
  }

  it('and errors fall with every polynomial more', () => {
    for (const kind of sectionKinds) {
      const [section] = randomSections(kind, 5, 1);
      const truth = solved(section, { effort: 8, mostEffort: 8 });
      const errors = [0, 2, 4].map((effort) => {
        const { capacitance, inductance } = solved(section, { effort, mostEffort: effort });
        return Math.max(Math.abs(capacitance[0] / truth.capacitance[0] - 1), Math.abs(inductance[0] / truth.inductance[0] - 1));
      });
      assert.ok(errors[1] < Math.max(errors[0] / 2, 2e-8) && errors[2] < Math.max(errors[1] / 2, 2e-8), `${kind}: ${errors.map((error) => error.toExponential(1))}`);
    }
  });
});

function solved(section: Section, options?: Parameters<typeof solveSection>[1]): SectionMatrices {
  const solution = solveSection(section, options);
  assert.ok('solved' in solution, JSON.stringify({ solution, section }));
  return solution.solved;
}
