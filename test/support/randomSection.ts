/** Seeded cross-sections of every kind that the solver covers, in the sizes that boards have. */
import type { Section, SectionConductor } from '../../server/src/physics/section/section';
import { metres } from '../../server/src/units/quantity';
import { seeded } from './seeded';

export const sectionKinds = ['bare', 'flat mask', 'stripline', 'stripline of two', 'stripline of four', 'plane above', 'two heights', 'two layers', 'both faces', 'no plane', 'guard', 'eight'] as const;
export type SectionKind = (typeof sectionKinds)[number];

/** The same sequence for the same seed. */
export function randomSections(kind: SectionKind, seed: number, count: number): Section[] {
  const random = seeded(seed * 7919 + sectionKinds.indexOf(kind));
  // The first numbers of neighbouring seeds are alike.
  for (let i = 0; i < 20; i += 1) random();
  return Array.from({ length: count }, () => sectionOf(kind, random));
}

const mm = 1e-3;

function sectionOf(kind: SectionKind, random: () => number): Section {
  const between = (low: number, high: number) => low * (high / low) ** random();
  const pick = (from: readonly number[]) => from[Math.floor(random() * from.length)];
  const permittivity = () => pick([2.2, 3, 3.4, 3.66, 4.2, 4.7, 6.15, 10.2]);
  const thickness = pick([0.012, 0.018, 0.035, 0.07, 0.105]);
  const undercut = random() < 0.4 ? 0.3 * thickness * random() : 0;
  const width = () => between(Math.max(0.08, 0.8 * thickness), Math.min(3, 50 * thickness));
  const open = { permittivity: 1, thickness: Infinity };
  const layer = (millimetres: number) => ({ permittivity: permittivity(), thickness: millimetres * mm });
  const trace = (x: number, y: number, w: number, role: SectionConductor['role'] = 'signal', t = thickness): SectionConductor =>
    ({ role, x: metres(x * mm), y: metres(y * mm), width: metres(w * mm), height: metres(t * mm), undercut: metres(undercut * mm) });
  const row = (y: number, widths: readonly number[], gap: () => number, reference: number | null = null) => {
    let x = between(0.1, 1);
    return widths.map((w, index) => {
      const conductor = trace(x, y, w, index === reference ? 'reference' : 'signal');
      x += w + gap();
      return conductor;
    });
  };
  const gap = () => between(0.1, 3.2);
  const make = (layers: readonly { permittivity: number; thickness: number }[], planes: 'below' | 'above' | 'both' | 'none', conductors: readonly SectionConductor[]): Section => ({
    layers: layers.map((each) => ({ permittivity: each.permittivity, thickness: metres(each.thickness) })),
    planeBelow: planes === 'below' || planes === 'both', planeAbove: planes === 'above' || planes === 'both', film: null, conductors,
  });
  const h = between(0.05, kind.startsWith('stripline') || kind.startsWith('two') ? 0.8 : 1.6);
  switch (kind) {
    case 'bare':
      return make([layer(h), open], 'below', row(h, [width(), width()], gap));
    case 'flat mask':
      return make([layer(h), { permittivity: 3.4, thickness: (thickness + between(0.01, 0.05)) * mm }, open], 'below', row(h, [width(), width()], gap));
    case 'stripline':
      return make([layer(h + thickness + between(0.05, 0.8))], 'both', row(h, [width(), width()], gap));
    case 'stripline of two':
      return make([layer(h), layer(thickness + between(0.05, 0.8))], 'both', row(h, [width(), width()], gap));
    case 'stripline of four':
      return make([layer(h), layer(0.2), layer(thickness + between(0.05, 0.5)), layer(between(0.05, 0.5))], 'both', row(h + 0.2, [width(), width()], gap));
    case 'plane above': {
      const conductors = row(0, [width(), width()], gap).map((each) => ({ ...each, y: metres(-each.height), undercut: metres(-each.undercut), x: metres(each.x + each.undercut) }));
      const [first, second] = conductors;
      // Faced down, the wide sides are at the top and each trace reaches further to its left and right.
      return make([open, layer(h)], 'above', [first, { ...second, x: metres(second.x + 2 * undercut * mm) }]);
    }
    case 'two heights':
    case 'two layers': {
      const between2 = between(0.08, 0.5);
      const above = between(0.08, 0.5);
      const conductors = [trace(0, h, width()), trace(2 * random() - 1, h + thickness + between2, width())];
      return kind === 'two heights'
        ? make([layer(h + 2 * thickness + between2 + above)], 'both', conductors)
        : make([layer(h), layer(thickness + between2), layer(thickness + above)], 'both', conductors);
    }
    case 'both faces':
      return make([open, layer(h), open], 'none', [trace(0, -thickness, width(), 'reference'), trace(2 * random() - 1, h, width()), trace(5 + random(), h, 0.3)]);
    case 'no plane':
      return make([open, layer(h), open], 'none', row(h, [width(), width(), width()], gap, 0));
    case 'guard':
      return make([layer(h), open], 'below', row(h, [width(), width(), width()], () => between(0.1, 0.8), 1));
    case 'eight':
      return make([layer(h), open], 'below', row(h, Array.from({ length: 8 }, () => between(Math.max(0.1, thickness), 0.4)), () => between(0.1, 0.5)));
  }
}
