import { describe, expect, it } from 'vitest';
import { SmoothingSpline } from '../../../pipeline/core/numeric/smoothing-spline.js';
import { column, type Matrix, solved, zeros } from './dense.js';
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

/** The spline's values at the points: with the p given, else with the likeliest. */
function smoothed(x: Float64Array, y: Float64Array, u: Float64Array, p?: number): Float64Array {
  const spline = new SmoothingSpline(x, u, x.length);
  const out = new Float64Array(x.length);
  spline.bend(p ?? spline.likeliest(y)).ordinates(y, out);
  return out;
}

/** -2 ln of the likelihood of the divided second differences under u and white noise of strength 2 p in g'', densely. */
function cost(x: ArrayLike<number>, y: ArrayLike<number>, u: ArrayLike<number>, p: number): number {
  const m = x.length - 2;
  const rows = Array.from({ length: m }, (_, j) => {
    const row = new Array<number>(x.length).fill(0);
    const left = 1 / (x[j + 1] - x[j]);
    const right = 1 / (x[j + 2] - x[j + 1]);
    row[j] = left;
    row[j + 1] = -left - right;
    row[j + 2] = right;
    return row;
  });
  // Each difference is the integral of g'' under a hat of height 1: 2 p times the hats' scalar products.
  const hats = (i: number, j: number): number => {
    if (i === j) return (x[i + 2] - x[i]) / 3;
    return Math.abs(i - j) === 1 ? (x[Math.max(i, j) + 1] - x[Math.max(i, j)]) / 6 : 0;
  };
  const covariance: Matrix = rows.map((a, i) =>
    rows.map((b, j) => a.reduce((s, v, k) => s + v * b[k] * u[k] ** 2, 0) + 2 * p * hats(i, j)),
  );
  const q = rows.map((row) => row.reduce((s, v, k) => s + v * y[k], 0));
  const z = solved(covariance, column(q)).map((row) => row[0]);
  return q.reduce((s, v, i) => s + v * z[i], 0) + logDeterminant(covariance);
}

/** By elimination; the matrix is positive definite. */
function logDeterminant(matrix: Matrix): number {
  const a = matrix.map((row) => row.slice());
  let sum = 0;
  for (let i = 0; i < a.length; i++) {
    sum += Math.log(a[i][i]);
    for (let k = i + 1; k < a.length; k++) {
      const factor = a[k][i] / a[i][i];
      for (let j = i; j < a.length; j++) a[k][j] -= factor * a[i][j];
    }
  }
  return sum;
}

describe('smoothing spline', () => {
  it('makes misfit and roughness together least: 400 random neighbours are all worse', () => {
    const n = 25;
    const { x, y, u } = sample(5, n);
    const p = new SmoothingSpline(x, u, n).likeliest(y);
    const g = smoothed(x, y, u, p);
    const worth = (curve: ArrayLike<number>): number => misfit(curve, y, u) + roughness(x, curve) / (2 * p);
    const best = worth(g);
    const { normal } = seeded(6);
    for (let trial = 0; trial < 400; trial++) {
      const size = 10 ** (-3 + (trial % 4));
      const other = g.map((v, i) => v + size * u[i] * normal());
      expect(worth(other)).toBeGreaterThan(best);
    }
  });

  it('satisfies the stationary equations: the residuals over u^2 are 1/(4 p) of the roughness gradient', () => {
    const n = 18;
    const { x, y, u } = sample(7, n);
    const p = new SmoothingSpline(x, u, n).likeliest(y);
    const g = smoothed(x, y, u, p);
    // Roughness is quadratic, so the central difference is its gradient but for rounding.
    const gradient = Array.from(g, (_, i) => {
      const up = g.slice();
      const down = g.slice();
      up[i] += 0.1;
      down[i] -= 0.1;
      return (roughness(x, up) - roughness(x, down)) / 0.2;
    });
    const pull = Array.from(g, (v, i) => (y[i] - v) / u[i] ** 2);
    const size = Math.max(...pull.map(Math.abs));
    for (let i = 0; i < n; i++) expect(Math.abs(pull[i] - gradient[i] / (4 * p))).toBeLessThan(1e-6 * size);
  });

  it('bends by what makes the points likeliest: a dense calculation of the likelihood finds no p that is much better', () => {
    for (const [seed, n] of [
      [1, 8],
      [2, 20],
      [3, 45],
    ]) {
      const { x, y, u } = sample(seed, n);
      const chosen = new SmoothingSpline(x, u, n).likeliest(y);
      const costs = Array.from({ length: 81 }, (_, k) => cost(x, y, u, chosen * Math.exp((k - 40) / 4)));
      // Within 0.3 of the least -2 ln L; a factor of e^4 off either way costs far more.
      expect(cost(x, y, u, chosen) - Math.min(...costs)).toBeLessThan(0.3);
      expect(Math.min(costs[24], costs[56]) - Math.min(...costs)).toBeGreaterThan(1);
    }
  });

  it('runs through the points when it may bend without bound, and is the weighted straight line when not at all', () => {
    const n = 12;
    const { x, y, u } = sample(8, n);
    const through = smoothed(x, y, u, 1e12);
    for (let i = 0; i < n; i++) expect(Math.abs(through[i] - y[i])).toBeLessThan(1e-6 * u[i]);
    // Weighted normal equations of a straight line, written out (common practice).
    const sum = (f: (i: number) => number): number => Array.from(u, (v, i) => f(i) / v ** 2).reduce((s, v) => s + v, 0);
    const [[a], [b]] = solved(
      [
        [sum(() => 1), sum((i) => x[i])],
        [sum((i) => x[i]), sum((i) => x[i] ** 2)],
      ],
      [[sum((i) => y[i])], [sum((i) => x[i] * y[i])]],
    );
    const straight = smoothed(x, y, u, 0);
    for (let i = 0; i < n; i++) expect(straight[i]).toBeCloseTo(a + b * x[i], 9);
  });

  it('leaves a straight row of points exactly where it is', () => {
    const u = Float64Array.of(1, 1, 1);
    expect(Array.from(smoothed(Float64Array.of(1, 2, 4), Float64Array.of(5, 7, 11), u))).toEqual([5, 7, 11]);
  });

  it('has about as many free parameters as it is told to: the trace of what it does to the points', () => {
    const n = 80;
    const x = Float64Array.from({ length: n }, (_, i) => 200 + 5 * i);
    const u = new Float64Array(n).fill(0.3);
    for (const parameters of [6, 12, 25]) {
      const spline = new SmoothingSpline(x, u, n);
      spline.bend(spline.bendingWithin(parameters));
      let trace = 0;
      const out = new Float64Array(n);
      for (let i = 0; i < n; i++) {
        const one = new Float64Array(n);
        one[i] = 1;
        spline.ordinates(one, out);
        trace += out[i];
      }
      // The ends, where the curve is freer, and the straight line come on top.
      expect(trace).toBeGreaterThan(parameters);
      expect(trace).toBeLessThan(parameters + 2);
    }
  });
});
