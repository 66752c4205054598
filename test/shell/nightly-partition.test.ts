import { describe, expect, it } from 'vitest';
import { partition } from '../../pipeline/shell/partition.js';

describe('partitions of the library', () => {
  it('are one for a small library and for an empty one', () => {
    expect(partition([1000, 2000, 3000])).toEqual([{ from: 0, to: 3 }]);
    expect(partition([])).toEqual([{ from: 0, to: 0 }]);
  });

  it('hold about the target of bytes each, and every substance once', () => {
    const bytes = Array.from({ length: 1000 }, (_, i) => 50_000 + (i % 7) * 1000);
    const runs = partition(bytes);
    expect(runs).toHaveLength(21);
    expect(runs[0]!.from).toBe(0);
    runs.slice(1).forEach(({ from }, i) => {
      expect(from).toBe(runs[i]!.to);
    });
    expect(runs.at(-1)!.to).toBe(1000);
    for (const { from, to } of runs) {
      const size = bytes.slice(from, to).reduce((a, b) => a + b, 0);
      expect(size).toBeGreaterThan(2_000_000);
      expect(size).toBeLessThan(3_000_000);
    }
  });

  it('never cut a substance, however large', () => {
    expect(partition([30_000_000, 10, 10])).toEqual([
      { from: 0, to: 1 },
      { from: 1, to: 2 },
      { from: 2, to: 3 },
    ]);
  });
});
