import { describe, expect, it } from 'vitest';
import {
  largestPossibleDifferenceK,
  possibleDifferenceK,
  t90MinusT48,
  t90MinusT68,
  toIts90,
} from '../../../pipeline/core/units/temperature-scale.js';

describe('t90MinusT68', () => {
  // The same differences as a published handbook table prints them, from Preston-Thomas, Metrologia 27 (1990) 3.
  it.each([
    [-180, 0.008],
    [-100, 0.013],
    [-50, 0.009],
    [100, -0.026],
    [150, -0.035],
    [200, -0.04],
    [230, -0.04],
  ])('is within 1.5 mK of the handbook at %d degrees Celsius', (celsius, expected) => {
    expect(Math.abs((t90MinusT68(celsius) as number) - expected)).toBeLessThan(0.0015);
  });

  it('is zero at the ice point and continuous to 1 mK where its pieces meet', () => {
    expect(t90MinusT68(0)).toBeCloseTo(0, 15);
    for (const joint of [630.6, 1064.18]) {
      const below = t90MinusT68(joint) as number;
      const above = t90MinusT68(joint + 1e-6) as number;
      expect(Math.abs(below - above)).toBeLessThan(0.001);
    }
    expect(t90MinusT68(-200.1)).toBeNull();
    expect(t90MinusT68(Number.NaN)).toBeNull();
  });
});

describe('toIts90', () => {
  // IPTS-68 (amended edition of 1975, Metrologia 12 (1976) 7, quoted from memory) against ITS-90 (Preston-Thomas 1990, table 1).
  it.each([
    ['triple point of argon', 83.798, 83.8058],
    ['triple point of water', 273.16, 273.16],
    ['freezing point of tin', 505.1181, 505.078],
    ['freezing point of zinc', 692.73, 692.677],
    ['freezing point of silver', 1235.08, 1234.93],
    ['freezing point of gold', 1337.58, 1337.33],
  ])('brings the %s of 1968 to that of 1990 within 1.5 mK', (_, t68, t90) => {
    const scaled = toIts90(t68, 'IPTS-68');
    expect(scaled.converted).toBe(true);
    expect(Math.abs(scaled.temperatureK - t90)).toBeLessThan(0.0015);
  });

  it('puts water boiling at 373.15 K on both old scales at 373.124 K', () => {
    // ITS-90 text, Preston-Thomas (1990): 99.974 degrees Celsius.
    expect(toIts90(373.15, 'IPTS-68').temperatureK).toBeCloseTo(373.124, 3);
    expect(toIts90(373.15, 'IPTS-48').temperatureK).toBeCloseTo(373.124, 3);
  });

  it('solves for the temperature at which the published difference holds', () => {
    for (const t68 of [80, 300, 903.6, 1000, 1300, 2500]) {
      const { temperatureK } = toIts90(t68, 'IPTS-68');
      expect(temperatureK - (t90MinusT68(temperatureK - 273.15) as number)).toBeCloseTo(t68, 9);
    }
  });

  it('gives the rate of the old scale against the new one', () => {
    for (const scale of ['IPTS-68', 'IPTS-48'] as const) {
      for (const t of [110, 250, 300, 400, 500, ...(scale === 'IPTS-68' ? [800, 950, 1200, 1500] : [])]) {
        const below = toIts90(t - 0.01, scale).temperatureK;
        const above = toIts90(t + 0.01, scale).temperatureK;
        expect(toIts90(t, scale).slope).toBeCloseTo(0.02 / (above - below), 6);
      }
    }
  });

  it('leaves ITS-90, thermodynamic and unstated temperatures as they are', () => {
    for (const scale of ['ITS-90', 'thermodynamic', 'not-stated'] as const) {
      expect(toIts90(1000, scale)).toEqual({ temperatureK: 1000, slope: 1, converted: true });
    }
  });

  it('converts nothing outside the published range and says so', () => {
    expect(toIts90(50, 'IPTS-68')).toEqual({ temperatureK: 50, slope: 1, converted: false });
    expect(toIts90(600, 'IPTS-48')).toEqual({ temperatureK: 600, slope: 1, converted: false });
    expect(toIts90(90, 'IPTS-48')).toEqual({ temperatureK: 90, slope: 1, converted: false });
  });
});

describe('t90MinusT48', () => {
  // A published handbook table, its rows.
  it.each([
    [-180, 0.02],
    [-150, 0],
    [-100, 0.035],
    [-50, 0.038],
    [-20, 0.016],
    [0, 0],
    [20, -0.012],
    [50, -0.023],
    [80, -0.027],
    [100, -0.026],
    [120, -0.023],
    [150, -0.016],
    [180, -0.005],
    [200, 0.003],
    [230, 0.014],
    [250, 0.021],
    [260, 0.024],
  ])('meets the table at %d degrees Celsius', (celsius, expected) => {
    expect(t90MinusT48(celsius)).toBeCloseTo(expected, 12);
  });

  it('has no step in its rate at a row, and ends with the table', () => {
    for (const row of [-150, -100, 0, 100, 230]) {
      const before = ((t90MinusT48(row) as number) - (t90MinusT48(row - 1e-4) as number)) / 1e-4;
      const after = ((t90MinusT48(row + 1e-4) as number) - (t90MinusT48(row) as number)) / 1e-4;
      expect(Math.abs(before - after)).toBeLessThan(1e-6);
    }
    expect(t90MinusT48(-180.1)).toBeNull();
    expect(t90MinusT48(260.1)).toBeNull();
  });
});

describe('possibleDifferenceK', () => {
  it('is nothing on ITS-90 and on the thermodynamic scale', () => {
    expect(possibleDifferenceK(1500, 'ITS-90')).toBe(0);
    expect(possibleDifferenceK(1500, 'thermodynamic')).toBe(0);
  });

  it('covers both old scales where none is stated', () => {
    expect(possibleDifferenceK(373.124, 'not-stated')).toBeGreaterThanOrEqual(0.0255);
    expect(possibleDifferenceK(373.124, 'not-stated')).toBeLessThan(0.03);
    // Gold froze at 1063 degrees Celsius in 1948 and freezes at 1064.18 now.
    expect(possibleDifferenceK(1337.33, 'not-stated')).toBeGreaterThanOrEqual(1.18);
    expect(possibleDifferenceK(20, 'IPTS-68')).toBe(0.01);
  });

  it('is at its largest over a range no smaller than anywhere in it', () => {
    const largest = largestPossibleDifferenceK(100, 700, 'not-stated');
    for (let t = 100; t <= 700; t += 7)
      expect(largest).toBeGreaterThanOrEqual(possibleDifferenceK(t, 'not-stated') - 1e-3);
    expect(largest).toBeLessThan(0.2);
    expect(largestPossibleDifferenceK(100, 3000, 'ITS-90')).toBe(0);
    expect(largestPossibleDifferenceK(290, 300, 'not-stated')).toBeLessThan(0.02);
  });
});
