import { describe, expect, it } from 'vitest';
import { chiSquareTail } from '../../../pipeline/core/numeric/chi-square.js';

describe('the upper tail of chi square', () => {
  // Percentage points as printed in Abramowitz and Stegun, Handbook of Mathematical Functions (1964), table 26.8; from memory.
  it.each([
    [1, 0.05, 3.84146],
    [1, 0.001, 10.8276],
    [2, 0.05, 5.99147],
    [2, 0.001, 13.8155],
    [3, 0.01, 11.3449],
    [4, 0.05, 9.48773],
    [5, 0.01, 15.0863],
    [10, 0.05, 18.307],
    [10, 0.001, 29.5883],
    [20, 0.01, 37.5662],
    [30, 0.05, 43.773],
  ])('with %d degrees of freedom leaves %f above the printed point %f', (freedom, p, point) => {
    expect(chiSquareTail(point, freedom) / p).toBeCloseTo(1, 4);
  });

  it('is 1 at zero and below', () => {
    expect(chiSquareTail(0, 3)).toBe(1);
    expect(chiSquareTail(-1, 4)).toBe(1);
  });
});
