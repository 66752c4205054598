/** Rows of a column table as objects, for tests. */
import { ABSENT_CODE, type ColumnTable } from '../../schemas/columns.js';

export type Cell = number | string | boolean | null;

export function rowsOf(table: ColumnTable): Record<string, Cell>[] {
  return Array.from({ length: table.rows }, (_, row) =>
    Object.fromEntries(
      Object.entries(table.columns).map(([name, column]): [string, Cell] => {
        if (column.kind === 'text') {
          return [name, column.codes[row] === ABSENT_CODE ? null : column.words[column.codes[row]!]!];
        }
        if (column.absent?.[row] === 1) return [name, null];
        return [name, column.kind === 'boolean' ? column.values[row] !== 0 : column.values[row]!];
      }),
    ),
  );
}
