/**
 * A quantity as a fix writes it into a file: spelt in the language's own ASCII units, three significant
 * figures, no trailing zeros. Reading it back gives the value that was rounded to.
 */
import type { Dimension } from './dimension';

export function inSource(value: number, dimension: Dimension): string {
  if (dimension === 'temperature') return `${threeFigures(value - 273.15)} degC`;
  const scales = sourceScales[dimension];
  // Three figures first: what rounds to 1 mm is written so, and not as 1000 um.
  const size = Math.abs(Number(value.toPrecision(3)));
  const scale = scales.find((each) => (size === 0 ? each.unit === 'mm' || each.size === 1 && dimension !== 'length' : each.from <= size * (1 + 1e-9))) ?? scales[scales.length - 1]!;
  return `${threeFigures(value / scale.size)}${scale.unit === '' ? '' : ` ${scale.unit}`}`;
}

interface Scale {
  readonly unit: string;
  readonly size: number;
  /** Used for values of at least this magnitude. */
  readonly from: number;
}

function threeFigures(value: number): string {
  return String(Number(value.toPrecision(3)));
}

/** Largest first. */
const sourceScales: Readonly<Record<Exclude<Dimension, 'temperature'>, readonly Scale[]>> = {
  // As on a drawing: 0.92 mm rather than 920 um.
  length: [{ unit: 'm', size: 1, from: 1 }, { unit: 'mm', size: 1e-3, from: 1e-4 }, { unit: 'um', size: 1e-6, from: 0 }],
  area: [{ unit: 'mm2', size: 1e-6, from: 0 }],
  time: prefixed('s', ['', 'm', 'u', 'n', 'p']),
  frequency: prefixed('Hz', ['G', 'M', 'k', '']),
  voltage: prefixed('V', ['k', '', 'm', 'u', 'n']),
  current: prefixed('A', ['', 'm', 'u', 'n']),
  resistance: prefixed('ohm', ['M', 'k', '', 'm']),
  capacitance: prefixed('F', ['u', 'n', 'p', 'f']),
  inductance: prefixed('H', ['m', 'u', 'n', 'p']),
  level: [{ unit: 'dB', size: 1, from: 0 }],
  fraction: [{ unit: '%', size: 0.01, from: 0 }],
  angle: [{ unit: 'deg', size: Math.PI / 180, from: 0 }],
  field: prefixed('V/m', ['k', '', 'm', 'u']),
  'voltage-noise': prefixed('V/rtHz', ['u', 'n']),
  'current-noise': prefixed('A/rtHz', ['n', 'p', 'f']),
  number: [{ unit: '', size: 1, from: 0 }],
};

function prefixed(symbol: string, prefixes: readonly string[]): readonly Scale[] {
  const powers: Readonly<Record<string, number>> = { G: 1e9, M: 1e6, k: 1e3, '': 1, m: 1e-3, u: 1e-6, n: 1e-9, p: 1e-12, f: 1e-15 };
  return prefixes.map((prefix) => ({ unit: prefix + symbol, size: powers[prefix]!, from: powers[prefix]! }));
}
