/** The text of one cell as a number whose digits can be changed one by one and written back in the same style. */
export interface PrintedNumber {
  readonly value: number;
  /** Trimmed, as printed. */
  readonly text: string;
  /** Places of the mantissa's digits in `text`. */
  readonly digits: readonly number[];
  /** Digits after the decimal mark. */
  readonly decimals: number;
  readonly mark: '.' | ',';
  /** '' where none is printed. */
  readonly sign: string;
  /** The exponent with its letter (`E+05`), or ''. */
  readonly exponentText: string;
  readonly exponent: number;
}

const SHAPE = /^([+\-\u2212]?)\s*([0-9][0-9.,\s]*|[.,][0-9][0-9\s]*)(?:([eEdD])([+\-\u2212]?)([0-9]+))?$/u;
/** By the decimal mark: the other mark sets groups of three digits apart. */
const GROUPED = { '.': /^[0-9]{1,3}(?:,[0-9]{3})+(?:\.[0-9]*)?$/, ',': /^[0-9]{1,3}(?:\.[0-9]{3})+(?:,[0-9]*)?$/ };

/**
 * Reads `printed`; null where it is no plain number. A mark that may be a decimal comma or set thousands apart is taken
 * the way that `expected` (in the column's unit) lies nearer to; without `expected` it is the decimal mark.
 */
export function readPrinted(printed: string, expected: number | null): PrintedNumber | null {
  const text = printed.trim();
  const parts = SHAPE.exec(text);
  if (parts === null) return null;
  const [, sign, mantissa, letter, exponentSign, exponentDigits] = parts;
  let best: PrintedNumber | null = null;
  let bestDistance = Number.POSITIVE_INFINITY;
  for (const mark of ['.', ','] as const) {
    const other = mark === '.' ? ',' : '.';
    if (mantissa.includes(other) && !GROUPED[mark].test(mantissa)) continue;
    const plain = mantissa.replaceAll(other, '').replace(/\s/gu, '');
    if (plain.split(mark).length > 2) continue;
    const point = plain.indexOf(mark);
    const exponent =
      letter === undefined ? 0 : Number(exponentDigits) * (exponentSign === '' || exponentSign === '+' ? 1 : -1);
    const size = Number(`${plain.replace(mark, '.')}e${exponent}`);
    if (!Number.isFinite(size)) continue;
    const value = isMinus(sign) ? -size : size;
    const start = text.indexOf(mantissa, sign.length);
    const distance = expected === null ? (point >= 0 ? 0 : 1) : Math.abs(value - expected);
    if (distance >= bestDistance) continue;
    bestDistance = distance;
    best = {
      value,
      text,
      digits: [...mantissa].flatMap((character, i) => (isDigit(character) ? [start + i] : [])),
      decimals: point < 0 ? 0 : plain.length - point - 1,
      mark,
      sign,
      exponentText: letter === undefined ? '' : letter + exponentSign + exponentDigits,
      exponent,
    };
  }
  return best;
}

/** One unit of the last printed place, in the column's unit. */
export function lastPlaceOf(number: PrintedNumber): number {
  return 10 ** (number.exponent - number.decimals);
}

/** `value` with `decimals` digits after the mark, its mark, minus sign and exponent as in `style`. */
export function writeLike(style: PrintedNumber, value: number, decimals: number): string {
  const figures = Math.abs(value / 10 ** style.exponent).toFixed(Math.max(0, Math.min(20, decimals)));
  const negative = value < 0 && /[1-9]/.test(figures);
  const minus = style.text.includes('\u2212') ? '\u2212' : '-';
  const sign = negative ? minus : style.sign === '+' ? '+' : '';
  return sign + figures.replace('.', style.mark) + style.exponentText;
}

/** What the value changes by when its digit number `index` (0 is the first) becomes `digit`. */
export function changeOf(number: PrintedNumber, index: number, digit: number): number {
  const after = number.digits.length - 1 - index;
  const change =
    (digit - Number(number.text[number.digits[index]])) * 10 ** (after - number.decimals + number.exponent);
  return isMinus(number.sign) ? -change : change;
}

/** The text with other characters at `places`. */
export function withCharacters(text: string, places: readonly number[], characters: readonly string[]): string {
  const changed = [...text];
  for (const [i, place] of places.entries()) changed[place] = characters[i];
  return changed.join('');
}

const isDigit = (character: string): boolean => character >= '0' && character <= '9';
const isMinus = (sign: string): boolean => sign === '-' || sign === '\u2212';
