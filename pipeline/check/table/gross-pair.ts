import { byStandoff, heatCapacityHypothesis } from './heat-capacity-hypothesis.js';
import { residuals } from './residuals.js';
import type { TableRows } from './table-rows.js';
import { fits, type Hypothesis, Window } from './window.js';

/** Two wrong Cp hide one another only within a stencil's reach. */
const REACH = 6;

/**
 * Two grossly wrong heat capacities near one another, where neither is named alone because the other spoils its neighbours:
 * each must stand off, and its neighbours not, once the other is left out. The surer one is given.
 */
export function grossPair(rows: TableRows, hot: readonly number[], threshold: number): Hypothesis | null {
  let best: Hypothesis | null = null;
  let least = threshold;
  const first = Math.max(0, hot[0] - 2);
  const last = Math.min(rows.n - 1, hot[hot.length - 1] + 2);
  for (let k = first; k < last; k++) {
    for (let m = k + 1; m <= Math.min(last, k + REACH) && m < rows.to[k]; m++) {
      if (k === rows.from[k]) break;
      const a = gross(without(rows, m), k);
      if (a === null || Math.abs(a.w) <= least) continue;
      const b = gross(without(rows, k), m - 1);
      if (b === null || Math.abs(b.w) <= least) continue;
      if (!isBorneOut(without(rows, m), k, threshold) || !isBorneOut(without(rows, k), m - 1, threshold)) continue;
      least = Math.min(Math.abs(a.w), Math.abs(b.w));
      best = Math.abs(a.w) >= Math.abs(b.w) ? a : { ...b, row: m };
    }
  }
  return best;
}

/** Least share of Cp by which both are off: a real bend of so much, gone without two of its rows, is no bend. */
export const GROSS = 0.25;

function gross(rows: TableRows, k: number): Hypothesis | null {
  const one = byStandoff(rows, k);
  if (one === null || one.after > 0) return null;
  return Math.abs(one.error) >= GROSS * Math.abs(rows.cp[k] - one.error) ? one : null;
}

/** What entropies and enthalpies there are must want it too. */
function isBorneOut(rows: TableRows, k: number, threshold: number): boolean {
  if (rows.h === null && rows.s === null) return true;
  const res = residuals(rows, true);
  const one = heatCapacityHypothesis(rows, res, k, new Window(rows, res, k));
  return one !== null && one.w > threshold && fits(one);
}

/** The rows without row m, which is not an end of its stretch. */
function without(rows: TableRows, m: number): TableRows {
  const keep = (_: number, i: number): boolean => i !== m;
  const shift = (i: number): number => (i > m ? i - 1 : i);
  return {
    ...rows,
    n: rows.n - 1,
    t: rows.t.filter(keep),
    cp: rows.cp.filter(keep),
    uCp: rows.uCp.filter(keep),
    row: rows.row.filter(keep),
    from: rows.from.filter(keep).map(shift),
    to: rows.to.filter(keep).map(shift),
  };
}
