/** One fast pass over a table: where each substance's rows stand. */
import type { Correction } from '../../schemas/corrections.js';
import type { Finding } from '../../schemas/finding.js';
import { NO_CELL } from '../../schemas/raw.js';
import type { Substance } from '../../schemas/substances.js';
import { tidyHeader } from './column-meaning.js';
import { correctionOutOfDate } from './corrections.js';
import { NumberReader, READ_NUMBER } from './number.js';
import type { RowIndex, TablePlan } from './plan.js';
import { readingFinding } from './reading.js';
import { newlineOf, RowSplitter } from './row-splitter.js';
import { RunList } from './runs.js';
import { SubstanceNames } from './substance-names.js';
import { readHeader, type TableHeader } from './table-header.js';
import { DecimalsCount } from './usual-decimals.js';
import { decodeUtf8 } from './utf8.js';
import { rowFilter } from './where.js';

/**
 * `substances`: all of them; runs point into this list. `names` may be shared between calls. Rows whose name is not
 * known belong to no run and give one finding a name. `corrections`: those of this file; an entry for a line that holds
 * no row is reported here, the others when their row is read.
 */
export function indexRows(
  plan: TablePlan,
  bytes: Uint8Array,
  substances: readonly Substance[],
  corrections: readonly Correction[] = [],
  names: SubstanceNames = new SubstanceNames(substances),
): RowIndex {
  const newline = newlineOf(bytes);
  const splitter = new RowSplitter(plan.layout, newline);
  const header = readHeader(plan, bytes, splitter);
  const broken = plan.broken ?? header.missing;
  const flaws = plan.broken === null && header.missing === null ? header.unknown : [];
  const pass = new Pass(plan, bytes, header, splitter, newline, names);
  pass.run();
  const findings: Finding[] = [
    ...(plan.broken === null ? [...(header.missing === null ? [] : [header.missing]), ...flaws] : []),
  ];
  if (plan.broken === null)
    findings.push(...pass.unknownNames(), ...correctionsAstray(plan, bytes, header, splitter, corrections));
  return {
    runs: pass.list.runs(),
    cellAt: header.cellAt,
    whereAt: header.whereAt,
    cells: header.cells,
    newline,
    usualDecimals:
      plan.meaning.holds === 'thermal-functions' || broken !== null
        ? new Int8Array(plan.meaning.columns.length).fill(NO_CELL)
        : usualDecimals(plan, bytes, header, splitter),
    broken,
    flaws,
    findings,
  };
}

interface UnknownName {
  readonly problem: 'name-unmapped' | 'substance-unknown';
  readonly line: number;
  rows: number;
}

class Pass {
  readonly list = new RunList();
  private readonly unknown = new Map<string, UnknownName>();
  private readonly places = new Map<string, number | null>();

  constructor(
    private readonly plan: TablePlan,
    private readonly bytes: Uint8Array,
    private readonly header: TableHeader,
    private readonly splitter: RowSplitter,
    private readonly newline: number,
    private readonly names: SubstanceNames,
  ) {}

  run(): void {
    const { plan, bytes, header } = this;
    const { substance } = plan;
    if (substance === null) return;
    if ('constant' in substance) {
      const place = this.placeOf(substance.constant, header.dataLine, 1);
      if (place !== null) this.list.add(place, header.dataStart, bytes.length, header.dataLine);
      return;
    }
    const cell = header.cellAt[substance.column]!;
    if (cell < 0) return;
    const filtered = plan.where.length > 0;
    if (plan.layout.spaces || bytes.indexOf(34) >= 0 || filtered) this.carefully(cell);
    else this.quickly(cell);
  }

  /** No quotes: a row is a line, and its name is compared byte by byte with the one before. */
  private quickly(cell: number): void {
    const { bytes, newline, splitter } = this;
    const delimiter = this.plan.layout.delimiter.charCodeAt(0);
    const commented = this.plan.layout.comment !== null;
    const limit = bytes.length;
    let at = this.header.dataStart;
    let line = this.header.dataLine;
    let nameStart = 0;
    let nameLength = -1;
    let place: number | null = null;
    let runStart = at;
    let runLine = line;
    let rows = 0;
    let runName = '';
    const close = (end: number): void => {
      if (place !== null) this.list.add(place, runStart, end, runLine);
      else if (nameLength >= 0 && rows > 1) this.countUnknown(runName, rows - 1);
    };
    while (at < limit) {
      const lineStart = at;
      let i = at;
      for (let k = 0; k < cell; k++) {
        while (i < limit && bytes[i] !== delimiter && bytes[i] !== newline) i++;
        if (i >= limit || bytes[i] === newline) break;
        i++;
      }
      const start = i;
      let same = nameLength >= 0;
      for (let k = 0; same && k < nameLength; k++) same = bytes[start + k] === bytes[nameStart + k];
      if (same) {
        const after = start + nameLength < limit ? bytes[start + nameLength] : newline;
        same = after === delimiter || after === newline || after === 13;
        i = same ? start + nameLength : start;
      }
      let end = i;
      if (!same) {
        while (end < limit && bytes[end] !== delimiter && bytes[end] !== newline) end++;
        i = end;
      }
      while (i < limit && bytes[i] !== newline) i++;
      const comment = commented && splitter.startsComment(bytes, lineStart, limit);
      if (!comment && same && nameLength > 0) rows++;
      else if (!comment && !blank(bytes, lineStart, i, delimiter)) {
        close(lineStart);
        nameStart = start;
        if (end > start && bytes[end - 1] === 13) end--;
        nameLength = end - start;
        runName = decodeUtf8(bytes, start, end).trim();
        runStart = lineStart;
        runLine = line;
        rows = 1;
        place = this.placeOf(runName, line, 1);
      }
      at = i + 1;
      line++;
    }
    close(limit);
  }

