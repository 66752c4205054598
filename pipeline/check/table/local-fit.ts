import type { TableRows } from './table-rows.js';

/** What other rows give for a row's Cp, and its u: scatter of the fit and of the row itself, and what the next degree would change. */
export interface Fitted {
  value: number;
  u: number;
}

/** Fewest and most rows of a fit. */
export const LEAST_ROWS = 4;
export const MOST_ROWS = 8;
const HIGHEST = 3;

/**
 * Least-squares polynomials of degree 1 to 3 through the nearest 4, 5 … of the rows `among` (nearest first), by orthogonal
 * polynomials (Forsythe, J. SIAM 5 (1957) 74); of all of them the one whose u at `target` is the least. Infinite u
 * where there are fewer than four rows. Scatter is the stated one, or what the fit leaves where that is more.
 */
export function localFit(rows: TableRows, among: Int32Array, target: number): Fitted {
  const best = { value: 0, u: Number.POSITIVE_INFINITY };
  for (let n = LEAST_ROWS; n <= among.length; n++) fitNearest(rows, among, n, target, best);
  return best;
}

const MOST_POINTS = MOST_ROWS + 1;
const x = new Float64Array(MOST_POINTS);
const phi = new Float64Array(MOST_POINTS);
const before = new Float64Array(MOST_POINTS);
const rest = new Float64Array(MOST_POINTS);

/** `best` is replaced by any degree that is surer. */
function fitNearest(rows: TableRows, among: Int32Array, n: number, target: number, best: Fitted): void {
  const { t, cp, uCp } = rows;
  let stated2 = 0;
  for (let j = 0; j < n; j++) {
    const row = among[j];
    x[j] = t[row] - t[target];
    phi[j] = 1;
    before[j] = 0;
    rest[j] = cp[row];
    stated2 += (uCp[row] * uCp[row]) / n;
  }
  // Values at the target, where x = 0.
  let here = 1;
  let hereBefore = 0;
  let normBefore = 1;
  let value = 0;
  let weights2 = 0;
  let scatter2 = 0;
  for (let degree = 0; degree <= HIGHEST + 1 && degree < n; degree++) {
    let norm = 0;
    let moment = 0;
    let along = 0;
    for (let j = 0; j < n; j++) {
      norm += phi[j] * phi[j];
      moment += phi[j] * phi[j] * x[j];
      along += phi[j] * rest[j];
    }
    const term = (along / norm) * here;
    if (degree > 1) {
      const own2 = Math.max(uCp[target] * uCp[target], scatter2);
      const u = Math.sqrt(weights2 * Math.max(stated2, scatter2) + own2 + term * term);
      if (u < best.u) {
        best.u = u;
        best.value = value;
      }
    }
    value += term;
    weights2 += (here * here) / norm;
    let squares = 0;
    const a = moment / norm;
    const b = degree === 0 ? 0 : norm / normBefore;
    for (let j = 0; j < n; j++) {
      rest[j] -= (along / norm) * phi[j];
      squares += rest[j] * rest[j];
      const next = (x[j] - a) * phi[j] - b * before[j];
      before[j] = phi[j];
      phi[j] = next;
    }
    scatter2 = n > degree + 1 ? squares / (n - degree - 1) : 0;
    const nextHere = -a * here - b * hereBefore;
    hereBefore = here;
    here = nextHere;
    normBefore = norm;
  }
}
