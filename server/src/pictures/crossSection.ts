/**
 * A cross-section to scale: planes, dielectrics, mask, traces, guards and returns, each with its name, and their widths, gaps and
 * heights. What is drawn is what is computed with.
 *
 *        VALVE    RX
 *   ~~~~[=====]~~[===]~~~~   mask
 *     0.25 mm  0.3 mm  …     widths and gaps
 *   ---- εr 4.2 · 0.2 mm ---
 *   //////// GND ///////////
 */
import { inText } from '../units/inText';
import { ink } from './ink';
import { placedLabels } from './labels';
import { pictureWidth, type Picture } from './picture';
import { niceStep } from './axis';
import { element, line, polygon, shortened, svgDocument, widthOf, words } from './svg';

/** Lengths in metres; y points up, from the plane below or the underside of the lowest layer. */
export interface CrossSection {
  readonly name: string;
  /** From bottom to top; the thickness of an outermost one may be Infinity. */
  readonly layers: readonly { readonly permittivity: number; readonly thickness: number }[];
  readonly planeBelow: string | null;
  readonly planeAbove: string | null;
  /** Left to right within each row, row by row; a gap is the copper-free width to the next one of its row. */
  readonly conductors: readonly SectionPart[];
  readonly film: { readonly permittivity: number; readonly thickness: number; readonly side: 'above' | 'below' } | null;
}

export interface SectionPart {
  readonly name: string;
  readonly kind: 'trace' | 'guard' | 'return';
  /** Left and right at the widest, the lower face first where they differ. */
  readonly x: number;
  readonly y: number;
  readonly width: number;
  readonly height: number;
  readonly undercut: number;
  /** Of a guard: how far apart its ties are; null where it is tied at its ends only. */
  readonly tied: number | null;
  /** As stated: the width of the wider face, and the gap to the right of it. */
  readonly written: { readonly width: number; readonly gap: number | null };
}

const sidePixels = 14;
const tallest = 190;

export function crossSection(section: CrossSection): Picture {
  const { conductors, layers } = section;
  const scale = scaleOf(section);
  const bottom = layers[0]?.thickness === Infinity ? -scale.air : 0;
  const heights = layerHeights(section, scale.air);
  const top = heights.length === 0 ? 0 : heights[heights.length - 1].top;
  const names = placedLabels(conductors.map(({ name, x, width, kind }) => ({ text: kind === 'trace' ? shortened(name, 16) : `${shortened(name, 14)} (${kind})`, middle: scale.x(x + width / 2) })), { levels: 3, from: 0, to: pictureWidth });
  const nameLevels = names.reduce((most, { level }) => Math.max(most, level + 1), 1);
  const head = 15 * nameLevels + 6 + (section.planeAbove === null ? 0 : 12);
  const y = (height: number) => head + (top - height) * scale.perMetre;
  const foot = y(bottom) + (section.planeBelow === null ? 4 : 12);
  const measures = measuresOf(section, scale.x);
  const measureLevels = measures.reduce((most, { level }) => Math.max(most, level + 1), 0);
  const bar = scaleBar(section, scale.perMetre, foot + 16 + 14 * measureLevels);
  const parts = [
    ...heights.map((layer, index) => layerShape(layer, y, index)),
    ...filmShape(section, { x: scale.x, y, perMetre: scale.perMetre }),
    ...planeShapes(section, { above: y(top), below: y(bottom) }),
    ...conductors.map((part) => conductorShape(part, scale.x, y)),
    ...names.map(({ text, middle, level }) => words(text, { x: middle, y: 15 * (nameLevels - level) - 2 }, { 'text-anchor': 'middle', 'font-weight': 'bold' })),
    ...measures.map(({ text, middle, level }) => words(text, { x: middle, y: foot + 13 + 14 * level }, { 'text-anchor': 'middle' })),
    ...layerWords(heights, y),
    ...bar,
  ];
  return svgDocument({ width: pictureWidth, height: foot + 24 + 14 * measureLevels, words: sectionInWords(section), parts });
}

interface Scale {
  readonly perMetre: number;
  x(value: number): number;
  /** Of what goes on for ever, as much as is drawn; metres. */
  readonly air: number;
}

