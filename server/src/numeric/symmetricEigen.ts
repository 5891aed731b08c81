/**
 * All eigenvalues and eigenvectors of a symmetric matrix.
 *
 * Row-major; the argument is left as it is. Values ascend; vector k is the column k of `vectors`, so that
 * A = V diag(values) V^T with V orthogonal.
 *
 * Method    cyclic Jacobi rotations until the off-diagonal part is below rounding
 * Source    Jacobi 1846; Golub & Van Loan, from memory
 * Accuracy  values to 1e-15 of the largest; small ones of a graded positive definite matrix to their own digits.
 *           Meant for orders up to about 50.
 */
export interface Eigen {
  readonly values: Float64Array;
  readonly vectors: Float64Array;
}

export function symmetricEigen(matrix: Float64Array, order: number): Eigen {
  const a = Float64Array.from(matrix);
  const vectors = new Float64Array(order * order);
  for (let i = 0; i < order; i += 1) vectors[i * order + i] = 1;
  for (let sweep = 0; rotateAll(a, vectors, order); sweep += 1) {
    if (sweep === 60) throw new Error(`Jacobi rotations do not converge at order ${order}`);
  }
  const columns = Array.from({ length: order }, (_, i) => i).sort((i, j) => a[i * order + i] - a[j * order + j]);
  const sorted = new Float64Array(order * order);
  for (let i = 0; i < order; i += 1) {
    for (let k = 0; k < order; k += 1) sorted[i * order + k] = vectors[i * order + columns[k]];
  }
  return { values: Float64Array.from(columns, (k) => a[k * order + k]), vectors: sorted };
}

/** One sweep; true while any rotation was worth making. */
function rotateAll(a: Float64Array, vectors: Float64Array, order: number): boolean {
  let rotated = false;
  for (let p = 0; p < order - 1; p += 1) {
    for (let q = p + 1; q < order; q += 1) {
      const apq = a[p * order + q];
      const app = a[p * order + p];
      const aqq = a[q * order + q];
      // Relative to its own two diagonal entries: keeps the digits of small eigenvalues of a graded matrix.
      const negligible = Number.EPSILON * Math.sqrt(Math.abs(app)) * Math.sqrt(Math.abs(aqq));
      if (Math.abs(apq) <= negligible || Math.abs(apq) < Number.MIN_VALUE * 4) continue;
      rotated = true;
      const theta = (aqq - app) / (2 * apq);
      const tangent = Math.abs(theta) < 1e150 ? (theta < 0 ? -1 : 1) / (Math.abs(theta) + Math.hypot(theta, 1)) : 0.5 / theta;
      const cosine = 1 / Math.hypot(tangent, 1);
      const sine = tangent * cosine;
      a[p * order + p] = app - tangent * apq;
      a[q * order + q] = aqq + tangent * apq;
      a[p * order + q] = 0;
      a[q * order + p] = 0;
      for (let i = 0; i < order; i += 1) {
        if (i !== p && i !== q) {
          const aip = a[i * order + p];
          const aiq = a[i * order + q];
          a[i * order + p] = a[p * order + i] = cosine * aip - sine * aiq;
          a[i * order + q] = a[q * order + i] = sine * aip + cosine * aiq;
        }
        const vip = vectors[i * order + p];
        const viq = vectors[i * order + q];
        vectors[i * order + p] = cosine * vip - sine * viq;
        vectors[i * order + q] = sine * vip + cosine * viq;
      }
    }
  }
  return rotated;
}
