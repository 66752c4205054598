/**
 * A number as it would stand in the place of a printed one: its decimals, and its decimal mark.
 *
 * @param printed the cell's text; `value` is in the same unit
 */
export function printedLike(printed: string, value: number): string {
  const plain = printed.trim();
  const comma = plain.includes(',') && !plain.includes('.');
  const point = plain.search(/[.,]/);
  const exponent = plain.search(/[eEdD]/);
  const decimals = point < 0 ? 0 : (exponent < 0 ? plain.length : exponent) - point - 1;
  const fixed = value.toFixed(Math.max(0, Math.min(12, decimals)));
  // Zero has no sign.
  const text = /^-[0.]*$/.test(fixed) ? fixed.slice(1) : fixed;
  return comma ? text.replace('.', ',') : text;
}

/** The number that a cell prints, with a decimal comma and a Unicode minus read; NaN where it is none. */
export function printedNumber(printed: string): number {
  const plain = printed.trim().replace('\u2212', '-');
  if (plain === '') return Number.NaN;
  return Number(plain.includes(',') && !plain.includes('.') ? plain.replace(',', '.') : plain);
}
