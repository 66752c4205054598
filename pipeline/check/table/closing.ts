import { REFERENCE_TEMPERATURE_K } from '../../core/constants.js';
import type { Residuals } from './residuals.js';
import { cellU, type TableRows } from './table-rows.js';

/** How far a whole table closes: each of its conditions (dH, dS, the three functions of a row, H(Tr) = 0) counts once. */
export interface Closing {
  readonly tested: number;
  readonly failing: number;
  /** Sum of squared normalised residuals, and the same with each held below `CAP`. */
  readonly squares: number;
  readonly capped: number;
  /** Sum of the squared interpolation errors of Cp [J2/mol2]: a run of wrong ones makes it rough at its ends. */
  readonly roughness: number;
  /** By row: 1 where a condition that begins there fails. */
  readonly bad: Uint8Array;
}

/** A condition fails beyond this many standard uncertainties. */
const FAILING = 4;
const CAP = 50;
/** A row this near is the row at 298.15 K, whatever the scale [K]. */
const SAME_K = 0.02;

export function closing(rows: TableRows, res: Residuals): Closing {
  const { n, h, s, f, t } = rows;
  const bad = new Uint8Array(n);
  let tested = 0;
  let failing = 0;
  let squares = 0;
  let capped = 0;
  let roughness = 0;
  const count = (y: number, variance: number, row: number): void => {
    if (!(variance > 0)) return;
    const square = (y * y) / variance;
    tested++;
    squares += square;
    capped += Math.min(square, CAP);
    if (square > FAILING * FAILING) {
      failing++;
      bad[row] = 1;
    }
  };
  for (let i = 0; i < n; i++) {
    const r = rows.row[i];
    if (res.hasClosure[i] === 1 && s !== null && h !== null && f !== null) {
      count(res.closure[i], cellU(s, r) ** 2 + cellU(f, r) ** 2 + (cellU(h, r) / t[i]) ** 2, i);
    }
    if (i === n - 1 || res.usable[i] === 0) continue;
    const next = rows.row[i + 1];
    const e2 = res.e[i] * res.e[i] + res.own[i];
    roughness += res.e[i] * res.e[i];
    if (h !== null && h.present[r] === 1 && h.present[next] === 1) {
      count(h.values[next] - h.values[r] - res.q[i], cellU(h, r) ** 2 + cellU(h, next) ** 2 + e2, i);
    }
    if (s !== null && s.present[r] === 1 && s.present[next] === 1) {
      const c = res.c[i];
      const spread = e2 * (c * c + res.open[i] * res.open[i]);
      count(s.values[next] - s.values[r] - res.p[i], cellU(s, r) ** 2 + cellU(s, next) ** 2 + spread, i);
    }
  }
  const zero = enthalpyAtReference(rows);
  if (zero !== null) count(zero.enthalpy, zero.u * zero.u, zero.at);
  return { tested, failing, squares, capped, roughness, bad };
}

/** H - H(Tr) at the row of Tr, which is zero where the increments count from there; null where the table has no such row. */
export function enthalpyAtReference(rows: TableRows): { enthalpy: number; u: number; at: number } | null {
  const { series, h } = rows;
  if (h === null || h.is !== 'enthalpy-increment') return null;
  if (series.incrementsFrom !== null && series.incrementsFrom !== series.phase) return null;
  for (let i = 0; i < rows.n; i++) {
    const way = rows.t[i] - REFERENCE_TEMPERATURE_K;
    if (way > SAME_K) return null;
    if (way < -SAME_K || h.present[rows.row[i]] === 0) continue;
    const enthalpy = h.values[rows.row[i]] - rows.cp[i] * way;
    return { enthalpy, u: Math.max(cellU(h, rows.row[i]), 1e-3 * Math.abs(rows.cp[i])), at: i };
  }
  return null;
}
