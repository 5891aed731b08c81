/**
 * A section with a film that follows the copper, solved to the accuracy that is worth its time.
 *
 * The film changes no inductance: L and C in air are those of the bare section. C with the film is refined until its bars
 * are below what a film's own tolerance makes of them.
 *
 * Formula   bar = |fine - coarse| + unseen |fine| + half the asymmetry + 1e-8, of groups 5e-8, sqrt(fine_ii fine_jj)
 * Model     the coarser system lacks the highest polynomials and the outermost panels of the film's face; what the
 *           difference does not show is the `unseen` of filmedCharge.ts, from measurement
 * Accuracy  holds in all seeded random sections of the test
 */
import { epsilon0 } from '../../../units/constants';
import type { Section, SectionMatrices, SectionSolution } from '../section';
import { asLayers } from './asLayers';
import { fewestGrouped } from './filmGroups';
import { filmRefusal } from './filmRefusal';
import { filmedCharge, type FilmedSolution } from './filmedCharge';
import { upsideDown } from './upsideDown';

export interface FilmedSolve {
  readonly bare: (section: Section) => SectionSolution;
  /** Where to start, and the last to try. */
  readonly effort: number;
  readonly mostEffort: number;
}

/** Bars above these are worth a finer setting; of a mutual also what is less than this part of the self entries. */
const wantedSelf = 5e-4;
const wantedMutual = 5e-3;
const weakMutual = 5e-7;

export function solveFilmed(section: Section, { bare, effort, mostEffort }: FilmedSolve): SectionSolution {
  const upright = section.film?.side === 'below' ? upsideDown(section) : section;
  const refused = filmRefusal(upright);
  if (refused !== null) return { refused };
  const plain = asLayers(upright);
  if (plain !== null) return bare(plain);
  const inAir = bare({ ...section, film: null, layers: section.layers.map((layer) => ({ ...layer, permittivity: 1 })) });
  if ('refused' in inAir) return inAir;
  const signals = section.conductors.flatMap(({ role }, index) => (role === 'signal' ? [index] : []));
  const floor = section.conductors.length < fewestGrouped ? absoluteFloor : groupedFloor;
  let best: SectionMatrices | null = null;
  for (let level = effort; level <= Math.max(effort, mostEffort); level += 1) {
    const solution = filmedCharge(upright, signals, level);
    if (solution === null) continue;
    const attempt = { ...inAir.solved, ...withBars(solution, floor, (i, j) => screened(section, signals[i], signals[j])), unknowns: Math.max(inAir.solved.unknowns, solution.unknowns) };
    // A number that is none would pass for the best, and every other be measured against it.
    if (!Number.isFinite(excess(attempt))) continue;
    if (best === null || excess(attempt) < excess(best)) best = attempt;
    if (excess(best) <= 1) break;
  }
  return best === null ? { refused: { reason: 'not-solved', what: 'the charges under the mask do not come out' } } : { solved: best };
}

/** The worst bar over the wanted one. */
function excess({ order, capacitance, capacitanceError }: SectionMatrices): number {
  return capacitance.reduce((worst, value, at) => {
    const [self, other] = [capacitance[Math.floor(at / order) * (order + 1)], capacitance[(at % order) * (order + 1)]];
    const wanted = at % (order + 1) === 0 ? wantedSelf * value : wantedMutual * Math.abs(value) + weakMutual * Math.sqrt(self * other);
    return Math.max(worst, (capacitanceError[at] * Math.abs(value)) / wanted);
  }, 0);
}

/** Whether another conductor stands between two. */
function screened({ conductors }: Section, first: number, second: number): boolean {
  const centre = (index: number) => conductors[index].x + conductors[index].width / 2;
  const [low, high] = [Math.min(centre(first), centre(second)), Math.max(centre(first), centre(second))];
  return conductors.some((_, index) => low < centre(index) && centre(index) < high);
}

function withBars({ fine, coarse, order, unseen }: FilmedSolution, floor: number, isScreened: (i: number, j: number) => boolean): { capacitance: Float64Array; capacitanceError: Float64Array } {
  const capacitance = new Float64Array(order * order);
  const capacitanceError = new Float64Array(order * order);
  for (let i = 0; i < order; i += 1) {
    for (let j = 0; j < order; j += 1) {
      const [at, mirrored] = [i * order + j, j * order + i];
      const value = (fine[at] + fine[mirrored]) / 2;
      const scale = Math.sqrt(Math.abs(fine[i * order + i] * fine[j * order + j]));
      const missed = isScreened(i, j) ? screenedFactor * unseen : unseen;
      const bar = Math.abs(value - (coarse[at] + coarse[mirrored]) / 2) + Math.abs(fine[at] - fine[mirrored]) / 2 + Math.max(missed, leastFloor) * Math.abs(value) + floor * scale;
      capacitance[at] = value * 2 * Math.PI * epsilon0;
      capacitanceError[at] = value === 0 ? 1 : bar / Math.abs(value);
    }
  }
  return { capacitance, capacitanceError };
}

const leastFloor = 1e-5;
/** What a conductor in between lets through is the small rest of what it takes, with the latter's error: measured. */
const screenedFactor = 8;
/** Of the self entries: what the kernel's own error may do to a vanishing mutual. */
const absoluteFloor = 1e-8;
/** What groups leave out of each other's charges (groupedCharge.ts), which no degree shows. */
const groupedFloor = 5e-8;
