import { describe, expect, it } from 'vitest';
import { pressurePlaces } from '../../pipeline/harmonise/pressure-places.js';
import type { RawCell } from '../../schemas/raw.js';

/** `usualDecimals`: those of the file. */
function placesOf(texts: readonly string[], usualDecimals: number): number[] {
  const cells = texts.map((printed): RawCell => {
    const [digits, exponent] = printed.split('e');
    const decimals = (digits!.split('.')[1]?.length ?? 0) - Number(exponent ?? 0);
    const value = Number(printed);
    return { column: 0, value, decimals, usualDecimals, printed, corrected: false, uncertainty: null };
  });
  return pressurePlaces(cells);
}

describe('the last places of pressures', () => {
  it('are the cells’ own where a table keeps its significant digits over the decades', () => {
    expect(placesOf(['0.0123', '0.123', '1.23', '12.3', '123', '1230'], 2)).toEqual([4, 3, 2, 1, 0, 0]);
    expect(placesOf(['1.23e-3', '1.23e0', '1.23e4'], 2)).toEqual([5, 2, -2]);
  });

  it('are the column’s where it keeps its decimals', () => {
    expect(placesOf(['1.23', '12.34', '123.45', '1234.56'], 2)).toEqual([2, 2, 2, 2]);
    expect(placesOf(['1', '5', '10', '20', '60', '100', '760'], 0)).toEqual([0, 0, 0, 0, 0, 0, 0]);
  });

  it('count zeros that are left out at the end, either way', () => {
    expect(placesOf(['0.0123', '0.123', '1.2', '12.3', '123', '50'], 1)).toEqual([4, 3, 2, 1, 0, 1]);
    expect(placesOf(['1.23', '12.3', '123.45', '1234.56', '3512.3'], 2)).toEqual([2, 2, 2, 2, 2]);
  });

  it('never take away what a cell prints', () => {
    expect(placesOf(['101.325', '100', '50', '20'], 0)).toEqual([3, 0, 0, 0]);
    expect(placesOf(['0.0123', '0.123', '1.2345', '12.3'], 3)).toEqual([4, 3, 4, 1]);
  });

  it('of one or two cells, of a zero and of none are defined', () => {
    expect(placesOf(['760'], 2)).toEqual([0]);
    expect(placesOf(['1000'], 0)).toEqual([0]);
    expect(placesOf(['1.2', '12.34'], 2)).toEqual([1, 2]);
    expect(placesOf(['12.34', '1.2'], 2)).toEqual([2, 1]);
    expect(placesOf(['0.00', '1.25', '2.50'], 2)).toEqual([2, 2, 2]);
    expect(placesOf([], 0)).toEqual([]);
  });
});
