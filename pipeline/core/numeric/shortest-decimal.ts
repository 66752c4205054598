/**
 * Writes a finite number as the shortest decimal that reads back to the same double, the closest one where several are as
 * short: what `String(value)` gives, as ASCII bytes, several times faster (-0 is written `-0`).
 *
 * The value is scaled to X = value * 10^p, 17 digits before the point, as an unevaluated sum of two doubles (Dekker, A
 * floating-point technique for extending the available precision, Numer. Math. 18 (1971) 224, product of section 5). The
 * multiple of 100, of 10 or of 1 next to X that lies nearer than half a unit of the last binary place is the answer.
 * X is right to 1e-7 of its last digit. Whatever falls within 1e-6 of a decision, powers of two (lopsided interval) and
 * what lies outside 1e-200 .. 1e17 go through `String`.
 */
export function writeDecimal(value: number, out: Uint8Array, at: number): number {
  f64[0] = value;
  const highWord = u32[1]!;
  if (highWord >>> 31 !== 0) {
    out[at++] = MINUS;
    value = -value;
  }
  if (value < 1e9 && value === Math.floor(value)) return writeInteger(value, out, at);
  if (value < 1e6 && value >= 1e-6) {
    // At most 15 digits, nine of them after the point: such a decimal is alone in its double's interval.
    const billionths = Math.round(value * 1e9);
    if (billionths / 1e9 === value) return writeFixed(billionths, out, at);
  }
  const binary = ((highWord >>> 20) & 0x7ff) - LOWEST_BINARY;
  if (binary < 0 || value >= 1e17 || ((highWord & 0xfffff) === 0 && u32[0] === 0)) return writeText(value, out, at);

  let exponent = decimalOf[binary]!;
  if (value >= nextPower[binary]!) exponent++;
  const p = 16 - exponent;
  const power = powerHigh[p]!;
  const product = value * power;
  const split = SPLITTER * value;
  const head = split - (split - value);
  const tail = value - head;
  const powerHead = powerSplitHead[p]!;
  const powerTail = powerSplitTail[p]!;
  const error = head * powerHead - product + head * powerTail + tail * powerHead + tail * powerTail;
  const low = error + value * powerLow[p]!;
  const reach = halfUnit[binary]! * power;

  // X = upper * 1e8 + rest; the first term is exact.
  let upper = Math.floor(product * 1e-8);
  let rest = product - upper * 1e8 + low;
  if (rest < 0) {
    upper--;
    rest += 1e8;
  } else if (rest >= 1e8) {
    upper++;
    rest -= 1e8;
  }
  const hundreds = Math.floor(rest * 0.01);
  const inHundred = rest - hundreds * 100;
  const toHundred = inHundred < 50 ? inHundred : 100 - inHundred;
  let lower: number;
  if (toHundred < reach - DOUBT) {
    lower = inHundred < 50 ? hundreds * 100 : hundreds * 100 + 100;
  } else if (toHundred < reach + DOUBT) {
    return writeText(value, out, at);
  } else {
    const tens = Math.floor(inHundred * 0.1);
    const inTen = inHundred - tens * 10;
    const toTen = inTen < 5 ? inTen : 10 - inTen;
    if (toTen > 5 - DOUBT || Math.abs(toTen - reach) < DOUBT) return writeText(value, out, at);
    if (toTen < reach) {
      lower = hundreds * 100 + (inTen < 5 ? tens : tens + 1) * 10;
    } else {
      const ones = Math.floor(inTen);
      const fraction = inTen - ones;
      if (Math.abs(fraction - 0.5) < DOUBT) return writeText(value, out, at);
      lower = hundreds * 100 + tens * 10 + (fraction < 0.5 ? ones : ones + 1);
    }
  }
  if (lower >= 1e8) {
    upper++;
    lower -= 1e8;
  }
  if (upper < 1e8 || upper >= 1e9) return writeText(value, out, at);
  return writeDigits(upper | 0, lower | 0, exponent, out, at);
}

/** The most bytes that one number takes. */
export const LONGEST_DECIMAL = 25;

const MINUS = 0x2d;
const POINT = 0x2e;
const ZERO = 0x30;
const LETTER_E = 0x65;
/** 2^27 + 1 cuts a double into two halves of 26 bits. */
const SPLITTER = 134217729;
const DOUBT = 1e-6;
/** Biased binary exponents from 2^-664 (4e-200) to 2^56 (7e16). */
const LOWEST_BINARY = 1023 - 664;
const BINARIES = 664 + 57;
/** 10^p for p from 0 to 217, as high + low. */
const POWERS = 218;

