/** The parts of a partition's result, and the names of the published tables. */
import type { ColumnTable } from './columns.js';

export const TABLE_NAMES = [
  'functions',
  'pieces',
  'phases',
  'transitions',
  'substances',
  'findings',
  'suspects',
  'coverage',
  'evidence',
  'provenance',
  'inputs',
] as const;
export type TableName = (typeof TABLE_NAMES)[number];

export type ReleaseTables = Readonly<Record<Exclude<TableName, 'inputs'>, ColumnTable>>;
