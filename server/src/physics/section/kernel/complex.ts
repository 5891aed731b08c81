/** Complex numbers for building tables; the loops that use the tables spell real and imaginary parts out. */
export interface Complex {
  readonly re: number;
  readonly im: number;
}

export const complex = (re: number, im = 0): Complex => ({ re, im });
export const plus = (a: Complex, b: Complex): Complex => ({ re: a.re + b.re, im: a.im + b.im });
export const minus = (a: Complex, b: Complex): Complex => ({ re: a.re - b.re, im: a.im - b.im });
export const scaled = (a: Complex, factor: number): Complex => ({ re: a.re * factor, im: a.im * factor });
export const times = (a: Complex, b: Complex): Complex => ({ re: a.re * b.re - a.im * b.im, im: a.re * b.im + a.im * b.re });

export function over(a: Complex, b: Complex): Complex {
  const square = b.re * b.re + b.im * b.im;
  return { re: (a.re * b.re + a.im * b.im) / square, im: (a.im * b.re - a.re * b.im) / square };
}

export function exponential(a: Complex): Complex {
  const size = Math.exp(a.re);
  return size === 0 ? { re: 0, im: 0 } : { re: size * Math.cos(a.im), im: size * Math.sin(a.im) };
}

/** 1 - e^a, also where a is so small that e^a rounds to 1. */
export function oneMinusExponential(a: Complex): Complex {
  if (a.re === -Infinity) return { re: 1, im: 0 };
  const half = Math.sin(a.im / 2);
  return { re: 2 * half * half - Math.expm1(a.re) * Math.cos(a.im), im: -Math.exp(a.re) * Math.sin(a.im) };
}
