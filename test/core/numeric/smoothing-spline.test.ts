import { describe, expect, it } from 'vitest';
import { smoothedOrdinates } from '../../../pipeline/core/numeric/smoothing-spline.js';
import { column, solved, zeros } from './dense.js';
import { seeded } from './random.js';

/** Integral of g''^2 of the natural cubic spline through (x, g): second derivatives by a dense solve, exact on each interval. */
function roughness(x: ArrayLike<number>, g: ArrayLike<number>): number {
  const n = x.length;
  const a = zeros(n, n);
  const b = new Array<number>(n).fill(0);
  a[0][0] = 1;
  a[n - 1][n - 1] = 1;
  for (let i = 1; i < n - 1; i++) {
    const hl = x[i] - x[i - 1];
    const hr = x[i + 1] - x[i];
    a[i][i - 1] = hl / 6;
    a[i][i] = (hl + hr) / 3;
    a[i][i + 1] = hr / 6;
    b[i] = (g[i + 1] - g[i]) / hr - (g[i] - g[i - 1]) / hl;
  }
  const m = solved(a, column(b)).map((row) => row[0]);
  let sum = 0;
  for (let i = 0; i < n - 1; i++) sum += ((x[i + 1] - x[i]) * (m[i] ** 2 + m[i] * m[i + 1] + m[i + 1] ** 2)) / 3;
  return sum;
}

function misfit(g: ArrayLike<number>, y: ArrayLike<number>, u: ArrayLike<number>): number {
  let sum = 0;
  for (let i = 0; i < g.length; i++) sum += ((g[i] - y[i]) / u[i]) ** 2;
  return sum;
}

/** Bent data with scatter, on uneven points with uneven uncertainties. */
function sample(seed: number, n: number): { x: Float64Array; y: Float64Array; u: Float64Array } {
  const { unit, normal } = seeded(seed);
  const x = new Float64Array(n);
  const u = new Float64Array(n);
  for (let i = 0; i < n; i++) {
    x[i] = (i === 0 ? 20 : x[i - 1]) + 2 + 8 * unit();
    u[i] = 0.1 + 0.4 * unit();
  }
  const y = x.map((t, i) => 30 + 12 * Math.sin(t / 35) + 0.02 * t + u[i] * normal());
  return { x, y, u };
}

describe('smoothing spline', () => {
  it("meets Reinsch's condition: the weighted sum of squares is the number of points, within 1e-4 of it", () => {
    for (const [seed, n] of [
      [1, 8],
      [2, 20],
      [3, 75],
      [4, 300],
    ]) {
      const { x, y, u } = sample(seed, n);
      const ratio = misfit(smoothedOrdinates(x, y, u, n), y, u) / n;
      expect(ratio).toBeLessThanOrEqual(1 + 1e-9);
      expect(ratio).toBeGreaterThan(1 - 1e-4);
    }
  });

  it('is smoother than any other curve that keeps the condition: 400 random neighbours are all rougher', () => {
    const n = 25;
    const { x, y, u } = sample(5, n);
    const g = smoothedOrdinates(x, y, u, n);
    const best = roughness(x, g);
    const { normal } = seeded(6);
    for (let trial = 0; trial < 400; trial++) {
      const size = 10 ** (-3 + (trial % 4));
      const other = g.map((v, i) => v + size * u[i] * normal());
      // Drawn back towards the points until the sum of squares is n again.
      const scale = Math.sqrt(n / misfit(other, y, u));
      const allowed = other.map((v, i) => y[i] + scale * (v - y[i]));
      expect(misfit(allowed, y, u)).toBeCloseTo(n, 8);
      expect(roughness(x, allowed)).toBeGreaterThan(best * (1 - 1e-4));
    }
  });

  it('satisfies the stationary equations: the residuals over u^2 are one multiple of the roughness gradient', () => {
    const n = 18;
    const { x, y, u } = sample(7, n);
    const g = smoothedOrdinates(x, y, u, n);
    // Roughness is quadratic, so the central difference is its gradient but for rounding.
    const gradient = Array.from(g, (_, i) => {
      const up = g.slice();
      const down = g.slice();
      up[i] += 0.1;
      down[i] -= 0.1;
      return (roughness(x, up) - roughness(x, down)) / 0.2;
    });
    const pull = Array.from(g, (v, i) => (y[i] - v) / u[i] ** 2);
    const factor =
      pull.reduce((s, p, i) => s + p * gradient[i], 0) / gradient.reduce((s, value) => s + value * value, 0);
    expect(factor).toBeGreaterThan(0);
    const size = Math.max(...pull.map(Math.abs));
    for (let i = 0; i < n; i++) expect(Math.abs(pull[i] - factor * gradient[i])).toBeLessThan(1e-6 * size);
  });

  it('is the weighted straight line where the points lie on one within their uncertainties', () => {
    const n = 12;
    const { unit, normal } = seeded(8);
    const x = Float64Array.from({ length: n }, (_, i) => 10 * i + 3 * unit());
    const u = Float64Array.from({ length: n }, () => 0.2 + unit());
    const y = x.map((t, i) => 5 + 0.3 * t + 0.4 * u[i] * normal());
    // Weighted normal equations of a straight line, written out (common practice).
    const sum = (f: (i: number) => number): number => Array.from(u, (v, i) => f(i) / v ** 2).reduce((s, v) => s + v, 0);
    const [[a], [b]] = solved(
      [
        [sum(() => 1), sum((i) => x[i])],
        [sum((i) => x[i]), sum((i) => x[i] ** 2)],
      ],
      [[sum((i) => y[i])], [sum((i) => x[i] * y[i])]],
    );
    const g = smoothedOrdinates(x, y, u, n);
    expect(misfit(g, y, u)).toBeLessThan(n);
    for (let i = 0; i < n; i++) expect(g[i]).toBeCloseTo(a + b * x[i], 9);
  });

  it('leaves fewer than three points alone, and a straight row of points exactly where it is', () => {
    const u = Float64Array.of(1, 1, 1);
    expect(Array.from(smoothedOrdinates(Float64Array.of(1, 2), Float64Array.of(5, 9), u, 2))).toEqual([5, 9]);
    expect(Array.from(smoothedOrdinates(Float64Array.of(1, 2, 4), Float64Array.of(5, 7, 11), u, 3))).toEqual([
      5, 7, 11,
    ]);
  });
});
