import { describe, it } from 'node:test';
import assert from 'node:assert/strict';
import { productTransposed } from '../../server/src/numeric/productTransposed';
import { seeded } from '../support/seeded';

describe('A times B transposed', () => {
  it('is the sum over k of A[i, k] B[j, k], for every remainder of the tiles', () => {
    const next = seeded(3);
    for (let rows = 0; rows < 6; rows += 1) {
      for (let columns = 0; columns < 10; columns += 1) {
        const length = 1 + ((rows + columns) % 5);
        const a = Float64Array.from({ length: 2 + rows * length }, next);
        const b = Float64Array.from({ length: 3 + columns * length }, next);
        const out = new Float64Array(rows * columns + 1).fill(7);
        productTransposed(a, 2, b, 3, { rows, columns, length }, out);
        for (let i = 0; i < rows; i += 1) {
          for (let j = 0; j < columns; j += 1) {
            let sum = 0;
            for (let k = 0; k < length; k += 1) sum += a[2 + i * length + k] * b[3 + j * length + k];
            assert.ok(Math.abs(out[i * columns + j] - sum) < 1e-14);
          }
        }
        assert.equal(out[rows * columns], 7);
      }
    }
  });
});
