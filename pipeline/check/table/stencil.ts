/**
 * Local cubic interpolation of a table, for the checks: another route than the published curve's.
 *
 * `pick` chooses the four points of a stencil around an interval or a row; `through` lays the polynomial through them.
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
  if (stride === 1 && without < 0 && lowIndex - 1 >= from && highIndex + 1 <= to) {
    // The ordinary case: two rows on each side, none too close.
    const plain = t[lowIndex] - t[lowIndex - 1] >= apart && t[highIndex + 1] - t[highIndex] >= apart;
    if (plain) {
      stencil.at[0] = lowIndex - 1;
      stencil.at[1] = lowIndex;
      stencil.at[2] = highIndex;
      stencil.at[3] = highIndex + 1;
      stencil.n = 4;
      return;
    }
  }
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

/** The polynomial through a stencil's points, c0 + c1 x + c2 x^2 + c3 x^3 with x = T - origin. */
export interface LocalCubic {
  origin: number;
  c0: number;
  c1: number;
  c2: number;
  c3: number;
}

export function newCubic(): LocalCubic {
  return { origin: 0, c0: 0, c1: 0, c2: 0, c3: 0 };
}

/** Newton's divided differences, multiplied out about `origin`. Two points give a line, three a parabola. */
export function through(stencil: Stencil, t: Float64Array, y: Float64Array, origin: number, out: LocalCubic): void {
  const { at, n } = stencil;
  const x0 = t[at[0]] - origin;
  const x1 = t[at[1]] - origin;
  const y0 = y[at[0]];
  const y1 = y[at[1]];
  const d01 = (y1 - y0) / (x1 - x0);
  let d012 = 0;
  let d0123 = 0;
  let x2 = 0;
  if (n > 2) {
    x2 = t[at[2]] - origin;
    const y2 = y[at[2]];
    const d12 = (y2 - y1) / (x2 - x1);
    d012 = (d12 - d01) / (x2 - x0);
    if (n > 3) {
      const x3 = t[at[3]] - origin;
      const d23 = (y[at[3]] - y2) / (x3 - x2);
      d0123 = ((d23 - d12) / (x3 - x1) - d012) / (x3 - x0);
    }
  }
  const b0 = d012 - x2 * d0123;
  const e1 = b0 - x1 * d0123;
  const e0 = d01 - x1 * b0;
  out.origin = origin;
  out.c3 = d0123;
  out.c2 = e1 - x0 * d0123;
  out.c1 = e0 - x0 * e1;
  out.c0 = y0 - x0 * e0;
}

export function cubicAt(p: LocalCubic, temperatureK: number): number {
  const x = temperatureK - p.origin;
  return p.c0 + x * (p.c1 + x * (p.c2 + x * p.c3));
}

// Gauss-Legendre nodes and weights on [0, 1], five points (Abramowitz and Stegun, table 25.4).
const NODES = [0.04691007703066802, 0.23076534494715845, 0.5, 0.7692346550528415, 0.953089922969332];
const WEIGHTS = [
  0.11846344252809454, 0.23931433524968324, 0.28444444444444444, 0.23931433524968324, 0.11846344252809454,
];

/** The integral of the polynomial over [low, high], in closed form. */
export function integralOf(p: LocalCubic, low: number, high: number): number {
  const a = low - p.origin;
  const b = high - p.origin;
  const at = (x: number): number => x * (p.c0 + x * (p.c1 / 2 + x * (p.c2 / 3 + (x * p.c3) / 4)));
  return at(b) - at(a);
}

/** The integral of the polynomial over T, by Gauss-Legendre quadrature. */
export function integralOverT(p: LocalCubic, low: number, high: number): number {
  const w = high - low;
  let s = 0;
  for (let k = 0; k < 5; k++) {
    const x = low + NODES[k] * w;
    s += (cubicAt(p, x) * WEIGHTS[k]) / x;
  }
  return s * w;
}

/** The integral of the bump 6x(1 - x)/T over the interval, x from 0 to 1: how an error of the integral of Cp reaches that of Cp/T. */
export function bumpOverT(low: number, high: number): number {
  const w = high - low;
  let s = 0;
  for (let k = 0; k < 5; k++) s += (WEIGHTS[k] * 6 * NODES[k] * (1 - NODES[k])) / (low + NODES[k] * w);
  return s;
}
