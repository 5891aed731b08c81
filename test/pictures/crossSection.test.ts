/** A cross-section is drawn to scale, with every part named. */
import assert from 'node:assert/strict';
import { describe, it } from 'node:test';
import { crossSection, type CrossSection, type SectionPart } from '../../server/src/pictures/crossSection';
import { checkDrawn, elementsNamed, hostileNames, textsOf } from './drawn';

const part = (name: string, x: number, width: number, gap: number | null, kind: SectionPart['kind'] = 'trace'): SectionPart => ({ name, kind, x, y: 0.2e-3, width, height: 35e-6, undercut: 5e-6, tied: null, written: { width, gap } });
const section: CrossSection = {
  name: 'past', planeBelow: 'GND', planeAbove: null, film: { permittivity: 3.5, thickness: 20e-6, side: 'above' },
  layers: [{ permittivity: 4.2, thickness: 0.2e-3 }, { permittivity: 1, thickness: Infinity }],
  conductors: [part('VALVE', 0, 0.25e-3, 0.3e-3), { ...part('AGND', 0.55e-3, 0.25e-3, 0.3e-3, 'guard'), tied: 5e-3 }, part('RX', 1.1e-3, 0.15e-3, null)],
};

describe('cross-section', () => {
  it('looks as it is kept', () => checkDrawn('cross-section-guarded', crossSection(section)));
  it('looks as it is kept, between planes and without film', () => checkDrawn('cross-section-between-planes', crossSection({ ...section, film: null, planeAbove: 'VDD', layers: [{ permittivity: 4.2, thickness: 0.2e-3 }, { permittivity: 3.9, thickness: 0.235e-3 }] })));
  it('looks as it is kept, without planes', () => checkDrawn('cross-section-without-planes', crossSection({ ...section, planeBelow: null, film: null, layers: [{ permittivity: 1, thickness: Infinity }, ...section.layers] })));

  it('says all of it in words', () => {
    assert.equal(crossSection(section).words, 'Cross-section of run past, left to right: VALVE 0.25 mm wide, gap 0.3 mm; guard AGND 0.25 mm wide, tied every 5 mm, gap 0.3 mm; RX 0.15 mm wide. Copper 35 µm high. From top to bottom: air, 0.2 mm of εr 4.2, plane GND. A mask of 20 µm, εr 3.5 follows the copper.');
  });

  it('names and measures each part in the drawing', () => {
    const texts = textsOf(crossSection(section));
    for (const text of ['VALVE', 'AGND (guard)', 'RX', 'plane GND', 'εr 4.2 · 0.2 mm', 'mask 20 µm · ↔ gaps · to scale', 'air', '0.15 mm', '↔ 0.3 mm']) assert.ok(texts.includes(text), `${text} is not among ${texts.join(', ')}`);
  });

  it('has one scale across and up', () => {
    const [trace] = elementsNamed(crossSection(section), 'polygon');
    const points = trace!.attributes.get('points')!.split(' ').map((point) => point.split(',').map(Number) as [number, number]);
    const [width, height] = [points[1]![0] - points[0]![0], points[0]![1] - points[2]![1]];
    assert.ok(Math.abs(width / height - 250 / 35) < 0.01 * (250 / 35), `${width} by ${height}`);
  });

  it('stays small for a run of sixteen, and for one of a hundred, and says what it leaves out', () => {
    for (const count of [16, 100]) {
      const picture = crossSection({ ...section, conductors: Array.from({ length: count }, (_, index) => part(`DATA_BUS_LINE_${index}`, index * 0.3e-3, 0.15e-3, index === count - 1 ? null : 0.15e-3)) });
      assert.ok(picture.svg.length < 200 * count + 8000, `${picture.svg.length} characters`);
      assert.match(picture.words, new RegExp(`; and ${count - 12} more\\.`));
    }
  });

  it('keeps every name as text', () => {
    for (const name of hostileNames) {
      const picture = crossSection({ ...section, name, planeBelow: name, conductors: [part(name, 0, 1e-4, null, 'guard')] });
      assert.deepEqual(elementsNamed(picture, 'script'), []);
      assert.ok(picture.words.includes(name));
    }
  });
});
