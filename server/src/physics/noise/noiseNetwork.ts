/**
 * A small network of resistances and capacitances, and a reading of it: a weighted sum of the voltages of its nodes.
 *
 *    node 1 --+--[ R‖C ]--+-- node 2      Model     linear; node 0 is ground; a resistance of 0 joins two nodes
 *             |           |               Method    nodal equations, solved once for the reading: reciprocity makes that one answer
 *            R‖C         R‖C                        the transfer from a current into any node
 *    ground --+-----------+--             Formula   (G + j w C) u = weights;  u_k is the reading for 1 A into node k,
 *                                                   u_a - u_b that for 1 A from b to a
 * Source    circuit theory; reciprocity of passive networks
 * Range     R from 0 to Infinity, C from 0      Accuracy  rounding
 */
import { complexLuFactor, complexLuSolve, type ComplexNumbers } from '../../numeric/complexLu';
import type { Frequency } from '../../units/quantity';
import type { Shunt } from '../circuit/circuit';

export interface NetworkReading {
  /** Beside ground; numbered from 1. */
  readonly nodes: number;
  /** Here a resistance may be 0. */
  readonly shunts: readonly Shunt[];
  /** Of node 1, 2, … */
  readonly weights: readonly number[];
}

/** Transfer impedances, ohm, from a current into node 1, 2, … to the reading; they hold until the next call. Null where nothing holds a node. */
export function readingResponse(reading: NetworkReading): (frequency: Frequency) => ComplexNumbers | null {
  const { nodes, shunts, weights } = reading;
  if (nodes === 2) return twoNodeResponse(reading);
  const conductance = nodalMatrix(nodes, shunts, ({ resistance }) => 1 / resistance);
  const capacitance = nodalMatrix(nodes, shunts, (shunt) => shunt.capacitance);
  return (frequency) => {
    const angular = 2 * Math.PI * frequency;
    const matrix = { real: conductance.slice(), imaginary: capacitance.map((value) => angular * value) };
    const exchanged = complexLuFactor(matrix, nodes);
    if (exchanged === null) return null;
    const answer = { real: Float64Array.from(weights), imaginary: new Float64Array(nodes) };
    complexLuSolve(matrix, exchanged, answer);
    return answer;
  };
}

/**
 * The case of a pair, ten times as fast: u1 = (w1 y2 + (w1 + w2) yx) / D, u2 = (w2 y1 + (w1 + w2) yx) / D, D = y1 y2 + yx (y1 + y2), y1 and y2 to
 * ground and yx between. Written in these, a strong yx takes no digits from a difference.
 */
function twoNodeResponse({ shunts, weights }: NetworkReading): (frequency: Frequency) => ComplexNumbers | null {
  const between = (a: number, b: number) => shunts.filter(({ node, to }) => Math.min(node, to) === a && Math.max(node, to) === b)
    .reduce((sum, { resistance, capacitance }) => ({ g: sum.g + 1 / resistance, c: sum.c + capacitance }), { g: 0, c: 0 });
  const [one, two, across] = [between(0, 1), between(0, 2), between(1, 2)];
  const [w1, w2] = [weights[0]!, weights[1]!];
  const both = w1 + w2;
  const answer = { real: new Float64Array(2), imaginary: new Float64Array(2) };
  return (frequency) => {
    const w = 2 * Math.PI * frequency;
    const [b1, b2, bx] = [w * one.c, w * two.c, w * across.c];
    const dr = one.g * two.g - b1 * b2 + across.g * (one.g + two.g) - bx * (b1 + b2);
    const di = one.g * b2 + b1 * two.g + across.g * (b1 + b2) + bx * (one.g + two.g);
    const square = dr * dr + di * di;
    if (!(0 < square && square < Infinity)) return null;
    const [r1, i1] = [w1 * two.g + both * across.g, w1 * b2 + both * bx];
    const [r2, i2] = [w2 * one.g + both * across.g, w2 * b1 + both * bx];
    answer.real[0] = (r1 * dr + i1 * di) / square;
    answer.imaginary[0] = (i1 * dr - r1 * di) / square;
    answer.real[1] = (r2 * dr + i2 * di) / square;
    answer.imaginary[1] = (i2 * dr - r2 * di) / square;
    return answer;
  };
}

/** Row-major, ground left out. */
export function nodalMatrix(nodes: number, shunts: readonly Shunt[], admittance: (shunt: Shunt) => number): Float64Array {
  const matrix = new Float64Array(nodes * nodes);
  for (const shunt of shunts) {
    const value = admittance(shunt);
    const [a, b] = [shunt.node - 1, shunt.to - 1];
    if (0 <= a) matrix[a * nodes + a]! += value;
    if (0 <= b) matrix[b * nodes + b]! += value;
    if (0 <= a && 0 <= b) {
      matrix[a * nodes + b]! -= value;
      matrix[b * nodes + a]! -= value;
    }
  }
  return matrix;
}

/** `nodeAt`: the node's number in what is left; 0 where it became ground. */
export interface Merged extends NetworkReading {
  readonly nodeAt: readonly number[];
}

/** The same network with the ends of some shunts made one node. */
export function mergedAcross(reading: NetworkReading, joins: (shunt: Shunt) => boolean): Merged {
  const roots = joinedNodes(reading, joins);
  const numbers = new Map([...new Set(roots)].map((root, at) => [root, at]));
  const nodeAt = roots.map((root) => numbers.get(root)!);
  const weights = new Array<number>(numbers.size - 1).fill(0);
  reading.weights.forEach((weight, at) => {
    const node = nodeAt[at + 1]!;
    if (node !== 0) weights[node - 1]! += weight;
  });
  const shunts = reading.shunts.map((shunt) => ({ ...shunt, node: nodeAt[shunt.node]!, to: nodeAt[shunt.to]! })).filter(({ node, to }) => node !== to);
  return { nodes: weights.length, shunts, weights, nodeAt };
}

/** Of ground, node 1, 2, …: the lowest node that each is joined with. */
export function joinedNodes({ nodes, shunts }: NetworkReading, joins: (shunt: Shunt) => boolean): readonly number[] {
  const roots = Array.from({ length: nodes + 1 }, (_, node) => node);
  const rootOf = (node: number): number => (roots[node] === node ? node : rootOf(roots[node]!));
  for (const shunt of shunts) {
    if (!joins(shunt)) continue;
    const [a, b] = [rootOf(shunt.node), rootOf(shunt.to)];
    roots[Math.max(a, b)] = Math.min(a, b);
  }
  return roots.map((_, node) => rootOf(node));
}

/** Parts that share nothing but ground: their noises are unrelated, and a part of one node has closed forms. */
export function unrelatedParts(reading: NetworkReading): readonly Merged[] {
  const whole = mergedAcross(reading, ({ resistance }) => resistance === 0);
  const roots = joinedNodes(whole, ({ node, to }) => node !== 0 && to !== 0);
  return [...new Set(roots)].filter((root) => root !== 0).map((root) => {
    const members = roots.flatMap((each, node) => (each === root ? [node] : []));
    const inPart = (node: number) => members.indexOf(node) + 1;
    return {
      nodes: members.length,
      shunts: whole.shunts.filter(({ node, to }) => roots[node] === root || roots[to] === root).map((shunt) => ({ ...shunt, node: inPart(shunt.node), to: inPart(shunt.to) })),
      weights: members.map((node) => whole.weights[node - 1]!),
      nodeAt: whole.nodeAt.map(inPart),
    };
  });
}
