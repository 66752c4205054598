import { describe, expect, it } from 'vitest';
import { factorise, whiten } from '../../../pipeline/core/numeric/cholesky.js';
import { column, type Matrix, product, solved, transposed } from './dense.js';
import { seeded } from './random.js';

const flat = (a: Matrix): Float64Array => Float64Array.from(a.flat());

function positiveDefinite(n: number, seed: number): Matrix {
  const { normal } = seeded(seed);
  const b = Array.from({ length: n }, () => Array.from({ length: n }, normal));
  return product(b, transposed(b)).map((row, i) => row.map((v, j) => v + (i === j ? 0.1 : 0)));
}

describe('Cholesky factor', () => {
  it('is that of the usual textbook matrix (common practice, no source)', () => {
    const a = Float64Array.of(4, 12, -16, 12, 37, -43, -16, -43, 98);
    expect(factorise(a, 3)).toBe(true);
    expect([a[0], a[3], a[4], a[6], a[7], a[8]]).toEqual([2, 6, 1, -8, 5, 3]);
  });

  it('multiplies back to the matrix', () => {
    for (const n of [1, 2, 5, 20]) {
      const a = positiveDefinite(n, n);
      const l = flat(a);
      expect(factorise(l, n)).toBe(true);
      const lower = a.map((row, i) => row.map((_, j) => (j <= i ? l[i * n + j] : 0)));
      const again = product(lower, transposed(lower));
      for (let i = 0; i < n; i++) for (let j = 0; j < n; j++) expect(again[i][j]).toBeCloseTo(a[i][j], 11);
    }
  });

  it('whitens a vector to its length under the inverse', () => {
    const n = 8;
    const a = positiveDefinite(n, 77);
    const { normal } = seeded(78);
    const b = Float64Array.from({ length: n }, normal);
    const x = solved(a, column(b)).map((row) => row[0]);
    const l = flat(a);
    factorise(l, n);
    const z = b.slice();
    whiten(l, n, z);
    const square = z.reduce((sum, v) => sum + v * v, 0);
    expect(square).toBeCloseTo(
      b.reduce((sum, v, i) => sum + v * x[i], 0),
      9,
    );
  });

  it('says no where the matrix is indefinite, singular or broken', () => {
    expect(factorise(Float64Array.of(1, 2, 2, 1), 2)).toBe(false);
    expect(factorise(Float64Array.of(1, 1, 1, 1), 2)).toBe(false);
    expect(factorise(Float64Array.of(Number.NaN), 1)).toBe(false);
  });
});
