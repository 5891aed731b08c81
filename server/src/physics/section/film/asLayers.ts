/**
 * The same section without a film that follows anything, where there is one: its film lies flat because no copper stands out
 * of the laminate, or it is of what lies over it anyway. Null otherwise. `section` has its film above.
 */
import { metres } from '../../../units/quantity';
import type { Section } from '../section';
import { laminateTop } from './filmedCharge';
import { negligibleStep } from './outline';

export function asLayers(section: Section): Section | null {
  const { film, layers, conductors } = section;
  if (film === null) return section;
  const outside = layers[layers.length - 1];
  if (film.permittivity === outside.permittivity) return { ...section, film: null };
  const face = laminateTop(section) + negligibleStep * film.thickness;
  if (conductors.some(({ y, height }) => face < y + height)) return null;
  return { ...section, film: null, layers: [...layers.slice(0, -1), { permittivity: film.permittivity, thickness: metres(film.thickness) }, outside] };
}
