import { cubicIntegral, cubicIntegralOverT } from '../core/numeric/cubic.js';
import { numbers } from '../core/numeric/room.js';
import { SmoothingSpline } from '../core/numeric/smoothing-spline.js';
import { notAKnotSpline } from '../core/numeric/spline.js';
import { leaveOut } from './interpolation-error.js';

/** What the scatter of a series' own points makes of its curve: linear propagation, JCGM 100:2008, 5.2.2. m points. */
export interface Scatter {
  /** Standard uncertainty of the curve's Cp at the points [J/(mol K)]. */
  readonly uHeatCapacity: Float64Array;
  /**
   * Per interval, away from the reference temperature: by how much var H, cov(H, S) and var S of the integrals from there
   * grow. Neighbouring intervals share points, so that these are no variances of the intervals alone.
   */
  readonly varH: Float64Array;
  readonly covHS: Float64Array;
  readonly varS: Float64Array;
  /** Variance of the change of each interval's integral when every second point is left out, the larger of both parities. */
  readonly varChange: Float64Array;
}

/** Fewer points than this are not smoothed. */
const FEWEST_SMOOTHED = 8;
/**
 * The curve keeps at least so many free parameters, or one for three points: what the points' own scatter says about the
 * bending is then too little to move the curve much, and the curve is as good as linear in the points.
 */
const LEAST_PARAMETERS = 12;
const POINTS_PER_PARAMETER = 3;
/** More points than this are not followed one by one: one in so many stands for its neighbours. */
const FOLLOWED = 64;

/** The points as they are smoothed: `ordinates` is linear in y, its strength fixed by the points that `smoothing` was given. */
interface Smoothing {
  readonly ordinates: (y: Float64Array, out: Float64Array) => void;
}

export function smoothing(x: Float64Array, y: Float64Array, u: Float64Array, m: number): Smoothing {
  if (m < FEWEST_SMOOTHED) return { ordinates: (from, out) => out.set(from.subarray(0, m)) };
  const spline = new SmoothingSpline(x, u, m);
  const least = spline.bendingWithin(Math.min(LEAST_PARAMETERS, m / POINTS_PER_PARAMETER));
  return spline.bend(Math.max(least, spline.likeliest(y)));
}

/** Each point is moved by its u in turn; what that does to the curve adds up in squares. */
export function scatterOf(x: Float64Array, u: Float64Array, m: number, smooth: Smoothing, referenceK: number): Scatter {
  const uHeatCapacity = numbers(m);
  const varH = numbers(m - 1);
  const covHS = numbers(m - 1);
  const varS = numbers(m - 1);
  const varChange = numbers(m - 1);
  const hh = new Float64Array(m);
  const hs = new Float64Array(m);
  const ss = new Float64Array(m);
  const own = [0, 0, 0];
  const moved = new Float64Array(m);
  const y = new Float64Array(m);
  const [c0, c1, c2, c3, h, s] = Array.from({ length: 6 }, () => new Float64Array(m));
  const change = [new Float64Array(m - 1), new Float64Array(m - 1)];
  const varParity = [new Float64Array(m - 1), new Float64Array(m - 1)];
  const moments = momentsOf(x, m);
  const from = Math.min(Math.max(referenceK, x[0]), x[m - 1]);
  let at = 0;
  while (at < m - 2 && x[at + 1] <= from) at++;

  const stride = Math.ceil(m / FOLLOWED);
  for (let i = Math.floor(stride / 2); i < m; i += stride) {
    moved.fill(0);
    moved[i] = u[i] * Math.sqrt(stride);
    smooth.ordinates(moved, y);
    notAKnotSpline(x, y, m, c0, c1, c2, c3);
    for (let k = 0; k < m - 1; k++) {
      const q = 8 * k;
      h[k + 1] = h[k] + c0[k] * moments[q] + c1[k] * moments[q + 1] + c2[k] * moments[q + 2] + c3[k] * moments[q + 3];
      s[k + 1] =
        s[k] + c0[k] * moments[q + 4] + c1[k] * moments[q + 5] + c2[k] * moments[q + 6] + c3[k] * moments[q + 7];
    }
    const h0 = h[at] + cubicIntegral(c0[at], c1[at], c2[at], c3[at], from - x[at]);
    const s0 = s[at] + cubicIntegralOverT(c0[at], c1[at], c2[at], c3[at], x[at], from - x[at]);
    for (let k = 0; k < m; k++) {
      const dH = h[k] - h0;
      const dS = s[k] - s0;
      hh[k] += dH * dH;
      hs[k] += dH * dS;
      ss[k] += dS * dS;
      uHeatCapacity[k] += y[k] * y[k];
    }
    const dH = h[at + 1] - h[at];
    const dS = s[at + 1] - s[at];
    own[0] += dH * dH;
    own[1] += dH * dS;
    own[2] += dS * dS;
    for (const parity of [0, 1]) {
      leaveOut(x, y, m, parity, c0, c1, c2, c3, change[parity]);
      for (let k = 0; k < m - 1; k++) varParity[parity][k] += change[parity][k] ** 2;
    }
  }
  for (let k = 0; k < m; k++) uHeatCapacity[k] = Math.sqrt(uHeatCapacity[k]);
  for (let k = 0; k < m - 1; k++) {
    varChange[k] = Math.max(varParity[0][k], varParity[1][k]);
    if (k === at) {
      [varH[k], covHS[k], varS[k]] = own;
      continue;
    }
    const [far, near] = k < at ? [k, k + 1] : [k + 1, k];
    varH[k] = Math.max(0, hh[far] - hh[near]);
    covHS[k] = hs[far] - hs[near];
    varS[k] = Math.max(0, ss[far] - ss[near]);
  }
  return { uHeatCapacity, varH, covHS, varS, varChange };
}

/** Of each interval: the integrals of 1, x, x^2, x^3, and of the same over T. */
function momentsOf(x: Float64Array, m: number): Float64Array {
  const out = new Float64Array(8 * (m - 1));
  for (let k = 0; k < m - 1; k++) {
    const w = x[k + 1] - x[k];
    for (let j = 0; j < 4; j++) {
      out[8 * k + j] = w ** (j + 1) / (j + 1);
      const one = (at: number): number => (at === j ? 1 : 0);
      out[8 * k + 4 + j] = cubicIntegralOverT(one(0), one(1), one(2), one(3), x[k], w);
    }
  }
  return out;
}
