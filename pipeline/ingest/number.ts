/** Printed numbers from bytes: a strict grammar, correctly rounded doubles, and how many digits were printed. */
import { decodeUtf8 } from './utf8.js';

/** The outcome of reading one cell. */
export const READ_EMPTY = 0;
export const READ_NUMBER = 1;
export const READ_WRONG = 2;
export const READ_INFINITE = 3;

const POWERS = Array.from({ length: 23 }, (_, n) => Number(`1e${n}`));
const BLANKS = new Uint8Array(256);
BLANKS[32] = 1;
BLANKS[9] = 1;

/**
 * Reads cells of one decimal mark. Grammar: [sign] digits [mark [digits]] or [sign] mark digits, then optionally e, E, d
 * or D, [sign], digits. A sign is +, - or U+2212; blanks around it are passed over, and between digits thin, narrow,
 * figure and no-break spaces. Nothing else is a number: no hexadecimal, no `inf`, no empty text.
 *
 * Rounding: up to 15 significant digits and a power of ten up to 22, one division or multiplication of exact doubles is
 * correctly rounded (Clinger, PLDI 1990); beyond that the language's own conversion of the same digits.
 */
export class NumberReader {
  value = 0;
  /** The last printed digit stands for 10^-decimals, clamped to -127...127. */
  decimals = 0;
  private readonly mark: number;

  constructor(decimalMark: '.' | ',') {
    this.mark = decimalMark.charCodeAt(0);
  }

  /** One of the READ_ codes; `value` and `decimals` are set with READ_NUMBER. */
  read(bytes: Uint8Array, start: number, end: number): number {
    let i = start;
    let last = end;
    while (i < last && BLANKS[bytes[i]!] === 1) i++;
    while (last > i && BLANKS[bytes[last - 1]!] === 1) last--;
    while (i < last && bytes[i]! > 0x7f && thinSpace(bytes, i, last) > 0) i += thinSpace(bytes, i, last);
    while (last > i && bytes[last - 1]! > 0x7f && thinSpaceBefore(bytes, i, last) > 0)
      last -= thinSpaceBefore(bytes, i, last);
    if (i >= last) return READ_EMPTY;

    const begin = i;
    let c = bytes[i]!;
    let negative = false;
    if (c === 45) {
      negative = true;
      i++;
    } else if (c === 43) i++;
    else if (c === 0xe2 && isMinus(bytes, i)) {
      negative = true;
      i += 3;
    }
    while (i < last && bytes[i] === 32) i++;

    let mantissa = 0;
    let significant = 0;
    let digits = 0;
    let decimals = 0;
    let afterMark = false;
    for (; i < last; i++) {
      c = bytes[i]!;
      const digit = c - 48;
      if (digit >= 0 && digit <= 9) {
        digits++;
        if (afterMark) decimals++;
        if (significant > 0 || digit > 0) {
          significant++;
          if (significant <= 15) mantissa = mantissa * 10 + digit;
        }
      } else if (c === this.mark && !afterMark) afterMark = true;
      else {
        const space = c > 0x7f && digits > 0 ? thinSpace(bytes, i, last) : 0;
        if (space === 0 || !isDigit(bytes[i + space])) break;
        i += space - 1;
      }
    }
    if (digits === 0) return READ_WRONG;

    let exponent = 0;
    if (i < last) {
      const letter = bytes[i]! | 0x20;
      if (letter !== 0x65 && letter !== 0x64) return READ_WRONG;
      i++;
      let down = false;
      if (bytes[i] === 45) {
        down = true;
        i++;
      } else if (bytes[i] === 43) i++;
      else if (i + 2 < last && isMinus(bytes, i)) {
        down = true;
        i += 3;
      }
      if (i >= last) return READ_WRONG;
      for (; i < last; i++) {
        const digit = bytes[i]! - 48;
        if (!(digit >= 0 && digit <= 9)) return READ_WRONG;
        if (exponent < 100000) exponent = exponent * 10 + digit;
      }
      if (down) exponent = -exponent;
    }

    const places = decimals - exponent;
    let value: number;
    if (significant === 0) value = 0;
    else if (significant <= 15 && places >= -22 && places <= 22)
      value = places > 0 ? mantissa / POWERS[places]! : mantissa * POWERS[-places]!;
    else value = this.slow(bytes, begin, last);
    if (!Number.isFinite(value)) return READ_INFINITE;
    this.value = negative && value !== 0 ? -value : value;
    this.decimals = Math.max(-127, Math.min(127, places));
    return READ_NUMBER;
  }

  /** The magnitude, by the language's own conversion of the digits that the grammar has let through. */
  private slow(bytes: Uint8Array, start: number, end: number): number {
    const text = decodeUtf8(bytes, start, end)
      .replaceAll('\u2212', '-')
      .replace(/[^0-9.,eEdD+-]/g, '')
      .replace(',', '.')
      .replace(/[dD]/, 'e');
    return Math.abs(Number(text));
  }
}

const isDigit = (byte: number | undefined): boolean => byte !== undefined && byte >= 48 && byte <= 57;

/** U+2212 is E2 88 92. */
const isMinus = (bytes: Uint8Array, i: number): boolean =>
  bytes[i] === 0xe2 && bytes[i + 1] === 0x88 && bytes[i + 2] === 0x92;

/** Length in bytes of a thin space at `i` (U+2006 to U+200A, U+202F, U+00A0), or 0. */
function thinSpace(bytes: Uint8Array, i: number, end: number): number {
  if (bytes[i] === 0xc2) return i + 1 < end && bytes[i + 1] === 0xa0 ? 2 : 0;
  if (bytes[i] !== 0xe2 || i + 2 >= end || bytes[i + 1] !== 0x80) return 0;
  const third = bytes[i + 2]!;
  return (third >= 0x86 && third <= 0x8a) || third === 0xaf ? 3 : 0;
}

function thinSpaceBefore(bytes: Uint8Array, start: number, end: number): number {
  if (end - 2 >= start && thinSpace(bytes, end - 2, end) === 2) return 2;
  return end - 3 >= start && thinSpace(bytes, end - 3, end) === 3 ? 3 : 0;
}
