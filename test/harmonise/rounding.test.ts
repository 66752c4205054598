import { describe, expect, it } from 'vitest';

import { halfUnitOf, halfUnits } from '../../pipeline/harmonise/rounding.js';
import { columnOf, harmonised, seriesOf, tableOf } from './raw.js';

describe('half a unit of the last place', () => {
  it('is that of the printed digit, in SI', () => {
    expect(halfUnitOf(3, 1000)).toBeCloseTo(0.5, 12);
    expect(halfUnitOf(0, -4.184)).toBeCloseTo(2.092, 12);
    expect(halfUnitOf(-2, 1)).toBe(50);
  });

  it('is the usual one where a zero or a round number leaves its zeros out', () => {
    const halves = halfUnits(Float64Array.of(0, 24.426, 25.87, 26.648), Int8Array.of(0, 3, 2, 3), 3, 1);
    expect(Array.from(halves)).toEqual([0.0005, 0.0005, 0.0005, 0.0005]);
  });

  it('is the row’s own where larger numbers are printed with fewer decimals throughout', () => {
    const halves = halfUnits(Float64Array.of(1.234, 9.876, 12.34, 98.76, 123.4), Int8Array.of(3, 3, 2, 2, 1), 3, 1);
    expect(Array.from(halves)).toEqual([0.0005, 0.0005, 0.005, 0.005, 0.05]);
  });

  it('is that of measured temperatures, while the temperatures of an evaluated table are chosen', () => {
    const columns = [columnOf('T', 'temperature', 'K'), columnOf('Cp', 'heat-capacity', 'J/(mol.K)')];
    const rows = [
      ['300.1', '25.0'],
      ['310.4', '25.2'],
    ];
    const half = (basis: 'measured' | 'evaluated') =>
      harmonised({ series: [seriesOf(tableOf(columns, { basis }), 'cr', rows)] }).series[0].temperatureHalfUnitK;
    expect(half('measured')).toBeCloseTo(0.05, 12);
    expect(half('evaluated')).toBe(0);
  });
});
