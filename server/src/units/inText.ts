/**
 * A quantity as messages, hovers and hints show it: three significant figures and the prefix that an
 * engineer would choose, `1.00 mV`, `40.0 ns`. Lengths and areas are written as on a drawing, in µm,
 * mm or m without trailing zeros: `0.92 mm`, not 920 µm.
 */
import type { Dimension } from './dimension';

export function inText(value: number, dimension: Dimension): string {
  if (!Number.isFinite(value)) return `${Number.isNaN(value) ? '?' : value < 0 ? '-∞' : '∞'}${tail(unitOfSi(dimension))}`;
  switch (dimension) {
    case 'length': return drawn(value, [[1e-4, 1e-6, 'µm'], [1, 1e-3, 'mm'], [Infinity, 1, 'm']]);
    case 'area': return drawn(value, [[1, 1e-6, 'mm²'], [Infinity, 1, 'm²']]);
    case 'temperature': return `${trimmed(rounded(value - 273.15, 1))} °C`;
    case 'level': return `${rounded(value, 1)} dB`;
    case 'fraction': return `${figures(value * 100)} %`;
    case 'angle': return `${figures((value * 180) / Math.PI)}°`;
    case 'number': return figures(value);
    default: return engineering(value, symbols[dimension]);
  }
}

/**
 * How far a value may be off, `± 0.045 %`: as a share of it in two figures, which reads at a glance and needs no second prefix; as a
 * quantity where it is larger than the value. No more than is worth a digit is said to be so.
 */
export function errorInText(error: number, value: number, dimension: Dimension): string {
  const share = 100 * Math.abs(error / value);
  if (!(share <= 100)) return `± ${inText(error, dimension)}`;
  return share < leastShare ? `± < ${leastShare} %` : `± ${Number(share.toPrecision(2))} %`;
}

/** Per cent: half of the last of three figures. */
const leastShare = 0.05;

const symbols = { time: 's', frequency: 'Hz', voltage: 'V', current: 'A', resistance: 'Ω', capacitance: 'F', inductance: 'H', field: 'V/m', 'voltage-noise': 'V/√Hz', 'current-noise': 'A/√Hz' } as const;

const prefixes: readonly string[] = ['f', 'p', 'n', 'µ', 'm', '', 'k', 'M', 'G', 'T'];

function engineering(value: number, symbol: string): string {
  if (value === 0) return `0 ${symbol}`;
  // The exponent is taken after rounding, so that 999.6 ns is 1.00 µs and not 1000 ns.
  const [mantissa, power] = value.toExponential(2).split('e') as [string, string];
  const group = Math.floor(Number(power) / 3);
  const prefix = prefixes[group + 5];
  if (prefix === undefined) return `${mantissa}e${Number(power)} ${symbol}`;
  const shift = Number(power) - 3 * group;
  return `${Number(`${mantissa}e${shift}`).toFixed(2 - shift)} ${prefix}${symbol}`;
}

/** `steps`: below the first number, in units of the second, written as the third. */
function drawn(value: number, steps: readonly (readonly [number, number, string])[]): string {
  if (value === 0) return `0 ${steps[steps.length - 2]![2]}`;
  // Half of the last of three figures: 99.97 µm rounds to 0.1 mm and is written so.
  const step = steps.find(([limit]) => Math.abs(value) * (1 + 5e-4) < limit) ?? steps[steps.length - 1]!;
  return `${figures(value / step[1])} ${step[2]}`;
}

/** Three significant figures, no trailing zeros; an exponent only where there would be a row of zeros. */
function figures(value: number): string {
  if (value === 0) return '0';
  const size = Math.abs(value);
  if (size < 1e-4 || 1e6 <= size) return value.toExponential(2).replace(/\.?0+e/, 'e').replace('e+', 'e');
  return String(Number(value.toPrecision(3)));
}

/** Never `-0.0`. */
function rounded(value: number, decimals: number): string {
  const text = value.toFixed(decimals);
  return Number(text) === 0 ? text.replace('-', '') : text;
}

function trimmed(text: string): string {
  return text.replace(/\.0+$/, '');
}

/** `V`, `m²`; nothing for a plain number. */
export function unitOfSi(dimension: Dimension): string {
  switch (dimension) {
    case 'length': return 'm';
    case 'area': return 'm²';
    case 'temperature': return '°C';
    case 'level': return 'dB';
    case 'fraction': return '%';
    case 'angle': return '°';
    case 'number': return '';
    default: return symbols[dimension];
  }
}

function tail(symbol: string): string {
  return symbol === '' || symbol === '°' ? symbol : ` ${symbol}`;
}
