/**
 * What a cross-section costs, kind by kind: the same again, an edit of the gaps, of the widths too, and another stack; and what the
 * textbook's method costs (pulses.ts). Every run gets dimensions of its own, so that nothing but what a real edit would find
 * again is found. `goal` is what the design asks for.
 */
import { solveSection } from '../../server/src/physics/section/solveSection';
import type { Section, SectionConductor } from '../../server/src/physics/section/section';
import { epsilon0 } from '../../server/src/units/constants';
import { metres } from '../../server/src/units/quantity';
import { seeded } from '../support/seeded';
import { pulseCapacitance } from './pulses';

const um = 1e-6;
const next = seeded(7);
const between = (low: number, high: number) => low * (high / low) ** next();

/** Micrometres. */
interface Row {
  readonly widths: readonly number[];
  readonly gaps: readonly number[];
  readonly copper: number;
  readonly height: number;
}

interface Kind {
  readonly name: string;
  readonly count: number;
  readonly section: (row: Row) => Section;
  /** Milliseconds: of another gap, and of other widths too. */
  readonly goals: readonly [number, number];
  /** All gaps alike, as in a bus, or each its own. */
  readonly uneven?: boolean;
}

const open = { permittivity: 1, thickness: Infinity };
const layers = (...given: readonly { permittivity: number; thickness: number }[]) => given.map(({ permittivity, thickness }) => ({ permittivity, thickness: metres(thickness * um) }));

function conductors({ widths, gaps, copper, height }: Row): SectionConductor[] {
  let x = 0;
  return widths.map((width, i) => {
    const left = x;
    x += width + (gaps[i] ?? 0);
    return { role: 'signal' as const, x: metres(left * um), y: metres(height * um), width: metres(width * um), height: metres(copper * um), undercut: metres(0) };
  });
}

const overPlane = { planeBelow: true, planeAbove: false, film: null } as const;
const bare = (row: Row): Section => ({ ...overPlane, layers: layers({ permittivity: 4.2, thickness: row.height }, open), conductors: conductors(row) });
const masked = (row: Row): Section => ({ ...bare(row), film: { permittivity: 3.4, thickness: metres(25 * um), side: 'above' } });
const flat = (row: Row): Section => ({ ...overPlane, layers: layers({ permittivity: 4.2, thickness: row.height }, { permittivity: 3.4, thickness: row.copper + 25 }, open), conductors: conductors(row) });
const embedded = (row: Row): Section => ({ ...overPlane, layers: layers({ permittivity: 4.2, thickness: 2 * row.height }, open), conductors: conductors(row) });
const stripline = (row: Row): Section => ({ ...overPlane, planeAbove: true, layers: layers({ permittivity: 4.2, thickness: 2 * row.height + row.copper }), conductors: conductors(row) });
const twoDielectrics = (row: Row): Section => ({ ...overPlane, planeAbove: true, layers: layers({ permittivity: 4.2, thickness: row.height }, { permittivity: 3.6, thickness: row.height + row.copper }), conductors: conductors(row) });
const twoLayers = (row: Row): Section => ({
  ...overPlane, planeAbove: true,
  layers: layers({ permittivity: 4.2, thickness: row.height }, { permittivity: 3.6, thickness: row.height + row.copper }, { permittivity: 4.2, thickness: row.height + row.copper }),
  conductors: conductors(row).map((conductor, i) => (i % 2 === 0 ? conductor : { ...conductor, y: metres((2 * row.height + row.copper) * um) })),
});
const bothFaces = (row: Row): Section => ({
  planeBelow: false, planeAbove: false, film: null, layers: layers(open, { permittivity: 4.2, thickness: row.height }, open),
  conductors: conductors(row).map((conductor, i) => (i === 0 ? { ...conductor, role: 'reference' as const, y: metres(-row.copper * um) } : conductor)),
});

