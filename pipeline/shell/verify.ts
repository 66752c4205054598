/** Whether a release is whole: every file as listed, both formats of each table alike, the descriptors fitting. */
import { readFile } from 'node:fs/promises';
import { join } from 'node:path';
import { type Contents, contentsSchema, type FileRecord } from '../../schemas/contents.js';
import { TABLE_NAMES } from '../../schemas/release.js';
import { type FieldKind, type PublishedTable, RELEASE_TABLES } from '../../schemas/release-tables.js';
import { summarySchema } from '../../schemas/summary.js';
import { identifier, literal, ParquetWriter } from './duckdb.js';
import { filesIn, recordOf } from './file-records.js';
import { type TableFile, tableOfFile } from './release-tables.js';

export interface ReleaseProblem {
  /** Path inside the release. */
  readonly file: string;
  readonly problem: string;
}

/** An empty list: the release is whole. Throws nothing on a damaged release; every damage is a problem. */
export async function verifyRelease(folder: string): Promise<ReleaseProblem[]> {
  const contents = await readJson(folder, 'contents.json', contentsSchema.parse);
  if ('problem' in contents) return [contents];
  const problems = await checkFiles(folder, contents.value);
  problems.push(...(await checkSummary(folder, contents.value)));
  problems.push(...(await checkDatapackage(folder, contents.value)));
  problems.push(...(await checkTables(folder, contents.value)));
  return problems;
}

async function checkFiles(folder: string, contents: Contents): Promise<ReleaseProblem[]> {
  const problems: ReleaseProblem[] = [];
  const found = new Set(await filesIn(folder));
  for (const record of contents.files) {
    const file = record.path;
    if (!found.delete(file)) {
      problems.push({ file, problem: 'the file is missing' });
      continue;
    }
    const actual = await recordOf(folder, file, record.rows).catch((error: Error) => error);
    if (actual instanceof Error) problems.push({ file, problem: `the file cannot be read: ${actual.message}` });
    else problems.push(...differences(record, actual));
  }
  found.delete('contents.json');
  for (const file of found) problems.push({ file, problem: 'the file is not listed in contents.json' });
  return problems;
}

function differences(expected: FileRecord, actual: FileRecord): ReleaseProblem[] {
  const file = expected.path;
  if (actual.bytes !== expected.bytes) {
    return [{ file, problem: `the file has ${actual.bytes} bytes, contents.json says ${expected.bytes}` }];
  }
  if (actual.sha256 !== expected.sha256) {
    return [{ file, problem: `the SHA-256 is ${actual.sha256}, contents.json says ${expected.sha256}` }];
  }
  return [];
}

async function checkSummary(folder: string, contents: Contents): Promise<ReleaseProblem[]> {
  const file = 'summary.json';
  const summary = await readJson(folder, file, summarySchema.parse);
  if ('problem' in summary) return [summary];
  if (summary.value.contentId === contents.contentId) return [];
  return [{ file, problem: `the content id is ${summary.value.contentId}, contents.json says ${contents.contentId}` }];
}

async function checkDatapackage(folder: string, contents: Contents): Promise<ReleaseProblem[]> {
  const file = 'datapackage.json';
  const descriptor = await readJson(folder, file, (value) => value as { resources?: { path?: string | string[] }[] });
  if ('problem' in descriptor) return [descriptor];
  const resources = descriptor.value?.resources;
  if (!Array.isArray(resources)) return [{ file, problem: 'it lists no resources' }];
  const problems: ReleaseProblem[] = [];
  const described = new Set(resources.flatMap((resource) => resource?.path ?? []));
  for (const { path } of contents.files) {
    if (tableOfFile(path) === null || described.delete(path)) continue;
    problems.push({ file, problem: `no resource describes ${path}` });
  }
  for (const path of described) problems.push({ file, problem: `a resource describes ${path}, which is not there` });
  return problems;
}

async function checkTables(folder: string, contents: Contents): Promise<ReleaseProblem[]> {
  const problems: ReleaseProblem[] = [];
  const parts = new Map<string, Map<'csv' | 'parquet', TableFile>>();
  const present = new Set<string>();
  for (const { path } of contents.files) {
    const of = tableOfFile(path);
    if (of === null) continue;
    present.add(of.table);
    if (!parts.has(of.part)) parts.set(of.part, new Map());
    parts.get(of.part)!.set(of.format, of);
  }
  for (const name of TABLE_NAMES) {
    if (!present.has(name)) problems.push({ file: 'contents.json', problem: `no file holds the table ${name}` });
  }
  const reader = await ParquetWriter.open();
  try {
    for (const [part, formats] of parts) problems.push(...(await checkPart(reader, folder, part, formats, contents)));
  } finally {
    reader.close();
  }
  return problems;
}

