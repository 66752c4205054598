import { describe, expect, it } from 'vitest';
import { smallest } from '../../../pipeline/check/table/left-over.js';
import { localFit } from '../../../pipeline/check/table/local-fit.js';
import { residuals } from '../../../pipeline/check/table/residuals.js';
import { isSecondTested, secondRow } from '../../../pipeline/check/table/second-row.js';
import type { TableRows } from '../../../pipeline/check/table/table-rows.js';
import { POLICY } from '../../harmonise/raw.js';
import { CP, examined, F, findingsOf, H, medium, S, T } from '../medium.js';

const RULE = 'heat-capacity-smooth';

/** One stretch of Cp alone. */
function stretch(t: readonly number[], cp: (t: number) => number, u = 0.003, last = t.length - 1): TableRows {
  const n = t.length;
  return {
    n,
    t: Float64Array.from(t),
    cp: Float64Array.from(t, cp),
    uCp: new Float64Array(n).fill(u),
    row: Int32Array.from(t, (_, i) => i),
    from: new Int32Array(n),
    to: new Int32Array(n).fill(last),
    h: null,
    s: null,
    f: null,
  } as unknown as TableRows;
}

const even = Array.from({ length: 12 }, (_, i) => 300 + 20 * i);
const smooth = (t: number): number => 42 + 0.02 * t - 3e5 / t ** 2;
/** Cp of the row at `atK` times `factor`. */
const off =
  (atK: number, factor: number, law = smooth) =>
  (t: number): number =>
    law(t) * (t === atK ? factor : 1);

describe('the second row of a stretch of heat capacities alone', () => {
  it.each([0.001, 1 / 4.184, 0.97, 1.03, 1.3, 1000])(
    'is wrong where it is off by the factor %d, at either end',
    (factor) => {
      for (const [k, atK] of [
        [1, 320],
        [10, 500],
      ] as const) {
        const found = secondRow(stretch(even, off(atK, factor)), k)!;
        expect(Math.abs(found.difference)).toBeGreaterThan(6 * found.u);
        expect(smooth(atK) * factor - found.difference).toBeCloseTo(smooth(atK), 1);
      }
    },
  );

  it.each([0.001, 1 / 4.184, 0.97, 1.03, 1.3, 1000])(
    'is not accused where the end row is off by the factor %d',
    (factor) => {
      expect(secondRow(stretch(even, off(300, factor)), 1)).toBeNull();
      expect(secondRow(stretch(even, off(520, factor)), 10)).toBeNull();
    },
  );

  it.each([
    ['a lambda peak at the end', (t: number) => 40 + 30 * Math.exp((t - 520) / 15)],
    ['a bend at the second row', (t: number) => 40 + 0.2 * Math.max(0, t - 500)],
    ['a step before the second row', (t: number) => (t < 490 ? 40 : 46)],
    ['a steep rise from low temperature', (t: number) => 60 / (1 + (380 / t) ** 6)],
  ])('is not accused of %s', (_, law) => {
    for (const k of [1, 10]) expect(secondRow(stretch(even, law), k)).toBeNull();
  });

  it('is tested where four rows lie beyond it and the end is no limit row at 0 K', () => {
    const rows = stretch(even, smooth);
    expect(even.map((_, k) => isSecondTested(rows, k)).flatMap((yes, k) => (yes ? [k] : []))).toEqual([1, 10]);
    expect(isSecondTested(stretch(even.slice(0, 6), smooth), 1)).toBe(true);
    expect(isSecondTested(stretch(even.slice(0, 5), smooth), 1)).toBe(false);
    expect(isSecondTested(stretch([0, ...even], smooth), 1)).toBe(false);
  });
});

describe('the smallest wrong Cp that would be named in heat capacities alone', () => {
  const least = (t: readonly number[]): number | null => {
    const rows = stretch(t, (x) => 20 + 0.1 * x, 0.5);
    return smallest(rows, residuals(rows), POLICY).heatCapacity;
  };
  /** Power 80 % at w = 6. */
  const times = 6.84;

  it('is that of the second row, whose neighbours lie on one side', () => {
    expect(least(even)).toBeCloseTo(times * 1.6 * 0.5, 9);
  });

  it('is that of the rows which are tested: in five rows the middle one, beside 0 K neither of two', () => {
    expect(least(even.slice(0, 5))).toBeCloseTo(times * 1.45 * 0.5, 9);
    expect(least([0, 15, 30, 45, 60, 75])).toBeCloseTo(times * 1.6 * 0.5, 9);
    expect(least([0, 15, 30, 45, 60])).toBeNull();
  });
});

describe('the local fit', () => {
  const nearest = Int32Array.from([1, 2, 3, 4, 5, 6, 7, 8]);

  it('continues a line with the u of its eight points and of the row itself', () => {
    const { value, u } = localFit(
      stretch(even, (t) => 20 + 0.1 * t, 0.1),
      nearest,
      0,
    );
    expect(value).toBeCloseTo(50, 9);
    // Points 1 to 8 steps away: 1/8 + 4.5^2/42 of the variance of one, and one more.
    expect(u / 0.1).toBeCloseTo(Math.sqrt(1 + 1 / 8 + 4.5 ** 2 / 42), 9);
  });

  it('continues a cubic where its bend is larger than the scatter', () => {
    const cubic = (t: number): number => 3 + 0.2 * t - 4e-4 * t ** 2 + 3e-6 * (t - 400) ** 3;
    const { value, u } = localFit(stretch(even, cubic, 1e-6), nearest, 0);
    expect(value).toBeCloseTo(cubic(300), 6);
    expect(u).toBeLessThan(1e-5);
  });

  it('takes the scatter that it finds where that is more than what is stated', () => {
    const noise = [0, 1, -1, 1, -1, -1, 1, -1, 1, 0, 0, 0];
    const law = (t: number): number => 50 + noise[(t - 300) / 20]!;
    expect(localFit(stretch(even, law, 0.001), nearest, 0).u).toBeGreaterThan(1);
  });

  it('knows nothing from three rows', () => {
    expect(localFit(stretch(even, smooth), nearest.subarray(0, 3), 0).u).toBe(Number.POSITIVE_INFINITY);
  });
});

describe(RULE, () => {
  /** Cp alone, the row at `atK` off by the factor. */
  function spoilt(atK: string, factor: number) {
    const printed = medium('measured');
    printed.tables = { cr: printed.tables.cr!.filter((row) => row[T] !== '298.15') };
    printed.without = [S, F, H];
    const row = printed.tables.cr!.find((one) => one[T] === atK)!;
    row[CP] = (Number(row[CP]) * factor).toFixed(3);
    return examined(printed);
  }

  it.each(['320', '580'])('names a wrong Cp at %s K beside an end of a measured series, and no other cell', (atK) => {
    const found = spoilt(atK, 1 / 4.184);
    const [finding] = findingsOf(found, RULE);
    expect([finding!.severity, finding!.temperatureK]).toEqual(['fault', Number(atK)]);
    expect(found.named).toHaveLength(1);
    expect(found.suspects).toHaveLength(1);
    expect(found.suspects[0]!.proposed * 0.98).toBeLessThan(finding!.expected!);
  });

  it.each(['300', '600'])('accuses no row where the end row at %s K is wrong', (atK) => {
    expect(spoilt(atK, 1 / 4.184).findings.filter(({ severity }) => severity !== 'note')).toEqual([]);
  });
});
