/**
 * Noise over time at the ends of a run and at the receiver, with what is tolerated and from when on it counts.
 *
 *   mV |      __  receiver
 *      | - - / -\- - - - -   tolerated
 *      |____/    \________
 *      0                  ns
 */
import { inText } from '../units/inText';
import { linearAxis, type Axis } from './axis';
import { ink } from './ink';
import { pictureWidth, type Picture } from './picture';
import { element, line, polyline, shortened, svgDocument, widthOf, words } from './svg';

/** Seconds and volts. */
export interface Waveforms {
  readonly from: string;
  readonly to: string;
  /** The one that counts first. */
  readonly curves: readonly Curve[];
  /** A peak; null where the receiver tolerates none, but an rms value. */
  readonly tolerates: number | null;
  /** What comes before it does not count; null where all does. */
  readonly countedFrom: number | null;
  /** How long was computed. */
  readonly until: number;
}

export interface Curve {
  readonly where: 'receiver' | 'near end' | 'far end';
  readonly times: ArrayLike<number>;
  readonly values: ArrayLike<number>;
}

const box = { left: 62, right: pictureWidth - 14, top: 36, bottom: 174 };
const styles = { receiver: { stroke: ink.good, 'stroke-width': 2.5 }, 'near end': { stroke: ink.second, 'stroke-width': 1.75, 'stroke-dasharray': '7 3' }, 'far end': { stroke: ink.third, 'stroke-width': 2.5, 'stroke-dasharray': '2 6' } } as const;

export function waveforms(given: Waveforms): Picture {
  const { curves, tolerates, countedFrom } = given;
  const end = endOf(given);
  const largest = Math.max(0, ...curves.map(({ values }) => extreme(values).size));
  // A limit far above all noise would make that a flat line: it is named at the edge instead.
  const seen = tolerates !== null && tolerates <= mostAbove * largest ? tolerates : null;
  const [low, high] = rangeOf(curves, seen);
  const x = linearAxis({ from: 0, to: end, pixels: [box.left, box.right], dimension: 'time' }, 74);
  const y = linearAxis({ from: low, to: high, pixels: [box.bottom, box.top], dimension: 'voltage' }, 32);
  const parts = [
    ...frame(x, y),
    ...(countedFrom === null ? [] : uncounted(x, Math.min(countedFrom, end))),
    ...(seen === null ? [] : [seen, -seen].filter((level) => low <= level && level <= high).map((level) => line([box.left, y.at(level)], [box.right, y.at(level)], { stroke: ink.limit, 'stroke-width': 1.75, 'stroke-dasharray': '6 3' }))),
    ...curves.map(({ where, times, values }) => polyline(drawnPoints({ times, values }, { x, y, end }), { ...styles[where], 'stroke-linejoin': 'round' })),
    ...peakMark(curves[0], x, y, end),
    ...legend(curves),
    ...(tolerates === null ? [] : [words(`tolerated ${inText(tolerates, 'voltage')}${seen === null ? ' ↑ above this picture' : ' (dashed)'}`, { x: box.right, y: box.top - 1 }, { 'text-anchor': 'end', fill: ink.limit, 'font-weight': 'bold' })]),
  ];
  return svgDocument({ width: pictureWidth, height: box.bottom + 24, words: inWords(given), parts });
}

const mostAbove = 4;

/** Where all has died down, or the end of what was computed. */
function endOf({ curves, until }: Waveforms): number {
  let last = 0;
  for (const { times, values } of curves) {
    const quiet = 0.03 * extreme(values).size;
    for (let index = 0; index < times.length; index += 1) if (quiet < Math.abs(values[index])) last = Math.max(last, times[Math.min(index + 1, times.length - 1)]);
  }
  const end = Math.min(until, 1.1 * last);
  return 0 < end && end < Infinity ? end : Math.max(until, 1e-12);
}

function rangeOf(curves: readonly Curve[], seen: number | null): readonly [number, number] {
  let [low, high] = [0, 0];
  for (const { values } of curves) for (let index = 0; index < values.length; index += 1) if (Number.isFinite(values[index])) [low, high] = [Math.min(low, values[index]), Math.max(high, values[index])];
  // The limit is drawn on the side that the noise goes to.
  if (seen !== null && -low <= high) high = Math.max(high, 1.12 * seen);
  if (seen !== null && high < -low) low = Math.min(low, -1.12 * seen);
  const margin = 0.08 * (high - low) || 1e-9;
  return [low === 0 ? 0 : low - margin, high === 0 ? 0 : high + margin];
}

