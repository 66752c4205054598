/** Lists the rows and numeric cells of a sources folder with what they mean, by its own reading of the descriptors. */
import { existsSync, readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { type CellPlace, type DelimitedFile, type DelimitedRow, readDelimited } from './delimited.js';
import { readUnit } from './units.js';

export interface SourceCell {
  readonly substance: string;
  readonly source: string;
  readonly file: string;
  readonly line: number;
  readonly column: string;
  /** The descriptor's word: entropy, heat-capacity, transition-temperature … */
  readonly quantity: string;
  readonly unit: string;
  readonly holds: string;
  /** As in the release: `cr`; of a transition `cr>l`; of a table on an isobar `l at 101325 Pa`. */
  readonly place: string;
  /** 'first' where the row does not say. */
  readonly order: string;
  readonly text: string;
  readonly value: number;
  /** Decimals that this column usually prints. */
  readonly decimals: number;
  /** Of the row [K]; NaN outside thermal functions. */
  readonly temperatureK: number;
  /** Rows between this one and the nearer end of its stretch, two-sided rows being ends; 0 at an end, -1 elsewhere. */
  readonly depth: number;
  readonly contents: DelimitedFile;
  readonly cell: CellPlace;
  readonly row: SourceRow;
}

export interface SourceRow {
  readonly substance: string;
  readonly source: string;
  readonly file: string;
  readonly line: number;
  readonly holds: string;
  readonly place: string;
  readonly order: string;
  readonly contents: DelimitedFile;
  readonly text: DelimitedRow;
  /** Its cells that hold words, by what they are. */
  readonly words: Readonly<Record<string, { readonly column: string; readonly cell: CellPlace }>>;
}

type Word = string | { readonly column: string };
type Names = Readonly<Record<string, string>>;

interface TableText {
  readonly file: string;
  readonly holds: string;
  readonly delimiter?: string;
  readonly skipLines?: number;
  readonly comment?: string;
  readonly substance?: Word;
  readonly phase?: Word;
  readonly pressure?: { readonly value: number; readonly unit: string };
  /** Rows kept, by a word of a column. */
  readonly where?: Readonly<Record<string, { readonly is?: string | readonly string[] }>>;
  readonly columns: Readonly<Record<string, { readonly is: string; readonly unit?: string }>>;
}

interface DescriptorText {
  readonly names?: Names;
  readonly phases?: Readonly<Record<string, string | Names>>;
  readonly tables: readonly TableText[];
}

export function listCells(sourcesDir: string): SourceCell[] {
  const folders = readdirSync(sourcesDir, { withFileTypes: true }).filter((entry) => entry.isDirectory());
  return folders
    .map((entry) => entry.name)
    .filter((source) => existsSync(join(sourcesDir, source, 'source.json')))
    .sort()
    .flatMap((source) => sourceCells(join(sourcesDir, source), source));
}

function sourceCells(folder: string, source: string): SourceCell[] {
  const descriptor = JSON.parse(readFileSync(join(folder, 'source.json'), 'utf8')) as DescriptorText;
  const files = readdirSync(folder).sort();
  return descriptor.tables.flatMap((table) =>
    files
      .filter((file) => matches(table.file, file))
      .flatMap((file) => tableCells(folder, source, file, table, descriptor)),
  );
}

function tableCells(
  folder: string,
  source: string,
  file: string,
  table: TableText,
  descriptor: DescriptorText,
): SourceCell[] {
  const contents = readDelimited(join(folder, file), {
    delimiter: table.delimiter ?? ',',
    skipLines: table.skipLines ?? 0,
    comment: table.comment ?? null,
  });
  const meanings = contents.header.map((header) => table.columns[header] ?? { is: 'ignored' });
  const indexOf = (quantity: string) => meanings.findIndex((meaning) => meaning.is === quantity);
  const wordOf = (row: (typeof contents.rows)[number], quantity: string, stated: Word | undefined) => {
    if (typeof stated === 'string') return stated;
    const index = stated === undefined ? indexOf(quantity) : contents.header.indexOf(stated.column);
    return row.cells[index]?.text.trim() ?? '';
  };
  const isobar = table.pressure === undefined ? '' : ` at ${inPascal(table.pressure)} Pa`;
  const kept = Object.entries(table.where ?? {}).flatMap(([header, { is }]) =>
    is === undefined ? [] : [{ index: contents.header.indexOf(header), words: [is].flat() }],
  );
  const isKept = (row: DelimitedRow) =>
    kept.every(({ index, words }) => words.includes(row.cells[index]?.text.trim() ?? ''));
  const rows = contents.rows.filter(isKept).map((row) => {
    const named = wordOf(row, 'substance', table.substance);
    const substance = descriptor.names?.[named] ?? named;
    const phaseOf = (word: string) => {
      const mapped = descriptor.phases?.[word] ?? (descriptor.phases?.[substance] as Names | undefined)?.[word];
      return typeof mapped === 'string' ? mapped : word;
    };
    const place =
      table.holds === 'transitions'
        ? `${phaseOf(wordOf(row, 'from-phase', undefined))}>${phaseOf(wordOf(row, 'to-phase', undefined))}`
        : `${phaseOf(wordOf(row, 'phase', table.phase))}${isobar}`;
    const order = wordOf(row, 'order', undefined) || 'first';
    const unit = meanings[indexOf('temperature')]?.unit;
    const printed = Number(row.cells[indexOf('temperature')]?.text || Number.NaN);
    const temperatureK = unit === 'Cel' ? printed + 273.15 : printed;
    const words: Record<string, { column: string; cell: CellPlace }> = {};
    for (const quantity of ['from-phase', 'to-phase']) {
      const cell = row.cells[indexOf(quantity)];
      if (cell !== undefined) words[quantity] = { column: contents.header[indexOf(quantity)]!, cell };
    }
    const { line } = row;
    const own: SourceRow = {
      ...{ substance, source, file, line, holds: table.holds, place, order, contents, text: row, words },
    };
    return { row, own, substance, place, order, temperatureK };
  });
  const depths = stretchDepths(rows);
  return meanings.flatMap((meaning, index) => {
    if (meaning.unit === undefined || meaning.is === 'uncertainty') return [];
    const texts = rows.map(({ row }) => row.cells[index]?.text.trim() ?? '');
    const decimals = Math.max(0, ...texts.map((text) => text.split('.')[1]?.length ?? 0));
    const cells: SourceCell[] = [];
    rows.forEach(({ row, own, substance, place, order, temperatureK }, i) => {
      const text = texts[i]!;
      const cell = row.cells[index];
      if (cell === undefined || !/^-?\d+\.?\d*$/.test(text)) return;
      cells.push({
        substance,
        source,
        file,
        line: row.line,
        column: contents.header[index]!,
        quantity: meaning.is,
        unit: meaning.unit!,
        holds: table.holds,
        place,
        order,
        text,
        value: Number(text),
        decimals,
        temperatureK,
        depth: table.holds === 'thermal-functions' ? depths[i]! : -1,
        contents,
        cell,
        row: own,
      });
    });
    return cells;
  });
}

/** A stretch is a run of rows of one phase with rising temperature; a temperature printed twice ends one. */
function stretchDepths(rows: readonly { substance: string; place: string; temperatureK: number }[]): number[] {
  const depths: number[] = [];
  for (let start = 0; start < rows.length; ) {
    let end = start + 1;
    const same = (i: number) => rows[i]!.substance === rows[start]!.substance && rows[i]!.place === rows[start]!.place;
    while (end < rows.length && same(end) && rows[end]!.temperatureK > rows[end - 1]!.temperatureK + 0.01) end++;
    for (let i = start; i < end; i++) depths.push(Math.min(i - start, end - 1 - i));
    start = end;
  }
  return depths;
}

function inPascal({ value, unit }: { value: number; unit: string }): number {
  return value * (readUnit(unit, Number.NaN)?.factor ?? Number.NaN);
}

function matches(glob: string, file: string): boolean {
  const parts = glob.split('*').map((part) => part.replace(/[.+?^${}()|[\]\\]/g, '\\$&'));
  return new RegExp(`^${parts.join('.*')}$`).test(file);
}