const kinds: readonly Kind[] = [
  { name: 'bare pair', count: 2, section: bare, goals: [0.01, 0.025] },
  { name: 'three bare', count: 3, section: bare, goals: [0.05, 0.05] },
  { name: 'eight bare', count: 8, section: bare, goals: [0.6, 0.6] },
  { name: 'eight bare, uneven', count: 8, section: bare, goals: [0.6, 0.6], uneven: true },
  { name: 'sixteen bare', count: 16, section: bare, goals: [5, 5] },
  { name: 'sixteen bare, uneven', count: 16, section: bare, goals: [5, 5], uneven: true },
  { name: 'embedded pair', count: 2, section: embedded, goals: [0.01, 0.025] },
  { name: 'stripline pair', count: 2, section: stripline, goals: [0.01, 0.025] },
  { name: 'stripline pair of two dielectrics', count: 2, section: twoDielectrics, goals: [0.01, 0.025] },
  { name: 'pair in two layers', count: 2, section: twoLayers, goals: [0.01, 0.025] },
  { name: 'both faces, no plane', count: 2, section: bothFaces, goals: [0.01, 0.025] },
  { name: 'pair under a flat mask', count: 2, section: flat, goals: [0.01, 0.025] },
  { name: 'eight under a flat mask', count: 8, section: flat, goals: [0.6, 0.6] },
  { name: 'pair under a mask', count: 2, section: masked, goals: [1, 1] },
  { name: 'eight under a mask', count: 8, section: masked, goals: [5, 5] },
  { name: 'sixteen under a mask', count: 16, section: masked, goals: [5, 5] },
  { name: 'sixteen under a mask, uneven', count: 16, section: masked, goals: [5, 5], uneven: true },
];

function casesOf({ name, count, section, goals: [goal, goalOfWidths], uneven = false }: Kind) {
  const each = (make: () => number) => Array.from({ length: count }, make);
  const repeated = (value: number) => each(() => value);
  const gaps = () => (uneven ? each(() => between(100, 1000)) : repeated(between(100, 2 < count ? 1000 : 3000)));
  const usual = { widths: repeated(200), gaps: repeated(400), copper: 35, height: 200 };
  const fixed = gaps();
  const pairs = uneven ? () => each(() => between(90, 1000)) : () => repeated(between(90, 1000));
  return [
    { name: `${name}: again`, prepare: () => section(usual), run: solve },
    { name: `${name}: another gap`, prepare: () => section({ ...usual, gaps: gaps() }), run: solve, goal },
    ...(uneven ? [{ name: `${name}: one of its gaps`, prepare: () => section({ ...usual, gaps: fixed.map((gap, i) => (i === 3 ? between(100, 1000) : gap)) }), run: solve, goal }] : []),
    { name: `${name}: other widths`, prepare: () => section({ ...usual, gaps: gaps(), widths: pairs() }), run: solve, goal: goalOfWidths },
    { name: `${name}: another stack`, prepare: () => section({ widths: pairs(), gaps: gaps(), copper: between(12, 70), height: between(80, 1600) }), run: solve },
  ];
}

/** The textbook's error is not ours at any number of pulses that a machine has room for: it is stated, and the times are compared. */
function textbook() {
  const usual = { widths: [200, 200], gaps: [400, 400], copper: 35, height: 200 };
  const exact = solveSection(bare(usual), { effort: 6, mostEffort: 6 });
  const ours = solveSection(bare(usual));
  if ('refused' in exact || 'refused' in ours) throw new Error('the pair is refused');
  const largestError = (capacitance: Float64Array) => capacitance.reduce((worst, value, at) => Math.max(worst, Math.abs(value / exact.solved.capacitance[at] - 1)), 0);
  // Both need C and C in air.
  const pulses = (count: number) => [4.2, 1].map((permittivity) => pulseCapacitance({ traces: [{ x: 0, width: 200, height: 35 }, { x: 600, width: 200, height: 35 }], permittivity, thickness: 200, count }));
  const own = `bare pair, C and L, error ${largestError(ours.solved.capacitance).toExponential(1)}`;
  return [
    { name: own, prepare: () => bare({ ...usual, gaps: [between(390, 410)] }), run: solve },
    ...[16, 48, 144].map((count) => {
      const error = largestError(pulses(count)[0].map((value) => value * 2 * Math.PI * epsilon0));
      return { name: `textbook, ${2 * (2 * count + 2 * Math.round(count / 3))} pulses, error ${error.toExponential(1)}`, run: () => pulses(count)[0][0], against: own };
    }),
  ];
}

function solve(section: Section): number {
  const solution = solveSection(section);
  if ('refused' in solution) throw new Error(JSON.stringify(solution.refused));
  return solution.solved.capacitance[1];
}

export const cases = [...kinds.flatMap(casesOf), ...textbook()];
