import { numbers } from '../../core/numeric/room.js';
import {
  bumpOverT,
  cubicAt,
  integralOf,
  integralOverT,
  newCubic,
  newStencil,
  pick,
  type Stencil,
  through,
} from './stencil.js';
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
const fineCubic = newCubic();
const coarseCubic = newCubic();

function integralBy(stencil: Stencil, rows: TableRows, i: number): number {
  through(stencil, rows.t, rows.cp, rows.t[i], coarseCubic);
  return integralOf(coarseCubic, rows.t[i], rows.t[i + 1]);
}

/**
 * Integrals by a local cubic through the four nearest rows; the interpolation error is the larger change when every second
 * row is left out, both parities; `careful` (asked for once something does not close) also takes one-sided stencils, which
 * see a kink that the thinned ones miss. Intervals that start at 0 K with the next row above 20 K cannot be integrated from Cp.
 */
export function residuals(rows: TableRows, careful = false): Residuals {
  const { n, t } = rows;
  const q = numbers(n - 1);
  const p = numbers(n - 1);
  const e = numbers(n - 1);
  const c = numbers(n - 1);
  const open = numbers(n - 1);
  const own = numbers(n - 1);
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
    own[i] = (w * w * (rows.uCp[i] * rows.uCp[i] + rows.uCp[i + 1] * rows.uCp[i + 1])) / 2;
  }
  const closure = numbers(n);
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
  const from = rows.from[i];
  const to = rows.to[i];
  let error = 0;
  for (let shift = -1; shift <= 1; shift += 2) {
    const first = i - 1 + shift;
    if (first < from || first + 3 > to) continue;
    central.n = 4;
    for (let k = 0; k < 4; k++) central.at[k] = first + k;
    error = Math.max(error, Math.abs(integralBy(central, rows, i) - fine));
  }
  return error;
}

/** Integrals over interval i without the row `without` (-1: with all). */
export function interval(rows: TableRows, i: number, without: number, out: Float64Array): void {
  const { t, cp } = rows;
  const w = t[i + 1] - t[i];
  pick(central, t, rows.from[i], rows.to[i], i, i + 1, 1, 0.25 * w, without);
  through(central, t, cp, t[i], fineCubic);
  out[0] = integralOf(fineCubic, t[i], t[i + 1]);
  out[1] = integralOverT(fineCubic, t[i], t[i + 1]);
}

/** The larger change of the integral when the rows are thinned to every second one, both parities. */
export function errorOf(rows: TableRows, i: number, without: number, fine: number): number {
  const { t } = rows;
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
    const change = Math.abs(integralBy(coarse, rows, i) - fine);
    if (change > error) error = change;
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

const NOWHERE: Standoff = { difference: 0, u: 0, interior: false, symmetric: false };

/** `least`: a smaller difference is of no interest, and its u is then not worked out (Infinity). */
export function standoff(rows: TableRows, k: number, least = 0): Standoff {
  const { t, cp } = rows;
  const from = rows.from[k];
  const to = rows.to[k];
  const low = k - 1;
  const high = k + 1;
  if (low < from || high > to || to - from < 4) return NOWHERE;
  const apart = 0.1 * (t[high] - t[low]);
  pick(central, t, from, to, low, high, 1, apart, -1);
  through(central, t, cp, t[k], fineCubic);
  const a = fineCubic.c0;
  const difference = cp[k] - a;
  const symmetric = k - 2 >= from && k + 2 <= to && !(t[from] === 0 && k - 2 === from);
  if (Math.abs(difference) < least) return { difference, u: Number.POSITIVE_INFINITY, interior: true, symmetric };
  pick(coarse, t, from, to, low, high, 2, apart, k);
  through(coarse, t, cp, t[k], coarseCubic);
  let spread = Math.abs(a - coarseCubic.c0);
  // One-sided stencils: the thinned one may agree with the full one by chance.
  for (let side = -1; side <= 1; side += 2) {
    if (!oneSided(rows, k, side as 1 | -1)) continue;
    through(coarse, t, cp, t[k], coarseCubic);
    spread = Math.max(spread, 0.5 * Math.abs(a - coarseCubic.c0));
  }
  // The squared weights of four even points sum to 0.94; a little more is taken for uneven ones.
  const scatter = 1.45 * rows.uCp[k];
  return { difference, u: Math.sqrt(spread * spread + scatter * scatter), interior: true, symmetric };
}

/** Row k's Cp by the polynomial through the rows beside it, four where its stretch has as many. */
export function between(rows: TableRows, k: number): number {
  const { t, cp } = rows;
  pick(central, t, rows.from[k], rows.to[k], k - 1, k + 1, 1, 0.1 * (t[k + 1] - t[k - 1]), k);
  through(central, t, cp, t[k], fineCubic);
  return fineCubic.c0;
}

/** One row on one side of k, three on the other; false where there are not enough, or two stand too close. */
function oneSided(rows: TableRows, k: number, side: 1 | -1): boolean {
  const { t } = rows;
  const lowest = side === 1 ? k - 1 : k - 3;
  const highest = side === 1 ? k + 3 : k + 1;
  if (lowest < rows.from[k] || highest > rows.to[k]) return false;
  const closest = 0.1 * (t[k + 1] - t[k - 1]);
  let n = 0;
  for (let j = lowest; j <= highest; j++) {
    if (j === k) continue;
    if (n > 0 && t[j] - t[coarse.at[n - 1]] < closest) return false;
    coarse.at[n++] = j;
  }
  coarse.n = 4;
  return true;
}

/** Row j's stand-off from the local cubic that uses neither j nor k. Null where too few rows are left. */
export function standoffWithout(rows: TableRows, j: number, k: number): { difference: number; u: number } | null {
  const { t, cp } = rows;
  const from = rows.from[j];
  const to = rows.to[j];
  let low = j - 1;
  let high = j + 1;
  if (low === k) low--;
  if (high === k) high++;
  if (low < from || high > to) return null;
  const apart = 0.1 * (t[high] - t[low]);
  pick(central, t, from, to, low, high, 1, apart, k);
  if (central.n < 4) return null;
  through(central, t, cp, t[j], fineCubic);
  const a = cubicAt(fineCubic, t[j]);
  pick(coarse, t, from, to, low, high, 2, apart, k);
  through(coarse, t, cp, t[j], coarseCubic);
  return { difference: cp[j] - a, u: Math.hypot(a - cubicAt(coarseCubic, t[j]), 1.4 * rows.uCp[j]) };
}

/** Standard uncertainty of the H and S differences of interval i from the digits. */
export function digitU(rows: TableRows, i: number): { h: number; s: number } {
  const a = rows.row[i];
  const b = rows.row[i + 1];
  return {
    h: rows.h === null ? 0 : root(cellU(rows.h, a), cellU(rows.h, b)),
    s: rows.s === null ? 0 : root(cellU(rows.s, a), cellU(rows.s, b)),
  };
}

function root(a: number, b: number): number {
  return Math.sqrt(a * a + b * b);
}
