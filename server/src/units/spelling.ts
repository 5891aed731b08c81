/**
 * How units are written: every spelling that the language knows, what it measures, and what it is in SI.
 *
 * Names of nets may hold anything, units may not: a spelling means one unit of one dimension, case
 * included, so that a unit can be looked up before it is known which dimension is due.
 */
import type { Dimension } from './dimension';

export interface Unit {
  readonly spelling: string;
  readonly dimension: Dimension;
  /** SI value of a number as it stands in the text. */
  readonly inSi: (number: WrittenNumber) => number;
  /** Whether a band may be stated around a value in this unit; not on scales with a zero of their own or in decibels. */
  readonly toleranced: boolean;
}

/** `-0.20e3` as digits and exponent, kept apart so that a decimal prefix costs no rounding: 0.3 mm is 3e-4 m to the last bit. */
export interface WrittenNumber {
  readonly digits: string;
  readonly exponent: number;
}

/** Undefined where there is no such unit. */
export function unitSpelt(spelling: string): Unit | undefined {
  return units.get(spelling) ?? units.get(equalCodePoints(spelling));
}

/** Units of these dimensions that are this spelling but for the case, those in common use first; or of which it is only the prefix. */
export function unitsMeantBy(spelling: string, dimensions: readonly Dimension[]): readonly string[] {
  const written = equalCodePoints(spelling);
  const lower = written.toLowerCase();
  const fitting = dimensions.flatMap(fittingUnits).filter((each) => each.toLowerCase() === lower);
  if (0 < fitting.length) return fitting;
  const otherCase = [...units.values()].filter((each) => dimensions.includes(each.dimension) && each.spelling.toLowerCase() === lower).map((each) => each.spelling);
  if (0 < otherCase.length) return otherCase;
  return dimensions.flatMap(fittingUnits).filter((each) => written.length === 1 && each.startsWith(written) && prefixes.some(([prefix]) => prefix === written));
}

/** The units in common use, for messages and completion, the likeliest first. */
export function fittingUnits(dimension: Dimension): readonly string[] {
  return common[dimension];
}

/** `a length`, `an area`. */
export function dimensionInWords(dimension: Dimension): string {
  return inWords[dimension];
}

/** A quantity that an engineer could have meant: `0.2 mm`. */
export function exampleOf(dimension: Dimension): string {
  return examples[dimension];
}

/** U+03BC is U+00B5 is u, U+2126 is U+03A9: they look alike, and keyboards and fonts differ in which one they make. */
function equalCodePoints(spelling: string): string {
  return spelling.replace(/[\u00b5\u03bc]/g, 'u').replace(/\u2126/g, '\u03a9').replace(/\u00b2/g, '2');
}

/** The weight of copper as a thickness, `1 oz` of it to the square foot. */
export const copperWeight = 'oz';

const prefixes: readonly (readonly [string, number])[] = [['', 0], ['f', -15], ['p', -12], ['n', -9], ['u', -6], ['m', -3], ['k', 3], ['M', 6], ['G', 9], ['T', 12]];

const prefixed: readonly (readonly [string, Dimension])[] = [
  ['V', 'voltage'], ['A', 'current'], ['ohm', 'resistance'], ['\u03a9', 'resistance'], ['R', 'resistance'], ['F', 'capacitance'], ['H', 'inductance'],
  ['s', 'time'], ['Hz', 'frequency'], ['m', 'length'], ['K', 'temperature'], ['V/m', 'field'], ['V/rtHz', 'voltage-noise'], ['A/rtHz', 'current-noise'],
];

const powersOfTen: readonly (readonly [string, Dimension, number])[] = [['cm', 'length', -2], ['%', 'fraction', -2], ['mm2', 'area', -6], ['cm2', 'area', -4], ['m2', 'area', 0], ['dB', 'level', 0]];

