import { describe, expect, it } from 'vitest';
import { type RatioPairs, robustRatio } from '../../../pipeline/check/table/robust-ratio.js';

const pairs = (x: number[], y: number[], u = 0.001): RatioPairs => ({
  x,
  y,
  ux: x.map(() => u),
  uy: y.map(() => u),
});
const numbers = Array.from({ length: 21 }, (_, i) => 1 + i / 3);

describe('the robust ratio', () => {
  it('is the factor, with the u of least squares', () => {
    const ratio = robustRatio(
      pairs(
        numbers,
        numbers.map((x) => 4.184 * x),
      ),
    )!;
    expect(ratio.value).toBeCloseTo(4.184, 12);
    const xx = numbers.reduce((sum, x) => sum + x * x, 0);
    expect(ratio.u).toBeCloseTo((0.001 * Math.hypot(1, 4.184)) / Math.sqrt(xx), 9);
  });

  it('is not moved by two fifths of wrong pairs', () => {
    const y = numbers.map((x, i) => (i % 5 < 2 ? 30 * x : -2 * x));
    expect(robustRatio(pairs(numbers, y))!.value).toBeCloseTo(-2, 9);
  });

  it('follows the pairs that are known best', () => {
    const vague = pairs([1, 1, 1, 1, 1, 1], [2, 2, 2, 3, 3, 3]);
    const uy = [0.3, 0.3, 0.3, 0.001, 0.001, 0.001];
    expect(robustRatio({ ...vague, uy })!.value).toBeCloseTo(3, 2);
  });

  it('is null where fewer than three pairs say anything', () => {
    expect(robustRatio(pairs([], []))).toBeNull();
    expect(robustRatio(pairs([1, 2], [2, 4]))).toBeNull();
    expect(robustRatio(pairs([0, 0, 0, 1], [1, 2, 3, 4]))).toBeNull();
    expect(robustRatio(pairs([1, 2, 3], [2, 4, 6], 10))).toBeNull();
  });
});
