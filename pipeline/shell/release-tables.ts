/** Writes published tables as files: each as Parquet and CSV, long ones in parts made by workers. */
import { join } from 'node:path';
import type { ColumnTable } from '../../schemas/columns.js';
import type { FileRecord } from '../../schemas/contents.js';
import { TABLE_NAMES, type TableName } from '../../schemas/release.js';
import { type PublishedTable, RELEASE_TABLES } from '../../schemas/release-tables.js';
import type { ParquetWriter } from './duckdb.js';
import { recordOf, sync } from './file-records.js';
import { writeCsv } from './write-csv.js';

/** The tables that are written in parts when the library is large; the others are always one file. */
export const PART_TABLES = [
  'functions',
  'pieces',
  'phases',
  'transitions',
  'coverage',
  'provenance',
] as const satisfies readonly TableName[];

/**
 * Writes the tables given into the folder, `functions.csv` when there is one part, else `functions-001-of-012.csv`.
 * `partIndex` counts from 0. Throws BrokenCalculation where a number is none.
 */
export async function writePart(
  writer: ParquetWriter,
  tables: Readonly<Partial<Record<TableName, ColumnTable>>>,
  folder: string,
  partIndex: number,
  partCount: number,
  contentId: string,
): Promise<FileRecord[]> {
  const records: FileRecord[] = [];
  for (const name of TABLE_NAMES) {
    const table = tables[name];
    if (table === undefined) continue;
    const parquet = partName(name, 'parquet', partIndex, partCount);
    const csv = partName(name, 'csv', partIndex, partCount);
    await writer.write(join(folder, parquet), name, table, parquetMetadata(name, contentId));
    records.push(await recordOf(folder, parquet, table.rows), writeCsv(join(folder, csv), csv, name, table));
    // The disk may begin; whether all is there is waited for, and answered, when the release is finished.
    for (const file of [parquet, csv]) sync(join(folder, file)).catch(() => undefined);
  }
  return records;
}

/** Writes tables that are one file each. */
export function writeWhole(
  writer: ParquetWriter,
  tables: Readonly<Partial<Record<TableName, ColumnTable>>>,
  folder: string,
  contentId: string,
): Promise<FileRecord[]> {
  return writePart(writer, tables, folder, 0, 1, contentId);
}

export function partName(table: TableName, format: 'csv' | 'parquet', partIndex: number, partCount: number): string {
  if (partCount === 1) return `${table}.${format}`;
  const digits = Math.max(3, String(partCount).length);
  const padded = (number: number) => String(number).padStart(digits, '0');
  return `${table}-${padded(partIndex + 1)}-of-${padded(partCount)}.${format}`;
}

export interface TableFile {
  readonly table: TableName;
  readonly format: 'csv' | 'parquet';
  /** The name without its ending: the CSV and the Parquet file of one part share it. */
  readonly part: string;
}

/** Which table a file of a release holds; null for every other file. */
export function tableOfFile(path: string): TableFile | null {
  const match = /^(([a-z_]+)(?:-\d+-of-\d+)?)\.(csv|parquet)$/.exec(path);
  if (match === null || !TABLE_NAMES.some((name) => name === match[2])) return null;
  return { table: match[2] as TableName, format: match[3] as 'csv' | 'parquet', part: match[1]! };
}

/** The content id, never a clock; units and descriptions by field as JSON. */
export function parquetMetadata(name: TableName, contentId: string): Record<string, string> {
  const table: PublishedTable = RELEASE_TABLES[name];
  const fields = table.fields.map(({ name: field, unit, description }) => ({ name: field, unit, description }));
  return {
    content_id: contentId,
    table: name,
    title: table.title,
    description: table.description,
    primary_key: JSON.stringify(table.key),
    fields: JSON.stringify(fields),
  };
}
