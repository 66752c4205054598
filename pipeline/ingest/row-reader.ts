/** Reads the rows of one table one by one: corrections laid over them, rows that `where` leaves out passed by. */
import type { Correction } from '../../schemas/corrections.js';
import type { Address } from '../../schemas/harmonised.js';
import { tidyHeader } from './column-meaning.js';
import { outOfDateNote } from './corrections.js';
import { NumberReader, READ_EMPTY, READ_INFINITE, READ_NUMBER } from './number.js';
import type { IngestPart } from './plan.js';
import type { Readings } from './reading.js';
import { RowSplitter } from './row-splitter.js';
import { decodeUtf8 } from './utf8.js';
import { rowFilter } from './where.js';

const INFINITE_WORDS = /^[+−-]?(?:inf|infinity|infinite|∞)\.?$/i;

/** After `next()` has given true, the row's cells are read by `number` and `text`. */
export class RowReader {
  readonly row: RowSplitter;
  readonly numbers: NumberReader;
  line = 0;
  rowStart = 0;
  /** Cells of `TableMeaning.columns` that a correction changed in this row; null when none did. */
  corrected: ReadonlySet<number> | null = null;
  /** Rows read, and rows that `where` left out, since the reader was made. */
  rowsRead = 0;
  rowsLeftOut = 0;
  private at = 0;
  private end = 0;
  private nextLine = 0;
  private readonly passes: ((row: RowSplitter) => boolean) | null;
  private readonly entries = new Map<number, Correction[]>();
  private readonly missing: ReadonlySet<string>;
  private readonly missingIsNumber: boolean;
  /** Cells that a row must have: up to the last number or name that is read. */
  private readonly cellsNeeded: number;

  constructor(
    private readonly part: IngestPart,
    readonly readings: () => Readings,
  ) {
    const { plan, index, corrections } = part;
    this.row = splitterOf(part);
    this.numbers = new NumberReader(plan.layout.decimal);
    this.passes = rowFilter(plan, index.whereAt);
    this.missing = new Set(plan.layout.missing);
    this.missingIsNumber = plan.layout.missing.some((mark) => /\d/.test(mark));
    for (const entry of corrections) {
      if (entry.file !== plan.file) continue;
      this.entries.set(entry.line, [...(this.entries.get(entry.line) ?? []), entry]);
    }
    let needed = 0;
    for (const [position, { is }] of plan.meaning.columns.entries())
      if (is !== 'note' && is !== 'ignored') needed = Math.max(needed, index.cellAt[position]! + 1);
    this.cellsNeeded = needed;
  }

  start(byteStart: number, byteEnd: number, firstLine: number): void {
    this.at = byteStart;
    this.end = byteEnd;
    this.nextLine = firstLine;
  }

  /** Moves to the next row that counts. */
  next(): boolean {
    const { row, part } = this;
    while (this.at < this.end) {
      const isRow = row.split(part.bytes, this.at, this.end);
      this.rowStart = this.at;
      this.line = this.nextLine;
      this.at = row.next;
      this.nextLine += row.lines;
      if (!isRow) continue;
      this.corrected = null;
      if (this.entries.size > 0 && this.entries.has(this.line) && !this.correct()) continue;
      if (this.passes !== null && !this.passes(row)) {
        this.rowsLeftOut++;
        continue;
      }
      if (row.count !== part.index.cells && !this.rightLength()) continue;
      this.rowsRead++;
      return true;
    }
    return false;
  }

