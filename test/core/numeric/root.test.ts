import { describe, expect, it } from 'vitest';
import { rootBetween } from '../../../pipeline/core/numeric/root.js';

function counted(f: (x: number) => number): { f: (x: number) => number; calls: () => number } {
  let calls = 0;
  return {
    f: (x) => {
      calls++;
      return f(x);
    },
    calls: () => calls,
  };
}

describe('root in a bracket', () => {
  it.each([
    ["Wallis's cubic x^3 - 2x - 5 (Newton's example)", (x: number) => x ** 3 - 2 * x - 5, 2, 3, 2.0945514815423265],
    ['cos x = x', (x: number) => Math.cos(x) - x, 0, 1, 0.7390851332151607],
    ['x e^x = 1, the omega constant', (x: number) => x * Math.exp(x) - 1, -1, 1, 0.5671432904097838],
    ['a falling function', (x: number) => 2 - x * x, 1, 2, Math.SQRT2],
    ['a triple root', (x: number) => (x - 0.3) ** 3, -1, 1, 0.3],
    ['a step that is never 0', (x: number) => (x < 1 / 3 ? -1 : 1), -1, 1, 1 / 3],
    ['a pole with a change of sign', (x: number) => 1 / (x - 1 / 3), -1, 1, 1 / 3],
  ])('finds %s to the tolerance', (_, f, low, high, root) => {
    for (const tolerance of [1e-3, 1e-8, 1e-13]) {
      expect(Math.abs(rootBetween(f, low, high, tolerance) - root)).toBeLessThanOrEqual(tolerance + 1e-15);
    }
  });

  it('never evaluates more often than bisection does, plus one and the two ends (Oliveira and Takahashi, theorem 1.1)', () => {
    const functions: ((x: number) => number)[] = [
      (x) => x * Math.exp(x) - 1,
      (x) => Math.tan(x - 0.1),
      (x) => Math.sin(x) + 0.5,
      (x) => 4 * x ** 5 + x * x + 1,
      (x) => x + x ** 10 - 1,
      (x) => Math.PI ** x - Math.E,
      (x) => Math.log(Math.abs(x - 10 / 9)),
      (x) => 1 / 3 + Math.sign(x) * Math.abs(x) ** (2 / 3) + x ** 3,
      (x) => (x + 2 / 3) / (x + 101 / 100),
      (x) => (1e6 * x - 1) ** 3,
      (x) => Math.exp(x) * (1e6 * x - 1) ** 3,
      (x) => (x - 1 / 3) ** 2 * Math.atan(x - 1 / 3),
      (x) => Math.sign(3 * x - 1) * (1 - Math.sqrt(Math.max(0, 1 - (3 * x - 1) ** 2 / 81))),
      (x) => (x > 0.5e-6 ? 1 + 1e-6 : -1),
      (x) => (x === 0.3 ? 0 : 1 / (20 * x - 6)),
      (x) => x ** 3 * Math.exp(-(x * x)) + 1e-9,
      (x) => (x < -0.99 ? -1 : 1e300),
    ];
    const tolerance = 1e-10;
    const bisection = Math.ceil(Math.log2(2 / (2 * tolerance)));
    let total = 0;
    let compared = 0;
    for (const f of functions) {
      if (f(-1) > 0 === f(1) > 0) continue;
      const { f: counting, calls } = counted(f);
      const root = rootBetween(counting, -1, 1, tolerance);
      expect(f(root - tolerance) > 0 && f(root + tolerance) > 0).toBe(false);
      expect(calls()).toBeLessThanOrEqual(bisection + 1 + 2);
      total += calls();
      compared++;
    }
    expect(compared).toBeGreaterThanOrEqual(12);
    expect(total / compared).toBeLessThan(0.8 * bisection);
  });

  it('needs few evaluations for a gap as smooth as that of two Gibbs energies', () => {
    const { f, calls } = counted((t) => 12000 - t * (10 + 2 * Math.log(t / 1000)));
    rootBetween(f, 1000, 1300, 1e-6);
    expect(calls()).toBeLessThan(14);
  });

  it('returns an end that is a root itself, and NaN without a change of sign', () => {
    expect(rootBetween((x) => x - 2, 2, 5, 1e-9)).toBe(2);
    expect(rootBetween((x) => x - 5, 2, 5, 1e-9)).toBe(5);
    expect(rootBetween((x) => x * x + 1, -1, 1, 1e-9)).toBeNaN();
  });

  it('ends where the tolerance is finer than doubles are', () => {
    expect(rootBetween((x) => x - 1000.1, 1000, 1001, 1e-20)).toBeCloseTo(1000.1, 12);
  });
});
