/**
 * The noise of a receiver against one gap, both axes logarithmic, where coupling is nearly a straight line.
 *
 *   mV |\                 /////  narrower than can be made
 *      | \o   the gap now
 *      |- -\- - - - - -   tolerated
 *      |    \<>           the gap that would just do
 *      +------------- mm
 */
import { inText } from '../units/inText';
import { logAxis, type Axis } from './axis';
import { ink } from './ink';
import { pictureWidth, type Picture } from './picture';
import { element, line, polygon, polyline, svgDocument, words } from './svg';

/** Metres and volts. */
export interface NoiseAgainstGap {
  readonly receiver: string;
  readonly measure: 'peak' | 'rms';
  /** By rising gap. */
  readonly points: readonly { readonly gap: number; readonly noise: number }[];
  readonly present: { readonly gap: number; readonly noise: number };
  /** The smallest that the board allows; null where it states none. */
  readonly clearance: number | null;
  readonly tolerates: number;
  /** What is tolerated less the headroom, where one is wanted. */
  readonly wanted: number | null;
  /** The gap that would just do; null where none in reach does, or nobody asked. */
  readonly enough: number | null;
}

const box = { left: 62, right: pictureWidth - 16, top: 16, bottom: 160 };

/** Null where there are too few numbers for a curve. */
export function noiseAgainstGap(given: NoiseAgainstGap): Picture | null {
  const { present, clearance, tolerates, wanted, enough } = given;
  const points = given.points.filter(({ gap, noise }) => 0 < gap && gap < Infinity && 0 < noise && noise < Infinity);
  if (points.length < 3) return null;
  const levels = [...points.map(({ noise }) => noise), present.noise].filter((level) => 0 < level);
  // A limit that is decades away is named at the edge: the curve is what the picture is for.
  const [least, most] = [Math.min(...levels), Math.max(...levels)];
  const seen = (level: number) => least / 20 <= level && level <= 20 * most;
  const limits = [tolerates, ...(wanted === null ? [] : [wanted])].filter(seen);
  const x = logAxis({ from: points[0].gap / 1.05, to: points[points.length - 1].gap * 1.05, pixels: [box.left, box.right], dimension: 'length' }, 48);
  const y = logAxis({ from: Math.min(least, ...limits) / 1.25, to: Math.max(most, ...limits) * 1.25, pixels: [box.bottom, box.top], dimension: 'voltage' }, 22);
  const parts = [
    ...frame(x, y),
    ...(clearance === null ? [] : cannotBeMade(x.at(clearance))),
    ...(seen(tolerates) ? limitMark(y.at(tolerates), `tolerated ${voltage(tolerates, given)}`, tolerates < present.noise ? Math.max(box.left, clearance === null ? 0 : x.at(clearance)) + 5 : null) : [words(`tolerated ${voltage(tolerates, given)} ${most < tolerates ? '↑ above' : '↓ below'} this picture`, { x: box.right, y: most < tolerates ? box.top - 6 : box.bottom - 6 }, { 'text-anchor': 'end', fill: ink.limit, 'font-weight': 'bold' })]),
    ...(wanted !== null && seen(wanted) ? [line([box.left, y.at(wanted)], [box.right, y.at(wanted)], { stroke: ink.limit, 'stroke-width': 1.5, 'stroke-dasharray': '1.5 3' })] : []),
    polyline(points.map(({ gap, noise }) => [x.at(gap), y.at(noise)] as const), { stroke: ink.good, 'stroke-width': 2.5, 'stroke-linejoin': 'round' }),
    ...presentMark(given, x, y),
    ...(enough === null ? [] : enoughMark({ gap: enough, noise: noiseAt(points, enough), widens: present.gap < enough }, x, y)),
  ];
  return svgDocument({ width: pictureWidth, height: box.bottom + 24, words: inWords({ ...given, points }), parts });
}

function frame(x: Axis, y: Axis): readonly string[] {
  return [
    ...y.ticks.flatMap(({ value, label }) => [line([box.left, y.at(value)], [box.right, y.at(value)], { stroke: ink.grid }), words(label, { x: box.left - 6, y: y.at(value) + 4 }, { 'text-anchor': 'end' })]),
    ...x.ticks.flatMap(({ value, label }) => [line([x.at(value), box.bottom], [x.at(value), box.bottom + 4]), words(label, { x: x.at(value), y: box.bottom + 17 }, { 'text-anchor': 'middle' })]),
    line([box.left, box.bottom], [box.right, box.bottom]),
    line([box.left, box.top], [box.left, box.bottom]),
  ];
}

