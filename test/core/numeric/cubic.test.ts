import { describe, expect, it } from 'vitest';
import { cubicIntegral, cubicIntegralOverT, cubicValue } from '../../../pipeline/core/numeric/cubic.js';
import { integral } from './quadrature.js';

/** The reference is quadrature of p(x)/(low + x) itself, Gauss-Legendre with compensated sums: no closed form in it. */
const one = (k: number): [number, number, number, number] => [0, 1, 2, 3].map((j) => (j === k ? 1 : 0)) as never;

describe('integrals of one cubic', () => {
  it('has a quadrature to compare with that is right to 1e-15 itself', () => {
    expect(Math.abs(integral((x) => 1 / x, 1, Math.E, 0) - 1)).toBeLessThan(1e-15);
    expect(Math.abs(integral((x) => x ** 5, 0, 1) * 6 - 1)).toBeLessThan(1e-15);
  });

  it('gives the integral of each power over T as quadrature does, for widths from 1e-6 to 1e3 of the temperature', () => {
    let worst = 0;
    for (const low of [0.5, 20, 298.15, 2000]) {
      for (let e = -6; e <= 3; e += 0.25) {
        const width = low * 10 ** e;
        for (let k = 0; k < 4; k++) {
          const reference = integral((x) => x ** k / (low + x), 0, width, -low);
          worst = Math.max(worst, Math.abs(cubicIntegralOverT(...one(k), low, width) / reference - 1));
        }
      }
    }
    expect(worst).toBeLessThan(2e-14);
  });

  it('does so downwards as well, as far as nine tenths of the way to 0 K', () => {
    for (const share of [1e-6, 1e-3, 0.1, 0.3, 0.49, 0.51, 0.7, 0.9]) {
      for (let k = 0; k < 4; k++) {
        const low = 300;
        const width = share * low;
        // With y = -x: the integral from 0 to -width of x^k/(low + x) is (-1)^(k+1) that of y^k/(low - y), rising to its pole.
        const mirrored = integral((z) => (width - z) ** k / (low - width + z), 0, width, width - low);
        const reference = mirrored * (k % 2 === 0 ? -1 : 1);
        expect(Math.abs(cubicIntegralOverT(...one(k), low, -width) / reference - 1)).toBeLessThan(1e-13);
      }
    }
  });

  it('takes a realistic Cp, all four coefficients at once, to rounding', () => {
    const c: [number, number, number, number] = [24.5, 0.031, -4.2e-5, 2.1e-8];
    for (const [low, width] of [
      [298.15, 1.85],
      [300, 100],
      [300, 700],
      [5, 295],
    ]) {
      const reference = integral((x) => cubicValue(...c, x) / (low + x), 0, width, -low);
      expect(Math.abs(cubicIntegralOverT(...c, low, width) - reference)).toBeLessThan(1e-14 * reference);
    }
  });

  it('starts from 0 K where Cp does: beta T^3 gives beta T^3/3', () => {
    expect(cubicIntegralOverT(0, 0, 0, 6e-5, 0, 15)).toBeCloseTo((6e-5 * 15 ** 3) / 3, 15);
    const reference = integral((x) => 0.7e-3 + 2e-4 * x + 6e-5 * x * x, 0, 15);
    expect(Math.abs(cubicIntegralOverT(0, 0.7e-3, 2e-4, 6e-5, 0, 15) / reference - 1)).toBeLessThan(1e-15);
  });

  it('gives 0 over no width, and the plain integral as quadrature does', () => {
    expect(cubicIntegralOverT(1, 2, 3, 4, 300, 0)).toBe(0);
    expect(cubicIntegralOverT(0, 2, 3, 4, 0, 0)).toBe(0);
    const c: [number, number, number, number] = [24.5, 0.031, -4.2e-5, 2.1e-8];
    const reference = integral((x) => cubicValue(...c, x), 0, 250);
    expect(Math.abs(cubicIntegral(...c, 250) / reference - 1)).toBeLessThan(1e-15);
  });
});
