import type { Series, SeriesQuantity } from '../../../schemas/harmonised.js';
import type { NumberQuantity } from '../../../schemas/quantities.js';
import { R_J_PER_MOL_K, STANDARD_PRESSURE_PA } from '../../core/constants.js';

/** The columns that a row check holds against each other. `enthalpy`: H - H(Tr), or H where a table has no increments. */
export type TableColumn = 'temperature' | 'heatCapacity' | 'entropy' | 'enthalpy' | 'gibbsFunction';

/** What a column would have to become: value * factor + shift + shiftOverT / T, in SI. */
export interface ColumnChange {
  readonly column: TableColumn;
  readonly factor: number;
  readonly shift: number;
  /** [J/mol] */
  readonly shiftOverT: number;
}

/** First and last row of a run, of the rows in rising temperature; null: the whole column. */
export type RowRun = { readonly rows: readonly number[] } | null;

export function scaledBy(column: TableColumn, factor: number): ColumnChange {
  return { column, factor, shift: 0, shiftOverT: 0 };
}

export function shiftedBy(column: TableColumn, shift: number): ColumnChange {
  return { column, factor: 1, shift, shiftOverT: 0 };
}

export function quantityIn(series: Series, column: TableColumn): SeriesQuantity | null {
  switch (column) {
    case 'heatCapacity':
      return series.heatCapacity;
    case 'entropy':
      return series.entropy;
    case 'gibbsFunction':
      return series.gibbsFunction;
    case 'enthalpy':
      return series.enthalpyIncrement ?? series.enthalpy;
    default:
      return null;
  }
}

export function quantityName(series: Series, column: TableColumn): NumberQuantity {
  return column === 'temperature' ? 'temperature' : (quantityIn(series, column)?.is ?? 'enthalpy-increment');
}

/**
 * The series as it would be with the changes made, in `run` or everywhere.
 * @param uToo whether uncertainties that are stated apart from the column were written in its unit too
 */
export function changed(series: Series, changes: readonly ColumnChange[], run: RowRun, uToo: boolean): Series {
  let out = series;
  for (const change of changes) {
    if (change.column === 'temperature') {
      const temperatureK = out.temperatureK.map((t) => temperatureAs(t, change));
      out = { ...out, temperatureK };
      continue;
    }
    const q = quantityIn(out, change.column);
    if (q === null) continue;
    const next = changedQuantity(out, q, change, run, uToo);
    if (change.column === 'heatCapacity') out = { ...out, heatCapacity: next };
    else if (change.column === 'entropy') out = { ...out, entropy: next };
    else if (change.column === 'gibbsFunction') out = { ...out, gibbsFunction: next };
    else if (out.enthalpyIncrement !== null) out = { ...out, enthalpyIncrement: next };
    else out = { ...out, enthalpy: next };
  }
  return out;
}

function changedQuantity(
  series: Series,
  q: SeriesQuantity,
  change: ColumnChange,
  run: RowRun,
  uToo: boolean,
): SeriesQuantity {
  const uFactor = uToo || !statesUApart(series, q) ? Math.abs(change.factor) : 1;
  const values = q.values.slice();
  const halfUnit = q.halfUnit.slice();
  const uOwn = q.uOwn.slice();
  const one = (row: number): void => {
    if (q.present[row] === 0) return;
    values[row] = changedValue(series, q.is, row, change);
    halfUnit[row] *= Math.abs(change.factor);
    uOwn[row] *= uFactor;
  };
  if (run === null) for (let row = 0; row < series.rows; row++) one(row);
  else for (const row of run.rows) one(row);
  return { ...q, values, halfUnit, uOwn };
}

/** Uncertainties in a column of their own, or as a number in the descriptor: the cells' unit does not act on them. */
export function statesUApart(series: Series, q: SeriesQuantity): boolean {
  const { columns } = series.table;
  return (
    columns.some(({ is, of }) => is === 'uncertainty' && of === q.is) ||
    columns[q.column]?.uncertainty.some(({ absolute }) => absolute !== null) === true
  );
}

/** A row at 0 K is a limit row: it must be met exactly. */
function temperatureAs(temperatureK: number, { factor, shift }: ColumnChange): number {
  const value = temperatureK * factor + shift;
  return Math.abs(value) < 1e-6 ? 0 : value;
}

/** One cell as the change would have it [SI]; a temperature too. */
export function changedValue(series: Series, is: NumberQuantity, row: number, change: ColumnChange): number {
  const t = series.temperatureK[row];
  if (change.column === 'temperature') return temperatureAs(t, change);
  const value = (quantityIn(series, change.column) as SeriesQuantity).values[row];
  const added = pressureTerm(series, is, t);
  return (value - added) * change.factor + added + shiftAt(t, is, change);
}

/** The value that stands in the column as it is where the change would have it say `value`. */
export function unchangedValue(
  series: Series,
  is: NumberQuantity,
  row: number,
  value: number,
  change: ColumnChange,
): number {
  const t = series.temperatureK[row];
  const added = pressureTerm(series, is, t);
  return (value - added - shiftAt(t, is, change)) / change.factor + added;
}

/** A limit row has no -[G - H]/T, and its S no standard pressure. */
function shiftAt(temperatureK: number, is: NumberQuantity, { shift, shiftOverT }: ColumnChange): number {
  const limit = temperatureK === 0 && (is === 'entropy' || is === 'gibbs-function');
  return limit ? 0 : shift + (shiftOverT === 0 ? 0 : shiftOverT / temperatureK);
}

/** What was added to a gas's printed S and -[G - H]/T to bring them to 1 bar: no factor of the column acts on it. */
function pressureTerm(series: Series, is: NumberQuantity, temperatureK: number): number {
  const { standardPressurePa, isobarPa } = series.table;
  if (isobarPa !== null || standardPressurePa === STANDARD_PRESSURE_PA || temperatureK === 0) return 0;
  if (series.phase !== 'g' && !series.phase.startsWith('g-')) return 0;
  return is === 'entropy' || is === 'gibbs-function'
    ? R_J_PER_MOL_K * Math.log(standardPressurePa / STANDARD_PRESSURE_PA)
    : 0;
}

/** Rows of the series whose cell the changes touch. */
export function touchedRows(series: Series, column: TableColumn, run: RowRun): number[] {
  const present = quantityIn(series, column)?.present ?? null;
  const rows = run === null ? Array.from({ length: series.rows }, (_, row) => row) : run.rows;
  return rows.filter((row) => present === null || present[row] === 1);
}