function cannotBeMade(x: number): readonly string[] {
  const edge = Math.max(box.left, Math.min(box.right, x));
  return [element('rect', { x: box.left, y: box.top, width: edge - box.left, height: box.bottom - box.top, fill: 'url(#barred)', 'fill-opacity': 0.6 }), line([edge, box.top], [edge, box.bottom], { 'stroke-width': 1.5 }), words('clearance', { x: edge + 4, y: box.bottom - 6 })];
}

/** Where the curve is not: left of where it comes down to the limit, or at the right end over a curve that is below it. */
function limitMark(y: number, label: string, from: number | null): readonly string[] {
  return [line([box.left, y], [box.right, y], { stroke: ink.limit, 'stroke-width': 1.75, 'stroke-dasharray': '6 3' }), words(label, { x: from ?? box.right, y: y - 5 }, { 'text-anchor': from === null ? 'end' : 'start', fill: ink.limit, 'font-weight': 'bold' })];
}

function presentMark({ present }: NoiseAgainstGap, x: Axis, y: Axis): readonly string[] {
  const [across, up] = [x.at(present.gap), y.at(present.noise)];
  const left = across < box.right - 90;
  return [element('circle', { cx: across, cy: up, r: 5, fill: ink.text }), words(`now ${inText(present.gap, 'length')}`, { x: across + (left ? 8 : -2), y: up - 8 }, { 'text-anchor': left ? 'start' : 'end', 'font-weight': 'bold' })];
}

/** A diamond on the curve, and a line away from it: up where the curve has come down from the left, else down. */
function enoughMark({ gap, noise, widens }: { readonly gap: number; readonly noise: number; readonly widens: boolean }, x: Axis, y: Axis): readonly string[] {
  const [across, up] = [x.at(gap), y.at(noise)];
  if (across < box.left || box.right + 1 < across) return [];
  const left = across < box.right - 110;
  return [line([across, up], [across, widens ? box.top : box.bottom], { stroke: ink.third, 'stroke-dasharray': '3 3' }), polygon([[across, up - 6], [across + 6, up], [across, up + 6], [across - 6, up]], { fill: ink.third }), words(`enough ${inText(gap, 'length')}`, { x: across + (left ? 5 : -5), y: widens ? box.top + 10 : box.bottom - 22 }, { 'text-anchor': left ? 'start' : 'end', fill: ink.third, 'font-weight': 'bold' })];
}

/** Between two points a power of the gap, as the picture draws it. */
function noiseAt(points: NoiseAgainstGap['points'], gap: number): number {
  const after = points.findIndex((point) => gap <= point.gap);
  if (after <= 0) return points[after < 0 ? points.length - 1 : 0].noise;
  const [a, b] = [points[after - 1], points[after]];
  const share = Math.log(gap / a.gap) / Math.log(b.gap / a.gap);
  return a.noise * (b.noise / a.noise) ** share;
}

function inWords(given: NoiseAgainstGap): string {
  const { receiver, points, present, clearance, tolerates, wanted, enough } = given;
  const told = points.filter((_, index) => index % Math.ceil(points.length / 6) === 0 || index === points.length - 1).map(({ gap, noise }) => `${voltage(noise, given)} at ${inText(gap, 'length')}`);
  const limits = `${voltage(tolerates, given)} tolerated${wanted === null ? '' : `, ${voltage(wanted, given)} with the headroom`}`;
  const least = clearance === null ? '' : ` No gap below ${inText(clearance, 'length')} can be made.`;
  const does = enough === null ? '' : ` ${inText(enough, 'length')} would just do.`;
  return `Noise on ${receiver} against this gap: ${voltage(present.noise, given)} at ${inText(present.gap, 'length')} now; ${limits}.${does} ${told.join(', ')}.${least}`;
}

function voltage(value: number, { measure }: Pick<NoiseAgainstGap, 'measure'>): string {
  return `${inText(value, 'voltage')}${measure === 'rms' ? ' rms' : ''}`;
}
