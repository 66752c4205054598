import { cubicIntegral } from '../core/numeric/cubic.js';
import { notAKnotSpline } from '../core/numeric/spline.js';

let size = 0;
let coarseX = new Float64Array(0);
let coarseY = coarseX;
let b0 = coarseX;
let b1 = coarseX;
let b2 = coarseX;
let b3 = coarseX;

/**
 * By how much the integral over each interval changes when every second of the m points of a parity (0 or 1) is left out,
 * the ends kept: into `change` [J/mol], which stays as it is where nothing is left out. a0..a3 are the spline through all.
 */
export function leaveOut(
  x: Float64Array,
  y: Float64Array,
  m: number,
  parity: number,
  a0: Float64Array,
  a1: Float64Array,
  a2: Float64Array,
  a3: Float64Array,
  change: Float64Array,
): void {
  if (m > size) {
    size = 2 * m;
    [coarseX, coarseY, b0, b1, b2, b3] = Array.from({ length: 6 }, () => new Float64Array(size));
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
    change[i] = coarse - cubicIntegral(a0[i], a1[i], a2[i], a3[i], x[i + 1] - x[i]);
  }
}
