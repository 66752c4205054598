import type { Series, SeriesQuantity } from '../../../schemas/harmonised.js';
import type { Policy } from '../../../schemas/policy.js';
import type { NumberQuantity } from '../../../schemas/quantities.js';
import { cellAsRead } from './cell-as-read.js';
import type { WholeColumns } from './column-cause.js';
import { changed } from './column-change.js';
import type { TableContext } from './column-hypothesis.js';
import { grossPair } from './gross-pair.js';
import { heatCapacityHypothesis } from './heat-capacity-hypothesis.js';
import { type Anomaly, type Detectable, leftOver, smallest } from './left-over.js';
import { withOwnDigits } from './own-digits.js';
import { type Residuals, residuals } from './residuals.js';
import { screen } from './screen.js';
import { type TableRows, tableRows } from './table-rows.js';
import { wholeColumns, worthTrying } from './whole-columns.js';
import { fits, type Hypothesis, type Pattern, Window } from './window.js';

/** A cell that the pattern of the row checks points to. */
export interface SuspectCell {
  /** Row of the series. */
  readonly row: number;
  readonly quantity: NumberQuantity;
  readonly pattern: Pattern;
  readonly w: number;
  readonly observed: number;
  readonly proposed: number;
  readonly uProposed: number;
  /** Other cells that the data cannot tell from this one (chi square within 9), best first. */
  readonly rivals: readonly {
    readonly row: number;
    readonly quantity: NumberQuantity;
    readonly w: number;
    readonly proposed: number;
    readonly uProposed: number;
  }[];
}

export interface TableVerdict {
  /** Whole columns that one law puts right; the cells below are those that stand out beside it. */
  readonly columns: readonly WholeColumns[];
  readonly cells: readonly SuspectCell[];
  readonly anomalies: readonly Anomaly[];
  readonly detectable: Detectable;
}

const MOST_NAMES = 12;

/** Takes the best explained cell, leaves it out, and looks again; whole columns first, where much does not close. */
export function nameCells(series: Series, policy: Policy, context: TableContext): TableVerdict | null {
  const cells: SuspectCell[] = [];
  let columns: readonly WholeColumns[] = [];
  let current = series;
  let rows = tableRows(current);
  if (rows === null) return null;
  let res = residuals(rows);
  let detectable = smallest(rows, res, policy);
  let hot = screen(rows, res, policy);
  if (worthTrying(rows, hot.length)) {
    columns = wholeColumns(series, context);
    if (columns.length > 0) {
      current = withOwnDigits(series);
      for (const { changes, run, uToo } of columns) current = changed(current, changes, run, uToo);
      rows = tableRows(current) as TableRows;
      res = residuals(rows);
      detectable = smallest(rows, res, policy);
      hot = screen(rows, res, policy);
    }
  }
  if (hot.length > 0) {
    res = residuals(rows, true);
    hot = screen(rows, res, policy);
  }
  while (hot.length > 0 && cells.length < MOST_NAMES) {
    const best = bestOf(rows, res, hot, policy) ?? bestOfPair(rows, hot, policy);
    if (best === null) break;
    cells.push(best);
    current = withoutCells(current, best);
    const next = tableRows(current);
    if (next === null) break;
    rows = next;
    res = residuals(rows, true);
    hot = screen(rows, res, policy);
  }
  const anomalies = hot.length === 0 ? [] : leftOver(rows, res, policy);
  const asRead = columns.length === 0 ? cells : cells.map((cell) => cellAsRead(series, columns, cell));
  return { columns, cells: asRead, anomalies, detectable };
}

const PATTERNS = ['entropy', 'enthalpy', 'gibbs-function', 'entropy+gibbs', 'enthalpy+gibbs'] as const;

