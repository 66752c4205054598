import { createHash } from 'node:crypto';
import { mkdtempSync, readdirSync, readFileSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { asyncBufferFromFile, parquetMetadataAsync, parquetReadObjects } from 'hyparquet';
import { compressors } from 'hyparquet-compressors';
import Papa from 'papaparse';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { publish } from '../../pipeline/publish/publish.js';
import { BrokenCalculation } from '../../pipeline/shell/broken-calculation.js';
import { literal, ParquetWriter } from '../../pipeline/shell/duckdb.js';
import { parquetMetadata, partName, tableOfFile, writePart, writeWhole } from '../../pipeline/shell/release-tables.js';
import { writeCsv } from '../../pipeline/shell/write-csv.js';
import { ABSENT_CODE, type ColumnTable } from '../../schemas/columns.js';
import { finding, reconciled, sentence, suspect } from '../publish/hand-made.js';
import { type Cell, rowsOf } from '../publish/read.js';

let writer: ParquetWriter;
let folder: string;
beforeAll(async () => {
  folder = mkdtempSync(join(tmpdir(), 'writing-'));
  writer = await ParquetWriter.open();
});
afterAll(() => {
  writer.close();
  rmSync(folder, { recursive: true });
});

/** More rows than three of DuckDB's vectors, every kind of column, absent cells at and around the edges of 64 and 2048. */
function wideTable(rows = 7001): ColumnTable {
  const number = new Float64Array(rows);
  const gappy = new Float64Array(rows);
  const gaps = new Uint8Array(rows);
  const integer = new Int32Array(rows);
  const flag = new Uint8Array(rows);
  const codes = new Uint32Array(rows);
  const many = new Uint32Array(rows);
  for (let row = 0; row < rows; row++) {
    number[row] = Math.sin(row + 1) * 10 ** ((row % 40) - 20);
    gappy[row] = row / 7;
    gaps[row] = row % 64 === 0 || row % 2048 === 2047 || row === rows - 1 ? 1 : 0;
    integer[row] = row % 2 === 0 ? -row : 2147483647 - row;
    flag[row] = row % 3 === 0 ? 1 : 0;
    codes[row] = row % 5 === 4 ? ABSENT_CODE : row % 5;
    many[row] = row % 700;
  }
  return {
    rows,
    columns: {
      number: { kind: 'number', values: number, absent: null },
      gappy: { kind: 'number', values: gappy, absent: gaps },
      empty: { kind: 'number', values: new Float64Array(rows), absent: new Uint8Array(rows).fill(1) },
      line: { kind: 'integer', values: integer, absent: null },
      column: { kind: 'boolean', values: flag, absent: gaps },
      words: {
        kind: 'text',
        codes,
        words: ['a, "b"', 'line\r\nline', 'Λ – 物', "it's; a longer word than twelve bytes"],
      },
      many: { kind: 'text', codes: many, words: Array.from({ length: 700 }, (_, word) => `word-${word}`) },
      never: { kind: 'text', codes: new Uint32Array(rows).fill(ABSENT_CODE), words: [] },
    },
  };
}

async function withDuckdb(path: string): Promise<Record<string, unknown>[]> {
  return [...(await writer.query(`SELECT * FROM read_parquet(${literal(path)})`))];
}

async function withHyparquet(path: string): Promise<Record<string, unknown>[]> {
  return parquetReadObjects({ file: await asyncBufferFromFile(path), compressors });
}

function csvCells(path: string, table: ColumnTable): Record<string, Cell>[] {
  const { data, errors } = Papa.parse<string[]>(readFileSync(path, 'utf8'), {
    delimiter: ',',
    newline: '\n',
    skipEmptyLines: true,
  });
  expect(errors).toEqual([]);
  const [header, ...lines] = data;
  return lines.map((cells) =>
    Object.fromEntries(
      cells.map((text, index): [string, Cell] => {
        const name = header![index]!;
        const { kind } = table.columns[name]!;
        if (text === '') return [name, null];
        return [name, kind === 'text' ? text : kind === 'boolean' ? text === 'true' : Number(text)];
      }),
    ),
  );
}

describe('Parquet', () => {
  test('read back by DuckDB and by hyparquet, every cell is what was written', async () => {
    const table = wideTable();
    const path = join(folder, 'wide.parquet');
    await writer.write(path, 'wide', table, {});
    const expected = rowsOf(table);
    expect(await withDuckdb(path)).toEqual(expected);
    expect(await withHyparquet(path)).toEqual(expected);
  });

  test('a table without rows keeps its columns', async () => {
    const path = join(folder, 'none.parquet');
    await writer.write(path, 'none', wideTable(0), {});
    expect(await withDuckdb(path)).toEqual([]);
    const names = await writer.query(`SELECT column_name FROM (DESCRIBE FROM read_parquet(${literal(path)}))`);
    expect(names.map((row) => row.column_name)).toEqual(Object.keys(wideTable(0).columns));
  });

  test('two words that differ only in what neither format can hold become one', async () => {
    const codes = Uint32Array.of(0, 1, 2);
    const table: ColumnTable = {
      rows: 3,
      columns: { word: { kind: 'text', codes, words: ['a\0', 'a\ufffd', 'a\ud800'] } },
    };
    const path = join(folder, 'unfit.parquet');
    await writer.write(path, 'unfit', table, {});
    expect(await withDuckdb(path)).toEqual([{ word: 'a\ufffd' }, { word: 'a\ufffd' }, { word: 'a\ufffd' }]);
    writeCsv(join(folder, 'unfit.csv'), 'unfit.csv', 'unfit', table);
    expect(csvCells(join(folder, 'unfit.csv'), table)).toEqual(await withDuckdb(path));
  });

  test('the metadata hold units, descriptions and the content id, and hyparquet reads them', async () => {
    const path = join(folder, "it's {a} [name].parquet");
    const { artefact } = publish([reconciled('oil')], { sentence });
    await writer.write(path, 'functions', artefact.functions, parquetMetadata('functions', 'c0ffee'));
    const { key_value_metadata } = await parquetMetadataAsync(await asyncBufferFromFile(path));
    const metadata = Object.fromEntries(key_value_metadata!.map(({ key, value }) => [key, value]));
    expect(metadata.content_id).toBe('c0ffee');
    const fields = JSON.parse(metadata.fields!) as { name: string; unit: string | null; description: string }[];
    expect(fields.find(({ name }) => name === 'entropy_J_per_mol_K')).toEqual({
      name: 'entropy_J_per_mol_K',
      unit: 'J/(mol.K)',
      description: 'Molar entropy; empty where its level is unknown',
    });
  });
});

describe('CSV', () => {
  test('every number reads back exactly, every text as it was, and an absent cell is empty', () => {
    const table = wideTable();
    const path = join(folder, 'wide.csv');
    const record = writeCsv(path, 'wide.csv', 'wide', table);
    expect(csvCells(path, table)).toEqual(rowsOf(table));
    const bytes = readFileSync(path);
    expect(record).toEqual({
      path: 'wide.csv',
      bytes: bytes.length,
      sha256: createHash('sha256').update(bytes).digest('hex'),
      rows: 7001,
    });
  });

  test('looks as described: a header line, LF, true and false', () => {
    const path = join(folder, 'few.csv');
    const table: ColumnTable = {
      rows: 2,
      columns: {
        'T, K': { kind: 'number', values: Float64Array.of(298.15, 1e-7), absent: null },
        line: { kind: 'integer', values: Int32Array.of(0, -7), absent: Uint8Array.of(1, 0) },
        stable: { kind: 'boolean', values: Uint8Array.of(1, 0), absent: null },
        words: { kind: 'text', codes: Uint32Array.of(0, ABSENT_CODE), words: ['a, "b"\r\nΛ'] },
      },
    };
    writeCsv(path, 'few.csv', 'few', table);
    expect(readFileSync(path, 'utf8')).toBe(
      '"T, K",line,stable,words\n' + '298.15,,true,"a, ""b""\r\nΛ"\n' + '1e-7,-7,false,\n',
    );
  });

  test('DuckDB reads it to the same rows as the Parquet file', async () => {
    const table = wideTable();
    await writer.write(join(folder, 'same.parquet'), 'same', table, {});
    writeCsv(join(folder, 'same.csv'), 'same.csv', 'same', table);
    const types =
      "{number: 'DOUBLE', gappy: 'DOUBLE', empty: 'DOUBLE', line: 'INTEGER', \"column\": 'BOOLEAN', words: 'VARCHAR', many: 'VARCHAR', never: 'VARCHAR'}";
    const csv = await writer.query(
      `SELECT * FROM read_csv(${literal(join(folder, 'same.csv'))}, auto_detect = false, header = true, columns = ${types})`,
    );
    expect(csv).toEqual(await withDuckdb(join(folder, 'same.parquet')));
  });
});

describe('broken numbers', () => {
  for (const broken of [Number.NaN, Number.POSITIVE_INFINITY, Number.NEGATIVE_INFINITY]) {
    test(`${broken} is refused with table, column and row, and no file is made`, async () => {
      const table: ColumnTable = {
        rows: 3,
        columns: { entropy: { kind: 'number', values: Float64Array.of(1, 2, broken), absent: null } },
      };
      const words = `broken calculation: table functions, column entropy, row 3 (the first is 1) holds ${broken}`;
      await expect(writer.write(join(folder, 'bad.parquet'), 'functions', table, {})).rejects.toThrow(words);
      expect(() => writeCsv(join(folder, 'bad.csv'), 'bad.csv', 'functions', table)).toThrow(BrokenCalculation);
      expect(readdirSync(folder).filter((name) => name.startsWith('bad'))).toEqual([]);
    });
  }

  test('what is marked absent may hold anything', async () => {
    const values = Float64Array.of(1, Number.NaN);
    const table: ColumnTable = { rows: 2, columns: { x: { kind: 'number', values, absent: Uint8Array.of(0, 1) } } };
    await writer.write(join(folder, 'gap.parquet'), 'gap', table, {});
    expect(await withHyparquet(join(folder, 'gap.parquet'))).toEqual([{ x: 1 }, { x: null }]);
  });
});

describe('parts', () => {
  test('one part has the plain name, more are numbered, and the name tells the table', () => {
    expect(partName('functions', 'csv', 0, 1)).toBe('functions.csv');
    expect(partName('functions', 'parquet', 0, 12)).toBe('functions-001-of-012.parquet');
    expect(partName('pieces', 'csv', 1233, 1234)).toBe('pieces-1234-of-1234.csv');
    expect(tableOfFile('functions-001-of-012.parquet')).toEqual({
      table: 'functions',
      format: 'parquet',
      part: 'functions-001-of-012',
    });
    expect(tableOfFile('contents.json')).toBeNull();
    expect(tableOfFile('report/functions.csv')).toBeNull();
    expect(tableOfFile('strangers.csv')).toBeNull();
  });

  test('the same tables give the same bytes, from another DuckDB too, and records that fit them', async () => {
    const { artefact } = publish(
      [reconciled('oil', { findings: [finding('f1', 'oil')], suspects: [suspect('f1', 'oil')] })],
      { sentence },
    );
    const first = mkdtempSync(join(folder, 'first-'));
    const second = mkdtempSync(join(folder, 'second-'));
    const other = await ParquetWriter.open();
    const records = await writeWhole(writer, artefact, first, 'c0ffee');
    expect(await writeWhole(other, artefact, second, 'c0ffee')).toEqual(records);
    other.close();
    expect(readdirSync(first)).toHaveLength(20);
    for (const { path, bytes, sha256 } of records) {
      for (const one of [first, second]) {
        const content = readFileSync(join(one, path));
        expect([content.length, createHash('sha256').update(content).digest('hex')], path).toEqual([bytes, sha256]);
      }
    }
  });

  test('a part holds the tables it was given, and its rows', async () => {
    const { functions } = publish([reconciled('oil')], { sentence }).artefact;
    const parts = mkdtempSync(join(folder, 'parts-'));
    const records = await writePart(writer, { functions }, parts, 1, 3, 'c0ffee');
    expect(records.map(({ path, rows }) => [path, rows])).toEqual([
      ['functions-002-of-003.parquet', 6],
      ['functions-002-of-003.csv', 6],
    ]);
    expect(await withDuckdb(join(parts, 'functions-002-of-003.parquet'))).toEqual(rowsOf(functions));
  });
});
