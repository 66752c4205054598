import type { Series } from '../../../schemas/harmonised.js';
import { printedNumber } from '../../core/numeric/printed-like.js';
import {
  type ColumnChange,
  changed,
  changedValue,
  quantityIn,
  quantityName,
  type RowRun,
  type TableColumn,
  touchedRows,
} from './column-change.js';
import { unitOf } from './column-laws.js';
import { cellU } from './table-rows.js';

/** The cells that a change of a column touches; the first is the first that it gives another value. */
export interface ColumnCells {
  readonly rows: readonly number[];
  /** Index into `TableMeaning.columns`. */
  readonly column: number;
  readonly firstRow: number;
  readonly observed: number;
  readonly proposed: number;
  /** Standard uncertainty of the first cell's proposed value: its rounding, and what the law leaves open. */
  readonly uProposed: number;
  readonly proposedPrinted: string;
}

/** Null where the change touches no cell. */
export function columnCells(
  series: Series,
  change: ColumnChange,
  run: RowRun,
  uToo: boolean,
  uFactor: number,
  uShift: number,
): ColumnCells | null {
  const q = quantityIn(series, change.column);
  const is = quantityName(series, change.column);
  const rows = touchedRows(series, change.column, run).toSorted((a, b) => a - b);
  const valueAt = (row: number): number => q?.values[row] ?? series.temperatureK[row];
  const firstRow = rows.find((row) => changedValue(series, is, row, change) !== valueAt(row)) ?? rows[0];
  if (firstRow === undefined) return null;
  const observed = valueAt(firstRow);
  const proposed = changedValue(series, is, firstRow, change);
  const after = quantityIn(changed(series, [change], { rows: [firstRow] }, uToo), change.column);
  const own = after === null ? (series.temperatureHalfUnitK * change.factor) / Math.sqrt(3) : cellU(after, firstRow);
  const column = q?.column ?? series.temperatureColumn;
  return {
    rows,
    column,
    firstRow,
    observed,
    proposed,
    uProposed: Math.hypot(own, proposed * uFactor, uShift),
    proposedPrinted: printedAs(series, firstRow, column, change, proposed - observed),
  };
}

/** The cell as the change would have it, in its column's unit, with as many decimals as its figures bear. */
function printedAs(series: Series, row: number, column: number, change: ColumnChange, differenceSi: number): string {
  const printed = series.text(row, column).trim();
  const number = printedNumber(printed);
  if (!Number.isFinite(number)) return '';
  const value = number + differenceSi / siPerUnit(series, change.column);
  if (/[eEdD]/.test(printed)) return String(Number(value.toPrecision(6)));
  const mark = printed.includes(',') && !printed.includes('.') ? ',' : '.';
  const point = printed.indexOf(mark);
  const decimals = point < 0 ? 0 : printed.length - point - 1;
  const size = Math.abs(change.factor);
  const borne = decimals - Math.floor(Math.log10(size) + 1e-9);
  const kept = change.column === 'temperature' ? Math.max(2, decimals) : size < 0.2 ? borne : Math.min(decimals, borne);
  const text = value.toFixed(Math.max(0, Math.min(12, kept)));
  return (Number(text) === 0 ? text.replace('-', '') : text).replace('.', mark);
}

function siPerUnit(series: Series, column: TableColumn): number {
  if (column !== 'temperature') return unitOf(series, column).factor;
  return series.table.columns[series.temperatureColumn]?.unit === '[degF]' ? 5 / 9 : 1;
}
