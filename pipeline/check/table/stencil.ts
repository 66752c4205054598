/**
 * Local cubic interpolation of a table, for the checks: another route than the published curve's.
 *
 * `pick` chooses the four points of a stencil around an interval or a row; the integrals are by Gauss-Legendre quadrature
 * on the Lagrange polynomial through them.
 */
export interface Stencil {
  /** Indices of the points; `n` of them are used (2 to 4). */
  readonly at: Int32Array;
  n: number;
}

export function newStencil(): Stencil {
  return { at: new Int32Array(4), n: 0 };
}

/**
 * Two points on each side of [low, high) where there are, `stride` rows apart, none of them `without`, and none closer than
 * `apart` to its neighbour (a row at 300 K beside one at 298.15 K would only bring in rounding).
 *
 * @param lowIndex the nearest admissible row at or below the interval
 * @param highIndex the nearest admissible row at or above it
 */
export function pick(
  stencil: Stencil,
  t: Float64Array,
  from: number,
  to: number,
  lowIndex: number,
  highIndex: number,
  stride: number,
  apart: number,
  without: number,
): void {
  const low = take(t, from, to, lowIndex, -1, stride, apart, without, below);
  const high = take(t, from, to, highIndex, 1, stride, apart, without, above);
  // Where one side runs out the other gives more.
  let nl = Math.min(low, 2);
  let nh = Math.min(high, 2);
  if (nl < 2) nh = Math.min(high, 4 - nl);
  if (nh < 2) nl = Math.min(low, 4 - nh);
  let n = 0;
  for (let k = nl - 1; k >= 0; k--) stencil.at[n++] = below[k];
  for (let k = 0; k < nh; k++) stencil.at[n++] = above[k];
  stencil.n = n;
}

const below = new Int32Array(4);
const above = new Int32Array(4);

function take(
  t: Float64Array,
  from: number,
  to: number,
  start: number,
  direction: 1 | -1,
  stride: number,
  apart: number,
  without: number,
  out: Int32Array,
): number {
  let n = 0;
  let last = Number.NaN;
  let counted = stride;
  for (let k = start; k >= from && k <= to && n < 4; k += direction) {
    if (k === without) continue;
    if (n > 0) {
      if (Math.abs(t[k] - last) < apart) continue;
      counted++;
      if (counted < stride) continue;
    }
    out[n++] = k;
    last = t[k];
    counted = 0;
  }
  return n;
}

/** Value at x of the polynomial through the stencil's points. */
export function lagrange(stencil: Stencil, t: Float64Array, y: Float64Array, x: number): number {
  let sum = 0;
  for (let i = 0; i < stencil.n; i++) {
    const ti = t[stencil.at[i]];
    let w = 1;
    for (let j = 0; j < stencil.n; j++) if (j !== i) w *= (x - t[stencil.at[j]]) / (ti - t[stencil.at[j]]);
    sum += w * y[stencil.at[i]];
  }
  return sum;
}

/** The sum of squared weights at x: how the points' own errors reach the interpolated value. */
export function noiseGain(stencil: Stencil, t: Float64Array, x: number): number {
  let sum = 0;
  for (let i = 0; i < stencil.n; i++) {
    const ti = t[stencil.at[i]];
    let w = 1;
    for (let j = 0; j < stencil.n; j++) if (j !== i) w *= (x - t[stencil.at[j]]) / (ti - t[stencil.at[j]]);
    sum += w * w;
  }
  return sum;
}

// Gauss-Legendre nodes and weights on [0, 1], five points (Abramowitz and Stegun, table 25.4).
const NODES = [0.04691007703066802, 0.23076534494715845, 0.5, 0.7692346550528415, 0.953089922969332];
const WEIGHTS = [
  0.11846344252809454, 0.23931433524968324, 0.28444444444444444, 0.23931433524968324, 0.11846344252809454,
];

/** Integrals of Cp and Cp/T over [low, high] by the stencil's polynomial, into out[0] and out[1]. */
export function integrals(
  stencil: Stencil,
  t: Float64Array,
  y: Float64Array,
  low: number,
  high: number,
  out: Float64Array,
): void {
  const w = high - low;
  let h = 0;
  let s = 0;
  for (let k = 0; k < 5; k++) {
    const x = low + NODES[k] * w;
    const v = lagrange(stencil, t, y, x) * WEIGHTS[k];
    h += v;
    s += v / x;
  }
  out[0] = h * w;
  out[1] = s * w;
}

/** The integral of the bump 6x(1 - x)/T over the interval, x from 0 to 1: how an error of the integral of Cp reaches that of Cp/T. */
export function bumpOverT(low: number, high: number): number {
  const w = high - low;
  let s = 0;
  for (let k = 0; k < 5; k++) s += (WEIGHTS[k] * 6 * NODES[k] * (1 - NODES[k])) / (low + NODES[k] * w);
  return s;
}
