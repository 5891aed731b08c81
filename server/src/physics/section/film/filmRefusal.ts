/** Which films are refused before anything is computed. `section` has its film above. */
import type { Section, SectionRefusal } from '../section';
import { placementOf } from '../placement';
import { filledWithFilm, laminateTop } from './filmedCharge';

export function filmRefusal(section: Section): SectionRefusal | null {
  const { film, layers, planeAbove, conductors } = section;
  if (film === null) return null;
  if (!(1 <= film.permittivity && film.permittivity < 1e3)) return notCovered(`a mask of permittivity ${film.permittivity}`);
  if (!(0 < film.thickness && film.thickness < 1e6)) return notCovered(`a mask of ${film.thickness} m`);
  if (planeAbove || layers.length < 2) return notCovered('a mask that follows the traces under a plane');
  const laminate = laminateTop(section);
  for (const { y, height, width } of conductors) {
    const size = height === 0 ? width : Math.min(width, height);
    if (laminate + 1e-6 * size < y) return notCovered('a conductor over a mask that does not lie on the laminate');
    if (laminate - 1e-6 * size <= y && film.thickness < Math.max(thinnest * height, thinnestOverWidth * width)) return notCovered('a mask thinner than a hundredth of the copper or a two-thousandth of its width');
  }
  const placement = placementOf(filledWithFilm(section));
  return 'refused' in placement ? placement.refused : null;
}

/** Of the height and of the width: thinner film would need more panels than were measured. */
const thinnest = 1 / 100;
const thinnestOverWidth = 1 / 2000;

const notCovered = (what: string): SectionRefusal => ({ reason: 'not-covered', what });
