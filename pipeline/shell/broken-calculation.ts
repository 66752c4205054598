/** A number that is none reached a published table: a fault of the program, never of the data. Nothing is published. */
import type { ColumnTable } from '../../schemas/columns.js';

export class BrokenCalculation extends Error {
  constructor(table: string, column: string, row: number, value: number) {
    super(`broken calculation: table ${table}, column ${column}, row ${row + 1} (the first is 1) holds ${value}`);
    this.name = 'BrokenCalculation';
  }
}

/** Tables that were looked through: each is written twice, as Parquet and as CSV. */
const whole = new WeakSet<ColumnTable>();

/** Throws BrokenCalculation at the first NaN or infinity that is not marked absent. A table must not change once it was passed. */
export function refuseBrokenNumbers(name: string, table: ColumnTable): void {
  if (whole.has(table)) return;
  for (const [column, { kind, ...cells }] of Object.entries(table.columns)) {
    if (kind !== 'number') continue;
    const { values, absent } = cells as { values: Float64Array; absent: Uint8Array | null };
    for (let row = 0; row < table.rows; row++) {
      const value = values[row]!;
      if (value - value !== 0 && absent?.[row] !== 1) throw new BrokenCalculation(name, column, row, value);
    }
  }
  whole.add(table);
}