interface Tally {
  readonly rows: number;
  /** Sum of the rows' hashes: alike for the same rows. */
  readonly mark: string;
  readonly broken: number;
}

async function checkPart(
  reader: ParquetWriter,
  folder: string,
  part: string,
  formats: ReadonlyMap<'csv' | 'parquet', TableFile>,
  contents: Contents,
): Promise<ReleaseProblem[]> {
  const problems: ReleaseProblem[] = [];
  const tallies: Tally[] = [];
  for (const format of ['parquet', 'csv'] as const) {
    const file = `${part}.${format}`;
    const of = formats.get(format);
    if (of === undefined) {
      problems.push({ file, problem: 'the table has no such file, only the other format' });
      continue;
    }
    const table: PublishedTable = RELEASE_TABLES[of.table];
    const path = literal(withoutGlob(join(folder, file)));
    try {
      const tally = await tallyOf(reader, table, format === 'csv' ? csvSource(path, table) : `read_parquet(${path})`);
      tallies.push(tally);
      if (tally.broken > 0) problems.push({ file, problem: `${tally.broken} rows hold numbers that are not finite` });
      const listed = contents.files.find((record) => record.path === file)?.rows;
      if (tally.rows !== listed)
        problems.push({ file, problem: `it has ${tally.rows} rows, contents.json says ${listed}` });
      if (format === 'parquet') {
        const id = await contentIdIn(reader, path);
        if (id !== contents.contentId) {
          problems.push({ file, problem: `its content id is ${id}, contents.json says ${contents.contentId}` });
        }
      }
    } catch (error) {
      problems.push({ file, problem: `the table cannot be read: ${(error as Error).message.split('\n')[0]}` });
    }
  }
  const [parquet, csv] = tallies;
  if (parquet === undefined || csv === undefined) return problems;
  const file = `${part}.csv`;
  if (parquet.rows !== csv.rows) {
    problems.push({ file, problem: `it has ${csv.rows} rows, ${part}.parquet has ${parquet.rows}` });
  } else if (parquet.mark !== csv.mark) {
    problems.push({ file, problem: `its values are not those of ${part}.parquet` });
  }
  return problems;
}

async function tallyOf(reader: ParquetWriter, table: PublishedTable, source: string): Promise<Tally> {
  const names = table.fields.map(({ name }) => identifier(name));
  const numbers = table.fields.filter(({ kind }) => kind === 'number').map(({ name }) => identifier(name));
  const broken = numbers.map((name) => `NOT isfinite(${name})`).join(' OR ') || 'FALSE';
  const [row] = await reader.query(
    `SELECT count(*) AS n, CAST(sum(CAST(hash(${names.join(', ')}) AS HUGEINT)) AS VARCHAR) AS mark, ` +
      `count(*) FILTER (${broken}) AS broken FROM ${source}`,
  );
  return { rows: Number(row!.n), mark: String(row!.mark), broken: Number(row!.broken) };
}

const CSV_TYPES: Record<FieldKind, string> = {
  number: 'DOUBLE',
  integer: 'INTEGER',
  boolean: 'BOOLEAN',
  text: 'VARCHAR',
};

/** Types are those published: nothing is guessed, and a cell that does not fit is an error. */
function csvSource(path: string, table: PublishedTable): string {
  const columns = table.fields.map(({ name, kind }) => `${literal(name)}: ${literal(CSV_TYPES[kind])}`);
  return (
    `read_csv(${path}, auto_detect = false, header = true, delim = ',', quote = '"', escape = '"', ` +
    `new_line = '\\n', nullstr = '', max_line_size = 16777216, columns = {${columns.join(', ')}})`
  );
}

async function contentIdIn(reader: ParquetWriter, path: string): Promise<string | null> {
  const rows = await reader.query(
    `SELECT decode(value) AS id FROM parquet_kv_metadata(${path}) WHERE decode(key) = 'content_id'`,
  );
  return rows.length === 0 ? null : String(rows[0]!.id);
}

/** DuckDB takes `*`, `?` and `[` in file names for patterns unless they stand in brackets. */
function withoutGlob(path: string): string {
  return path.replaceAll(/[*?[]/g, '[$&]');
}

async function readJson<T>(
  folder: string,
  file: string,
  parse: (value: unknown) => T,
): Promise<{ value: T } | ReleaseProblem> {
  try {
    return { value: parse(JSON.parse(await readFile(join(folder, file), 'utf8'))) };
  } catch (error) {
    return { file, problem: `it cannot be read: ${(error as Error).message.split('\n').join(' ')}` };
  }
}
