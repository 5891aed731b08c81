/** The interpolant in a gap against solves of the same sections afresh: its bars hold, ends and refusals are what they are said to be. */
import { describe, it } from 'node:test';
import assert from 'node:assert/strict';
import { gapQuery, sectionWithGap, type GapRange } from '../../../server/src/physics/section/gapQuery';
import type { Section, SectionMatrices } from '../../../server/src/physics/section/section';
import { solveSection } from '../../../server/src/physics/section/solveSection';
import { metres } from '../../../server/src/units/quantity';
import { randomSections, type SectionKind } from '../../support/randomSection';
import { seeded } from '../../support/seeded';

const cases: readonly { readonly kind: SectionKind; readonly count: number }[] = [
  { kind: 'bare', count: 20 },
  { kind: 'flat mask', count: 8 },
  { kind: 'stripline', count: 20 },
  { kind: 'stripline of two', count: 10 },
  { kind: 'guard', count: 8 },
  { kind: 'no plane', count: 8 },
  { kind: 'eight', count: 1 },
];

describe('a section as a function of one gap', () => {
  it('holds fresh solves within its bars', () => {
    const counted = { entries: 0, outside: 0 };
    for (const { kind, count } of cases) {
      const of = { kind, solves: 0, made: 0, largest: 0, worst: 0 };
      const random = seeded(71 + count);
      for (const section of randomSections(kind, 5, count)) {
        const range = rangeOf(section);
        const query = gapQuery(range);
        if (query === null) continue;
        of.made += 1;
        of.solves += query.solves;
        for (let trial = 0; trial < 6; trial += 1) {
          const gap = range.smallest * (range.largest / range.smallest) ** random();
          const [near, fresh] = [query.at(metres(gap))!, solved(sectionWithGap(range, gap))!];
          for (const [name, bar] of [['capacitance', 'capacitanceError'], ['inductance', 'inductanceError']] as const) {
            for (const [entry, value] of fresh[name].entries()) {
              const miss = Math.abs(near[name][entry] / value - 1);
              counted.entries += 1;
              // What is weaker is the noise of the solver as much as a coupling.
              const isStrong = 1e-4 * fresh[name][0] < Math.abs(value);
              if (isStrong) of.largest = Math.max(of.largest, near[bar][entry]);
              if (isStrong) of.worst = Math.max(of.worst, miss);
              // Both have their bar: the fresh one stands as far from the truth as it says.
              if (near[bar][entry] < miss) counted.outside += 1;
            }
          }
        }
      }
      // Between two planes a mutual may die within reach, and its bar at a point beyond counts; everywhere else there is a good curve.
      const isClosed = kind.startsWith('stripline');
      assert.ok((isClosed ? 0.4 : 1) * count <= of.made, JSON.stringify(of));
      assert.ok(of.worst < 3e-5 && of.largest < (isClosed ? 5e-2 : 1e-3), JSON.stringify(of));
      assert.ok(of.solves <= 24 * of.made, JSON.stringify(of));
    }
    assert.ok(counted.outside <= 1e-3 * counted.entries, JSON.stringify(counted));
  });

  it('holds them under a mask that follows the traces', () => {
    const section: Section = { ...randomSections('bare', 5, 3)[2], film: { permittivity: 3.4, thickness: metres(25e-6), side: 'above' } };
    const range = rangeOf(section);
    const query = gapQuery(range)!;
    for (const factor of [0.55, 0.8, 1.3, 3.1]) {
      const [near, fresh] = [query.at(metres(range.gap * factor))!, solved(sectionWithGap(range, range.gap * factor))!];
      fresh.capacitance.forEach((value, entry) => {
        const miss = Math.abs(near.capacitance[entry] / value - 1);
        assert.ok(miss < 1e-4 && miss <= near.capacitanceError[entry] && near.capacitanceError[entry] < 2e-3, `${factor}: ${miss} of ${near.capacitanceError[entry]}`);
      });
    }
  });

  it('is the solution itself at the ends of its range, and nothing beyond', () => {
    const range = rangeOf(randomSections('bare', 3, 1)[0]);
    const query = gapQuery(range)!;
    const [near, fresh] = [query.at(range.largest)!, solved(sectionWithGap(range, range.largest))!];
    near.capacitance.forEach((value, entry) => assert.ok(Math.abs(value / fresh.capacitance[entry] - 1) < 1e-12));
    assert.equal(query.at(metres(range.largest * 1.001)), null);
    assert.equal(query.at(metres(range.smallest * 0.999)), null);
  });

  it('declines where a gap in reach is refused, and where there is no range', () => {
    const range = rangeOf(randomSections('bare', 3, 1)[0]);
    assert.equal(gapQuery(range, (section) => (range.gap * 2 < section.conductors[1].x ? null : solved(section))), null);
    assert.equal(gapQuery({ ...range, smallest: range.largest }), null);
    assert.equal(gapQuery({ ...range, smallest: metres(0) }), null);
  });

  it('declines what no smooth curve follows', () => {
    const range = rangeOf(randomSections('bare', 3, 1)[0]);
    let calls = 0;
    const rough = (section: Section) => {
      calls += 1;
      const matrices = solved(section)!;
      const kink = 1 + Math.abs(Math.sin(1e7 * section.conductors[1].x)) / 10;
      return { ...matrices, capacitance: matrices.capacitance.map((value) => value * kink) };
    };
    assert.equal(gapQuery(range, rough), null);
    assert.ok(calls <= 129);
  });
});

/** The gap after the first conductor: what lies to its right goes with it. */
function rangeOf(section: Section): GapRange {
  const [first, second] = section.conductors;
  const gap = second.x - first.x - first.width;
  return { section, moved: section.conductors.map((_, index) => index).slice(1), gap: metres(gap), smallest: metres(gap / 2), largest: metres(4 * gap) };
}

function solved(section: Section): SectionMatrices | null {
  const solution = solveSection(section);
  return 'solved' in solution ? solution.solved : null;
}
