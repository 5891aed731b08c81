/**
 * What has been solved, found again by its numbers: the only state of the analysis. An edit that
 * leaves the numbers of a section or of a line as they were costs a look-up, wherever it was made;
 * one that changes a gap costs that section and its lines.
 *
 * Bounded: what was not asked for longest goes first, so that an afternoon of edits does not fill
 * the memory. Keys are written from the numbers themselves, exactly: two sections share a solution
 * only when no digit differs.
 */
import { characteristicImpedance, type LineAlone } from '../physics/lines/characteristicImpedance';
import type { Section, SectionSolution } from '../physics/section/section';
import { solveSection } from '../physics/section/solveSection';
import type { WorkDone } from './results';
import type { SolvedPath } from './lumped/hearLumped';
import type { SolvedRun } from './runs/solvedRun';

export interface SolveCache {
  /** Solved where it is not known. */
  section(section: Section): KnownSection;
  /** The same for what is drawn from a line; the caller keeps one type to one kind of key. */
  line<Solution extends object>(key: string, solve: () => Solution): Solution;
  /** The same for what a small circuit answers. */
  circuit(key: string, solve: () => SolvedPath): SolvedPath;
  /** The same for inductances in space; the caller keeps one type to one kind of key. */
  inductance<Solution extends object>(key: string, solve: () => Solution): Solution;
  /** The same for own noise that no closed form yields; the caller keeps one type to one kind of key. */
  noise<Solution extends object>(key: string, solve: () => Solution): Solution;
  /** All of a run, by every number and name that enters it. */
  run(key: string, solve: () => SolvedRun): SolvedRun;
  /** A short name for a long one, in the keys of runs; never given twice. */
  number(content: string): number;
  /** Counted since the cache was made. */
  work(): WorkDone;
}

export interface KnownSection {
  /** Stands for the section's numbers in the keys of its lines, which would be long otherwise. */
  readonly id: number;
  readonly solution: SectionSolution;
  /** Of each line alone; empty where there is no solution. */
  readonly alone: readonly LineAlone[];
}

export interface CacheBounds {
  readonly sections: number;
  readonly lines: number;
  readonly circuits: number;
  readonly inductances: number;
  readonly runs: number;
}

/** Room for a board of 3 000 runs and the edits of an afternoon. */
const roomy: CacheBounds = { sections: 8192, lines: 32768, circuits: 16384, inductances: 65536, runs: 8192 };

export function createSolveCache(bounds: CacheBounds = roomy): SolveCache {
  const sections = new Recent<KnownSection>(bounds.sections);
  const lines = new Recent<object>(bounds.lines);
  const circuits = new Recent<SolvedPath>(bounds.circuits);
  const inductances = new Recent<object>(bounds.inductances);
  const noises = new Recent<object>(bounds.circuits);
  const runs = new Recent<SolvedRun>(bounds.runs);
  const numbers = new Recent<number>(bounds.runs);
  return {
    section: (section) => sections.find(sectionKey(section), () => known(section, sections.misses)),
    line: <Solution extends object>(key: string, solve: () => Solution) => lines.find(key, solve) as Solution,
    circuit: (key, solve) => circuits.find(key, solve),
    inductance: <Solution extends object>(key: string, solve: () => Solution) => inductances.find(key, solve) as Solution,
    noise: <Solution extends object>(key: string, solve: () => Solution) => noises.find(key, solve) as Solution,
    run: (key, solve) => runs.find(key, solve),
    number: (content) => numbers.find(content, () => numbers.misses),
    work: () => ({ sectionsSolved: sections.misses, linesSolved: lines.misses, circuitsSolved: circuits.misses, inductancesSolved: inductances.misses }),
  };
}

function known(section: Section, id: number): KnownSection {
  const solution = solveSection(section);
  return { id, solution, alone: 'solved' in solution ? characteristicImpedance(solution.solved) : [] };
}

/** A name made of every number of the section. */
export function sectionKey(section: Section): string {
  const parts: (string | number)[] = [section.planeBelow ? 'plane' : 'open', section.planeAbove ? 'plane' : 'open'];
  for (const layer of section.layers) parts.push(layer.permittivity, layer.thickness);
  if (section.film !== null) parts.push('film', section.film.side, section.film.permittivity, section.film.thickness);
  for (const conductor of section.conductors) {
    parts.push(conductor.role, conductor.x, conductor.y, conductor.width, conductor.height, conductor.undercut);
  }
  return parts.join(' ');
}

class Recent<Value> {
  misses = 0;
  /** A Map keeps the order of insertion: the first key is the one longest unused. */
  private readonly entries = new Map<string, Value>();

  constructor(private readonly capacity: number) {}

  find(key: string, make: () => Value): Value {
    const known = this.entries.get(key);
    if (known !== undefined) {
      this.entries.delete(key);
      this.entries.set(key, known);
      return known;
    }
    this.misses += 1;
    const made = make();
    this.entries.set(key, made);
    if (this.capacity < this.entries.size) this.entries.delete(this.entries.keys().next().value as string);
    return made;
  }
}
