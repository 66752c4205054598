import { bumpOverT, integrals, newStencil, noiseGain, pick } from './stencil.js';
import { cellU, type TableRows } from './table-rows.js';

/** What the three row checks leave, over the rows and intervals of one table. Intervals without a check hold 0 in `has*`. */
export interface Residuals {
  /** Integrals of Cp and Cp/T over interval i -> i + 1 and the interpolation error of the first [J/mol]. */
  readonly q: Float64Array;
  readonly p: Float64Array;
  readonly e: Float64Array;
  /** How an error of the first reaches the second [1/K], and what that leaves open [1/K]. */
  readonly c: Float64Array;
  readonly open: Float64Array;
  /** Variance of q from the rounding and scatter of Cp itself. */
  readonly own: Float64Array;
  /** 0: not to be checked; 1: an interval; TWIN: a row printed twice, whose H and S must be equal. */
  readonly usable: Uint8Array;
  /** S - F - H/T of each row. */
  readonly closure: Float64Array;
  readonly hasClosure: Uint8Array;
}

export const TWIN = 2;

const central = newStencil();
const coarse = newStencil();
const two = new Float64Array(2);
const other = new Float64Array(2);

/**
 * Integrals by a local cubic through the four nearest rows; the interpolation error is the larger change when every second
 * row is left out, both parities; `careful` (asked for once something does not close) also takes one-sided stencils, which
 * see a kink that the thinned ones miss. Intervals that start at 0 K with the next row above 20 K cannot be integrated from Cp.
 */
export function residuals(rows: TableRows, careful = false): Residuals {
  const { n, t } = rows;
  const q = new Float64Array(n - 1);
  const p = new Float64Array(n - 1);
  const e = new Float64Array(n - 1);
  const c = new Float64Array(n - 1);
  const open = new Float64Array(n - 1);
  const own = new Float64Array(n - 1);
  const usable = new Uint8Array(n - 1);
  for (let i = 0; i < n - 1; i++) {
    if (t[i + 1] === t[i]) {
      usable[i] = isJump(rows, i) ? 0 : TWIN;
      continue;
    }
    if (t[i] === 0 && t[i + 1] > 20) continue;
    usable[i] = 1;
    interval(rows, i, -1, two);
    q[i] = two[0];
    p[i] = two[1];
    e[i] = errorOf(rows, i, -1, two[0]);
    if (careful) e[i] = Math.max(e[i], shiftedError(rows, i, two[0]));
    const w = t[i + 1] - t[i];
    if (t[i] > 0) {
      c[i] = bumpOverT(t[i], t[i + 1]);
      open[i] = w / (4 * t[i] * t[i + 1]);
    } else {
      c[i] = 3 / w;
      open[i] = 3 / w;
    }
    own[i] = (w * w * (rows.uCp[i] ** 2 + rows.uCp[i + 1] ** 2)) / 2;
  }
  const closure = new Float64Array(n);
  const hasClosure = new Uint8Array(n);
  const { h, s, f } = rows;
  if (h !== null && s !== null && f !== null) {
    for (let i = 0; i < n; i++) {
      const r = rows.row[i];
      if (t[i] === 0 || h.present[r] === 0 || s.present[r] === 0 || f.present[r] === 0) continue;
      hasClosure[i] = 1;
      closure[i] = s.values[r] - f.values[r] - h.values[r] / t[i];
    }
  }
  return { q, p, e, c, open, own, usable, closure, hasClosure };
}

/** Both S and H apart at one temperature: two sides of a jump, not a slip. */
function isJump(rows: TableRows, i: number): boolean {
  const a = rows.row[i];
  const b = rows.row[i + 1];
  let apart = 0;
  let compared = 0;
  for (const q of [rows.h, rows.s]) {
    if (q === null || q.present[a] === 0 || q.present[b] === 0) continue;
    compared++;
    if (Math.abs(q.values[a] - q.values[b]) > 6 * Math.hypot(cellU(q, a), cellU(q, b))) apart++;
  }
  return compared > 0 && apart === compared && compared > 1;
}

/** The larger change of the integral when the stencil is moved one row down or up. */
function shiftedError(rows: TableRows, i: number, fine: number): number {
  const { t, cp } = rows;
  const from = rows.from[i];
  const to = rows.to[i];
  let error = 0;
  for (let shift = -1; shift <= 1; shift += 2) {
    const first = i - 1 + shift;
    if (first < from || first + 3 > to) continue;
    central.n = 4;
    for (let k = 0; k < 4; k++) central.at[k] = first + k;
    integrals(central, t, cp, t[i], t[i + 1], other);
    error = Math.max(error, Math.abs(other[0] - fine));
  }
  return error;
}

