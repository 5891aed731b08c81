/**
 * What a section costs under a mask that follows the traces: an edit of a gap or of a width, another stack, a row of sixteen, and
 * the first section of a process (the column `first` of the first case). Every run gets dimensions of its own, so that nothing
 * but what a real edit would find again is found.
 */
import { solveSection } from '../../server/src/physics/section/solveSection';
import type { Section } from '../../server/src/physics/section/section';
import { metres } from '../../server/src/units/quantity';
import { seeded } from '../support/seeded';

const um = 1e-6;
const next = seeded(7);
const between = (low: number, high: number) => low * (high / low) ** next();

interface Row {
  readonly count?: number;
  readonly widths?: readonly number[];
  readonly gap: number;
  readonly copper?: number;
  readonly height?: number;
  readonly film?: number;
  readonly masked?: boolean;
}

function row({ count = 2, widths = [200], gap, copper = 35, height = 200, film = 25, masked = true }: Row): Section {
  let x = 0;
  return {
    layers: [{ permittivity: 4.2, thickness: metres(height * um) }, { permittivity: 1, thickness: metres(Infinity) }], planeBelow: true, planeAbove: false,
    conductors: Array.from({ length: count }, (_, i) => {
      const width = widths[i % widths.length];
      const left = x;
      x += width + gap;
      return { role: 'signal' as const, x: metres(left * um), y: metres(height * um), width: metres(width * um), height: metres(copper * um), undercut: metres(0) };
    }),
    film: masked ? { permittivity: 3.4, thickness: metres(film * um), side: 'above' } : null,
  };
}

function solve(section: Section): number {
  const solution = solveSection(section);
  if ('refused' in solution) throw new Error(JSON.stringify(solution.refused));
  return solution.solved.capacitance[1];
}

export const cases = [
  { name: 'pair, another gap', prepare: () => row({ gap: between(100, 3000) }), run: solve },
  { name: 'the same without the mask', prepare: () => row({ gap: between(100, 3000), masked: false }), run: solve, against: 'pair, another gap' },
  { name: 'pair, the same again', prepare: () => row({ gap: 400 }), run: solve, against: 'pair, another gap' },
  { name: 'unequal pair, another gap', prepare: () => row({ gap: between(100, 3000), widths: [150, 310] }), run: solve, against: 'pair, another gap' },
  { name: 'pair, another width', prepare: () => row({ gap: between(100, 3000), widths: [between(90, 1000)] }), run: solve, against: 'pair, another gap' },
  { name: 'unequal pair, other widths', prepare: () => row({ gap: between(100, 3000), widths: [between(90, 1000), between(90, 1000)] }), run: solve, against: 'pair, another gap' },
  { name: 'pair, another stack', prepare: () => row({ gap: between(100, 3000), widths: [between(90, 1000)], copper: between(12, 70), height: between(80, 1600), film: between(10, 60) }), run: solve, against: 'pair, another gap' },
  { name: 'six, another gap', prepare: () => row({ count: 6, gap: between(100, 1000), widths: [150] }), run: solve, against: 'pair, another gap' },
  { name: 'sixteen, another gap', prepare: () => row({ count: 16, gap: between(100, 1000), widths: [150] }), run: solve, against: 'pair, another gap' },
];
