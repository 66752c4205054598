import type { Series } from '../../../schemas/harmonised.js';
import type { WholeColumns } from './column-cause.js';
import { temperatureLaws } from './column-laws.js';

/** One negative temperature may be a sign too many. */
const FEWEST = 2;

/**
 * Temperatures below 0 K in a table that holds nothing to check them by: the usual slip that makes all of them possible,
 * degrees Celsius before degrees Fahrenheit. Null where fewer than two are below 0 K, or no slip does.
 */
export function belowZero(series: Series): WholeColumns | null {
  const { temperatureK } = series;
  let lowest = 0;
  let negative = 0;
  for (let i = 0; i < series.rows; i++) {
    if (temperatureK[i] < lowest) lowest = temperatureK[i];
    if (temperatureK[i] < 0) negative++;
  }
  if (negative < FEWEST) return null;
  const law = temperatureLaws(series).find(({ change: { factor, shift } }) => lowest * factor + shift > -1e-6);
  if (law === undefined) return null;
  const { change, code } = law;
  return { changes: [change], run: null, uToo: true, explanation: code, uFactor: 0, uShift: 0, w: 0, rivals: [] };
}
