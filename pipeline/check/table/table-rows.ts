import type { Series, SeriesQuantity } from '../../../schemas/harmonised.js';
import { integers, numbers } from '../../core/numeric/room.js';

/** The rows of one series in rising temperature, as the row checks see them; n rows. Absent values are NaN-free and flagged. */
export interface TableRows {
  readonly series: Series;
  readonly n: number;
  readonly t: Float64Array;
  readonly cp: Float64Array;
  readonly uCp: Float64Array;
  /** Row of the series. */
  readonly row: Int32Array;
  /** First row of the stretch (between rows printed twice) that each row belongs to, and its last. */
  readonly from: Int32Array;
  readonly to: Int32Array;
  readonly h: SeriesQuantity | null;
  readonly s: SeriesQuantity | null;
  readonly f: SeriesQuantity | null;
  /** Median distance of rows [K]. */
  readonly spacingK: number;
}

export function tableRows(series: Series): TableRows | null {
  const cp = series.heatCapacity;
  if (cp === null) return null;
  const temperature = series.temperatureK;
  let order: Int32Array | number[] = integers(series.rows);
  let sorted = true;
  let n = 0;
  for (let i = 0; i < series.rows; i++) {
    if (cp.present[i] === 0) continue;
    if (n > 0 && temperature[i] < temperature[order[n - 1]]) sorted = false;
    order[n++] = i;
  }
  order = order.subarray(0, n);
  if (!sorted) order = Array.from(order).sort((a, b) => temperature[a] - temperature[b] || a - b);
  // A measured run that returns to a temperature stands once here: its first row.
  const measured = series.table.basis === 'measured';
  const t = numbers(n);
  const y = numbers(n);
  const u = numbers(n);
  const row = integers(n);
  let k = 0;
  for (let j = 0; j < n; j++) {
    const i = order[j];
    if (measured && k > 0 && temperature[i] === t[k - 1]) continue;
    t[k] = temperature[i];
    y[k] = cp.values[i];
    u[k] = cellU(cp, i);
    row[k] = i;
    k++;
  }
  if (k < 2) return null;
  const from = integers(k);
  const to = integers(k);
  let start = 0;
  for (let i = 1; i <= k; i++) {
    if (i < k && t[i] !== t[i - 1]) continue;
    for (let j = start; j < i; j++) {
      from[j] = start;
      to[j] = i - 1;
    }
    start = i;
  }
  const absolute = series.enthalpyIncrement === null && series.enthalpy !== null;
  return {
    series,
    n: k,
    t: t.subarray(0, k),
    cp: y.subarray(0, k),
    uCp: u.subarray(0, k),
    row: row.subarray(0, k),
    from,
    to,
    h: absolute ? series.enthalpy : series.enthalpyIncrement,
    s: series.entropy,
    f: absolute ? null : series.gibbsFunction,
    spacingK: (t[k - 1] - t[0]) / (k - 1),
  };
}

/** Standard uncertainty of one cell: its rounding and its own. */
export function cellU(q: SeriesQuantity, row: number): number {
  const rounding = q.halfUnit[row] / 1.7320508075688772;
  const own = q.uOwn[row];
  return own === 0 ? rounding : Math.sqrt(own * own + rounding * rounding);
}
