import { numbers } from '../core/numeric/room.js';
import { notAKnotSpline } from '../core/numeric/spline.js';
import { leaveOut } from './interpolation-error.js';
import type { Knots } from './knots.js';
import { type Scatter, scatterOf, smoothing } from './scatter.js';

/** Piecewise cubic through the knots' Cp, with the interpolation error of each interval's integral [J/mol]. */
export interface BaseCurve {
  readonly c0: Float64Array;
  readonly c1: Float64Array;
  readonly c2: Float64Array;
  readonly c3: Float64Array;
  readonly errorJPerMol: Float64Array;
  /** Null where the points have no scatter of their own. */
  readonly scatter: Scatter | null;
}

/** Changes that the points' scatter makes of itself are no interpolation error: so many of their standard deviations. */
const SCATTER_SPARED = 3;

/**
 * A not-a-knot spline for each stretch between split points (rows printed twice). Points with scatter of their own are
 * smoothed within it first (`scatterFromK`: where H and S count from; null: no scatter). The interpolation error is the
 * larger change of an interval's integral when every second point is left out, both parities, less what scatter explains.
 */
export function baseCurve(knots: Knots, scatterFromK: number | null): BaseCurve {
  const n = knots.n;
  const c0 = numbers(n - 1);
  const c1 = numbers(n - 1);
  const c2 = numbers(n - 1);
  const c3 = numbers(n - 1);
  const errorJPerMol = numbers(n - 1);
  if (scatterFromK !== null) {
    // Measured rows are never printed twice: one stretch.
    const x = knots.temperatureK;
    const u = knots.uHeatCapacity;
    const smooth = smoothing(x, knots.heatCapacity, u, n);
    const y = numbers(n);
    smooth.ordinates(knots.heatCapacity, y);
    const scatter = scatterOf(x, u, n, smooth, scatterFromK);
    notAKnotSpline(x, y, n, c0, c1, c2, c3);
    errorOf(x, y, n, c0, c1, c2, c3, errorJPerMol);
    for (let i = 0; i < n - 1; i++) {
      errorJPerMol[i] = Math.max(0, errorJPerMol[i] - SCATTER_SPARED * Math.sqrt(scatter.varChange[i]));
    }
    return { c0, c1, c2, c3, errorJPerMol, scatter };
  }
  let from = 0;
  for (let i = 1; i <= n; i++) {
    if (i < n && knots.twin[i] === 0) continue;
    const m = i - from;
    if (m > 1) {
      const x = knots.temperatureK.subarray(from, i);
      const y = knots.heatCapacity.subarray(from, i);
      const a0 = c0.subarray(from, i - 1);
      const a1 = c1.subarray(from, i - 1);
      const a2 = c2.subarray(from, i - 1);
      const a3 = c3.subarray(from, i - 1);
      notAKnotSpline(x, y, m, a0, a1, a2, a3);
      errorOf(x, y, m, a0, a1, a2, a3, errorJPerMol.subarray(from, i - 1));
    }
    from = i;
  }
  return { c0, c1, c2, c3, errorJPerMol, scatter: null };
}

let changed = new Float64Array(128);

function errorOf(
  x: Float64Array,
  y: Float64Array,
  m: number,
  a0: Float64Array,
  a1: Float64Array,
  a2: Float64Array,
  a3: Float64Array,
  error: Float64Array,
): void {
  if (m === 2) {
    // Two points: nothing is known of the bend between them; a tenth of the change is taken.
    error[0] = (Math.abs(y[1] - y[0]) * (x[1] - x[0])) / 10;
    return;
  }
  if (m > changed.length) changed = new Float64Array(2 * m);
  for (let parity = 0; parity < 2; parity++) {
    changed.fill(0, 0, m - 1);
    leaveOut(x, y, m, parity, a0, a1, a2, a3, changed);
    for (let i = 0; i < m - 1; i++) {
      const change = Math.abs(changed[i]);
      if (change > error[i]) error[i] = change;
    }
  }
}
