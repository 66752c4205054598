import { describe, expect, test } from 'vitest';
import { LONGEST_DECIMAL, writeDecimal } from '../../../pipeline/core/numeric/shortest-decimal.js';

const out = new Uint8Array(64);
const written = (value: number) => String.fromCharCode(...out.subarray(3, writeDecimal(value, out, 3)));

/** Seeded 32-bit numbers (Marsaglia, Xorshift RNGs, J. Stat. Software 8 (2003) 14). */
function seeded(state: number): () => number {
  return () => {
    state ^= state << 13;
    state ^= state >>> 17;
    state ^= state << 5;
    return state >>> 0;
  };
}

describe('writeDecimal', () => {
  test('writes ordinary numbers as String does', () => {
    const ordinary = [
      0,
      1,
      -1,
      298.15,
      101325,
      0.1,
      0.3,
      2 / 3,
      -1234.5,
      1e-6,
      1e-7,
      1.5e-7,
      123e-20,
      8.31446261815324,
    ];
    for (const value of ordinary) expect(written(value)).toBe(String(value));
  });

  test('keeps the sign of a negative zero, which String drops', () => {
    expect(written(-0)).toBe('-0');
  });

  test('writes the ends of its ranges and of the doubles as String does', () => {
    const ends = [
      999999999,
      1e9,
      1e9 + 0.5,
      1e16,
      1e17,
      1e21,
      1e22,
      2 ** 53,
      2 ** 53 + 2,
      2 ** 56,
      5e-324,
      2.2250738585072014e-308,
    ];
    for (const value of [...ends, Number.MAX_VALUE, Number.MIN_VALUE, 1e-199, 1e-201, 0.5, 0.25, 2 ** -40]) {
      expect(written(value)).toBe(String(value));
    }
  });

  test('writes every double as String does: random bits, rounded figures, neighbours of powers of ten', () => {
    const next = seeded(2463534242);
    const value = new Float64Array(1);
    const bits = new Uint32Array(value.buffer);
    const wrong: number[] = [];
    const check = (one: number) => {
      if (Number.isFinite(one) && written(one) !== String(one)) wrong.push(one);
    };
    for (let i = 0; i < 100_000; i++) {
      bits[0] = next();
      bits[1] = next();
      check(value[0]!);
      const uniform = next() / 2 ** 32 + next() / 2 ** 64;
      check(uniform * 10 ** ((next() % 30) - 12));
      check(Math.round(uniform * 1e6) / 10 ** (next() % 9));
      check((next() / 2) * 2 ** -(next() % 80));
    }
    for (let exponent = -210; exponent < 25; exponent++) {
      for (let step = -40; step <= 40; step++) {
        value[0] = Number(`1e${exponent}`);
        bits[0] = bits[0]! + step;
        check(value[0]!);
        check(Number(`${Math.abs(step) + 1}e${exponent}`));
      }
    }
    expect(wrong).toEqual([]);
  });

  test('never needs more room than it says', () => {
    const longest = [
      -1.234567890123457e-300, -2.2250738585072014e-308, -0.0000012345678901234567, -123456789012345680000,
    ];
    for (const value of longest) expect(written(value).length).toBeLessThanOrEqual(LONGEST_DECIMAL);
  });
});
