/** A release made in process, and its tables read back from the CSV files by a reader of the tests' own. */
import { mkdtempSync, readFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { dirname, join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { readArguments } from '../../pipeline/shell/arguments.js';
import type { Log } from '../../pipeline/shell/log.js';
import { nightly } from '../../pipeline/shell/nightly.js';
import type { TableName } from '../../schemas/release.js';
import { RELEASE_TABLES } from '../../schemas/release-tables.js';

export const ROOT = join(dirname(fileURLToPath(import.meta.url)), '..', '..');

export type Cell = number | string | boolean | null;
export type Row = Readonly<Record<string, Cell>>;

export interface Release {
  readonly folder: string;
  readonly status: number;
  /** What the command told people, line by line. */
  readonly lines: readonly string[];
  readonly table: (name: TableName) => readonly Row[];
}

/** A folder of its own under the system's temporary one. */
export function temporaryFolder(): string {
  return mkdtempSync(join(tmpdir(), 'cuspline-acceptance-'));
}

/** Runs `cuspline nightly` on one worker and leaves the release in `out`. */
export async function makeRelease(sources: string, out: string, ...words: string[]): Promise<Release> {
  const lines: string[] = [];
  const log: Log = {
    begin: () => {},
    advance: () => {},
    end: () => {},
    tell: (_event, told) => lines.push(...told),
    fail: (stop) => lines.push(stop.message, stop.next),
  };
  const request = readArguments(['nightly', '--sources', sources, '--out', out, '--jobs', '1', ...words], '2026-01-01');
  const status = await nightly(request, log);
  const folder = join(out, 'current');
  const read = new Map<TableName, readonly Row[]>();
  const table = (name: TableName): readonly Row[] => {
    let rows = read.get(name);
    if (rows === undefined) {
      rows = readTable(folder, name);
      read.set(name, rows);
    }
    return rows;
  };
  return { folder, status, lines, table };
}

/** The CSV of a table with its cells in the kinds that the table's description gives them; an empty cell is null. */
export function readTable(folder: string, name: TableName): Row[] {
  const [header = [], ...records] = splitCsv(readFileSync(join(folder, `${name}.csv`), 'utf8'));
  const kinds = new Map<string, string>(RELEASE_TABLES[name].fields.map((field) => [field.name, field.kind]));
  return records.map((record) =>
    Object.fromEntries(header.map((field, i) => [field, typed(record[i] ?? '', kinds.get(field) ?? 'unknown')])),
  );
}

function typed(text: string, kind: string): Cell {
  if (text === '') return null;
  if (kind === 'text') return text;
  if (kind === 'boolean') return text === 'true' ? true : text === 'false' ? false : text;
  return Number(text);
}

/** RFC 4180 with LF: quotes hold commas, line ends and doubled quotes. */
function splitCsv(text: string): string[][] {
  const records: string[][] = [];
  let record: string[] = [];
  let at = 0;
  while (at < text.length) {
    let cell = '';
    if (text[at] === '"') {
      for (at++; ; ) {
        const close = text.indexOf('"', at);
        cell += text.slice(at, close);
        at = close + 1;
        if (text[at] !== '"') break;
        cell += '"';
        at++;
      }
    } else {
      const start = at;
      while (at < text.length && text[at] !== ',' && text[at] !== '\n') at++;
      cell = text.slice(start, at);
    }
    record.push(cell);
    if (text[at] === '\n') {
      records.push(record);
      record = [];
    }
    at++;
  }
  return records;
}
