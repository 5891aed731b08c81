/** Compares a picture with the one that is kept beside the tests; `UPDATE=1` keeps it anew, to be looked at in a browser. */
import assert from 'node:assert/strict';
import { existsSync, readFileSync, writeFileSync } from 'node:fs';
import { readXml, type XmlElement } from '../support/wellFormedXml';
import type { Picture } from '../../server/src/pictures/picture';

export function checkDrawn(name: string, { svg }: Picture): void {
  readXml(svg);
  const kept = `test/pictures/drawn/${name}.svg`;
  if (process.env['UPDATE'] === '1') writeFileSync(kept, svg);
  assert.ok(existsSync(kept), `${kept} is missing: UPDATE=1 writes it`);
  assert.equal(svg, readFileSync(kept, 'utf8'));
}

/** Every element of one name, in the order of the document. */
export function elementsNamed(picture: Picture, name: string): readonly XmlElement[] {
  const all = (element: XmlElement): readonly XmlElement[] => [element, ...element.children.flatMap(all)];
  return all(readXml(picture.svg)).filter((element) => element.name === name);
}

/** What can be read in the drawing. */
export function textsOf(picture: Picture): readonly string[] {
  return elementsNamed(picture, 'text').map(({ text }) => text);
}

export const hostileNames: readonly string[] = ['<script>alert(1)</script>', '"quoted\' &amp; more"', ']]>', '`code` ![x](y) | **b**', '__proto__', 'a\u0000b\ud800c', '\u202Ereversed', 'Ω'.repeat(300)];