/** Integrals over interval i without the row `without` (-1: with all). */
export function interval(rows: TableRows, i: number, without: number, out: Float64Array): void {
  const { t, cp } = rows;
  const w = t[i + 1] - t[i];
  pick(central, t, rows.from[i], rows.to[i], i, i + 1, 1, 0.25 * w, without);
  integrals(central, t, cp, t[i], t[i + 1], out);
}

/** The larger change of the integral when the rows are thinned to every second one, both parities. */
export function errorOf(rows: TableRows, i: number, without: number, fine: number): number {
  const { t, cp } = rows;
  const w = t[i + 1] - t[i];
  const from = rows.from[i];
  const to = rows.to[i];
  let error = 0;
  for (let parity = 0; parity < 2; parity++) {
    const low = parity === 0 ? i : i - 1;
    const high = parity === 0 ? i + 2 : i + 1;
    const lowAt = low < from ? i : low;
    const highAt = high > to ? i + 1 : high;
    pick(coarse, t, from, to, lowAt, highAt, 2, 0.25 * w, without);
    integrals(coarse, t, cp, t[i], t[i + 1], other);
    error = Math.max(error, Math.abs(other[0] - fine));
  }
  return error;
}

/** A row's Cp against the local cubic without it: the difference, and how sure the prediction is. */
export interface Standoff {
  difference: number;
  u: number;
  /** False where the row is an end of its stretch: the prediction would be an extrapolation. */
  interior: boolean;
  /** Two rows on each side, none of them a limit row at 0 K. */
  symmetric: boolean;
}

export function standoff(rows: TableRows, k: number, without: number): Standoff {
  const { t, cp } = rows;
  const from = rows.from[k];
  const to = rows.to[k];
  let low = k - 1;
  let high = k + 1;
  if (low === without) low--;
  if (high === without) high++;
  if (low < from || high > to || to - from < 4) return { difference: 0, u: 0, interior: false, symmetric: false };
  const apart = 0.1 * (t[high] - t[low]);
  pick(central, t, from, to, low, high, 1, apart, without === -1 ? k : without);
  const a = valueAt(t, cp, t[k]);
  const gain = noiseGain(central, t, t[k]);
  pick(central, t, from, to, low, high, 2, apart, without === -1 ? k : without);
  const b = valueAt(t, cp, t[k]);
  const scatter = rows.uCp[k] * Math.sqrt(1 + gain);
  let spread = Math.abs(a - b);
  // One-sided stencils: the thinned one may agree with the full one by chance.
  for (let side = -1; side <= 1; side += 2) {
    oneSided(rows, k, side as 1 | -1);
    if (central.n === 4) spread = Math.max(spread, 0.5 * Math.abs(a - valueAt(t, cp, t[k])));
  }
  const symmetric = k - 2 >= from && k + 2 <= to && !(t[from] === 0 && k - 2 === from);
  return { difference: cp[k] - a, u: Math.hypot(spread, scatter), interior: true, symmetric };
}

/** One row on one side of k, three on the other. */
function oneSided(rows: TableRows, k: number, side: 1 | -1): void {
  const at = [k - side, k + side, k + 2 * side, k + 3 * side].sort((p, q) => p - q);
  central.n = 0;
  if (at[0] < rows.from[k] || at[3] > rows.to[k]) return;
  const closest = 0.1 * (rows.t[k + 1] - rows.t[k - 1]);
  for (let j = 1; j < 4; j++) if (rows.t[at[j]] - rows.t[at[j - 1]] < closest) return;
  for (let j = 0; j < 4; j++) central.at[j] = at[j];
  central.n = 4;
}

function valueAt(t: Float64Array, cp: Float64Array, x: number): number {
  let sum = 0;
  for (let i = 0; i < central.n; i++) {
    const ti = t[central.at[i]];
    let w = 1;
    for (let j = 0; j < central.n; j++) if (j !== i) w *= (x - t[central.at[j]]) / (ti - t[central.at[j]]);
    sum += w * cp[central.at[i]];
  }
  return sum;
}

/** Standard uncertainty of the H and S differences of interval i from the digits. */
export function digitU(rows: TableRows, i: number): { h: number; s: number } {
  const a = rows.row[i];
  const b = rows.row[i + 1];
  return {
    h: rows.h === null ? 0 : Math.hypot(cellU(rows.h, a), cellU(rows.h, b)),
    s: rows.s === null ? 0 : Math.hypot(cellU(rows.s, a), cellU(rows.s, b)),
  };
}
