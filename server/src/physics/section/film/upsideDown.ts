/**
 * The same section seen in a mirror that lies flat: what was below is above. Its matrices are the same, so that a film
 * need only be solved for on the upper face.
 */
import { metres } from '../../../units/quantity';
import type { Section } from '../section';

export function upsideDown(section: Section): Section {
  const { layers, planeBelow, planeAbove, conductors, film } = section;
  // Heights count from the plane below or from the bottom of the lowest finite layer; so they do in the mirror.
  const height = layers.reduce((sum, { thickness }) => (thickness === Infinity ? sum : sum + thickness), 0);
  return {
    layers: [...layers].reverse(),
    planeBelow: planeAbove,
    planeAbove: planeBelow,
    film: film === null ? null : { ...film, side: film.side === 'above' ? 'below' : 'above' },
    conductors: conductors.map((conductor) => ({
      ...conductor,
      // The face that was the upper one: it starts `undercut` further right and is narrower by twice that.
      x: metres(conductor.x + conductor.undercut),
      y: metres(height - conductor.y - conductor.height),
      width: metres(conductor.width - 2 * conductor.undercut),
      undercut: metres(-conductor.undercut),
    })),
  };
}