const converted: readonly (readonly [string, Dimension, (value: number) => number])[] = [
  ['mil', 'length', (value) => value * 25.4e-6],
  ['in', 'length', (value) => value * 25.4e-3],
  [copperWeight, 'length', (value) => value * 35e-6],
  ['degC', 'temperature', (value) => value + 273.15],
  ['\u00b0C', 'temperature', (value) => value + 273.15],
  ['deg', 'angle', (value) => (value * Math.PI) / 180],
  ['\u00b0', 'angle', (value) => (value * Math.PI) / 180],
  // Decibels over 1 uV/m.
  ['dBuV/m', 'field', (value) => powerOfTen((value - 120) / 20)],
];

/** Whole powers as literals, which round once: 40 dBuV/m is 1e-4 V/m to the last bit. */
function powerOfTen(exponent: number): number {
  const whole = Math.floor(exponent);
  return Number(`1e${whole}`) * 10 ** (exponent - whole);
}

const untoleranced: ReadonlySet<string> = new Set(['degC', '\u00b0C', 'dB', 'dBuV/m']);

const units: ReadonlyMap<string, Unit> = new Map(
  [
    ...prefixed.flatMap(([symbol, dimension]) => prefixes.map(([prefix, power]) => unit(prefix + symbol, dimension, power))),
    ...powersOfTen.map(([spelling, dimension, power]) => unit(spelling, dimension, power)),
    ...converted.map(([spelling, dimension, convert]) => ({ ...unit(spelling, dimension, 0), inSi: (number: WrittenNumber) => convert(inPowerOfTen(number, 0)) })),
  ].map((each) => [each.spelling, each]),
);

function unit(spelling: string, dimension: Dimension, power: number): Unit {
  return { spelling, dimension, inSi: (number) => inPowerOfTen(number, power), toleranced: !untoleranced.has(spelling) };
}

/** Read as one literal: `Number` rounds once, a multiplication by the prefix would round again. */
export function inPowerOfTen(number: WrittenNumber, power: number): number {
  return Number(`${number.digits}e${number.exponent + power}`);
}

const common: Readonly<Record<Dimension, readonly string[]>> = {
  length: ['mm', 'um', 'mil', 'cm', 'in', 'm'],
  area: ['mm2', 'cm2', 'm2'],
  time: ['ns', 'us', 'ps', 's'],
  frequency: ['MHz', 'kHz', 'Hz', 'GHz'],
  voltage: ['V', 'mV', 'uV'],
  current: ['A', 'mA', 'uA'],
  resistance: ['ohm', 'kohm', 'Mohm', 'mohm'],
  capacitance: ['pF', 'nF', 'uF'],
  inductance: ['nH', 'uH', 'pH', 'mH'],
  temperature: ['degC', 'K'],
  level: ['dB'],
  fraction: ['%'],
  angle: ['deg'],
  field: ['V/m', 'mV/m', 'uV/m', 'dBuV/m'],
  'voltage-noise': ['nV/rtHz', 'uV/rtHz'],
  'current-noise': ['pA/rtHz', 'fA/rtHz'],
  number: [],
};

const inWords: Readonly<Record<Dimension, string>> = {
  length: 'a length', area: 'an area', time: 'a time', frequency: 'a frequency', voltage: 'a voltage', current: 'a current', resistance: 'a resistance',
  capacitance: 'a capacitance', inductance: 'an inductance', temperature: 'a temperature', level: 'a level', fraction: 'a percentage', angle: 'an angle',
  field: 'a field strength', 'voltage-noise': 'a noise voltage density', 'current-noise': 'a noise current density', number: 'a plain number',
};

const examples: Readonly<Record<Dimension, string>> = {
  length: '0.2 mm', area: '120 mm2', time: '40 ns', frequency: '20 MHz', voltage: '3.3 V', current: '20 mA', resistance: '50 ohm', capacitance: '10 pF',
  inductance: '5 nH', temperature: '25 degC', level: '6 dB', fraction: '50 %', angle: '90 deg', field: '3 V/m', 'voltage-noise': '5 nV/rtHz',
  'current-noise': '2 pA/rtHz', number: '4.2',
};
