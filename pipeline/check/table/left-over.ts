import type { Policy } from '../../../schemas/policy.js';
import { digitU, type Residuals } from './residuals.js';
import { isSecondTested } from './second-row.js';
import { cellU, type TableRows } from './table-rows.js';

/** A place that does not close and that no single cell explains. */
export interface Anomaly {
  readonly check: 'entropy' | 'enthalpy' | 'closure' | 'heat-capacity';
  readonly row: number;
  readonly nextRow: number;
  readonly difference: number;
  readonly tolerance: number;
  readonly material: boolean;
  /** More than a tenth of what the interval itself changes by: no step between two fits, but something broken. */
  readonly gross: boolean;
}

/** By check: the smallest error of a cell that would have been named wherever it stood; null where nothing is checked. */
export interface Detectable {
  entropy: number | null;
  enthalpy: number | null;
  closure: number | null;
  heatCapacity: number | null;
}

/** The worst place of each check that no single cell explains. */
export function leftOver(rows: TableRows, res: Residuals, policy: Policy): Anomaly[] {
  const out: Anomaly[] = [];
  const { n, h, s, f } = rows;
  const limit = policy.cell.threshold;
  const worst: Partial<Record<Anomaly['check'], Anomaly>> = {};
  const keep = (a: Anomaly): void => {
    const before = worst[a.check];
    if (before === undefined || Math.abs(a.difference) / a.tolerance > Math.abs(before.difference) / before.tolerance) {
      worst[a.check] = a;
    }
  };
  for (let i = 0; i < n; i++) {
    const r = rows.row[i];
    if (res.hasClosure[i] === 1 && s !== null && h !== null && f !== null) {
      // Only rounding can explain a difference here: its worst case is the tolerance.
      const bound = s.halfUnit[r] + f.halfUnit[r] + h.halfUnit[r] / rows.t[i];
      const own = Math.hypot(s.uOwn[r], f.uOwn[r], h.uOwn[r] / rows.t[i]);
      const tolerance = 1.05 * bound + limit * own;
      if (Math.abs(res.closure[i]) > 2 * tolerance) {
        keep({
          check: 'closure',
          row: r,
          nextRow: r,
          difference: res.closure[i],
          tolerance,
          material: Math.abs(res.closure[i]) > materialS(policy, s.values[r]),
          gross: Math.abs(res.closure[i]) > 0.1 * Math.abs(s.values[r]),
        });
      }
    }
    if (i === n - 1 || res.usable[i] !== 1) continue;
    const next = rows.row[i + 1];
    const digits = digitU(rows, i);
    const e = Math.sqrt(res.e[i] * res.e[i] + res.own[i]);
    if (h !== null && h.present[r] === 1 && h.present[next] === 1) {
      const difference = h.values[next] - h.values[r] - res.q[i];
      const tolerance = limit * Math.hypot(digits.h, e);
      if (Math.abs(difference) > tolerance)
        keep({
          check: 'enthalpy',
          row: r,
          nextRow: next,
          difference,
          tolerance,
          material: Math.abs(difference) > policy.material.enthalpyJPerMol,
          gross: Math.abs(difference) > 0.1 * Math.abs(res.q[i]),
        });
    }
    if (s !== null && s.present[r] === 1 && s.present[next] === 1) {
      const difference = s.values[next] - s.values[r] - res.p[i];
      const tolerance = limit * Math.hypot(digits.s, e * Math.hypot(res.c[i], res.open[i]));
      if (Math.abs(difference) > tolerance)
        keep({
          check: 'entropy',
          row: r,
          nextRow: next,
          difference,
          tolerance,
          material: Math.abs(difference) > materialS(policy, s.values[r]),
          gross: Math.abs(difference) > 0.1 * Math.abs(res.p[i]),
        });
    }
  }
  for (const a of Object.values(worst)) out.push(a);
  return out;
}

export function materialS(policy: Policy, value: number): number {
  return Math.max(policy.material.entropyRelative * Math.abs(value), policy.material.entropyJPerMolK);
}

/** The smallest error of a cell that would have been named wherever it stood in the table. */
export function smallest(rows: TableRows, res: Residuals, policy: Policy): Detectable {
  // Power 80 % at the naming threshold: threshold + 0.84 standard deviations of the interval's check.
  const times = policy.cell.threshold + 0.84;
  const out: Detectable = { entropy: null, enthalpy: null, closure: null, heatCapacity: null };
  const { h, s, f } = rows;
  const alone = h === null && s === null;
  for (let i = 0; i < rows.n - 1; i++) {
    const r = rows.row[i];
    const next = rows.row[i + 1];
    if (res.usable[i] !== 1) continue;
    const digits = digitU(rows, i);
    const e = Math.sqrt(res.e[i] * res.e[i] + res.own[i]);
    if (h !== null && h.present[r] === 1 && h.present[next] === 1)
      out.enthalpy = Math.max(out.enthalpy ?? 0, times * Math.hypot(digits.h, e), 10 * h.halfUnit[r]);
    if (s !== null && s.present[r] === 1 && s.present[next] === 1)
      out.entropy = Math.max(out.entropy ?? 0, times * Math.hypot(digits.s, e * res.open[i]), 10 * s.halfUnit[r]);
    if (res.hasClosure[i] === 1 && s !== null && h !== null && f !== null) {
      const u = Math.hypot(cellU(s, r), cellU(f, r), cellU(h, r) / rows.t[i]);
      out.closure = Math.max(out.closure ?? 0, times * u, 10 * s.halfUnit[r]);
    }
    const scatter = i > rows.from[i] && res.usable[i - 1] === 1 ? scatterOf(rows, i, alone) : 0;
    if (scatter > 0) {
      // An even table's stand-off is as unsure as the thinned integral beside it, per kelvin.
      const left = res.e[i - 1] / (rows.t[i] - rows.t[i - 1]);
      const right = res.e[i] / (rows.t[i + 1] - rows.t[i]);
      const spread = Math.max(left, right);
      out.heatCapacity = Math.max(
        out.heatCapacity ?? 0,
        times * Math.sqrt(spread * spread + (scatter * rows.uCp[i]) ** 2),
        policy.material.heatCapacityRelative * Math.abs(rows.cp[i]),
      );
    }
  }
  return out;
}

/**
 * How the scatter of Cp enters the stand-off of an inner row; 0 where a wrong Cp is not looked for. The second row of heat
 * capacities alone is held against a parabola through eight rows, one step on.
 */
function scatterOf(rows: TableRows, i: number, alone: boolean): number {
  if (!alone) return 1.45;
  const depth = i - rows.from[i];
  if (depth === 1 || rows.to[i] - i === 1) return isSecondTested(rows, i) ? 1.6 : 0;
  return depth === 2 && rows.t[rows.from[i]] === 0 ? 0 : 1.45;
}
