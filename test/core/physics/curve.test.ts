import { describe, expect, it } from 'vitest';
import { enthalpyAt, entropyAt, gibbsAt, heatCapacityAt, intervalOf } from '../../../pipeline/core/physics/curve.js';
import { integral } from '../numeric/quadrature.js';
import { type Cubic, curveOf } from './curves.js';

const KNOTS = [15, 60, 200, 298.15, 500, 500, 900];
const CUBICS: Cubic[] = [
  [1, 0.3, 0.004, -2e-5],
  [21.7775, 0.2, -8e-4, 1e-6],
  [36.8415, 0.03, 0, 0],
  [39.786, 0.02, -1e-5, 3e-8],
  [0, 0, 0, 0],
  [50, -0.01, 2e-5, -1e-8],
];
const CURVE = curveOf(KNOTS, CUBICS, 250, 3);

/** Derivative over five points (common practice): exact for quartics, as H is within one interval. */
function derivative(f: (t: number) => number, t: number, step: number): number {
  return (8 * (f(t + step) - f(t - step)) - (f(t + 2 * step) - f(t - 2 * step))) / (12 * step);
}

describe('one curve', () => {
  it('finds the interval: the upper one at a knot, also where a knot stands twice, and the end ones outside', () => {
    expect([10, 15, 59.9, 60, 298.15, 499.9, 500, 899, 900, 1000].map((t) => intervalOf(CURVE, t))).toEqual([
      0, 0, 0, 1, 3, 3, 5, 5, 5, 5,
    ]);
  });

  it('has H and S as the integrals of its Cp by quadrature, everywhere', () => {
    for (const t of [15, 20, 59, 60, 150, 298.15, 400, 499.999, 500, 700, 900]) {
      let h = 250;
      let s = 3;
      for (let i = 0; i < CUBICS.length && KNOTS[i] < t; i++) {
        const to = Math.min(t, KNOTS[i + 1]) - KNOTS[i];
        const [c0, c1, c2, c3] = CUBICS[i];
        const cp = (x: number): number => c0 + c1 * x + c2 * x ** 2 + c3 * x ** 3;
        if (to <= 0) continue;
        h += integral(cp, 0, to);
        s += integral((x) => cp(x) / (KNOTS[i] + x), 0, to, -KNOTS[i]);
      }
      expect(Math.abs(enthalpyAt(CURVE, t) - h)).toBeLessThan(1e-9);
      expect(Math.abs(entropyAt(CURVE, t) - s)).toBeLessThan(1e-12);
      expect(gibbsAt(CURVE, t)).toBeCloseTo(h - t * s, 8);
    }
  });

  it('has dH/dT = Cp, dS/dT = Cp/T and dG/dT = -S', () => {
    for (const t of [16, 40, 100, 250, 310, 450, 600, 880]) {
      const step = 1e-3 * t;
      const cp = heatCapacityAt(CURVE, t);
      expect(Math.abs(derivative((x) => enthalpyAt(CURVE, x), t, step) / cp - 1)).toBeLessThan(1e-10);
      expect(Math.abs((t * derivative((x) => entropyAt(CURVE, x), t, step)) / cp - 1)).toBeLessThan(1e-9);
      expect(Math.abs(derivative((x) => gibbsAt(CURVE, x), t, step) / -entropyAt(CURVE, t) - 1)).toBeLessThan(1e-9);
    }
  });
});
