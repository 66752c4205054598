import { describe, expect, it } from 'vitest';
import {
  changeOf,
  lastPlaceOf,
  readPrinted,
  withCharacters,
  writeLike,
} from '../../../pipeline/reconcile/slips/printed-number.js';

describe('a printed number', () => {
  it.each([
    ['888.108', 888.108, 3, 0.001],
    ['  -285,83 ', -285.83, 2, 0.01],
    ['\u22121 234.5', -1234.5, 1, 0.1],
    ['1\u2009234.50', 1234.5, 2, 0.01],
    ['+.25', 0.25, 2, 0.01],
    ['1.2345E+05', 123450, 4, 10],
    ['3.20d\u221203', 0.0032, 2, 1e-5],
    ['1,234.5', 1234.5, 1, 0.1],
    ['1.234,5', 1234.5, 1, 0.1],
    ['600.', 600, 0, 1],
  ])('%j is read', (text, value, decimals, lastPlace) => {
    const number = readPrinted(text, null)!;
    expect(number.value).toBe(value);
    expect(number.decimals).toBe(decimals);
    expect(lastPlaceOf(number)).toBeCloseTo(lastPlace, 12);
  });

  it('has its one comma taken for what the value read says', () => {
    expect(readPrinted('1,234', 1234)!.value).toBe(1234);
    expect(readPrinted('1,234', 1.234)!.value).toBe(1.234);
    expect(readPrinted('1,234', null)!.value).toBe(1.234);
  });

  it.each(['', 'n.a.', '1.2.3', '12 K', '0x10', '1e', '--3'])('%j is none', (text) => {
    expect(readPrinted(text, null)).toBeNull();
  });

  it('has its digits changed in place, with what that changes in the value', () => {
    const number = readPrinted('\u2212285,83', null)!;
    expect(withCharacters(number.text, [number.digits[2]], ['7'])).toBe('\u2212287,83');
    expect(changeOf(number, 2, 7)).toBeCloseTo(-2, 12);
    const exponential = readPrinted('1.2345E+05', null)!;
    expect(withCharacters(exponential.text, [exponential.digits[4]], ['9'])).toBe('1.2349E+05');
    expect(changeOf(exponential, 4, 9)).toBe(40);
  });

  it('lends its style to another value', () => {
    expect(writeLike(readPrinted('\u2212285,83', null)!, -68.315, 2)).toBe('\u221268,31');
    expect(writeLike(readPrinted('1.20E+03', null)!, 4600, 3)).toBe('4.600E+03');
    expect(writeLike(readPrinted('12.5', null)!, -0.0001, 1)).toBe('0.0');
  });
});
