/**
 * The E24 series of preferred numbers, in which resistors are sold.
 *
 * Source  IEC 60063, from memory
 */
export const e24 = [1, 1.1, 1.2, 1.3, 1.5, 1.6, 1.8, 2, 2.2, 2.4, 2.7, 3, 3.3, 3.6, 3.9, 4.3, 4.7, 5.1, 5.6, 6.2, 6.8, 7.5, 8.2, 9.1] as const;

/** The first so many of the series that are not below the value. */
export function e24From(value: number, count: number): readonly number[] {
  if (!(0 < value) || value === Infinity) return [];
  const power = Math.floor(Math.log10(value));
  // By text: 4.7 times a power of ten is not always the number that one writes.
  const series = [power, power + 1, power + 2].flatMap((exponent) => e24.map((digits) => Number(`${digits}e${exponent}`)));
  return series.filter((each) => value <= each * (1 + 1e-9)).slice(0, count);
}
