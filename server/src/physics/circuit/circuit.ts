/**
 * A small linear circuit: what links, loops and shared returns come down to.
 *
 *    shunt    node --+-- R, C across it -- ground        branch    from --\/\/-- L -- e(t) -- to,  coils may be coupled
 *
 * Model     lumped, linear, at rest at first. Node 0 is ground. A source is a voltage e(t) in a branch, positive from
 *           `from` to `to`, or a current that flows into a node
 * Formula   mass x' = stiffness x + forcing u(t);  x the voltages of the nodes, then the currents of the branches
 * Source    modified nodal analysis: Ho, Ruehli, Brennan, IEEE Trans. Circuits and Systems 22 (1975), from memory
 * Range     any R from 0 to Infinity, any C and L from 0
 */
import type { Capacitance, Inductance, Resistance } from '../../units/quantity';

export interface Circuit {
  /** Beside ground; numbered from 1. */
  readonly nodes: number;
  readonly shunts: readonly Shunt[];
  readonly branches: readonly Branch[];
  readonly mutuals: readonly Mutual[];
}

/** A resistance and a capacitance beside each other, between a node and another or ground. */
export interface Shunt {
  readonly node: number;
  readonly to: number;
  /** Infinity where there is none. Not 0: a short circuit is a branch. */
  readonly resistance: Resistance;
  readonly capacitance: Capacitance;
}

/** A resistance, a coil and a source in series. */
export interface Branch {
  readonly from: number;
  readonly to: number;
  readonly resistance: Resistance;
  readonly inductance: Inductance;
}

/**
 * What the current of one branch induces in another, by their numbers from 0; positive where a rising current in one drives the
 * other backwards, as in one coil. One way, so that a mutual can be stated where the coils are not known: coupled coils are two.
 */
export interface Mutual {
  readonly by: number;
  readonly into: number;
  readonly inductance: Inductance;
}

/** What moves the circuit: volts in a branch, or amperes into a node. */
export type Drive = { readonly kind: 'voltage'; readonly branch: number } | { readonly kind: 'current'; readonly node: number };

/** Row-major, `order` squared, in SI. */
export interface CircuitMatrices {
  readonly order: number;
  readonly mass: Float64Array;
  readonly stiffness: Float64Array;
}

export function circuitMatrices({ nodes, shunts, branches, mutuals }: Circuit): CircuitMatrices {
  const order = nodes + branches.length;
  const mass = new Float64Array(order * order);
  const stiffness = new Float64Array(order * order);
  const add = (matrix: Float64Array, row: number, column: number, value: number) => {
    if (0 <= row && 0 <= column) matrix[row * order + column] += value;
  };
  for (const { node, to, resistance, capacitance } of shunts) {
    for (const [a, b] of [[node, to], [to, node]]) {
      add(mass, a - 1, a - 1, capacitance);
      add(mass, a - 1, b - 1, -capacitance);
      add(stiffness, a - 1, a - 1, -1 / resistance);
      add(stiffness, a - 1, b - 1, 1 / resistance);
    }
  }
  branches.forEach(({ from, to, resistance, inductance }, index) => {
    const row = nodes + index;
    add(mass, row, row, inductance);
    add(stiffness, row, row, -resistance);
    add(stiffness, row, from - 1, 1);
    add(stiffness, row, to - 1, -1);
    add(stiffness, from - 1, row, -1);
    add(stiffness, to - 1, row, 1);
  });
  for (const { by, into, inductance } of mutuals) add(mass, nodes + into, nodes + by, inductance);
  return { order, mass, stiffness };
}

/** Of the equation that the drive stands in. */
export function drivenRow({ nodes }: Circuit, drive: Drive): number {
  return drive.kind === 'voltage' ? nodes + drive.branch : drive.node - 1;
}
