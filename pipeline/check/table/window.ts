import { factorise, whiten } from '../../core/numeric/cholesky.js';
import { errorOf, interval, type Residuals, TWIN } from './residuals.js';
import { cellU, type TableRows } from './table-rows.js';

/** The kinds of error of one row that leave different patterns in the three row checks. */
export type Pattern = 'entropy' | 'enthalpy' | 'gibbs-function' | 'entropy+gibbs' | 'enthalpy+gibbs' | 'heat-capacity';

export interface Hypothesis {
  readonly row: number;
  readonly pattern: Pattern;
  /** Normalised: Baarda's w of the one datum. */
  readonly w: number;
  /** Printed minus true, in the unit of the first cell of the pattern. */
  readonly error: number;
  readonly uError: number;
  /** Sum of squares before and after the correction, and the conditions left. */
  readonly before: number;
  readonly after: number;
  readonly freedom: number;
}

/** The rest closes once the cell is right, or the cell explains nearly all. */
export function fits({ before, after, freedom }: Hypothesis): boolean {
  return after / Math.max(1, freedom) < 5 || after < 0.05 * before;
}

const HALF_WIDTH = 3;

/**
 * The conditions of the rows around `centre`: closure of each row, dH and dS of each interval against the integrals of Cp,
 * with their covariance from the digits and, per interval, the interpolation error e as e^2 [1, c; c, c^2 + open^2]. An
 * interpolant bent until it meets dH leaves dS sharp.
 */
export class Window {
  private readonly low: number;
  private readonly high: number;
  private readonly y: Float64Array;
  private readonly factor: Float64Array;
  private readonly m: number;
  /** Coefficient of S, H and F of each row (3 a row) in each condition. */
  private readonly b: Float64Array;
  private readonly columns: number;
  readonly ok: boolean;
  readonly squares: number;

  constructor(rows: TableRows, res: Residuals, centre: number, withoutCp = -1) {
    this.low = Math.max(0, centre - HALF_WIDTH);
    this.high = Math.min(rows.n - 1, centre + HALF_WIDTH);
    const size = this.high - this.low + 1;
    this.columns = 3 * size;
    const most = 3 * size;
    const b = new Float64Array(most * this.columns);
    const y = new Float64Array(most);
    const add = new Float64Array(most * most);
    let m = 0;
    const { h, s, f, t } = rows;
    const q = new Float64Array(2);
    for (let k = this.low; k <= this.high; k++) {
      const at = 3 * (k - this.low);
      const r = rows.row[k];
      if (res.hasClosure[k] === 1) {
        b[m * this.columns + at] = 1;
        b[m * this.columns + at + 1] = -1 / t[k];
        b[m * this.columns + at + 2] = -1;
        y[m] = res.closure[k];
        m++;
      }
      if (k === this.high || res.usable[k] === 0) continue;
      const next = rows.row[k + 1];
      const hasH = h !== null && h.present[r] === 1 && h.present[next] === 1;
      const hasS = s !== null && s.present[r] === 1 && s.present[next] === 1;
      if (!hasH && !hasS) continue;
      if (res.usable[k] === TWIN) {
        if (hasH) {
          b[m * this.columns + at + 1] = -1;
          b[m * this.columns + at + 4] = 1;
          y[m] = h.values[next] - h.values[r];
          m++;
        }
        if (hasS) {
          b[m * this.columns + at] = -1;
          b[m * this.columns + at + 3] = 1;
          y[m] = s.values[next] - s.values[r];
          m++;
        }
        continue;
      }
      let iq = res.q[k];
      let ip = res.p[k];
      let e = res.e[k];
      if (withoutCp >= 0 && Math.abs(k - withoutCp) <= 4) {
        interval(rows, k, withoutCp, q);
        iq = q[0];
        ip = q[1];
        // The thinned rows are four apart around the missing one, this integral's own only two: of the sixteen that a smooth
        // curve gains from that, four are taken.
        e = errorOf(rows, k, withoutCp, iq) / 4;
      }
      const e2 = e * e + res.own[k];
      const c = res.c[k];
      let atH = -1;
      if (hasH) {
        b[m * this.columns + at + 1] = -1;
        b[m * this.columns + at + 4] = 1;
        y[m] = h.values[next] - h.values[r] - iq;
        add[m * most + m] = e2;
        atH = m++;
      }
      if (hasS) {
        b[m * this.columns + at] = -1;
        b[m * this.columns + at + 3] = 1;
        y[m] = s.values[next] - s.values[r] - ip;
        add[m * most + m] = e2 * (c * c + res.open[k] * res.open[k]);
        if (atH >= 0) {
          add[m * most + atH] = e2 * c;
          add[atH * most + m] = e2 * c;
        }
        m++;
      }
    }
    const u2 = new Float64Array(this.columns);
    for (let k = this.low; k <= this.high; k++) {
      const at = 3 * (k - this.low);
      const r = rows.row[k];
      if (s !== null && s.present[r] === 1) u2[at] = cellU(s, r) ** 2;
      if (h !== null && h.present[r] === 1) u2[at + 1] = cellU(h, r) ** 2;
      if (f !== null && f.present[r] === 1) u2[at + 2] = cellU(f, r) ** 2;
    }
    const a = new Float64Array(m * m);
    for (let i = 0; i < m; i++) {
      for (let j = 0; j <= i; j++) {
        let v = add[i * most + j];
        for (let d = 0; d < this.columns; d++) {
          const x = b[i * this.columns + d];
          if (x !== 0) v += x * u2[d] * b[j * this.columns + d];
        }
        a[i * m + j] = v;
        a[j * m + i] = v;
      }
    }
    // A cell that is exactly zero by definition (H at Tr) has no rounding; a trace keeps the matrix definite.
    for (let i = 0; i < m; i++) a[i * m + i] *= 1 + 1e-12;
    this.ok = m > 0 && factorise(a, m);
    this.factor = a;
    this.m = m;
    this.b = b;
    this.y = y.slice(0, m);
    let squares = 0;
    if (this.ok) {
      whiten(this.factor, m, this.y);
      for (let i = 0; i < m; i++) squares += this.y[i] * this.y[i];
    }
    this.squares = squares;
  }

