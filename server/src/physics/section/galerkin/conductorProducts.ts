/**
 * Charges of conductors from the solutions L Y = B: C = Y^T Y; and without planes, of charge-neutral states only.
 *
 * Model     without a plane the potential has no zero. A constant on every potential changes no charge-neutral state; one
 *           large enough makes A positive definite, and the projection C - (C 1)(C 1)^T / (1^T C 1) removes it
 * Source    Kelvin's and Thomson's theorems in any textbook
 * Accuracy  the constant is removed to 1e-15 times its size
 */
/** Of the first `to` entries of every row. */
export function innerProducts(rows: Float64Array, stride: number, to: number, count: number): Float64Array {
  const products = new Float64Array(count * count);
  for (let a = 0; a < count; a += 1) {
    for (let b = 0; b <= a; b += 1) {
      let sum = 0;
      for (let i = 0; i < to; i += 1) sum += rows[a * stride + i] * rows[b * stride + i];
      products[a * count + b] = products[b * count + a] = sum;
    }
  }
  return products;
}

/** The last row and column belong to all conductors at potential 1 together. */
export function neutral(products: Float64Array, count: number): Float64Array {
  const order = count - 1;
  const all = products[count * count - 1];
  const result = new Float64Array(order * order);
  for (let a = 0; a < order; a += 1) {
    for (let b = 0; b < order; b += 1) result[a * order + b] = products[a * count + b] - (products[a * count + order] * products[b * count + order]) / all;
  }
  return result;
}
