/**
 * The outline of a loop to scale, seen square on to its two longest extents, with its area, the way of its current and the planes
 * that it lies over.
 */
import { inText } from '../units/inText';
import { niceStep } from './axis';
import { ink } from './ink';
import { pictureWidth, type Picture } from './picture';
import { element, line, polygon, shortened, svgDocument, words } from './svg';

/** Metres. */
export interface LoopOutline {
  readonly name: string;
  /** Corners in the direction of the current; a circle as a polygon of many. */
  readonly points: readonly (readonly [number, number, number])[];
  readonly area: number | null;
  readonly areaLimit: number | null;
  readonly inductance: number | null;
  readonly conductor: { readonly form: 'strip' | 'wire'; readonly width: number } | null;
  readonly planes: readonly string[];
}

const widest = pictureWidth - 90;
const tallest = 150;
const top = 22;

/** Null where there is no outline. */
export function loopOutline(loop: LoopOutline): Picture | null {
  const { name, area, conductor, planes } = loop;
  const points = loop.points.filter((point) => point.every(Number.isFinite));
  const view = viewOf(points);
  if (view === null) return null;
  const { across, up, perMetre } = view;
  const [width, height] = [across.span * perMetre, up.span * perMetre];
  const left = (pictureWidth - width) / 2 + 12;
  const at = (point: readonly number[]): readonly [number, number] => [left + (point[across.axis] - across.least) * perMetre, top + height - (point[up.axis] - up.least) * perMetre];
  const outline = thinned(points.map(at));
  const foot = top + height;
  const thick = Math.max(1.5, Math.min(14, (conductor?.width ?? 0) * perMetre));
  const beside = planes.length === 0 ? thick / 2 : 16;
  const over = area !== null && loop.areaLimit !== null && loop.areaLimit < area;
  const bar = niceStep(40 / perMetre);
  const parts = [
    ...(planes.length === 0 ? [] : [element('rect', { x: left - 16, y: top - 12, width: width + 32, height: height + 24, fill: 'url(#barred)', 'fill-opacity': 0.45, stroke: ink.reference, 'stroke-dasharray': '4 3' })]),
    polygon(outline, { fill: over ? 'url(#over)' : ink.good, 'fill-opacity': over ? 0.45 : 0.14, stroke: ink.copper, 'stroke-linejoin': 'round', 'stroke-width': thick }),
    ...arrow(outline),
    words(inText(across.span, 'length'), { x: left + width / 2, y: foot + beside + 16 }, { 'text-anchor': 'middle' }),
    words(inText(up.span, 'length'), { x: left - beside - 7, y: top + height / 2 + 4 }, { 'text-anchor': 'end' }),
    ...(area === null ? [] : [words(`${inText(area, 'area')}${over ? `, over the ${inText(loop.areaLimit ?? 0, 'area')} allowed` : ''}`, { x: left + width / 2, y: height < 34 ? top - 5 : top + height / 2 + 4 }, { 'text-anchor': 'middle', 'font-weight': 'bold' })]),
    line([5, foot + 42], [5 + bar * perMetre, foot + 42], { 'stroke-width': 1.5 }),
    line([5, foot + 39], [5, foot + 45]),
    line([5 + bar * perMetre, foot + 39], [5 + bar * perMetre, foot + 45]),
    words(`${inText(bar, 'length')}, to scale`, { x: 11 + bar * perMetre, y: foot + 46 }),
    ...(planes.length === 0 ? [] : [words(`over plane ${shortened(planes.join(', '), 30)}`, { x: pictureWidth - 5, y: foot + 46 }, { 'text-anchor': 'end' })]),
  ];
  return svgDocument({ width: pictureWidth, height: foot + 52, words: inWords(loop, name, { across, up }), parts });
}

interface Extent {
  readonly axis: 0 | 1 | 2;
  readonly least: number;
  readonly span: number;
}

function viewOf(points: LoopOutline['points']): { readonly across: Extent; readonly up: Extent; readonly perMetre: number } | null {
  if (points.length < 3) return null;
  const extents = ([0, 1, 2] as const).map((axis): Extent => {
    const [least, most] = points.reduce(([low, high], point) => [Math.min(low, point[axis]), Math.max(high, point[axis])], [Infinity, -Infinity]);
    return { axis, least, span: most - least };
  });
  // Along x and y where it lies flat; the smallest extent is looked along.
  const dropped = extents.reduce((least, extent) => (extent.span < least.span || (extent.span === least.span && least.axis < extent.axis) ? extent : least));
  const [across, up] = extents.filter((extent) => extent !== dropped);
  const perMetre = Math.min(widest / across.span, tallest / up.span);
  return 0 < across.span && 0 < up.span && Number.isFinite(perMetre) ? { across, up, perMetre } : null;
}

/** Corners nearer to each other than can be told apart are one. */
function thinned(points: readonly (readonly [number, number])[]): readonly (readonly [number, number])[] {
  const kept: (readonly [number, number])[] = [];
  for (const point of points) {
    const last = kept.at(-1);
    if (last === undefined || 0.8 < Math.hypot(point[0] - last[0], point[1] - last[1])) kept.push(point);
  }
  return kept;
}

/** On the longest side, the way that the current goes. */
function arrow(points: readonly (readonly [number, number])[]): readonly string[] {
  let longest = 0;
  let found: string[] = [];
  for (const [index, [x1, y1]] of points.entries()) {
    const [x2, y2] = points[(index + 1) % points.length];
    const length = Math.hypot(x2 - x1, y2 - y1);
    if (length <= longest * 1.001) continue;
    longest = length;
    const [x, y, dx, dy] = [(x1 + x2) / 2, (y1 + y2) / 2, (x2 - x1) / length, (y2 - y1) / length];
    found = [polygon([[x + 8 * dx, y + 8 * dy], [x - 5 * dx - 6 * dy, y - 5 * dy + 6 * dx], [x - 5 * dx + 6 * dy, y - 5 * dy - 6 * dx]], { fill: ink.text })];
  }
  return found;
}

function inWords({ area, areaLimit, inductance, conductor, planes }: LoopOutline, name: string, { across, up }: { readonly across: Extent; readonly up: Extent }): string {
  const size = `${inText(across.span, 'length')} by ${inText(up.span, 'length')}`;
  const limit = areaLimit === null ? '' : ` of ${inText(areaLimit, 'area')} at most`;
  const parts = [size, ...(area === null ? [] : [`${inText(area, 'area')}${limit}`]), ...(inductance === null ? [] : [inText(inductance, 'inductance')]), ...(conductor === null ? [] : [`${conductor.form} of ${inText(conductor.width, 'length')}`]), ...(planes.length === 0 ? [] : [`over plane ${planes.join(', ')}`])];
  return `Outline of loop ${name}, to scale: ${parts.join('; ')}.`;
}
