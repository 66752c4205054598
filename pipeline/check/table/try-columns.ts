import type { Series, SeriesQuantity } from '../../../schemas/harmonised.js';
import { type Closing, closing } from './closing.js';
import { changed, quantityIn, type RowRun } from './column-change.js';
import { columnHypotheses } from './column-hypotheses.js';
import type { ColumnHypothesis, TableContext } from './column-hypothesis.js';
import { residuals } from './residuals.js';
import { standing } from './standing.js';
import { type TableRows, tableRows } from './table-rows.js';

/** A hypothesis with what it leaves of a table; the higher score is the likelier. */
export interface Tried {
  readonly hypothesis: ColumnHypothesis;
  readonly closing: Closing;
  readonly score: number;
}

/** In standard uncertainties. */
const DROWNED = 5;

/** Each hypothesis that makes fewer conditions fail, with what it leaves. */
export function tryAll(
  series: Series,
  rows: TableRows,
  run: RowRun,
  now: Closing,
  context: TableContext,
  uToo: boolean,
): Tried[] {
  const inRun = run === null ? null : new Set(run.rows);
  const within = (i: number): boolean => inRun === null || inRun.has(rows.row[i]);
  return columnHypotheses(rows, residuals(rows, true), run, within, context, uToo).flatMap(
    (hypothesis) => tryOne(series, rows, hypothesis, run, now, context, uToo) ?? [],
  );
}

export function tryOne(
  series: Series,
  rows: TableRows,
  hypothesis: ColumnHypothesis,
  run: RowRun,
  now: Closing,
  context: TableContext,
  uToo: boolean,
): Tried | null {
  const after = changed(series, hypothesis.changes, run, uToo);
  const next = tableRows(after);
  if (next === null || next.n < rows.n) return null;
  if (!uToo && hypothesis.changes.some(({ column }) => saysNothing(quantityIn(after, column)))) return null;
  const left = closing(next, residuals(next, true));
  // A law that leaves less to be tested would close by that alone.
  if (left.tested < 0.8 * now.tested || left.failing >= now.failing) return null;
  return { hypothesis, closing: left, score: 2 * (hypothesis.prior + standing(next, context)) - left.capped };
}

/** Half of the figures or more drown in their uncertainty: they would close with anything. */
function saysNothing(q: SeriesQuantity | null): boolean {
  if (q === null) return false;
  let cells = 0;
  let drowned = 0;
  for (let row = 0; row < q.values.length; row++) {
    if (q.present[row] === 0 || q.values[row] === 0) continue;
    cells++;
    if (Math.abs(q.values[row]) < DROWNED * q.uOwn[row]) drowned++;
  }
  return 2 * drowned >= cells;
}