  /** Rows cut by the splitter: quotes, runs of spaces, rows that `where` leaves out. */
  private carefully(cell: number): void {
    const { bytes, splitter } = this;
    const passes = this.header.whereAt.every((at) => at >= 0) ? rowFilter(this.plan, this.header.whereAt) : null;
    const limit = bytes.length;
    let at = this.header.dataStart;
    let line = this.header.dataLine;
    let name: string | null = null;
    let place: number | null = null;
    let runStart = at;
    let runLine = line;
    while (at < limit) {
      const isRow = splitter.split(bytes, at, limit);
      const { next, lines } = splitter;
      if (isRow && !splitter.isBlankFrom(0)) {
        const here = splitter.text(cell);
        if (here !== name) {
          if (place !== null) this.list.add(place, runStart, at, runLine);
          name = here;
          runStart = at;
          runLine = line;
          place = this.known(here);
        }
        if (place === null && (passes === null || passes(splitter))) this.placeOf(here, line, 1);
      }
      at = next;
      line += lines;
    }
    if (place !== null) this.list.add(place, runStart, limit, runLine);
  }

  private known(name: string): number | null {
    const cached = this.places.get(name);
    if (cached !== undefined) return cached;
    const resolved = this.names.resolve(this.plan, name);
    const place = typeof resolved === 'number' ? resolved : null;
    this.places.set(name, place);
    return place;
  }

  private placeOf(name: string, line: number, rows: number): number | null {
    const place = this.known(name);
    if (place !== null) return place;
    const known = this.unknown.get(name);
    if (known !== undefined) known.rows += rows;
    else {
      const problem = this.names.resolve(this.plan, name) as UnknownName['problem'];
      this.unknown.set(name, { problem, line, rows });
    }
    return null;
  }

  private countUnknown(name: string, rows: number): void {
    const known = this.unknown.get(name);
    if (known !== undefined) known.rows += rows;
  }

  unknownNames(): Finding[] {
    const { plan } = this;
    const { substance, meaning, names } = plan;
    const constant = substance === null || 'constant' in substance;
    const column = constant ? 'substance' : meaning.columns[substance.column]!.header;
    return [...this.unknown].map(([name, { problem, line, rows }]) => {
      const rowsOf = constant ? 'every row of the table' : rows === 1 ? 'one row' : `${rows} rows, this the first`;
      return readingFinding({
        problem,
        subject: name,
        address: { source: meaning.source, file: plan.file, line, column },
        read: name,
        wanted:
          problem === 'name-unmapped'
            ? `an id of substances.csv or a name of the source's "names" map (${rowsOf})${this.names.near(plan, name)}`
            : `"${names[name]}", which "names" gives for it, among the ids of substances.csv (${rowsOf})${this.names.near(plan, names[name]!)}`,
        remedy:
          problem === 'name-unmapped'
            ? `add "${name}" to "names" in source.json, or the substance to substances.csv; its rows are not used`
            : 'add the substance to substances.csv or correct "names" in source.json; its rows are not used',
      });
    });
  }
}

function blank(bytes: Uint8Array, start: number, end: number, delimiter: number): boolean {
  for (let i = start; i < end; i++) {
    const c = bytes[i]!;
    if (c !== 32 && c !== 9 && c !== 13 && c !== delimiter) return false;
  }
  return true;
}

/** Row tables are short and their rows lie apart, so a column's usual decimals are counted over the whole file. */
function usualDecimals(plan: TablePlan, bytes: Uint8Array, header: TableHeader, splitter: RowSplitter): Int8Array {
  const { columns } = plan.meaning;
  const reader = new NumberReader(plan.layout.decimal);
  const counts = columns.map((column) => (column.unit === null ? null : new DecimalsCount()));
  let at = header.dataStart;
  while (at < bytes.length) {
    const isRow = splitter.split(bytes, at, bytes.length);
    at = splitter.next;
    if (!isRow) continue;
    for (const [position, count] of counts.entries()) {
      const cell = header.cellAt[position]!;
      if (count === null || cell >= splitter.count) continue;
      if (reader.read(splitter.bytes, splitter.starts[cell]!, splitter.ends[cell]!) !== READ_NUMBER) continue;
      count.add(reader.value, reader.decimals);
    }
  }
  return Int8Array.from(counts, (count) => count?.usual('most') ?? NO_CELL);
}

/** Corrections that no row will meet: their line holds no row, or their column is none of the file's. */
function correctionsAstray(
  plan: TablePlan,
  bytes: Uint8Array,
  header: TableHeader,
  splitter: RowSplitter,
  corrections: readonly Correction[],
): Finding[] {
  const ours = corrections.filter((entry) => entry.file === plan.file);
  if (ours.length === 0) return [];
  const rowLines = new Set<number>();
  const wanted = new Set(ours.map((entry) => entry.line));
  let line = header.dataLine;
  for (let at = header.dataStart; at < bytes.length; at = splitter.next) {
    if (splitter.split(bytes, at, bytes.length) && wanted.has(line)) rowLines.add(line);
    line += splitter.lines;
  }
  const astray: Finding[] = [];
  for (const entry of ours) {
    const noColumn = entry.column !== null && !header.headers.includes(tidyHeader(entry.column));
    if (rowLines.has(entry.line) && !(noColumn && !/^#\d+$/.test(entry.column!))) continue;
    const { column, printed } = entry;
    const address = { source: plan.meaning.source, file: plan.file, line: entry.line, column: column ?? '' };
    const read = rowLines.has(entry.line) ? `no column "${column}"` : `no row in line ${entry.line}`;
    astray.push(correctionOutOfDate(address, read, printed));
  }
  return astray;
}
