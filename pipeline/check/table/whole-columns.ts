import type { Series } from '../../../schemas/harmonised.js';
import { type Closing, closing, enthalpyAtReference } from './closing.js';
import { columnsOf, described, type WholeColumns } from './column-cause.js';
import { changed, quantityIn, statesUApart } from './column-change.js';
import type { ColumnHypothesis, TableContext } from './column-hypothesis.js';
import { runOfRows } from './column-run.js';
import { withOwnDigits } from './own-digits.js';
import { residuals } from './residuals.js';
import { type TableRows, tableRows } from './table-rows.js';
import { type Tried, tryAll } from './try-columns.js';

const COLUMNS = ['heatCapacity', 'entropy', 'enthalpy', 'gibbsFunction'] as const;
/** Fewer rows tell no law. */
const FEWEST_ROWS = 5;
const FEWEST_FAILING = 5;
/** Of the conditions that failed, so many may still fail: other slips, real steps. */
const LEFT_SHARE = 0.15;
/** A first law of several must put right at least this share of what fails. */
const FIRST_SHARE = 0.25;
const MOST_LAWS = 3;
/** Laws that leave so much more failing than the best one are not weighed against it. */
const SLACK = 0.02;

/**
 * Whether the rows where something does not close are many enough to look for a whole column.
 * @param hot rows around which something does not close
 */
export function worthTrying(rows: TableRows, hot: number): boolean {
  if (rows.n < FEWEST_ROWS) return false;
  return hot >= Math.min(Math.max(FEWEST_FAILING, 0.3 * rows.n), 9) || countsFromElsewhere(rows);
}

/** H - H(Tr) is not 0 at Tr, and not just there: its neighbours agree with it. */
export function countsFromElsewhere(rows: TableRows): boolean {
  const zero = enthalpyAtReference(rows);
  return zero !== null && Math.abs(zero.enthalpy) > Math.max(6 * zero.u, 1);
}

/**
 * The laws that make a table close where many single cells would be needed: one, or up to three that each put right a
 * good part. Empty where none does; then single cells are looked for.
 */
export function wholeColumns(printed: Series, context: TableContext): WholeColumns[] {
  const series = withOwnDigits(printed);
  const apart = COLUMNS.some((column) => {
    const q = quantityIn(series, column);
    return q !== null && statesUApart(series, q);
  });
  for (const uToo of apart ? [true, false] : [true]) {
    const whole = searched(series, context, uToo);
    if (whole.length > 0) return whole;
  }
  return runOfRows(series, context);
}

function searched(series: Series, context: TableContext, uToo: boolean): WholeColumns[] {
  const found: WholeColumns[] = [];
  let current = series;
  let rows = tableRows(current);
  if (rows === null) return [];
  let now = closing(rows, residuals(rows, true));
  const first = now;
  const allowed = Math.floor(LEFT_SHARE * first.failing);
  while (found.length < MOST_LAWS) {
    const tried = withoutNeedless(tryAll(current, rows, null, now, context, uToo), now);
    const best = tried[0];
    if (best === undefined) return [];
    const closes = best.closing.failing <= allowed;
    // Laws that only help one another are believed where each is a usual slip.
    if ((!closes || found.length > 0) && best.hypothesis.explanation === null) return [];
    if (!closes && now.failing - best.closing.failing < Math.max(FEWEST_FAILING, FIRST_SHARE * now.failing)) return [];
    found.push(described(best, closes && found.length === 0 ? tried : [], null, now, uToo));
    if (closes) return found;
    current = changed(current, best.hypothesis.changes, null, uToo);
    const next = tableRows(current);
    if (next === null) return [];
    rows = next;
    now = best.closing;
  }
  return [];
}

/** Those that close about as well as any, an unexplained factor only where no usual slip lies near it. */
function withoutNeedless(tried: readonly Tried[], now: Closing): Tried[] {
  const least = Math.min(...tried.map(({ closing: { failing } }) => failing));
  const slack = Math.max(1, SLACK * now.failing);
  const close = tried.filter(({ closing: { failing } }) => failing <= least + slack);
  const usual = close.filter(({ hypothesis: { explanation } }) => explanation !== null);
  return close
    .filter(
      ({ hypothesis }) => hypothesis.explanation !== null || !usual.some((one) => isNear(hypothesis, one.hypothesis)),
    )
    .sort((a, b) => b.score - a.score);
}

/** The same columns by nearly the same factors. */
function isNear(one: ColumnHypothesis, other: ColumnHypothesis): boolean {
  return (
    columnsOf(one) === columnsOf(other) &&
    one.changes.every(({ factor, shift, shiftOverT }, i) => {
      const beside = other.changes[i];
      const plain = shift === 0 && shiftOverT === 0 && beside.shift === 0 && beside.shiftOverT === 0;
      return plain && Math.abs(factor / beside.factor - 1) <= one.loose;
    })
  );
}