function frame(x: Axis, y: Axis): readonly string[] {
  return [
    ...y.ticks.flatMap(({ value, label }) => [line([box.left, y.at(value)], [box.right, y.at(value)], { stroke: ink.grid }), words(label, { x: box.left - 6, y: y.at(value) + 4 }, { 'text-anchor': 'end' })]),
    ...x.ticks.flatMap(({ value, label }) => [line([x.at(value), box.bottom], [x.at(value), box.bottom + 4]), words(label, { x: Math.min(x.at(value), box.right - widthOf(label) / 2 + 10), y: box.bottom + 17 }, { 'text-anchor': 'middle' })]),
    line([box.left, box.bottom], [box.right, box.bottom]),
    line([box.left, box.top], [box.left, box.bottom]),
    line([box.left, y.at(0)], [box.right, y.at(0)]),
  ];
}

function uncounted(x: Axis, until: number): readonly string[] {
  const width = x.at(until) - box.left;
  return [element('rect', { x: box.left, y: box.top, width, height: box.bottom - box.top, fill: 'url(#barred)', 'fill-opacity': 0.5 }), ...(width < 90 ? [] : [words('does not count', { x: box.left + 5, y: box.bottom - 6 })])];
}

/** As many points as a line of this width can show. */
function drawnPoints({ times, values }: Pick<Curve, 'times' | 'values'>, { x, y, end }: { readonly x: Axis; readonly y: Axis; readonly end: number }): readonly (readonly [number, number])[] {
  const points: (readonly [number, number])[] = [];
  let kept: readonly [number, number] | null = null;
  for (let index = 0; index < times.length; index += 1) {
    const beyond = end < times[index];
    const before = Math.max(0, index - 1);
    const share = beyond && times[before] < times[index] ? (end - times[before]) / (times[index] - times[before]) : 1;
    const value = values[before] + share * (values[index] - values[before]);
    const point = [x.at(Math.min(times[index], end)), y.at(value)] as const;
    const far: boolean = kept === null || 0.6 < Math.hypot(point[0] - kept[0], point[1] - kept[1]) || beyond || index === times.length - 1;
    if (far && points.length < mostPoints) points.push((kept = point));
    if (beyond) break;
  }
  return points;
}

const mostPoints = 400;

function peakMark(curve: Curve | undefined, x: Axis, y: Axis, end: number): readonly string[] {
  if (curve === undefined) return [];
  const { time, value } = extreme(curve.values, curve.times);
  return end < time || value === 0 ? [] : [element('circle', { cx: x.at(time), cy: y.at(value), r: 4, fill: 'none', stroke: ink.good, 'stroke-width': 2 })];
}

function legend(curves: readonly Curve[]): readonly string[] {
  let at = 8;
  return curves.flatMap(({ where, values }) => {
    const text = `${where} ${inText(extreme(values).value, 'voltage')}`;
    const from = at;
    at += 32 + widthOf(text);
    return [line([from, 10], [from + 20, 10], styles[where]), words(text, { x: from + 24, y: 14 })];
  });
}

function extreme(values: ArrayLike<number>, times: ArrayLike<number> = values): { readonly value: number; readonly size: number; readonly time: number } {
  let best = 0;
  for (let index = 1; index < values.length; index += 1) if (Math.abs(values[best]) < Math.abs(values[index])) best = index;
  const value = values.length === 0 || !Number.isFinite(values[best]) ? 0 : values[best];
  return { value, size: Math.abs(value), time: times[best] ?? 0 };
}

function inWords(given: Waveforms): string {
  const { from, to, curves, tolerates, countedFrom, until } = given;
  const peaks = curves.map(({ where, times, values }) => {
    const { value, time } = extreme(values, times);
    return `peak of ${inText(value, 'voltage')} at the ${where} after ${inText(time, 'time')}`;
  });
  const limit = tolerates === null ? '' : `; ${inText(tolerates, 'voltage')} tolerated`;
  const late = countedFrom === null ? '' : ` What comes before ${inText(countedFrom, 'time')} does not count.`;
  return `What ${shortened(from, 60)} puts on ${shortened(to, 60)} over time: ${peaks.join(', ')}${limit}. Shown for ${inText(endOf(given), 'time')} of the ${inText(until, 'time')} computed.${late}`;
}
