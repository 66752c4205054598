import { describe, expect, it } from 'vitest';
import { baseCurve } from '../../pipeline/assemble/base-curve.js';
import { knotsOf } from '../../pipeline/assemble/knots.js';
import { column, type Matrix, solved } from '../core/numeric/dense.js';
import { seriesOf } from './cases.js';

/**
 * Not-a-knot spline by truncated powers: 1, t, t^2, t^3 and (t - x_k)^3 above each inner knot but the second and the last but
 * one point, n functions through n points, solved densely. Returns the integral between two temperatures in closed form.
 */
function integralOfSpline(x: readonly number[], y: readonly number[]): (from: number, to: number) => number {
  const scale = x[x.length - 1] - x[0];
  const z = x.map((v) => (v - x[0]) / scale);
  const inner = z.slice(2, -2);
  const functions = [0, 1, 2, 3].map((k) => (t: number) => t ** k).slice(0, Math.min(4, x.length));
  for (const at of inner) functions.push((t) => Math.max(0, t - at) ** 3);
  const primitives = [0, 1, 2, 3].map((k) => (t: number) => t ** (k + 1) / (k + 1)).slice(0, Math.min(4, x.length));
  for (const at of inner) primitives.push((t) => Math.max(0, t - at) ** 4 / 4);
  const a: Matrix = z.map((t) => functions.map((f) => f(t)));
  const c = solved(a, column(y)).map((row) => row[0]);
  const total = (t: number): number => primitives.reduce((sum, f, k) => sum + c[k] * f((t - x[0]) / scale), 0) * scale;
  return (from, to) => total(to) - total(from);
}

const knots = (temperatureK: number[], values: number[], rest = {}) => {
  const k = knotsOf(seriesOf({ phase: 'cr', temperatureK, cp: { values, decimals: 6 }, ...rest }), []);
  if (k === null) throw new Error('no knots');
  return k;
};

describe('interpolation error of a table', () => {
  it('is the larger change of an interval when every second point is left out, both parities, ends kept', () => {
    const t = [200, 220, 250, 298.15, 300, 350, 400, 500, 600, 700, 820];
    const rows = knots(
      t,
      t.map((x) => 20 + 0.05 * x + 6 * Math.sin(x / 90)),
    );
    const cp = Array.from(rows.heatCapacity);
    const base = baseCurve(rows, null);
    const whole = integralOfSpline(t, cp);
    for (let i = 0; i + 1 < t.length; i++) {
      const changes = [0, 1].map((parity) => {
        const kept = t.map((_, k) => k).filter((k) => k === 0 || k === t.length - 1 || k % 2 === parity);
        const coarse = integralOfSpline(
          kept.map((k) => t[k]),
          kept.map((k) => cp[k]),
        );
        return Math.abs(coarse(t[i], t[i + 1]) - whole(t[i], t[i + 1]));
      });
      expect(base.errorJPerMol[i] / Math.max(...changes)).toBeCloseTo(1, 6);
    }
  });

  it('is nothing where Cp is a cubic, and a tenth of the change between two lone points', () => {
    const t = [200, 260, 300, 370, 400, 450, 520, 600, 640];
    const cubic = baseCurve(
      knots(
        t,
        t.map((x) => 20 + 0.05 * x - 1e-5 * x * x),
      ),
      null,
    );
    // The printed digits are left: 0.5e-6 J/(mol K) over some 60 K.
    for (const e of cubic.errorJPerMol) expect(e).toBeLessThan(1e-3);
    expect(baseCurve(knots([300, 350], [40, 42]), null).errorJPerMol[0]).toBeCloseTo(10, 9);
  });

  it('is worked out on each side of a row that is printed twice, for itself', () => {
    const low = [200, 250, 300, 350, 400];
    const high = [400, 450, 500, 550, 600];
    const f = (x: number): number => 20 + 8 * Math.sin(x / 60);
    const g = (x: number): number => 60 + 8 * Math.cos(x / 50);
    const both = baseCurve(knots([...low, ...high], [...low.map(f), ...high.map(g)]), null);
    const one = baseCurve(knots(low, low.map(f)), null);
    const two = baseCurve(knots(high, high.map(g)), null);
    expect(Array.from(both.errorJPerMol)).toEqual([...one.errorJPerMol, 0, ...two.errorJPerMol]);
  });
});

describe('rows as knots', () => {
  const NONE = Number.POSITIVE_INFINITY;

  it('rise in temperature, skip rows without Cp, and know what is printed where', () => {
    const k = knots([400, 300, 350], [44, 42, Number.NaN], {
      s: { values: [90, Number.NaN, 85], decimals: 2 },
      increment: { values: [5000, 1000, 3000], decimals: 1, factor: 1000 },
    });
    expect(Array.from(k.temperatureK)).toEqual([300, 400]);
    expect(Array.from(k.row)).toEqual([1, 0]);
    expect(Array.from(k.h)).toEqual([1000, 5000]);
    // Half a unit of the last place over root three: 50 J/mol and 0.005 J/(mol K).
    expect(Math.sqrt(k.hVar[0])).toBeCloseTo(50 / Math.sqrt(3), 9);
    expect(k.sVar[0]).toBe(NONE);
    expect(Math.sqrt(k.sVar[1])).toBeCloseTo(0.005 / Math.sqrt(3), 9);
    expect(k.absoluteH).toBe(false);
  });

  it('mark a second row at one temperature as the other side, with a jump only where H or S differ by more than rounding', () => {
    const make = (s: number) =>
      knots([300, 400, 400, 500], [40, 42, 50, 51], { s: { values: [80, 92, s, 100], decimals: 1 } });
    expect(Array.from(make(92).twin)).toEqual([0, 0, 1, 0]);
    expect(Array.from(make(92).jump)).toEqual([0, 0, 0, 0]);
    expect(Array.from(make(92.1).jump)).toEqual([0, 0, 0, 0]);
    expect(Array.from(make(92.4).jump)).toEqual([0, 0, 1, 0]);
    // A third row at one temperature has no side to stand on.
    expect(knots([300, 400, 400, 400, 500], [40, 42, 50, 60, 51]).n).toBe(4);
  });

  it('turn H and G from a declared zero into H and -G/T', () => {
    const k = knots([300, 400], [40, 40], {
      h: { values: [-1000, 3000], decimals: 0 },
      g: { values: [-30000, -40000], decimals: 0 },
    });
    expect(k.absoluteH).toBe(true);
    expect(Array.from(k.h)).toEqual([-1000, 3000]);
    expect(k.f[0]).toBeCloseTo(100, 12);
    expect(Math.sqrt(k.fVar[1])).toBeCloseTo(0.5 / Math.sqrt(3) / 400, 12);
  });

  it('are too few where fewer than two are left', () => {
    expect(knotsOf(seriesOf({ phase: 'cr', temperatureK: [300], cp: { values: [40], decimals: 1 } }), [])).toBeNull();
    expect(
      knotsOf(seriesOf({ phase: 'g', temperatureK: [0, 300], cp: { values: [0, 40], decimals: 1 } }), []),
    ).toBeNull();
  });
});
