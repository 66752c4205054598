/** What the printed digits of a table's pressures leave open. */
import type { RawCell } from '../../schemas/raw.js';

/**
 * Decimals of the last place of each pressure of one table. Pressures run over decades, so that a table keeps either its
 * decimals or its significant digits: whichever more of its cells print, the digits where they are even. Zeros left out
 * at the end count as printed ("1.2" among "1.23" and "0.0123" is 1.20); what a cell prints beyond that is its own.
 */
export function pressurePlaces(cells: readonly RawCell[]): number[] {
  const digits = cells.map(significantDigits);
  const usualDigits = commonest(digits);
  const decimalsKept = cells.filter(({ decimals, usualDecimals }) => decimals === usualDecimals).length;
  const digitsKept = digits.filter((one) => one === usualDigits).length;
  return cells.map(({ value, decimals, usualDecimals }) =>
    Math.max(decimals, decimalsKept > digitsKept ? usualDecimals : usualDigits - 1 - orderOf(value)),
  );
}

/** 3 for 0.0123 and for 123; a zero has none. */
function significantDigits({ value, decimals }: RawCell): number {
  return value === 0 ? 0 : decimals + orderOf(value) + 1;
}

/** The power of ten of the first digit. */
function orderOf(value: number): number {
  return value === 0 ? 0 : Number(value.toExponential().split('e')[1]);
}

/** The smallest of them where several are. */
function commonest(numbers: readonly number[]): number {
  const counts = new Map<number, number>();
  for (const one of numbers) counts.set(one, (counts.get(one) ?? 0) + 1);
  let best = 0;
  let most = 0;
  for (const [one, count] of counts) {
    if (count < most || (count === most && one >= best)) continue;
    best = one;
    most = count;
  }
  return best;
}