/** One scale for both directions; the air and the board beside the copper get what is left. */
function scaleOf({ conductors, layers }: CrossSection): Scale {
  const left = Math.min(...conductors.map(({ x }) => x));
  const right = Math.max(...conductors.map(({ x, width }) => x + width));
  const solid = layers.reduce((sum, { thickness }) => sum + (thickness === Infinity ? 0 : thickness), 0);
  const tops = Math.max(...conductors.map(({ height }) => height));
  const air = 3 * tops;
  const endless = layers.filter(({ thickness }) => thickness === Infinity).length;
  const across = (pictureWidth - 2 * sidePixels) / Math.max(right - left, 1e-9);
  // A margin of board beside the copper, as wide as the board between copper and plane is high, shows that it goes on.
  const perMetre = Math.min(across * 0.86, tallest / Math.max(solid + endless * air, 1e-9));
  const middle = (left + right) / 2;
  return { perMetre, air, x: (value) => pictureWidth / 2 + (value - middle) * perMetre };
}

interface LayerHeight {
  readonly bottom: number;
  readonly top: number;
  readonly permittivity: number;
  readonly thickness: number;
}

function layerHeights({ layers }: CrossSection, air: number): readonly LayerHeight[] {
  let at = 0;
  return layers.map(({ permittivity, thickness }, index) => {
    const bottom = index === 0 && thickness === Infinity ? -air : at;
    const top = thickness === Infinity ? (index === 0 ? 0 : at + air) : at + thickness;
    at = top;
    return { bottom, top, permittivity, thickness };
  });
}

/** The denser the dielectric, the darker; air is not filled at all. */
function layerShape({ bottom, top, permittivity }: LayerHeight, y: (height: number) => number, index: number): string {
  const shape = { x: 0, width: pictureWidth, y: y(top), height: Math.max(0.5, y(bottom) - y(top)) };
  if (permittivity <= 1) return element('rect', { ...shape, fill: 'none' });
  return element('rect', { ...shape, fill: ink.third, 'fill-opacity': 0.14 + 0.06 * (index % 2), stroke: ink.third, 'stroke-opacity': 0.5, 'stroke-width': 0.5 });
}

function layerWords(layers: readonly LayerHeight[], y: (height: number) => number): readonly string[] {
  return layers.flatMap(({ bottom, top, permittivity, thickness }) => {
    const room = y(bottom) - y(top);
    const text = thickness === Infinity ? (permittivity === 1 ? 'air' : `εr ${inText(permittivity, 'number')}`) : `εr ${inText(permittivity, 'number')} · ${inText(thickness, 'length')}`;
    return room < 14 || (permittivity === 1 && room < 24) ? [] : [words(text, { x: pictureWidth - 5, y: (y(bottom) + y(top)) / 2 + 4 }, { 'text-anchor': 'end' })];
  });
}

function planeShapes({ planeAbove, planeBelow }: CrossSection, at: { readonly above: number; readonly below: number }): readonly string[] {
  const plane = (name: string, top: number, text: number) => [
    element('rect', { x: 0, y: top, width: pictureWidth, height: 9, fill: ink.reference, 'fill-opacity': 0.35 }),
    element('rect', { x: 0, y: top, width: pictureWidth, height: 9, fill: 'url(#barred)' }),
    words(`plane ${shortened(name, 20)}`, { x: 5, y: text }),
  ];
  return [...(planeAbove === null ? [] : plane(planeAbove, at.above - 9, at.above + 12)), ...(planeBelow === null ? [] : plane(planeBelow, at.below, at.below - 4))];
}

function conductorShape(part: SectionPart, x: (value: number) => number, y: (height: number) => number): string {
  const { kind, height, undercut, width } = part;
  const low = Math.max(y(part.y), y(part.y + height) + 1);
  const shape: readonly (readonly [number, number])[] = [[x(part.x), low], [x(part.x + width), low], [x(part.x + width - undercut), y(part.y + height)], [x(part.x + undercut), y(part.y + height)]];
  if (kind === 'trace') return polygon(shape, { fill: ink.copper, stroke: ink.copper });
  // A reference is hatched like the planes that it is tied to.
  return `${polygon(shape, { fill: ink.reference, 'fill-opacity': 0.45, stroke: ink.reference })}${polygon(shape, { fill: 'url(#barred)' })}${kind === 'guard' ? tie(x(part.x + width / 2), low) : ''}`;
}

