import type { SeriesQuantity } from '../../../schemas/harmonised.js';
import type { Policy } from '../../../schemas/policy.js';
import { GROSS } from './gross-pair.js';
import { between, digitU, type Residuals, standoff } from './residuals.js';
import { cellU, type TableRows } from './table-rows.js';

/** Above this a residual is looked at; naming needs more. */
const SCREEN = 3.5;

/** Rows around which something does not close. */
export function screen(rows: TableRows, res: Residuals, policy: Policy): number[] {
  const hot: number[] = [];
  const { n, h, s, f } = rows;
  for (let i = 0; i < n; i++) {
    let over = 0;
    if (res.hasClosure[i] === 1 && s !== null && h !== null && f !== null) {
      const r = rows.row[i];
      const u2 = cellU(s, r) ** 2 + cellU(f, r) ** 2 + (cellU(h, r) / rows.t[i]) ** 2;
      over = (res.closure[i] * res.closure[i]) / u2;
    }
    if (i < n - 1 && res.usable[i] !== 0) {
      const r = rows.row[i];
      const next = rows.row[i + 1];
      const hasH = h !== null && h.present[r] === 1 && h.present[next] === 1;
      const hasS = s !== null && s.present[r] === 1 && s.present[next] === 1;
      if (hasH || hasS) {
        const e2 = res.e[i] * res.e[i] + res.own[i];
        const c = res.c[i];
        const uh2 = hasH ? cellU(h, r) ** 2 + cellU(h, next) ** 2 : 0;
        const us2 = hasS ? cellU(s, r) ** 2 + cellU(s, next) ** 2 : 0;
        const yh = hasH ? h.values[next] - h.values[r] - res.q[i] : 0;
        const ys = hasS ? s.values[next] - s.values[r] - res.p[i] : 0;
        const vh = uh2 + e2;
        const vs = us2 + e2 * (c * c + res.open[i] * res.open[i]);
        if (hasH) over = Math.max(over, (yh * yh) / vh);
        if (hasS) over = Math.max(over, (ys * ys) / vs);
        if (hasH && hasS) {
          const k = e2 * c;
          const det = vh * vs - k * k;
          over = Math.max(over, (yh * yh * vs - 2 * yh * ys * k + ys * ys * vh) / det / 1.6);
        }
      }
    }
    if (over <= SCREEN * SCREEN) {
      const least = 0.6 * policy.material.heatCapacityRelative * Math.abs(rows.cp[i]);
      const stand = standoff(rows, i, least);
      if (stand.interior && Math.abs(stand.difference) > SCREEN * stand.u) over = SCREEN * SCREEN + 1;
      // Two wrong ones near one another make each other's u as large as themselves.
      if (stand.interior && Math.abs(stand.difference) > GROSS * Math.abs(rows.cp[i])) over = SCREEN * SCREEN + 1;
      // Too few rows for a stand-off: a wrong Cp makes the interpolation error of its own intervals as large as itself.
      if (!stand.interior && i > rows.from[i] && i < rows.to[i] && Math.abs(rows.cp[i] - between(rows, i)) >= least) {
        if (opensDigits(rows, res, i - 1) || opensDigits(rows, res, i)) over = SCREEN * SCREEN + 1;
      }
    }
    if (over > SCREEN * SCREEN) hot.push(i);
  }
  return hot;
}

/** Whether dH or dS of interval i differs from the integral by more than the digits allow. */
function opensDigits(rows: TableRows, res: Residuals, i: number): boolean {
  if (res.usable[i] !== 1) return false;
  const { h, s } = rows;
  const r = rows.row[i];
  const next = rows.row[i + 1];
  const u = digitU(rows, i);
  const opens = (q: SeriesQuantity | null, integral: number, uq: number): boolean =>
    q !== null &&
    q.present[r] === 1 &&
    q.present[next] === 1 &&
    Math.abs(q.values[next] - q.values[r] - integral) > SCREEN * uq;
  return opens(h, res.q[i], u.h) || opens(s, res.p[i], u.s);
}
