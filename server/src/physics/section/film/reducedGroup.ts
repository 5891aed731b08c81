/**
 * The few charges of a group that others cause, and the few tests of it that others notice.
 */
import { productTransposed } from '../../../numeric/productTransposed';
import { pivotedBasis } from '../galerkin/pivotedBasis';
import type { GroupRow } from './groupedCharge';

export interface ReducedGroup {
  readonly fine: ReducedSeries;
  readonly coarse: ReducedSeries;
  /** Tests of this group on charges of a neighbour, of which `across` says what they make here, one row for each. */
  readonly between: (which: 'fine' | 'coarse', across: Float64Array, neighbour: ReducedGroup) => Float64Array;
}

export interface ReducedSeries {
  readonly count: number;
  /** count × length, orthonormal. */
  readonly basis: Float64Array;
  readonly length: number;
  /** count × points: of the charges at the skeleton's points, and of potentials there. */
  readonly charges: Float64Array;
  readonly tests: Float64Array;
  readonly driven: Float64Array;
  readonly collected: Float64Array;
}

/** What a neighbour's charge of 1, in its own coordinates, has to make here to matter. */
const least = 1e-3;

export function reducedGroup(row: GroupRow, g: number): ReducedGroup {
  const { unknowns, coarse } = row.groups[g];
  const all = joined([row.driven[g], row.collected[g], ...neighbours(row, g, 'caused'), farAnswers(row, g, 'rows'), ...neighbours(row, g, 'noticed'), farAnswers(row, g, 'charges')]);
  const fine = seriesOf(row, g, all, unknowns);
  const coarseSeries = seriesOf(row, g, all, coarse);
  return {
    fine, coarse: coarseSeries,
    between: (which, across, neighbour) => {
      const [own, other] = [which === 'fine' ? fine : coarseSeries, neighbour[which]];
      const half = new Float64Array(own.count * other.length);
      for (let c = 0; c < own.count; c += 1) {
        for (let n = 0; n < other.length; n += 1) {
          let sum = 0;
          for (let m = 0; m < own.length; m += 1) sum += own.basis[c * own.length + m] * across[n * unknowns + m];
          half[c * other.length + n] = sum;
        }
      }
      const block = new Float64Array(own.count * other.count);
      productTransposed(half, 0, other.basis, 0, { rows: own.count, columns: other.count, length: other.length }, block);
      return block;
    },
  };
}

/** Vectors of this group's unknowns, one for each of a neighbour's, as large as the neighbour's is likely to be. */
function neighbours(row: GroupRow, g: number, which: 'caused' | 'noticed'): Float64Array[] {
  const found: Float64Array[] = [];
  for (const h of [g - 1, g + 1]) {
    if (h in row.groups) found.push(scaledRows(acrossOf(row, g, h, which), likely(row, h, which)));
  }
  return found;
}

/** To fields of far charges, and how such would notice it. */
function farAnswers({ groups, skeletons }: GroupRow, g: number, which: 'rows' | 'charges'): Float64Array {
  const { unknowns } = groups[g];
  const { points, fields } = skeletons[g];
  const count = fields.length / points;
  const answers = new Float64Array(count * unknowns);
  productTransposed(fields.map((value) => value * farLikely), 0, flipped(skeletons[g][which], points), 0, { rows: count, columns: unknowns, length: points }, answers);
  return answers;
}

/** Beside a conductor's own charge: what far ones leave of a field after the plane's image. */
const farLikely = 0.1;

/** What each unknown of `h` causes in `g`, or notices of it: one row for each. */
function acrossOf({ groups, fromLeft, fromRight }: GroupRow, g: number, h: number, which: 'caused' | 'noticed'): Float64Array {
  if (which === 'caused') return g < h ? fromRight[g] : fromLeft[h];
  return flipped(g < h ? fromLeft[g] : fromRight[h], groups[g].unknowns);
}

