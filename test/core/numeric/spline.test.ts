import { describe, expect, it } from 'vitest';
import { cubicValue } from '../../../pipeline/core/numeric/cubic.js';
import { notAKnotSpline } from '../../../pipeline/core/numeric/spline.js';
import { column, type Matrix, solved, zeros } from './dense.js';
import { seeded } from './random.js';

function spline(x: readonly number[], y: readonly number[]): number[][] {
  const n = x.length;
  const c = [0, 1, 2, 3].map(() => new Float64Array(Math.max(0, n - 1)));
  notAKnotSpline(Float64Array.from(x), Float64Array.from(y), n, c[0], c[1], c[2], c[3]);
  return Array.from({ length: n - 1 }, (_, i) => c.map((a) => a[i]));
}

/**
 * The definition itself as 4(n - 1) equations, solved densely: each cubic meets both of its points, neighbours share slope
 * and curvature, and at the second and the last but one point the third derivative too (de Boor 1978, chapter IV).
 */
function byDefinition(x: readonly number[], y: readonly number[]): number[][] {
  const m = x.length - 1;
  const a: Matrix = [];
  const b: number[] = [];
  const equation = (entries: [number, number][], value: number): void => {
    const row = zeros(1, 4 * m)[0];
    for (const [at, v] of entries) row[at] += v;
    a.push(row);
    b.push(value);
  };
  for (let i = 0; i < m; i++) {
    const h = x[i + 1] - x[i];
    const k = 4 * i;
    equation([[k, 1]], y[i]);
    equation(
      [
        [k, 1],
        [k + 1, h],
        [k + 2, h * h],
        [k + 3, h ** 3],
      ],
      y[i + 1],
    );
    if (i === m - 1) continue;
    equation(
      [
        [k + 1, 1],
        [k + 2, 2 * h],
        [k + 3, 3 * h * h],
        [k + 5, -1],
      ],
      0,
    );
    equation(
      [
        [k + 2, 2],
        [k + 3, 6 * h],
        [k + 6, -2],
      ],
      0,
    );
    if (i === 0 || i === m - 2)
      equation(
        [
          [k + 3, 1],
          [k + 7, -1],
        ],
        0,
      );
  }
  const flat = solved(a, column(b)).map((row) => row[0]);
  return Array.from({ length: m }, (_, i) => flat.slice(4 * i, 4 * i + 4));
}

describe('not-a-knot spline', () => {
  it('reproduces a cubic exactly, on uneven points', () => {
    const cubic = (t: number): number => 3 - 2 * t + 0.7 * t * t - 0.05 * t ** 3;
    const x = [0, 0.3, 1, 1.1, 2.5, 4, 7];
    const pieces = spline(x, x.map(cubic));
    for (let i = 0; i < pieces.length; i++) {
      for (const share of [0, 0.25, 0.5, 0.9]) {
        const t = share * (x[i + 1] - x[i]);
        const [c0, c1, c2, c3] = pieces[i];
        expect(cubicValue(c0, c1, c2, c3, t)).toBeCloseTo(cubic(x[i] + t), 11);
      }
      expect(pieces[i][3]).toBeCloseTo(-0.05, 10);
    }
  });

  it('agrees with its definition solved as a dense system, on random uneven points', () => {
    const { unit, normal } = seeded(11);
    for (const n of [5, 6, 9, 17]) {
      const x = [200];
      for (let i = 1; i < n; i++) x.push(x[i - 1] + 1 + 30 * unit());
      const y = x.map((t) => 25 + 0.01 * t + normal());
      const ours = spline(x, y);
      const theirs = byDefinition(x, y);
      for (let i = 0; i < n - 1; i++) {
        const h = x[i + 1] - x[i];
        for (let k = 0; k < 4; k++) expect(Math.abs(ours[i][k] - theirs[i][k]) * h ** k).toBeLessThan(1e-8);
      }
    }
  });

  it('has an error of fourth order: halving the spacing divides it by nearly sixteen', () => {
    const error = (n: number): number => {
      const x = Array.from({ length: n }, (_, i) => (3 * i) / (n - 1));
      const pieces = spline(x, x.map(Math.exp));
      let worst = 0;
      for (let i = 0; i < n - 1; i++) {
        const h = x[i + 1] - x[i];
        const [c0, c1, c2, c3] = pieces[i];
        worst = Math.max(worst, Math.abs(cubicValue(c0, c1, c2, c3, h / 2) - Math.exp(x[i] + h / 2)));
      }
      return worst;
    };
    const ratio = error(41) / error(81);
    expect(ratio).toBeGreaterThan(14);
    expect(ratio).toBeLessThan(18);
  });

  it('draws one cubic through four points, a parabola through three, a line through two and nothing through one', () => {
    // Lagrange through (0,1), (1,3), (3,-2), (4,0), written out by divided differences: 1, 2, -3/2, 3/4.
    const newton = (t: number): number => 1 + 2 * t - 1.5 * t * (t - 1) + 0.75 * t * (t - 1) * (t - 3);
    for (const [i, [c0, c1, c2, c3]] of spline([0, 1, 3, 4], [1, 3, -2, 0]).entries()) {
      const low = [0, 1, 3][i];
      for (const t of [0, 0.4, 1]) expect(cubicValue(c0, c1, c2, c3, t)).toBeCloseTo(newton(low + t), 12);
    }
    expect(spline([1, 2, 4], [1, 4, 16])).toEqual([
      [1, 2, 1, 0],
      [4, 4, 1, 0],
    ]);
    expect(spline([300, 400], [25, 27])).toEqual([[25, 0.02, 0, 0]]);
    expect(spline([300], [25])).toEqual([]);
  });

  it('is not disturbed by a longer spline before it, whose room it may reuse', () => {
    const x = Array.from({ length: 700 }, (_, i) => i);
    const short = spline([0, 1, 3, 4, 6], [1, 3, -2, 0, 5]);
    spline(x, x.map(Math.cos));
    expect(spline([0, 1, 3, 4, 6], [1, 3, -2, 0, 5])).toEqual(short);
  });
});