  get conditions(): number {
    return this.m;
  }

  /** The pattern of one row's S, H or -[G - H]/T, alone or with the one computed from it. */
  test(rows: TableRows, row: number, pattern: Exclude<Pattern, 'heat-capacity'>): Hypothesis | null {
    if (!this.ok || row < this.low || row > this.high) return null;
    const r = rows.row[row];
    const has = (q: { present: Uint8Array } | null): boolean => q !== null && q.present[r] === 1;
    const t = rows.t[row];
    const direction = [0, 0, 0];
    if (pattern === 'entropy' || pattern === 'entropy+gibbs') direction[0] = 1;
    if (pattern === 'enthalpy' || pattern === 'enthalpy+gibbs') direction[1] = 1;
    if (pattern === 'gibbs-function' || pattern === 'entropy+gibbs') direction[2] = 1;
    if (pattern === 'enthalpy+gibbs') direction[2] = -1 / t;
    if (direction[0] !== 0 && !has(rows.s)) return null;
    if (direction[1] !== 0 && !has(rows.h)) return null;
    if (direction[2] !== 0 && !has(rows.f)) return null;
    const at = 3 * (row - this.low);
    const z = new Float64Array(this.m);
    for (let i = 0; i < this.m; i++) {
      for (let d = 0; d < 3; d++) z[i] += this.b[i * this.columns + at + d] * direction[d];
    }
    whiten(this.factor, this.m, z);
    let zz = 0;
    let zy = 0;
    for (let i = 0; i < this.m; i++) {
      zz += z[i] * z[i];
      zy += z[i] * this.y[i];
    }
    if (!(zz > 0)) return null;
    return {
      row,
      pattern,
      w: zy / Math.sqrt(zz),
      error: zy / zz,
      uError: 1 / Math.sqrt(zz),
      before: this.squares,
      after: this.squares - (zy * zy) / zz,
      freedom: this.m - 1,
    };
  }

  /** The sum of squares that another window's residuals have under this one's covariance is not comparable; the raw residuals are. */
  squaresOf(raw: Float64Array): number {
    const z = raw.slice();
    whiten(this.factor, this.m, z);
    let sum = 0;
    for (let i = 0; i < this.m; i++) sum += z[i] * z[i];
    return sum;
  }

  /** Residuals before whitening, in the order of the conditions. */
  raw(): Float64Array {
    const out = new Float64Array(this.m);
    for (let i = 0; i < this.m; i++) {
      let v = 0;
      for (let k = 0; k <= i; k++) v += this.factor[i * this.m + k] * this.y[k];
      out[i] = v;
    }
    return out;
  }
}

/** "This Cp" by the integrals alone. */
export interface ByIntegrals extends Hypothesis {
  /** What w would be if the row's Cp were off by all of its stand-off, and which share of that the integrals ask for. */
  readonly foreseen: number;
  readonly share: number;
}

/** "This Cp": how much better the window closes when the row's Cp is left out, judged with the tolerance made without it. */
export function testHeatCapacity(rows: TableRows, res: Residuals, row: number): ByIntegrals | null {
  const all = new Window(rows, res, row);
  const without = new Window(rows, res, row, row);
  if (!all.ok || !without.ok || all.conditions !== without.conditions) return null;
  const y = all.raw();
  const before = without.squaresOf(y);
  const after = without.squares;
  const change = without.raw();
  for (let i = 0; i < y.length; i++) change[i] = y[i] - change[i];
  const foreseen2 = without.squaresOf(change);
  return {
    row,
    pattern: 'heat-capacity',
    w: Math.sqrt(Math.max(0, before - after)),
    error: 0,
    uError: 0,
    before,
    after,
    freedom: without.conditions - 1,
    foreseen: Math.sqrt(foreseen2),
    // before - after = 2 y.c - c.c in the metric of Q, y the residuals and c the change: the share is y.c / c.c.
    share: (before - after + foreseen2) / (2 * foreseen2),
  };
}
