import { describe, expect, it } from 'vitest';
import { ErrorSum } from '../../../pipeline/core/physics/error-sum.js';
import { imperfection } from '../../../pipeline/core/physics/imperfection-error.js';

describe('what H and S owe to the imperfection of a gas', () => {
  const sumOf = (h: number, s: number, t = 400, u = 80): ErrorSum => {
    const sum = new ErrorSum();
    for (const { key, by, u: one } of imperfection(u, h, s, t)) sum.addDatum(key, by, one);
    return sum;
  };

  it('is, in G = H - TS, the uncertainty of the gas term itself', () => {
    const gibbs = sumOf(1, -400);
    expect(Math.sqrt(gibbs.covariance(gibbs))).toBeCloseTo(80, 9);
  });

  it('is some four times as much in H, and three times over T in S, as B falls with the third power of T', () => {
    const h = sumOf(1, 0);
    const s = sumOf(0, 1);
    expect(Math.sqrt(h.covariance(h)) / 80).toBeCloseTo(Math.hypot(4, 1.5), 9);
    expect((Math.sqrt(s.covariance(s)) * 400) / 80).toBeCloseTo(Math.hypot(3, 1.5), 9);
    // Nearly one error: what is left of H - TS beside G is nothing.
    expect(h.covariance(s)).toBeGreaterThan(0);
  });

  it('is nothing where the gas is ideal', () => {
    expect(imperfection(0, 1, -400, 400)).toEqual([]);
  });
});
