/** Leaves out the rows that state no temperature, and says which. */
import type { Finding } from '../../schemas/finding.js';
import { NO_CELL, type RawColumn, type RawSeries } from '../../schemas/raw.js';
import { readingFinding } from './reading-finding.js';

/** `given` itself where every row has a temperature. */
export function withTemperatures(
  given: RawSeries,
  temperature: RawColumn,
  substance: string,
  findings: Finding[],
): RawSeries {
  const absent = temperature.decimals.indexOf(NO_CELL);
  if (absent < 0) return given;
  const kept = Int32Array.from(Array.from(given.line.keys()).filter((row) => temperature.decimals[row] !== NO_CELL));
  findings.push(
    readingFinding({
      substance,
      table: given.table,
      problem: 'required-missing',
      read: `The temperature of ${given.rows - kept.length} of ${given.rows} rows`,
      wanted: 'a temperature on every row',
      remedy: 'Fill it in by a correction, or keep such rows out with `where`.',
      line: given.line[absent],
      column: given.table.columns[temperature.column]?.header ?? '',
      fromPhase: given.phase,
    }),
  );
  const pick = <T extends Float64Array | Int8Array | Uint8Array | Int32Array>(array: T): T => {
    const picked = array.slice(0, kept.length) as T;
    for (let i = 0; i < kept.length; i++) picked[i] = array[kept[i]];
    return picked;
  };
  return {
    ...given,
    rows: kept.length,
    line: pick(given.line),
    columns: given.columns.map((column) => ({
      ...column,
      values: pick(column.values),
      decimals: pick(column.decimals),
      corrected: column.corrected === null ? null : pick(column.corrected),
    })),
    uncertainties: given.uncertainties.map((column) => ({
      ...column,
      values: pick(column.values),
      decimals: pick(column.decimals),
    })),
    notes: given.notes === null ? null : Array.from(kept, (row) => (given.notes as readonly string[])[row]),
    text: (row, column) => given.text(kept[row], column),
  };
}
