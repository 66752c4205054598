import type { TableColumn } from './column-change.js';
import type { Residuals } from './residuals.js';
import type { RatioPairs } from './robust-ratio.js';
import { cellU, type TableRows } from './table-rows.js';

/**
 * The conditions that hold a column of the set against one outside it, factor * x = y: those of dH, of dS, and of the three
 * functions of a row, each by itself, since another column that is wrong too spoils only some of them.
 */
export function pairsOf(
  rows: TableRows,
  res: Residuals,
  set: ReadonlySet<TableColumn>,
  within: (i: number) => boolean,
): RatioPairs[] {
  const heats = noPairs();
  const entropies = noPairs();
  const functions = noPairs();
  const { n, h, s, f, t } = rows;
  const hasCp = set.has('heatCapacity');
  const hasH = set.has('enthalpy');
  const hasS = set.has('entropy');
  const hasF = set.has('gibbsFunction');
  for (let i = 0; i < n; i++) {
    if (!within(i)) continue;
    const r = rows.row[i];
    if (res.hasClosure[i] === 1 && s !== null && h !== null && f !== null) {
      // S - F - H/T = 0, parted into what the factor acts on and the rest.
      let x = 0;
      let y = 0;
      let vx = 0;
      let vy = 0;
      for (const [inSet, value, u] of [
        [hasS, s.values[r], cellU(s, r)],
        [hasF, -f.values[r], cellU(f, r)],
        [hasH, -h.values[r] / t[i], cellU(h, r) / t[i]],
      ] as const) {
        if (inSet) {
          x += value;
          vx += u * u;
        } else {
          y -= value;
          vy += u * u;
        }
      }
      if (vx > 0 && vy > 0) add(functions, true, x, Math.sqrt(vx), y, Math.sqrt(vy));
    }
    if (i === n - 1 || res.usable[i] !== 1 || !within(i + 1)) continue;
    const next = rows.row[i + 1];
    const e = Math.sqrt(res.e[i] * res.e[i] + res.own[i]);
    if (hasH !== hasCp && h !== null && h.present[r] === 1 && h.present[next] === 1) {
      add(heats, hasH, h.values[next] - h.values[r], Math.hypot(cellU(h, r), cellU(h, next)), res.q[i], e);
    }
    if (hasS !== hasCp && s !== null && s.present[r] === 1 && s.present[next] === 1) {
      const u = e * Math.hypot(res.c[i], res.open[i]);
      add(entropies, hasS, s.values[next] - s.values[r], Math.hypot(cellU(s, r), cellU(s, next)), res.p[i], u);
    }
  }
  return [heats, entropies, functions].filter(({ x }) => x.length > 0);
}

export function noPairs(): RatioPairs {
  return { x: [], y: [], ux: [], uy: [] };
}

/** The factor acts on `a` where that is in the set, else on `b`. */
export function add(to: RatioPairs, inSet: boolean, a: number, ua: number, b: number, ub: number): void {
  to.x.push(inSet ? a : b);
  to.ux.push(inSet ? ua : ub);
  to.y.push(inSet ? b : a);
  to.uy.push(inSet ? ub : ua);
}
