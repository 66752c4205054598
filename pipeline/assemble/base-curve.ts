import { cubicIntegral } from '../core/numeric/cubic.js';
import { numbers } from '../core/numeric/room.js';
import { smoothedOrdinates } from '../core/numeric/smoothing-spline.js';
import { notAKnotSpline } from '../core/numeric/spline.js';
import type { Knots } from './knots.js';

/** Piecewise cubic through the knots' Cp, with the interpolation error of each interval's integral [J/mol]. */
export interface BaseCurve {
  readonly c0: Float64Array;
  readonly c1: Float64Array;
  readonly c2: Float64Array;
  readonly c3: Float64Array;
  readonly errorJPerMol: Float64Array;
}

/**
 * A not-a-knot spline for each stretch between split points (rows printed twice). Points with scatter of their own
 * (`scatter`) are smoothed within it first. The interpolation error is the larger change of an interval's integral when
 * every second point is left out, both parities.
 */
export function baseCurve(knots: Knots, scatter: boolean): BaseCurve {
  const n = knots.n;
  const c0 = numbers(n - 1);
  const c1 = numbers(n - 1);
  const c2 = numbers(n - 1);
  const c3 = numbers(n - 1);
  const errorJPerMol = numbers(n - 1);
  let from = 0;
  for (let i = 1; i <= n; i++) {
    if (i < n && knots.twin[i] === 0) continue;
    const m = i - from;
    if (m > 1) {
      const x = knots.temperatureK.subarray(from, i);
      let y: Float64Array = knots.heatCapacity.subarray(from, i);
      if (scatter && m >= 8) y = smoothedOrdinates(x, y, knots.uHeatCapacity.subarray(from, i), m);
      const a0 = c0.subarray(from, i - 1);
      const a1 = c1.subarray(from, i - 1);
      const a2 = c2.subarray(from, i - 1);
      const a3 = c3.subarray(from, i - 1);
      notAKnotSpline(x, y, m, a0, a1, a2, a3);
      const error = errorJPerMol.subarray(from, i - 1);
      if (m > 2) {
        leaveOut(x, y, m, 0, a0, a1, a2, a3, error);
        leaveOut(x, y, m, 1, a0, a1, a2, a3, error);
      } else {
        // Two points: nothing is known of the bend between them; a tenth of the change is taken.
        error[0] = (Math.abs(y[1] - y[0]) * (x[1] - x[0])) / 10;
      }
    }
    from = i;
  }
  return { c0, c1, c2, c3, errorJPerMol };
}

let coarseX = new Float64Array(128);
let coarseY = new Float64Array(128);
let b0 = new Float64Array(128);
let b1 = new Float64Array(128);
let b2 = new Float64Array(128);
let b3 = new Float64Array(128);

function leaveOut(
  x: Float64Array,
  y: Float64Array,
  m: number,
  parity: number,
  a0: Float64Array,
  a1: Float64Array,
  a2: Float64Array,
  a3: Float64Array,
  error: Float64Array,
): void {
  if (m > coarseX.length) {
    coarseX = new Float64Array(2 * m);
    coarseY = new Float64Array(2 * m);
    b0 = new Float64Array(2 * m);
    b1 = new Float64Array(2 * m);
    b2 = new Float64Array(2 * m);
    b3 = new Float64Array(2 * m);
  }
  let k = 0;
  for (let i = 0; i < m; i++) {
    if (i === 0 || i === m - 1 || (i & 1) === parity) {
      coarseX[k] = x[i];
      coarseY[k] = y[i];
      k++;
    }
  }
  if (k === m) return;
  notAKnotSpline(coarseX, coarseY, k, b0, b1, b2, b3);
  let j = 0;
  for (let i = 0; i < m - 1; i++) {
    while (j < k - 2 && x[i] >= coarseX[j + 1]) j++;
    const start = x[i] - coarseX[j];
    const end = x[i + 1] - coarseX[j];
    const coarse = cubicIntegral(b0[j], b1[j], b2[j], b3[j], end) - cubicIntegral(b0[j], b1[j], b2[j], b3[j], start);
    const fine = cubicIntegral(a0[i], a1[i], a2[i], a3[i], x[i + 1] - x[i]);
    const change = Math.abs(coarse - fine);
    if (change > error[i]) error[i] = change;
  }
}
