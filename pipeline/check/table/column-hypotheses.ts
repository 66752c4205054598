import type { SeriesQuantity } from '../../../schemas/harmonised.js';
import type { Substance } from '../../../schemas/substances.js';
import { type RowRun, scaledBy, statesUApart, type TableColumn } from './column-change.js';
import type { ColumnHypothesis, TableContext } from './column-hypothesis.js';
import { type RatioLaw, ratioLaws, temperatureLaws, UNEXPLAINED_WEIGHT } from './column-laws.js';
import { pairsOf } from './column-pairs.js';
import { columnShifts } from './column-shifts.js';
import type { Residuals } from './residuals.js';
import { type Ratio, robustRatio } from './robust-ratio.js';
import type { TableRows } from './table-rows.js';

/** How usual it is that several columns go wrong together, by how many. */
const TOGETHER = [1, 0.4, 0.2, 0.1];
/** A law is tried where it lies within so many standard uncertainties of the factor seen, or within this share of it. */
const NEAR = 8;
const NEAR_SHARE = 2e-3;
/** Two ways to the same factor. */
const SAME_FACTOR = 1e-7;

/**
 * All that is worth trying on the rows of `run`, or on all.
 * @param uToo false where uncertainties stated apart are in the right unit, though their column is not: they then say nothing
 *   of its scatter
 */
export function columnHypotheses(
  given: TableRows,
  res: Residuals,
  run: RowRun,
  within: (i: number) => boolean,
  context: TableContext,
  uToo: boolean,
): ColumnHypothesis[] {
  const rows = uToo ? given : { ...given, s: bare(given, given.s), h: bare(given, given.h), f: bare(given, given.f) };
  const out: ColumnHypothesis[] = [];
  const columns = scalable(rows, res);
  for (const set of splits(columns)) {
    const others = columns.filter((column) => !set.includes(column));
    const factors = new Set<number>();
    const uOf = new Map<number, number>();
    for (const pairs of pairsOf(rows, res, new Set(set), within)) {
      const ratio = robustRatio(pairs);
      if (ratio === null) continue;
      const inverse = { value: 1 / ratio.value, u: ratio.u / ratio.value ** 2 };
      for (const law of lawsNear(rows, set, ratio, context.substance)) factors.add(law.factor);
      for (const law of lawsNear(rows, others, inverse, context.substance)) factors.add(1 / law.factor);
      if (Math.abs(ratio.value - 1) <= NEAR * ratio.u) continue;
      factors.add(ratio.value);
      uOf.set(ratio.value, Math.abs(ratio.u / ratio.value));
    }
    for (const factor of factors) {
      const uFactor = uOf.get(factor) ?? 0;
      const one = scaled(rows, set, factor, uFactor, context.substance);
      // The other columns by the inverse factor: this table alone cannot tell them apart.
      const other = scaled(rows, others, 1 / factor, uFactor, context.substance);
      out.push(one, other);
    }
  }
  out.push(...columnShifts(rows, res, within, context.anchors));
  if (run === null) {
    for (const { code, change, weight } of temperatureLaws(rows.series)) {
      out.push({
        changes: [change],
        explanation: code,
        prior: Math.log(weight),
        uFactor: 0,
        uShift: 0,
        loose: 0,
      });
    }
  }
  return out;
}

/** With its rounding alone where its uncertainties are stated apart. */
function bare({ series }: TableRows, q: SeriesQuantity | null): SeriesQuantity | null {
  return q !== null && statesUApart(series, q) ? { ...q, uOwn: q.uOwn.map(() => 0) } : q;
}

/** The set multiplied by `factor`, with the usual slip that has this factor, if there is one. */
function scaled(
  rows: TableRows,
  set: readonly TableColumn[],
  factor: number,
  uFactor: number,
  substance: Substance,
): ColumnHypothesis {
  const laws = ratioLaws(rows.series, set[0], substance).filter(
    (law) => Math.abs(law.factor / factor - 1) < SAME_FACTOR,
  );
  const law = laws.sort((a, b) => b.weight - a.weight)[0] ?? { code: null, weight: UNEXPLAINED_WEIGHT };
  return {
    changes: set.map((column) => scaledBy(column, factor)),
    explanation: law.code,
    prior: Math.log(law.weight * TOGETHER[set.length - 1]),
    uFactor: law.code === null ? uFactor : 0,
    uShift: 0,
    loose: NEAR * uFactor + roundingOf(rows),
  };
}

/** Half a unit of the last place of Cp over Cp, in the middle of the table. */
function roundingOf({ series, cp, row, n }: TableRows): number {
  const middle = n >> 1;
  return series.heatCapacity === null ? 0 : series.heatCapacity.halfUnit[row[middle]] / Math.abs(cp[middle]);
}

/** The usual slips of a set whose factor lies near the one seen. */
function lawsNear(rows: TableRows, set: readonly TableColumn[], { value, u }: Ratio, substance: Substance): RatioLaw[] {
  const near = Math.max(NEAR * u, Math.max(NEAR_SHARE, roundingOf(rows)) * Math.abs(value));
  return ratioLaws(rows.series, set[0], substance).filter(({ factor }) => Math.abs(factor - value) <= near);
}

/** The columns that a common factor can be seen in; -[G - H]/T only where a row's three functions are held together. */
function scalable(rows: TableRows, res: Residuals): TableColumn[] {
  const columns: TableColumn[] = [];
  if (rows.s !== null) columns.push('entropy');
  if (rows.h !== null) columns.push('enthalpy');
  if (rows.f !== null && res.hasClosure.includes(1)) columns.push('gibbsFunction');
  columns.push('heatCapacity');
  return columns;
}

/** Each way to part the columns in two, told by its smaller half: its inverse acts on the other one alike. */
function splits(columns: readonly TableColumn[]): TableColumn[][] {
  const out: TableColumn[][] = [];
  const all = 2 ** columns.length - 1;
  for (let bits = 1; bits < all; bits++) {
    const set = columns.filter((_, i) => (bits >> i) % 2 === 1);
    const size = 2 * set.length - columns.length;
    if (size < 0 || (size === 0 && set.includes(columns[0]))) out.push(set);
  }
  return out;
}