/** Sizes of a group's unknowns when its own conductor, or one beside it, is driven; or of what its tests are worth. */
function likely(row: GroupRow, g: number, which: 'caused' | 'noticed'): Float64Array {
  const sources = which === 'caused' ? row.driven : row.collected;
  const sizes = sources[g].map(Math.abs);
  for (const h of [g - 1, g + 1]) {
    if (!(h in row.groups)) continue;
    const across = acrossOf(row, g, h, which);
    const caused = new Float64Array(sizes.length);
    sources[h].forEach((value, n) => {
      for (let m = 0; m < caused.length; m += 1) caused[m] += value * across[n * caused.length + m];
    });
    caused.forEach((value, m) => { sizes[m] = Math.max(sizes[m], Math.abs(value)); });
  }
  const floor = unlikely * sizes.reduce((most, size) => Math.max(most, size), 0);
  return sizes.map((size) => size + floor);
}

/** Of the largest: no unknown is thought to be smaller. */
const unlikely = 1e-4;

function scaledRows(values: Float64Array, scales: Float64Array): Float64Array {
  const columns = values.length / scales.length;
  return values.map((value, at) => value * scales[Math.floor(at / columns)]);
}

function flipped(values: Float64Array, rows: number): Float64Array {
  const columns = values.length / rows;
  const result = new Float64Array(values.length);
  for (let i = 0; i < rows; i += 1) for (let j = 0; j < columns; j += 1) result[j * rows + i] = values[i * columns + j];
  return result;
}

function joined(parts: readonly Float64Array[]): Float64Array {
  const all = new Float64Array(parts.reduce((sum, { length }) => sum + length, 0));
  let at = 0;
  for (const part of parts) {
    all.set(part, at);
    at += part.length;
  }
  return all;
}

function seriesOf(row: GroupRow, g: number, all: Float64Array, length: number): ReducedSeries {
  const { unknowns, conductor } = row.groups[g];
  const { points, charges, rows } = row.skeletons[g];
  const basis = basisOf(all, unknowns, length, least / 3 ** (row.context.conductors[conductor].effort - 1));
  const count = basis.length / length;
  const series = { count, basis, length, charges: new Float64Array(count * points), tests: new Float64Array(count * points), driven: new Float64Array(count), collected: new Float64Array(count) };
  productTransposed(basis, 0, leading(charges, points, unknowns, length), 0, { rows: count, columns: points, length }, series.charges);
  productTransposed(basis, 0, leading(rows, points, unknowns, length), 0, { rows: count, columns: points, length }, series.tests);
  productTransposed(basis, 0, row.driven[g], 0, { rows: count, columns: 1, length }, series.driven);
  productTransposed(basis, 0, row.collected[g], 0, { rows: count, columns: 1, length }, series.collected);
  return series;
}

function leading(values: Float64Array, rows: number, stride: number, length: number): Float64Array {
  const result = new Float64Array(rows * length);
  for (let i = 0; i < rows; i += 1) result.set(values.subarray(i * stride, i * stride + length), i * length);
  return result;
}

/** Orthonormal; holds the first two vectors, whatever the others are. */
function basisOf(all: Float64Array, stride: number, length: number, tolerance: number): Float64Array {
  const vectors = longVectors(all, stride, length, tolerance);
  const count = vectors.length / length;
  // So that they are taken first.
  for (let m = 0; m < 2 * length; m += 1) vectors[m] *= 1e3;
  const { pivots } = pivotedBasis([{ vectors, count, length }], tolerance, length);
  const basis = new Float64Array(pivots.length * length);
  pivots.forEach((v, c) => basis.set(vectors.subarray(v * length, (v + 1) * length), c * length));
  return basis;
}

/** The first `length` entries of those that may matter: most of what a neighbour might do is too little. */
function longVectors(all: Float64Array, stride: number, length: number, tolerance: number): Float64Array {
  const vectors = new Float64Array((all.length / stride) * length);
  let to = 0;
  for (let from = 0; from < all.length; from += stride) {
    let square = 0;
    for (let m = 0; m < length; m += 1) square += all[from + m] * all[from + m];
    if (0 < from && square < tolerance * tolerance) continue;
    vectors.set(all.subarray(from, from + length), to);
    to += length;
  }
  return vectors.subarray(0, to);
}
