/**
 * What the dielectrics and planes above and below do to a wave e^(±ky) cos(kx) of the potential.
 *
 *     plane or open            Model    planar layers, each permittivity constant; planes at zero potential
 *   ------------- top          Method   z = potential / (flux / k) seen from an interface outwards, carried inwards
 *     layer i, e   source        layer by layer; every quotient below has only sums of positive terms for real
 *   ------------- bottom         k > 0, so that nothing cancels as k goes to 0
 *     plane or open
 *
 *   Formula   z <- (z + tanh(kh)/e) / (1 + z e tanh(kh)), from 0 on a plane or 1/e in an open outermost layer
 *             a = e z(below), b = e z(above), E = e^(-2kd), N = (ab + 1)(1 - E) + (a + b)(1 + E)
 *             R1 = (a-1)(b+1)/N, R2 = (a+1)(b-1)/N, R3 = (a-1)(b-1) E/N: images below, above and both, for a
 *             source and an observer in one layer of thickness d
 *             T = (1/e_i) (a+1)(b+1)/N times 2 b (b'+1) / ((b+1)(b'(1+E') + 1 - E')) for each layer entered going up
 *   Symbols   k wave number (1/unit of length), h thickness, e relative permittivity; primes: the layer entered
 *   Source    Yamashita & Mittra 1968 for the spectral potential of layers; Silvester 1968 gives one interface over
 *             a plane as image charges, which the test compares with
 *   Range     Re k > 0 (no poles there), and real k from 1e-7 of 1/height on
 */
import { complex, exponential, minus, oneMinusExponential, over, plus, scaled, times, type Complex } from './complex';
import type { Stack, StackLayer } from './stack';

const one = complex(1);
const zero = complex(0);

/** 1 - e^(-2kh); 1 for an unbounded layer. */
const doubleCrossingLoss = (k: Complex, { bottom, top }: StackLayer) => oneMinusExponential({ re: -2 * k.re * (top - bottom), im: bounded(-2 * k.im * (top - bottom)) });
const doubleCrossing = (k: Complex, { bottom, top }: StackLayer) => exponential({ re: -2 * k.re * (top - bottom), im: bounded(-2 * k.im * (top - bottom)) });
const bounded = (angle: number) => (Number.isFinite(angle) ? angle : 0);

/** z seen from the upper face of layer `index` upwards. */
export function impedanceAbove({ layers, planeAbove }: Stack, index: number, k: Complex): Complex {
  if (index === layers.length - 1) return planeAbove ? zero : complex(1 / layers[index].permittivity);
  let z = planeAbove ? zero : complex(1 / layers[layers.length - 1].permittivity);
  for (let i = layers.length - 1; index < i; i -= 1) z = carried(z, layers[i], k);
  return z;
}

/** z seen from the lower face of layer `index` downwards. */
export function impedanceBelow({ layers, planeBelow }: Stack, index: number, k: Complex): Complex {
  let z = planeBelow ? zero : complex(1 / layers[0].permittivity);
  for (let i = 0; i < index; i += 1) z = carried(z, layers[i], k);
  return z;
}

function carried(z: Complex, layer: StackLayer, k: Complex): Complex {
  const loss = doubleCrossingLoss(k, layer);
  const tangent = over(loss, minus(complex(2), loss));
  return over(plus(z, scaled(tangent, 1 / layer.permittivity)), plus(one, scaled(times(z, tangent), layer.permittivity)));
}

export interface SameLayerSpectra {
  readonly below: Complex;
  readonly above: Complex;
  readonly both: Complex;
}

/** R1, R2, R3 of layer `index`. */
export function sameLayerSpectra(stack: Stack, index: number, k: Complex): SameLayerSpectra {
  const layer = stack.layers[index];
  const a = scaled(impedanceBelow(stack, index, k), layer.permittivity);
  const b = scaled(impedanceAbove(stack, index, k), layer.permittivity);
  const loss = doubleCrossingLoss(k, layer);
  const n = denominator(a, b, loss);
  const lower = minus(a, one);
  const upper = minus(b, one);
  return {
    below: over(times(lower, plus(b, one)), n),
    above: over(times(plus(a, one), upper), n),
    // E afresh: 1 - loss has lost the digits of a small E, and the remainder's table multiplies it by 1/E.
    both: over(times(times(lower, upper), doubleCrossing(k, layer)), n),
  };
}

export interface CrossLayerSpectra {
  /** T, and T times the reflection below the source, above the observer, and both. */
  readonly through: Complex;
  readonly below: Complex;
  readonly above: Complex;
  readonly both: Complex;
}

/** Source in layer `lower`, observer in the layer `upper` above it. */
export function crossLayerSpectra(stack: Stack, lower: number, upper: number, k: Complex): CrossLayerSpectra {
  const { layers } = stack;
  const a = scaled(impedanceBelow(stack, lower, k), layers[lower].permittivity);
  let b = scaled(impedanceAbove(stack, lower, k), layers[lower].permittivity);
  let through = over(times(plus(a, one), plus(b, one)), scaled(denominator(a, b, doubleCrossingLoss(k, layers[lower])), layers[lower].permittivity));
  for (let i = lower + 1; i <= upper; i += 1) {
    const next = scaled(impedanceAbove(stack, i, k), layers[i].permittivity);
    const loss = doubleCrossingLoss(k, layers[i]);
    const entered = plus(times(next, minus(complex(2), loss)), loss);
    through = times(through, over(scaled(times(b, plus(next, one)), 2), times(plus(b, one), entered)));
    b = next;
  }
  const below = times(through, over(minus(a, one), plus(a, one)));
  const reflectedAbove = over(minus(b, one), plus(b, one));
  return { through, below, above: times(through, reflectedAbove), both: times(below, reflectedAbove) };
}

/** N, with 1 - E handed in. */
function denominator(a: Complex, b: Complex, loss: Complex): Complex {
  return plus(times(plus(times(a, b), one), loss), times(plus(a, b), minus(complex(2), loss)));
}