/** The via that ties a guard, as the sign for ground. */
function tie(x: number, y: number): string {
  return [line([x, y], [x, y + 7]), line([x - 5, y + 7], [x + 5, y + 7], { 'stroke-width': 1.5 }), line([x - 2.5, y + 10], [x + 2.5, y + 10], { 'stroke-width': 1.5 })].join('');
}

/** Over the copper and beside it, as thick on its sides as on its top. */
function filmShape({ film, conductors, layers }: CrossSection, { x, y, perMetre }: { x(value: number): number; y(height: number): number; readonly perMetre: number }): readonly string[] {
  if (film === null) return [];
  const up = film.side === 'above';
  const surface = up ? layers.reduce((sum, { thickness }) => sum + (thickness === Infinity ? 0 : thickness), 0) : 0;
  const thick = Math.max(1, film.thickness * perMetre);
  const style = { fill: ink.second, 'fill-opacity': 0.3 };
  const flat = element('rect', { x: 0, width: pictureWidth, y: up ? y(surface) - thick : y(surface), height: thick, ...style });
  const over = conductors.filter((part) => Math.abs((up ? part.y : part.y + part.height) - surface) < 1e-9).map((part) => element('rect', { x: x(part.x) - thick, width: part.width * perMetre + 2 * thick, y: y(part.y + part.height) - (up ? thick : 0), height: part.height * perMetre + thick, ...style }));
  return [flat, ...over];
}

/** Widths under the conductors, gaps between them; of rows above each other, each in turn. */
function measuresOf({ conductors }: CrossSection, x: (value: number) => number) {
  const labels = conductors.flatMap(({ x: left, width, written }) => [
    { text: `${inText(written.width, 'length')}`, middle: x(left + width / 2) },
    ...(written.gap === null ? [] : [{ text: `↔ ${inText(written.gap, 'length')}`, middle: x(left + width + written.gap / 2) }]),
  ]);
  return placedLabels(labels, { levels: 3, from: 0, to: pictureWidth });
}

function scaleBar({ film }: CrossSection, perMetre: number, y: number): readonly string[] {
  const length = niceStep(40 / perMetre);
  const [from, to] = [5, 5 + length * perMetre];
  const text = inText(length, 'length');
  const notes = [...(film === null ? [] : [`mask ${inText(film.thickness, 'length')}`]), '↔ gaps', 'to scale'].join(' · ');
  return to + widthOf(text) + 12 < pictureWidth ? [line([from, y], [to, y], { 'stroke-width': 1.5 }), line([from, y - 3], [from, y + 3]), line([to, y - 3], [to, y + 3]), words(text, { x: to + 6, y: y + 4 }), words(notes, { x: pictureWidth - 5, y: y + 4 }, { 'text-anchor': 'end' })] : [];
}

const partsTold = 12;

function sectionInWords({ name, conductors, layers, planeAbove, planeBelow, film }: CrossSection): string {
  const told = conductors.slice(0, partsTold).map(({ name: part, kind, written, tied }, index) => {
    const what = kind === 'trace' ? part : `${kind} ${part}`;
    const ties = kind === 'guard' ? (tied === null ? ', tied at its ends' : `, tied every ${inText(tied, 'length')}`) : '';
    const gap = written.gap === null || index === conductors.length - 1 ? '' : `, gap ${inText(written.gap, 'length')}`;
    return `${what} ${inText(written.width, 'length')} wide${ties}${gap}`;
  });
  const rest = conductors.length - told.length;
  const stack = [...layers].reverse().map(({ permittivity, thickness }) => (thickness === Infinity ? (permittivity === 1 ? 'air' : `εr ${inText(permittivity, 'number')} without end`) : `${inText(thickness, 'length')} of εr ${inText(permittivity, 'number')}`));
  const copper = [...new Set(conductors.map(({ height }) => inText(height, 'length')))].join(' and ');
  const all = [...(planeAbove === null ? [] : [`plane ${planeAbove}`]), ...stack, ...(planeBelow === null ? [] : [`plane ${planeBelow}`])];
  const mask = film === null ? '' : ` A mask of ${inText(film.thickness, 'length')}, εr ${inText(film.permittivity, 'number')} follows the copper.`;
  return `Cross-section of run ${name}, left to right: ${told.join('; ')}${rest === 0 ? '' : `; and ${rest} more`}. Copper ${copper} high. From top to bottom: ${all.join(', ')}.${mask}`;
}
