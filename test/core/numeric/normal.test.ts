import { describe, expect, it } from 'vitest';
import { normalQuantile, sidakThreshold, upperTail } from '../../../pipeline/core/numeric/normal.js';
import { integral } from './quadrature.js';

const density = (x: number): number => Math.exp((-x * x) / 2) / Math.sqrt(2 * Math.PI);

describe('normal law', () => {
  it.each([
    [0.25, 0.67449],
    [0.1, 1.28155],
    [0.05, 1.64485],
    [0.025, 1.95996],
    [0.01, 2.32635],
    [0.005, 2.57583],
    [0.001, 3.09023],
    [1e-4, 3.71902],
    [1e-5, 4.26489],
    [1e-6, 4.75342],
    [1e-7, 5.19934],
    [1e-8, 5.612],
    [1e-9, 5.99781],
  ])(
    'has the upper %d point of Abramowitz and Stegun 1964, tables 26.5 and 26.6 (from memory), five decimals',
    (p, z) => {
      expect(Math.abs(normalQuantile(p) - z)).toBeLessThan(0.6e-5);
    },
  );

  it('has a tail that quadrature of the density confirms, from z = -3 to 35', () => {
    for (const z of [-3, -1, -0.1, 0, 0.1, 0.5, 1, 2, 2.49, 2.5, 2.51, 3, 4, 6, 10, 20, 35]) {
      const reference = integral(density, z, z + (z < 3 ? 14 : 40 / z + 2));
      expect(Math.abs(upperTail(z) / reference - 1)).toBeLessThan(2e-13);
    }
  });

  it('turns tails back into quantiles to 1e-9 of themselves, as far as 1e-300', () => {
    for (const z of [0.01, 0.3, 1, 2, 2.4, 3, 4.2, 6, 8, 8.5, 12, 20, 37]) {
      expect(Math.abs(normalQuantile(upperTail(z)) / z - 1)).toBeLessThan(1e-9);
    }
  });

  it('is odd about one half', () => {
    expect(Math.abs(normalQuantile(0.5))).toBeLessThan(1e-15);
    for (const p of [0.4, 0.1, 0.01, 1e-4]) expect(normalQuantile(1 - p)).toBeCloseTo(-normalQuantile(p), 9);
  });

  it('shares a significance over tests as Sidak does: the chance that none of n exceeds it is 1 - alpha', () => {
    for (const alpha of [0.05, 0.01, 0.001]) {
      for (const n of [1, 2, 10, 137, 1e4, 1e7]) {
        const each = 2 * upperTail(sidakThreshold(alpha, n));
        expect(Math.abs(-Math.expm1(n * Math.log1p(-each)) / alpha - 1)).toBeLessThan(1e-7);
      }
    }
  });

  it('has 3.29 for one test at 0.1 % (Baarda 1968), rises with their number, and takes none for one', () => {
    expect(sidakThreshold(0.001, 1)).toBeCloseTo(3.2905, 4);
    expect(sidakThreshold(0.001, 20)).toBeGreaterThan(sidakThreshold(0.001, 10));
    expect(sidakThreshold(0.001, 0)).toBe(sidakThreshold(0.001, 1));
    // Bonferroni's bound is never smaller (common practice).
    expect(sidakThreshold(0.01, 50)).toBeLessThan(normalQuantile(0.01 / 50 / 2));
  });
});