const f64 = new Float64Array(1);
const u32 = new Uint32Array(f64.buffer);
const fourDigits = new Uint8Array(40000);
const decimalOf = new Int16Array(BINARIES);
const nextPower = new Float64Array(BINARIES);
const halfUnit = new Float64Array(BINARIES);
const powerHigh = new Float64Array(POWERS);
const powerLow = new Float64Array(POWERS);
const powerSplitHead = new Float64Array(POWERS);
const powerSplitTail = new Float64Array(POWERS);

for (let i = 0; i < 10000; i++) {
  for (let k = 0, n = i; k < 4; k++, n = Math.floor(n / 10)) fourDigits[4 * i + 3 - k] = ZERO + (n % 10);
}
for (let p = 0; p < POWERS; p++) {
  const high = Number(`1e${p}`);
  const split = SPLITTER * high;
  powerHigh[p] = high;
  powerLow[p] = Number(10n ** BigInt(p) - BigInt(high));
  powerSplitHead[p] = split - (split - high);
  powerSplitTail[p] = high - powerSplitHead[p]!;
}
for (let i = 0; i < BINARIES; i++) {
  const lowest = 2 ** (i - 664);
  const exponent = Number(lowest.toExponential().split('e')[1]);
  decimalOf[i] = exponent;
  nextPower[i] = Number(`1e${exponent + 1}`);
  halfUnit[i] = lowest / 2 ** 53;
}

/** 17 digits, `upper` the first 9, with the point after the first and a decimal exponent. */
function writeDigits(upper: number, lower: number, exponent: number, out: Uint8Array, at: number): number {
  if (exponent >= -6 && exponent < 0) {
    out[at++] = ZERO;
    out[at++] = POINT;
    for (let i = -1; i > exponent; i--) out[at++] = ZERO;
    return putDigits(upper, lower, out, at);
  }
  // One place is left before the digits, for those before the point to move into.
  let end = putDigits(upper, lower, out, at + 1);
  if (exponent >= 0) {
    const point = at + exponent + 1;
    for (; end <= point; end++) out[end] = ZERO;
    for (; at < point; at++) out[at] = out[at + 1]!;
    if (end === point + 1) return point;
    out[point] = POINT;
    return end;
  }
  out[at] = out[at + 1]!;
  if (end === at + 2) end--;
  else out[at + 1] = POINT;
  out[end++] = LETTER_E;
  out[end++] = MINUS;
  return writeInteger(-exponent, out, end);
}

/** Without the zeros at the end. */
function putDigits(upper: number, lower: number, out: Uint8Array, at: number): number {
  const first = (upper / 1e8) | 0;
  const nextEight = upper - first * 1e8;
  out[at] = ZERO + first;
  const nextFour = (nextEight / 10000) | 0;
  putFour(nextFour, out, at + 1);
  putFour(nextEight - nextFour * 10000, out, at + 5);
  let end = at + 9;
  if (lower !== 0) {
    const four = (lower / 10000) | 0;
    putFour(four, out, end);
    putFour(lower - four * 10000, out, end + 4);
    end += 8;
  }
  while (out[end - 1] === ZERO) end--;
  return end;
}

/** A number of billionths, not a multiple of 1e9. */
function writeFixed(billionths: number, out: Uint8Array, at: number): number {
  const whole = Math.floor(billionths / 1e9);
  const rest = billionths - whole * 1e9;
  const point = writeInteger(whole, out, at);
  out[point] = POINT;
  const first = (rest / 1e8) | 0;
  const nextEight = rest - first * 1e8;
  out[point + 1] = ZERO + first;
  const nextFour = (nextEight / 10000) | 0;
  putFour(nextFour, out, point + 2);
  putFour(nextEight - nextFour * 10000, out, point + 6);
  let end = point + 10;
  while (out[end - 1] === ZERO) end--;
  return end;
}

function putFour(number: number, out: Uint8Array, at: number): void {
  const from = 4 * number;
  out[at] = fourDigits[from]!;
  out[at + 1] = fourDigits[from + 1]!;
  out[at + 2] = fourDigits[from + 2]!;
  out[at + 3] = fourDigits[from + 3]!;
}

/** A whole number from 0 to 999 999 999. */
function writeInteger(value: number, out: Uint8Array, at: number): number {
  let count = 1;
  for (let power = 10; value >= power; power *= 10) count++;
  let rest = value | 0;
  for (let i = at + count - 1; i >= at; i--) {
    const next = (rest / 10) | 0;
    out[i] = ZERO + rest - next * 10;
    rest = next;
  }
  return at + count;
}

function writeText(value: number, out: Uint8Array, at: number): number {
  const text = String(value);
  for (let i = 0; i < text.length; i++) out[at++] = text.charCodeAt(i);
  return at;
}