function bestOf(rows: TableRows, res: Residuals, hot: readonly number[], policy: Policy): SuspectCell | null {
  const candidates = new Set<number>();
  for (const i of hot) for (let k = i - 1; k <= i + 2; k++) if (k >= 0 && k < rows.n) candidates.add(k);
  const all: Hypothesis[] = [];
  for (const k of candidates) {
    const window = new Window(rows, res, k);
    for (const pattern of PATTERNS) {
      const one = window.test(rows, k, pattern);
      if (one !== null) all.push(one);
    }
    const cp = heatCapacityHypothesis(rows, res, k, window);
    if (cp !== null) all.push(cp);
  }
  all.sort((a, b) => Math.abs(b.w) - Math.abs(a.w) || a.row - b.row);
  for (const one of all) {
    if (Math.abs(one.w) <= policy.cell.threshold) return null;
    if (!worthNaming(rows, one, policy)) continue;
    if (!fits(one)) continue;
    const rivals = all.filter(
      (o) =>
        o !== one &&
        !(o.row === one.row && firstCell(o.pattern) === firstCell(one.pattern)) &&
        Math.abs(o.row - one.row) <= 3 &&
        one.w * one.w - o.w * o.w < 9 &&
        worthNaming(rows, o, policy),
    );
    const seen = new Set<string>();
    return {
      ...described(rows, one),
      rivals: rivals
        .map((o) => described(rows, o))
        .filter((o) => {
          const key = `${o.row} ${o.quantity}`;
          if (seen.has(key)) return false;
          seen.add(key);
          return true;
        }),
    };
  }
  return null;
}

/** The surer of two wrong heat capacities near one another. */
function bestOfPair(rows: TableRows, hot: readonly number[], policy: Policy): SuspectCell | null {
  const one = grossPair(rows, hot, policy.cell.threshold);
  return one === null || !worthNaming(rows, one, policy) ? null : { ...described(rows, one), rivals: [] };
}

function described(rows: TableRows, one: Hypothesis): Omit<SuspectCell, 'rivals'> {
  const quantity = firstCell(one.pattern);
  const q = cellsOf(rows, quantity);
  const row = rows.row[one.row];
  const observed = quantity === 'heat-capacity' ? rows.cp[one.row] : (q as SeriesQuantity).values[row];
  return {
    row,
    quantity: q === null ? quantity : q.is,
    pattern: one.pattern,
    w: Math.abs(one.w),
    observed,
    proposed: observed - one.error,
    uProposed: one.uError,
  };
}

function firstCell(pattern: Pattern): NumberQuantity {
  if (pattern === 'entropy' || pattern === 'entropy+gibbs') return 'entropy';
  if (pattern === 'enthalpy' || pattern === 'enthalpy+gibbs') return 'enthalpy-increment';
  return pattern === 'gibbs-function' ? 'gibbs-function' : 'heat-capacity';
}

function cellsOf(rows: TableRows, quantity: NumberQuantity): SeriesQuantity | null {
  if (quantity === 'entropy') return rows.s;
  if (quantity === 'enthalpy-increment') return rows.h;
  if (quantity === 'gibbs-function') return rows.f;
  return rows.series.heatCapacity;
}

function worthNaming(rows: TableRows, one: Hypothesis, policy: Policy): boolean {
  const quantity = firstCell(one.pattern);
  const q = cellsOf(rows, quantity);
  if (q === null) return false;
  const row = rows.row[one.row];
  const units = Math.abs(one.error) / (2 * q.halfUnit[row]);
  if (units < policy.cell.lastPlaces * 0.9) return false;
  if (quantity === 'heat-capacity') {
    return Math.abs(one.error) >= policy.material.heatCapacityRelative * 0.9 * Math.abs(rows.cp[one.row] - one.error);
  }
  return true;
}

/** The series with the named cells blanked. A pair's second cell goes with its first. */
function withoutCells(series: Series, cell: SuspectCell): Series {
  const blank = (q: SeriesQuantity | null, yes: boolean): SeriesQuantity | null => {
    if (q === null || !yes) return q;
    const present = q.present.slice();
    present[cell.row] = 0;
    return { ...q, present };
  };
  const p = cell.pattern;
  return {
    ...series,
    heatCapacity: blank(series.heatCapacity, p === 'heat-capacity'),
    entropy: blank(series.entropy, p === 'entropy' || p === 'entropy+gibbs'),
    enthalpyIncrement: blank(series.enthalpyIncrement, p === 'enthalpy' || p === 'enthalpy+gibbs'),
    enthalpy: blank(series.enthalpy, p === 'enthalpy' || p === 'enthalpy+gibbs'),
    gibbsFunction: blank(series.gibbsFunction, p === 'gibbs-function' || p.endsWith('+gibbs')),
  };
}
