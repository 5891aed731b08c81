/** Axes with ticks that a person would choose, in the unit that makes their numbers short. */
import { inText } from '../units/inText';
import type { Dimension } from '../units/dimension';

export interface Axis {
  readonly ticks: readonly Tick[];
  /** From the quantity to the picture. */
  at(value: number): number;
}

export interface Tick {
  readonly value: number;
  readonly label: string;
}

export interface AxisRange {
  readonly from: number;
  readonly to: number;
  /** Pixels that the ends stand at. */
  readonly pixels: readonly [number, number];
  readonly dimension: Dimension;
}

/** Ticks at 1, 2 or 5 times a power of ten; about one for each `apart` pixels. */
export function linearAxis({ from, to, pixels, dimension }: AxisRange, apart: number): Axis {
  const span = to - from;
  const wanted = Math.max(1, Math.abs(pixels[1] - pixels[0]) / apart);
  const step = niceStep(span / wanted);
  const ticks: Tick[] = [];
  for (let index = Math.ceil(from / step - 1e-9); index * step <= to + 1e-9 * span && ticks.length < mostTicks; index += 1) ticks.push(tick(index * step, dimension));
  return { ticks, at: (value) => pixels[0] + ((value - from) / span) * (pixels[1] - pixels[0]) };
}

/** Ticks at powers of ten, with 2 and 5 between where there is room; both ends above zero. */
export function logAxis({ from, to, pixels, dimension }: AxisRange, apart: number): Axis {
  const [low, high] = [Math.log10(from), Math.log10(to)];
  const perDecade = Math.abs(pixels[1] - pixels[0]) / (high - low);
  const steps = perDecade * 0.3 < apart ? [1] : [1, 2, 5];
  const every = Math.max(1, Math.ceil(apart / perDecade));
  const ticks: Tick[] = [];
  for (let decade = Math.floor(low); decade <= Math.ceil(high); decade += 1) {
    if (decade % every !== 0) continue;
    for (const step of steps) {
      const value = Number(`${step}e${decade}`);
      if (from * (1 - 1e-9) <= value && value <= to * (1 + 1e-9) && ticks.length < mostTicks) ticks.push(tick(value, dimension));
    }
  }
  return { ticks, at: (value) => pixels[0] + ((Math.log10(value) - low) / (high - low)) * (pixels[1] - pixels[0]) };
}

const mostTicks = 40;

export function niceStep(least: number): number {
  if (!(0 < least && least < Infinity)) return 1;
  const power = Math.floor(Math.log10(least));
  const mantissa = least / 10 ** power;
  const step = mantissa <= 1.0001 ? 1 : mantissa <= 2 ? 2 : mantissa <= 5 ? 5 : 10;
  return Number(`${step}e${power}`);
}

/** `0.50 mV` says no more than `0.5 mV`: a tick is exact. */
function tick(value: number, dimension: Dimension): Tick {
  return { value, label: inText(Number(value.toPrecision(9)), dimension).replace(/(\.\d*?)0+(?=\D)/, '$1').replace(/\.(?=\D)/, '') };
}
