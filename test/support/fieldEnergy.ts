/**
 * Capacitance of a cross-section from the energy of its field: finite elements on a grid that follows the outlines. A second
 * opinion for tests: it shares neither code nor method with the product.
 *
 * Model     electrostatic, conductors and planes equipotential, sides and open top or bottom without flux (far away)
 * Method    linear triangles on a product grid whose columns lean with trapezoidal traces; cells crowd at every corner; the
 *           matrix is solved by a banded Cholesky factorisation; C_ij = eps0 v_i' K v_j, whose error is of second order
 *           in that of the potentials v; two grids, the finer of half the spacing, extrapolated with order 2
 * Source    textbook (Zienkiewicz, The Finite Element Method; Richardson 1911), from memory
 * Accuracy  `error`, relative to the largest entry: a quarter of the step of the extrapolation, at least `floor` (0.1 to 0.5 % with nine
 *           cells a stretch). On the reference sections the truth lay within an eighth of that step
 */
export interface FieldSection {
  /** y of the planes; null where the section is open. */
  readonly bottom: number | null;
  readonly top: number | null;
  readonly layers: readonly { readonly y0: number; readonly y1: number; readonly er: number }[];
  /** Painted over the layers. */
  readonly patches?: readonly { readonly x0: number; readonly x1: number; readonly y0: number; readonly y1: number; readonly er: number }[];
  readonly conductors: readonly FieldConductor[];
}

export interface FieldConductor {
  /** The face at y0 spans x0 to x1, that at y1 is shorter by `inset` at either side (longer where below zero). */
  readonly x0: number; readonly x1: number; readonly y0: number; readonly y1: number;
  readonly inset?: number;
  readonly grounded?: boolean;
}

export interface FieldCapacitance {
  readonly matrix: readonly (readonly number[])[];
  readonly error: number;
}

const eps0 = 8.8541878128e-12;
const floor = 5e-4;

export function fieldCapacitance(section: FieldSection, cells = 9): FieldCapacitance {
  const coarse = onGrid(section, cells);
  const fine = onGrid(section, 2 * cells);
  const matrix = fine.map((row, i) => row.map((value, j) => value + (value - coarse[i]![j]!) / 3));
  const largest = Math.max(...matrix.flat().map(Math.abs));
  const step = Math.max(...matrix.flatMap((row, i) => row.map((value, j) => Math.abs(value - fine[i]![j]!))));
  return { matrix, error: Math.max(floor, step / largest / 4) };
}

/** The same in air, for the inductance. */
export function fieldCapacitanceInAir(section: FieldSection, cells?: number): FieldCapacitance {
  return fieldCapacitance({ ...section, layers: [], patches: [] }, cells);
}

interface Grid { readonly nx: number; readonly ny: number; readonly x: Float64Array; readonly y: Float64Array }

function onGrid(section: FieldSection, cells: number): number[][] {
  const grid = gridOf(section, cells);
  const { nx, ny } = grid;
  const owner = ownersOf(section, grid);
  const triangles = trianglesOf(section, grid);
  const width = ny + 2;
  const band = new Float64Array(nx * ny * width);
  for (const { nodes, k } of triangles) {
    for (let a = 0; a < 3; a += 1) for (let b = 0; b < 3; b += 1) {
      if (owner[nodes[a]!] === free && owner[nodes[b]!] === free && nodes[b]! <= nodes[a]!) band[nodes[a]! * width + nodes[a]! - nodes[b]!]! += k[a * 3 + b]!;
    }
  }
  for (let node = 0; node < nx * ny; node += 1) if (owner[node] !== free) band[node * width] = 1;
  factorise(band, nx * ny, width);
  const driven = section.conductors.flatMap(({ grounded }, index) => (grounded === true ? [] : [index]));
  const potentials = driven.map((index) => {
    const v = Float64Array.from(owner, (own) => (own === index ? 1 : 0));
    const right = new Float64Array(nx * ny);
    for (const { nodes, k } of triangles) for (let a = 0; a < 3; a += 1) if (owner[nodes[a]!] === free) for (let b = 0; b < 3; b += 1) right[nodes[a]!]! -= k[a * 3 + b]! * v[nodes[b]!]!;
    solve(band, width, right);
    return v.map((value, node) => (owner[node] === free ? right[node]! : value));
  });
  return potentials.map((one) => potentials.map((other) => {
    let sum = 0;
    for (const { nodes, k } of triangles) for (let a = 0; a < 3; a += 1) for (let b = 0; b < 3; b += 1) sum += one[nodes[a]!]! * k[a * 3 + b]! * other[nodes[b]!]!;
    return eps0 * sum;
  }));
}

const free = -1;
const plane = -2;

