import { rmSync } from 'node:fs';
import { join } from 'node:path';
import { afterAll, beforeAll, describe, expect, it, vi } from 'vitest';
import { curvesOf, type Piece, valuesAt } from './curves.js';
import { isLimitOfGas, nameOf, printed, SOURCES } from './printed-rows.js';
import { makeRelease, temporaryFolder } from './release.js';

vi.setConfig({ testTimeout: 30_000, hookTimeout: 60_000 });

let folder: string;
let curves: Map<string, Piece[]>;
beforeAll(async () => {
  folder = temporaryFolder();
  curves = curvesOf((await makeRelease(SOURCES, join(folder, 'out'))).table('pieces'));
});
afterAll(() => rmSync(folder, { recursive: true, force: true }));

describe('the published curves', () => {
  it('keep Cp between two rows within the printed neighbours, up to the interpolation error', () => {
    const outside: string[] = [];
    let intervals = 0;
    for (const { name, run } of stretches()) {
      const pieces = curves.get(name)!;
      for (let i = 0; i + 1 < run.length; i++) {
        const [from, to] = [run[i]!, run[i + 1]!];
        const slack = slackOf(run, i);
        const low = Math.min(from.Cp, to.Cp) - slack;
        const high = Math.max(from.Cp, to.Cp) + slack;
        const inside = Array.from({ length: 19 }, (_, k) => from.T + ((to.T - from.T) * (k + 1)) / 20);
        const worst = inside.find((T) => {
          const { heatCapacity } = valuesAt(pieces, T);
          return !(heatCapacity >= low && heatCapacity <= high);
        });
        if (worst !== undefined)
          outside.push(`${name} ${worst} K: ${valuesAt(pieces, worst).heatCapacity} outside ${low} to ${high}`);
        intervals++;
      }
    }
    expect(intervals).toBeGreaterThan(1000);
    expect(outside).toEqual([]);
  });
});

interface Point {
  readonly T: number;
  readonly Cp: number;
  /** J/mol, from any zero. */
  readonly H: number;
}

/** Runs of printed rows of one phase that no temperature printed again interrupts. */
function stretches(): { name: string; run: Point[] }[] {
  const runs: { name: string; run: Point[]; at: string }[] = [];
  const enthalpy = new Map(
    printed
      .filter(({ quantity }) => quantity === 'enthalpy-increment' || quantity === 'enthalpy')
      .map((cell) => [`${cell.source}/${cell.file}:${cell.line}`, 1000 * cell.value]),
  );
  for (const cell of printed.filter(({ quantity }) => quantity === 'heat-capacity')) {
    if (isLimitOfGas(cell)) continue;
    const at = `${cell.source}/${cell.file} ${cell.place}`;
    const last = runs.at(-1);
    const point = {
      T: cell.temperatureK,
      Cp: cell.value,
      H: enthalpy.get(`${cell.source}/${cell.file}:${cell.line}`)!,
    };
    if (last?.at === at && point.T > last.run.at(-1)!.T + 0.01) last.run.push(point);
    else runs.push({ name: nameOf(cell), run: [point], at });
  }
  return runs.filter(({ run }) => run.length > 1);
}

/**
 * How far Cp may leave the two rows around interval i: what a curve of the rows' own curvature bulges, h² |Cp''| / 8; three
 * standard deviations of the two bumps a 6x(1 - x)/h and b 60x(1 - x)(1 - 2x)/h, 1.5 a/h and 5.77 b/h high, with
 * u(a) = 2 u(b) = e + 0.001 J/(mol K) h; and the bump that the printed H asks for. e is the interpolation error of the
 * integral, the larger change when every second row is left out.
 */
