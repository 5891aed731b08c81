/**
 * A section in the one attitude and with the one rounding under which it is solved and found again: the
 * plane, where there is one, below, so that what lies on a board's underside is the same section as
 * what lies on its top; its leftmost edge at zero; lengths on a grid far below any that matters, so that a
 * height which went through other sums is the same height.
 */
import type { Section, SectionConductor } from '../../physics/section/section';
import { metres } from '../../units/quantity';

export function canonicalSection(section: Section): Section {
  return onGrid(isTurnedOver(section) ? upsideDown(section) : section);
}

/** Whether its canonical form is upside down. */
export function isTurnedOver(section: Section): boolean {
  if (section.planeAbove !== section.planeBelow) return section.planeAbove;
  if (section.planeAbove) return false;
  if (section.film !== null) return section.film.side === 'below';
  // Without planes and film: where the copper is below the middle of what carries it.
  const middle = section.conductors.reduce((sum, conductor) => sum + conductor.y + conductor.height / 2, 0);
  return middle < (section.conductors.length * finiteHeight(section)) / 2;
}

/** Twice is the section itself. */
export function upsideDown(section: Section): Section {
  const height = finiteHeight(section);
  return {
    layers: [...section.layers].reverse(),
    planeBelow: section.planeAbove,
    planeAbove: section.planeBelow,
    conductors: section.conductors.map((conductor) => turned(conductor, height)),
    film: section.film === null ? null : { ...section.film, side: section.film.side === 'above' ? 'below' : 'above' },
  };
}

function turned(conductor: SectionConductor, height: number): SectionConductor {
  const { x, y, width, undercut } = conductor;
  return {
    ...conductor,
    x: metres(x + undercut),
    y: metres(height - y - conductor.height),
    width: metres(width - 2 * undercut),
    undercut: metres(0 - undercut),
  };
}

/** Twelve decimal digits below the section's own size, whatever that is. */
function onGrid(section: Section): Section {
  const largest = section.conductors.reduce((size, { x, width }) => Math.max(size, Math.abs(x) + width), finiteHeight(section));
  const grid = 10 ** (Math.ceil(Math.log10(largest)) - 12);
  // Outside what a double can hold there is nothing to round; the solver refuses what makes no sense.
  if (!(0 < grid && grid < Infinity)) return section;
  // `+ 0` turns a negative zero into zero: they are one length, and have to be one key.
  const round = (length: number) => metres(length === Infinity ? length : Math.round(length / grid) * grid + 0);
  const left = section.conductors.reduce((least, { x }) => Math.min(least, x), Infinity);
  return {
    ...section,
    layers: section.layers.map((layer) => ({ ...layer, thickness: round(layer.thickness) })),
    conductors: section.conductors.map(({ role, x, y, width, height, undercut }) => ({ role, x: round(x - left), y: round(y), width: round(width), height: round(height), undercut: round(undercut) })),
    film: section.film === null ? null : { ...section.film, thickness: round(section.film.thickness) },
  };
}

function finiteHeight(section: Section): number {
  return section.layers.reduce((sum, layer) => sum + (layer.thickness === Infinity ? 0 : layer.thickness), 0);
}