  /** True where column `position` holds a number, left in `numbers`; a cell that is none is reported. */
  number(position: number, infinityAllowed: boolean): boolean {
    const cell = this.part.index.cellAt[position]!;
    const { row, numbers } = this;
    if (cell >= row.count) return false;
    const code = numbers.read(row.bytes, row.starts[cell]!, row.ends[cell]!);
    if (code === READ_NUMBER) return !(this.missingIsNumber && this.missing.has(row.text(cell)));
    if (code === READ_EMPTY) return false;
    const text = row.text(cell);
    if (this.missing.has(text)) return false;
    const infinite = code === READ_INFINITE || INFINITE_WORDS.test(text);
    if (infinite && infinityAllowed) return false;
    const { is, of } = this.part.plan.meaning.columns[position]!;
    this.readings().add({
      problem: infinite || /^nan$/i.test(text) ? 'cell-not-finite' : 'cell-not-a-number',
      address: this.address(position),
      read: this.printed(position),
      wanted: `a number (${is === 'uncertainty' ? `uncertainty of ${of}` : is}) with a decimal "${this.part.plan.layout.decimal}"`,
      remedy:
        'correct the cell by an entry in corrections.json, or list the text under "missing" if it means that there is no value',
    });
    return false;
  }

  text(position: number): string {
    return this.row.text(this.part.index.cellAt[position]!);
  }

  /** The cell as the file prints it, before corrections. */
  printed(position: number): string {
    return this.corrected === null
      ? this.text(position)
      : printedCell(this.part, splitterOf(this.part), this.rowStart, position);
  }

  address(position: number): Address {
    const { meaning, file } = this.part.plan;
    return { source: meaning.source, file, line: this.line, column: meaning.columns[position]?.header ?? '' };
  }

  isBlank(): boolean {
    return this.row.isBlankFrom(0);
  }

  /** Lays the entries of this line over the row; false where the row is withdrawn. */
  private correct(): boolean {
    const { row, part, readings } = this;
    const { columns } = part.plan.meaning;
    const cells = Array.from({ length: row.count }, (_, cell) => row.text(cell));
    const corrected = new Set<number>();
    for (const entry of this.entries.get(this.line)!) {
      if (entry.column === null) {
        const line = decodeUtf8(part.bytes, this.rowStart, row.next).trim();
        if (line === entry.printed.trim()) {
          if (entry.corrected === null) return false;
          readings().add({
            ...outOfDateNote(this.address(-1), line, entry.printed),
            wanted: 'a column, or "corrected": null to withdraw the row',
          });
        } else readings().add(outOfDateNote(this.address(-1), line, entry.printed));
        continue;
      }
      const header = tidyHeader(entry.column);
      const position = columns.findIndex((column) => column.header === header);
      const cell = position < 0 ? -1 : part.index.cellAt[position]!;
      if (cell < 0) continue;
      if ((cells[cell] ?? '') !== entry.printed.trim())
        readings().add(outOfDateNote(this.address(position), cells[cell] ?? '', entry.printed));
      else {
        while (cells.length <= cell) cells.push('');
        cells[cell] = entry.corrected ?? '';
        corrected.add(position);
      }
    }
    if (corrected.size > 0) {
      row.replace(cells);
      this.corrected = corrected;
    }
    return true;
  }

  /** Empty cells at the end may be lacking or too many; anything else is a row whose cells may have shifted. */
  private rightLength(): boolean {
    const { row, part } = this;
    const { cells } = part.index;
    if (row.count > cells ? row.isBlankFrom(cells) : row.count >= this.cellsNeeded) return true;
    if (row.isBlankFrom(0)) return false;
    this.readings().add({
      problem: row.count > cells ? 'row-too-long' : 'row-too-short',
      address: this.address(-1),
      read: decodeUtf8(part.bytes, this.rowStart, row.next).trim().slice(0, 200),
      wanted: `${cells} cells, as in the header; this row has ${row.count}`,
      remedy:
        'look at the row for a delimiter too many or too few (a decimal comma, a comma inside a name without quotes)',
    });
    return false;
  }
}

/** The text that a file prints for column `position` of the row at `rowStart`; '' where the row has no such cell. */
export function printedCell(part: IngestPart, splitter: RowSplitter, rowStart: number, position: number): string {
  const cell = part.index.cellAt[position] ?? -1;
  return splitter.split(part.bytes, rowStart, part.bytes.length) ? splitter.text(cell) : '';
}

/** Another splitter for the same table, so that looking back at a cell does not disturb the reading. */
export function splitterOf({ plan, index }: IngestPart): RowSplitter {
  return new RowSplitter(plan.layout, index.newline);
}
