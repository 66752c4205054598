/** Tables of several partitions joined in order; dictionaries are merged, words in order of first use. */
import { ABSENT_CODE, type Column, type ColumnTable, type TextColumn } from '../../schemas/columns.js';
import type { ReleaseTables } from '../../schemas/release.js';

/** Joins the tables of partitions; names with no table in a part (written already) are left out there. */
export function concatTables<const T extends Partial<ReleaseTables>>(parts: readonly T[]): T {
  const joined: Record<string, ColumnTable> = {};
  for (const part of parts) {
    for (const name of Object.keys(part)) {
      if (name in joined) continue;
      const present = parts.map((one) => one[name as keyof T] as ColumnTable | undefined);
      joined[name] = concatTable(present.filter((table) => table !== undefined));
    }
  }
  return joined as T;
}

export function concatTable(tables: readonly ColumnTable[]): ColumnTable {
  const [first] = tables;
  if (first === undefined) return { rows: 0, columns: {} };
  if (tables.length === 1) return first;
  const filled = tables.filter(({ rows }) => rows > 0);
  if (filled.length === 1) return filled[0]!;
  const columns: Record<string, Column> = {};
  for (const name of Object.keys(first.columns)) {
    columns[name] = concatColumn(tables.map((table) => table.columns[name]!));
  }
  return { rows: tables.reduce((rows, table) => rows + table.rows, 0), columns };
}

function concatColumn(columns: readonly Column[]): Column {
  const kind = columns[0]!.kind;
  if (columns.some((column) => column.kind !== kind)) throw new Error('columns of different kinds cannot be joined');
  if (kind === 'text') return concatText(columns as readonly TextColumn[]);
  const valued = columns as readonly Exclude<Column, TextColumn>[];
  const rows = valued.reduce((sum, column) => sum + column.values.length, 0);
  const Values = valued[0]!.values.constructor as new (length: number) => Float64Array | Int32Array | Uint8Array;
  const values = new Values(rows);
  const absent = valued.some((column) => column.absent !== null) ? new Uint8Array(rows) : null;
  let at = 0;
  for (const column of valued) {
    values.set(column.values, at);
    if (column.absent !== null) absent!.set(column.absent, at);
    at += column.values.length;
  }
  return { kind, values, absent } as Column;
}

function concatText(columns: readonly TextColumn[]): TextColumn {
  const codes = new Uint32Array(columns.reduce((sum, column) => sum + column.codes.length, 0));
  const codeOf = new Map<string, number>();
  let at = 0;
  for (const column of columns) {
    const renamed = new Uint32Array(column.words.length);
    column.words.forEach((word, index) => {
      let code = codeOf.get(word);
      if (code === undefined) {
        code = codeOf.size;
        codeOf.set(word, code);
      }
      renamed[index] = code;
    });
    for (const code of column.codes) codes[at++] = code === ABSENT_CODE ? ABSENT_CODE : renamed[code]!;
  }
  return { kind: 'text', codes, words: [...codeOf.keys()] };
}