/** Columns pass through every corner and lean with the flanks; nodes are numbered along y first. */
function gridOf(section: FieldSection, cells: number): Grid {
  const { conductors, layers, patches = [], bottom, top } = section;
  const marks = [...conductors.flatMap(({ x0, x1, y0, y1, inset = 0 }) => [{ foot: x0, head: x0 + inset, y0, y1 }, { foot: x1, head: x1 - inset, y0, y1 }]), ...patches.flatMap(({ x0, x1 }) => [{ foot: x0, head: x0, y0: 0, y1: 1 }, { foot: x1, head: x1, y0: 0, y1: 1 }])].sort((a, b) => a.foot - b.foot);
  const columns = marks.filter((mark, at) => at === 0 || 1e-10 < mark.foot - marks[at - 1]!.foot);
  const ys = [...conductors, ...layers, ...patches].flatMap(({ y0, y1 }) => [y0, y1]).concat(bottom ?? [], top ?? []).sort((a, b) => a - b).filter((y, at, all) => at === 0 || 1e-10 < y - all[at - 1]!).filter((y) => (bottom ?? -Infinity) <= y && y <= (top ?? Infinity));
  const size = 60 * Math.max(columns.at(-1)!.foot - columns[0]!.foot, ys.at(-1)! - ys[0]!);
  const yLines = [...(bottom === null ? outwards(cells).map((u) => ys[0]! - size * u).reverse() : []), ...between(ys, cells), ...(top === null ? outwards(cells).map((u) => ys.at(-1)! + size * u) : [])];
  const at = ({ foot, head, y0, y1 }: (typeof columns)[number], y: number) => foot + (head - foot) * Math.min(Math.max((y - y0) / (y1 - y0), 0), 1);
  const rows = yLines.map((y) => {
    const edges = columns.map((column) => at(column, y));
    return [...outwards(cells).map((u) => edges[0]! - size * u).reverse(), ...between(edges, cells), ...outwards(cells).map((u) => edges.at(-1)! + size * u)];
  });
  const [nx, ny] = [rows[0]!.length, yLines.length];
  return { nx, ny, x: Float64Array.from({ length: nx * ny }, (_, node) => rows[node % ny]![Math.floor(node / ny)]!), y: Float64Array.from({ length: nx * ny }, (_, node) => yLines[node % ny]!) };
}

/** Crowded at both ends, where the corners are: with the field's r^(2/3) there, second order comes back. */
function between(edges: readonly number[], cells: number): readonly number[] {
  return edges.flatMap((edge, k) => (k === 0 ? [edge] : Array.from({ length: cells }, (_, n) => {
    const u = (n + 1) / cells;
    return edges[k - 1]! + (edge - edges[k - 1]!) * (u ** 2 / (u ** 2 + (1 - u) ** 2));
  })));
}

function outwards(cells: number): readonly number[] {
  return Array.from({ length: 2 * cells }, (_, n) => ((n + 1) / (2 * cells)) ** 5);
}

function ownersOf({ conductors, bottom, top }: FieldSection, { x, y }: Grid): Int32Array {
  const small = 1e-11;
  return Int32Array.from(x, (here, node) => {
    const high = y[node]!;
    if ((bottom !== null && high <= bottom + small) || (top !== null && top - small <= high)) return plane;
    const found = conductors.findIndex(({ x0, x1, y0, y1, inset = 0 }) => {
      const cut = inset * ((high - y0) / (y1 - y0));
      return y0 - small <= high && high <= y1 + small && x0 + cut - small <= here && here <= x1 - cut + small;
    });
    return found < 0 ? free : conductors[found]!.grounded === true ? plane : found;
  });
}

interface Triangle { readonly nodes: readonly [number, number, number]; readonly k: Float64Array }

function trianglesOf({ layers, patches = [] }: FieldSection, { nx, ny, x, y }: Grid): readonly Triangle[] {
  const er = (cx: number, cy: number) => (patches.find(({ x0, x1, y0, y1 }) => x0 < cx && cx < x1 && y0 < cy && cy < y1) ?? layers.find(({ y0, y1 }) => y0 < cy && cy < y1))?.er ?? 1;
  const triangles: Triangle[] = [];
  for (let i = 0; i + 1 < nx; i += 1) for (let j = 0; j + 1 < ny; j += 1) {
    const [a, b, c, d] = [i * ny + j, (i + 1) * ny + j, (i + 1) * ny + j + 1, i * ny + j + 1] as const;
    for (const nodes of [[a, b, c], [a, c, d]] as const) {
      const [p, q, r] = nodes;
      const by = [y[q]! - y[r]!, y[r]! - y[p]!, y[p]! - y[q]!];
      const cx = [x[r]! - x[q]!, x[p]! - x[r]!, x[q]! - x[p]!];
      const twice = (x[q]! - x[p]!) * (y[r]! - y[p]!) - (x[r]! - x[p]!) * (y[q]! - y[p]!);
      const weight = er((x[p]! + x[q]! + x[r]!) / 3, (y[p]! + y[q]! + y[r]!) / 3) / (2 * twice);
      triangles.push({ nodes, k: Float64Array.from({ length: 9 }, (_, n) => weight * (by[Math.floor(n / 3)]! * by[n % 3]! + cx[Math.floor(n / 3)]! * cx[n % 3]!)) });
    }
  }
  return triangles;
}

/** In place; band[n * width + m] holds the entry of row n, column n - m. */
function factorise(band: Float64Array, size: number, width: number): void {
  for (let n = 0; n < size; n += 1) {
    const first = Math.max(0, n - width + 1);
    for (let m = first; m <= n; m += 1) {
      let sum = band[n * width + n - m]!;
      const from = Math.max(first, m - width + 1);
      for (let k = from; k < m; k += 1) sum -= band[n * width + n - k]! * band[m * width + m - k]!;
      if (m < n) band[n * width + n - m] = sum / band[m * width]!;
      else if (0 < sum) band[n * width] = Math.sqrt(sum);
      else throw new Error(`the energy of node ${n} is ${sum}`);
    }
  }
}

function solve(band: Float64Array, width: number, right: Float64Array): void {
  for (let n = 0; n < right.length; n += 1) {
    for (let m = Math.max(0, n - width + 1); m < n; m += 1) right[n]! -= band[n * width + n - m]! * right[m]!;
    right[n]! /= band[n * width]!;
  }
  for (let n = right.length - 1; 0 <= n; n -= 1) {
    right[n]! /= band[n * width]!;
    for (let m = Math.max(0, n - width + 1); m < n; m += 1) right[m]! -= band[n * width + n - m]! * right[n]!;
  }
}