function slackOf(run: readonly Point[], i: number): number {
  const t = run.map(({ T }) => T);
  const y = run.map(({ Cp }) => Cp);
  const h = t[i + 1]! - t[i]!;
  const curvatures = [i - 1, i]
    .filter((k) => k >= 0 && k + 2 < t.length)
    .map((k) => {
      const right = (y[k + 2]! - y[k + 1]!) / (t[k + 2]! - t[k + 1]!);
      const left = (y[k + 1]! - y[k]!) / (t[k + 1]! - t[k]!);
      return Math.abs((2 * (right - left)) / (t[k + 2]! - t[k]!));
    });
  const bulge = (h * h * Math.max(0, ...curvatures)) / 8;
  const fine = integral(spline(t, y), t[i]!, t[i + 1]!);
  const coarse = [0, 1].map((parity) => {
    const kept = t.map((_, k) => k).filter((k) => k === 0 || k === t.length - 1 || k % 2 === parity);
    return integral(
      spline(
        kept.map((k) => t[k]!),
        kept.map((k) => y[k]!),
      ),
      t[i]!,
      t[i + 1]!,
    );
  });
  const e = Math.max(...coarse.map((value) => Math.abs(value - fine)));
  const asked = Math.abs(run[i + 1]!.H - run[i]!.H - fine);
  return bulge + 3 * Math.hypot(1.5, 5.77 / 2) * (e / h + 0.001) + (1.5 * asked) / h + 0.0005;
}

/** The cubic spline through the points (not-a-knot; a straight line through two, a parabola through three), as a function. */
function spline(x: readonly number[], y: readonly number[]): (at: number) => number {
  const n = x.length;
  const h = x.slice(1).map((next, i) => next - x[i]!);
  const d = y.slice(1).map((next, i) => (next - y[i]!) / h[i]!);
  const rows = x.map((_, i): number[] => {
    const row = new Array<number>(n + 1).fill(0);
    if (n === 2) {
      row[i] = 1;
      row[n] = d[0]!;
    } else if (i > 0 && i < n - 1) {
      row[i - 1] = 1 / h[i - 1]!;
      row[i] = 2 / h[i - 1]! + 2 / h[i]!;
      row[i + 1] = 1 / h[i]!;
      row[n] = 3 * (d[i - 1]! / h[i - 1]! + d[i]! / h[i]!);
    } else {
      // Three points: no third derivative; else it is the same on both sides of the second point, and of the last but one.
      const k = i === 0 ? 0 : n - 3;
      const outer = i === 0 ? k : k + 1;
      const inner = n === 3 ? -1 : i === 0 ? k + 1 : k;
      row[outer]! += 1 / h[outer]! ** 2;
      row[outer + 1]! += 1 / h[outer]! ** 2;
      row[n] = (2 * d[outer]!) / h[outer]! ** 2;
      if (inner >= 0) {
        row[inner]! -= 1 / h[inner]! ** 2;
        row[inner + 1]! -= 1 / h[inner]! ** 2;
        row[n]! -= (2 * d[inner]!) / h[inner]! ** 2;
      }
    }
    return row;
  });
  const slope = solve(rows);
  return (at) => {
    let i = 0;
    while (i < n - 2 && at > x[i + 1]!) i++;
    const u = at - x[i]!;
    const c2 = (3 * d[i]! - 2 * slope[i]! - slope[i + 1]!) / h[i]!;
    const c3 = (slope[i]! + slope[i + 1]! - 2 * d[i]!) / h[i]! ** 2;
    return y[i]! + u * (slope[i]! + u * (c2 + u * c3));
  };
}

/** Gauss-Jordan elimination with pivoting; the right-hand side stands in the last column. */
function solve(rows: number[][]): number[] {
  const n = rows.length;
  for (let k = 0; k < n; k++) {
    const best = rows.reduce((top, row, i) => (i >= k && Math.abs(row[k]!) > Math.abs(rows[top]![k]!) ? i : top), k);
    [rows[k], rows[best]] = [rows[best]!, rows[k]!];
    for (let i = 0; i < n; i++) {
      const times = rows[i]![k]! / rows[k]![k]!;
      if (i === k || times === 0) continue;
      for (let j = k; j <= n; j++) rows[i]![j]! -= times * rows[k]![j]!;
    }
  }
  return rows.map((row, i) => row[n]! / row[i]!);
}

/** By Simpson's rule on four panels; a thinned spline may change its cubic half-way. */
function integral(f: (x: number) => number, from: number, to: number): number {
  const h = (to - from) / 8;
  return (h / 3) * [1, 4, 2, 4, 2, 4, 2, 4, 1].reduce((sum, weight, k) => sum + weight * f(from + k * h), 0);
}
