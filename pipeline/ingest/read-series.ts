/** Gathers the rows of a `thermal-functions` table, by phase and series, into columns in file order. */
import type { NumberQuantity } from '../../schemas/quantities.js';
import { NO_CELL, type RawColumn, type RawSeries } from '../../schemas/raw.js';
import type { IngestPart, WordFrom } from './plan.js';
import { printedCell, type RowReader, splitterOf } from './row-reader.js';
import type { RowSplitter } from './row-splitter.js';
import { readPhase, wordOf } from './row-words.js';
import { DecimalsCount } from './usual-decimals.js';

interface Group {
  readonly phase: string;
  readonly series: string;
  readonly incrementsFrom: string | null;
  rows: number;
}

/** Reads the runs of one substance after another; the room for one substance's rows is used again for the next. */
export class SeriesGatherer {
  private room = 256;
  private rows = 0;
  private line = new Int32Array(this.room);
  private rowStart = new Uint32Array(this.room);
  private groupOf = new Int32Array(this.room);
  private order = new Int32Array(this.room);
  private notes: string[] = [];
  private values: Float64Array[];
  private decimals: Int8Array[];
  private corrected: (Uint8Array | null)[];
  /** Positions of the number and uncertainty columns; the temperature's place among them. */
  private readonly positions: readonly number[];
  private readonly temperature: number;
  private readonly zeroKelvin: number;
  private readonly infinityAllowed: readonly boolean[];
  private readonly notePosition: number;
  private readonly keyPositions: readonly number[];
  private readonly count = new DecimalsCount();
  private readonly lookBack: RowSplitter;

  constructor(
    private readonly part: IngestPart,
    private readonly reader: RowReader,
  ) {
    const { meaning, words } = part.plan;
    this.lookBack = splitterOf(part);
    const positions: number[] = [];
    for (const [position, { unit }] of meaning.columns.entries()) if (unit !== null) positions.push(position);
    this.positions = positions;
    this.temperature = positions.findIndex((position) => meaning.columns[position]!.is === 'temperature');
    const unit = meaning.columns[positions[this.temperature]!]?.unit;
    this.zeroKelvin = unit === 'Cel' ? -273.15 : unit === '[degF]' ? -459.67 : 0;
    this.infinityAllowed = positions.map((position) => meaning.columns[position]!.is === 'gibbs-function');
    this.values = positions.map(() => new Float64Array(this.room));
    this.decimals = positions.map(() => new Int8Array(this.room));
    this.corrected = positions.map(() => null);
    this.notePosition = columnOf(words.note);
    this.keyPositions = [words.phase, words.series, words['increments-from']].map(columnOf).filter((at) => at >= 0);
  }

  /** All series of the substance `id` in the given runs. */
  read(id: string, runs: readonly number[]): RawSeries[] {
    const { part, reader } = this;
    const groups: Group[] = [];
    this.rows = 0;
    this.notes = [];
    this.corrected.fill(null);
    let group = -1;
    let key: string | null = null;
    const groupOfKey = new Map<string, number>();
    const { runs: all } = part.index;
    for (const run of runs) {
      reader.start(all.byteStart[run]!, all.byteEnd[run]!, all.firstLine[run]!);
      this.sameBytes = null;
      while (reader.next()) {
        if (group < 0 || key === null || !this.sameKey()) {
          key = this.keyPositions.map((position) => reader.text(position)).join('\n');
          let known = groupOfKey.get(key);
          if (known === undefined) {
            known = reader.isBlank() ? -1 : this.open(id, groups);
            if (!reader.isBlank()) groupOfKey.set(key, known);
          }
          group = known;
          this.rememberKey();
        }
        if (group < 0) {
          if (!reader.isBlank() && groupOfKey.get(key) === -1) this.groupOfRow(id);
          continue;
        }
        this.take(group);
      }
    }
    return this.close(groups);
  }

  private sameBytes: Uint8Array | null = null;
  private readonly keyStarts: number[] = [];
  private readonly keyEnds: number[] = [];

  /** True where the phase, series and increments cells are, byte by byte, those of the row before. */
  private sameKey(): boolean {
    const { row } = this.reader;
    const { keyPositions, sameBytes: before } = this;
    if (keyPositions.length === 0) return true;
    if (before === null || row.bytes !== before) return false;
    const { cellAt } = this.part.index;
    for (let k = 0; k < keyPositions.length; k++) {
      const cell = cellAt[keyPositions[k]!]!;
      if (cell >= row.count) return false;
      const start = row.starts[cell]!;
      const from = this.keyStarts[k]!;
      const length = this.keyEnds[k]! - from;
      if (row.ends[cell]! - start !== length) return false;
      for (let i = 0; i < length; i++) if (before[start + i] !== before[from + i]) return false;
    }
    return true;
  }

  private rememberKey(): void {
    const { row } = this.reader;
    this.sameBytes = row.bytes === this.part.bytes ? row.bytes : null;
    for (const [k, position] of this.keyPositions.entries()) {
      const cell = this.part.index.cellAt[position]!;
      this.keyStarts[k] = cell < row.count ? row.starts[cell]! : 0;
      this.keyEnds[k] = cell < row.count ? row.ends[cell]! : 0;
    }
  }

  /** Number of the row's group, a new one opened where needed; -1 where its phase is unknown (and reported). */
  private open(id: string, groups: Group[]): number {
    const found = this.groupOfRow(id);
    if (found === null) return -1;
    const same = groups.findIndex(
      (other) =>
        other.phase === found.phase && other.series === found.series && other.incrementsFrom === found.incrementsFrom,
    );
    return same >= 0 ? same : groups.push(found) - 1;
  }

  private groupOfRow(id: string): Group | null {
    const { words } = this.part.plan;
    const phase = readPhase(this.part, this.reader, id, 'phase');
    const incrementsFrom =
      words['increments-from'] === undefined ? null : readPhase(this.part, this.reader, id, 'increments-from');
    if (phase === null || (words['increments-from'] !== undefined && incrementsFrom === null)) return null;
    return {
      phase,
      series: wordOf(this.reader, words.series),
      incrementsFrom: incrementsFrom === '' ? null : incrementsFrom,
      rows: 0,
    };
  }

  private take(group: number): void {
    const { reader, positions } = this;
    if (this.rows === this.room) this.grow();
    const n = this.rows;
    // The temperature first: it says whether this is a limit row.
    if (!this.cell(this.temperature, n, false)) {
      if (!reader.isBlank()) this.withoutTemperature();
      return;
    }
    const limitRow = this.values[this.temperature]![n] === this.zeroKelvin;
    for (let k = 0; k < positions.length; k++)
      if (k !== this.temperature) this.cell(k, n, limitRow && this.infinityAllowed[k]!);
    if (reader.corrected !== null) this.mark(n, reader.corrected);
    this.line[n] = reader.line;
    this.rowStart[n] = reader.rowStart;
    this.groupOf[n] = group;
    if (this.notePosition >= 0) this.notes.push(reader.text(this.notePosition));
    this.rows++;
  }

  private cell(k: number, n: number, infinityAllowed: boolean): boolean {
    const { reader } = this;
    if (reader.number(this.positions[k]!, infinityAllowed)) {
      this.values[k]![n] = reader.numbers.value;
      this.decimals[k]![n] = reader.numbers.decimals;
      return true;
    }
    this.values[k]![n] = 0;
    this.decimals[k]![n] = NO_CELL;
    return false;
  }

  private withoutTemperature(): void {
    const { reader } = this;
    const position = this.positions[this.temperature]!;
    const read = reader.printed(position);
    if (read !== '' && !this.part.plan.layout.missing.includes(read)) return;
    reader.readings().add({
      problem: 'required-missing',
      address: reader.address(position),
      read,
      wanted: 'a temperature in every row',
      remedy: 'give the temperature by an entry in corrections.json, or withdraw the row there ("column": null)',
    });
  }

  private mark(n: number, corrected: ReadonlySet<number>): void {
    for (const [k, position] of this.positions.entries()) {
      if (!corrected.has(position)) continue;
      this.corrected[k] ??= new Uint8Array(this.room);
      this.corrected[k][n] = 1;
    }
  }

  private close(groups: readonly Group[]): RawSeries[] {
    for (let n = 0; n < this.rows; n++) groups[this.groupOf[n]!]!.rows++;
    const { order } = this;
    const places: number[] = [];
    let rows = 0;
    for (const group of groups) {
      places.push(rows);
      rows += group.rows;
    }
    for (let n = 0; n < this.rows; n++) order[places[this.groupOf[n]!]!++] = n;
    const result: RawSeries[] = [];
    let start = 0;
    for (const group of groups) {
      if (group.rows > 0) result.push(this.seriesOf(group, start));
      start += group.rows;
    }
    return result;
  }

  /** The rows `order[start]` and on. All columns of a series share one piece of memory. */
  private seriesOf(group: Group, start: number): RawSeries {
    const { part, positions, order, lookBack } = this;
    const { meaning } = part.plan;
    const { rows } = group;
    const room = new ArrayBuffer(rows * (9 * positions.length + 8));
    const afterValues = 8 * rows * positions.length;
    const line = pickIntegers(this.line, order, start, new Int32Array(room, afterValues, rows));
    const rowStart = pickOffsets(this.rowStart, order, start, new Uint32Array(room, afterValues + 4 * rows, rows));
    const columns: RawColumn[] = [];
    const uncertainties: RawSeries['uncertainties'][number][] = [];
    for (let k = 0; k < positions.length; k++) {
      const column = positions[k]!;
      const { is, of } = meaning.columns[column]!;
      const values = pickNumbers(this.values[k]!, order, start, new Float64Array(room, 8 * rows * k, rows));
      const decimals = pickDecimals(
        this.decimals[k]!,
        order,
        start,
        new Int8Array(room, afterValues + 8 * rows + rows * k, rows),
      );
      if (is === 'uncertainty') {
        uncertainties.push({ of: of!, column, values, decimals });
        continue;
      }
      const marks = this.corrected[k] ?? null;
      const picked = marks === null ? null : Uint8Array.from(order.subarray(start, start + rows), (n) => marks[n]!);
      const corrected = picked?.includes(1) ? picked : null;
      const usualDecimals = this.usual(values, decimals);
      columns.push({ is: is as NumberQuantity, column, values, decimals, usualDecimals, corrected });
    }
    return {
      table: meaning,
      phase: group.phase,
      series: group.series,
      incrementsFrom: group.incrementsFrom,
      rows,
      line,
      columns,
      uncertainties,
      notes: this.notePosition < 0 ? null : Array.from(order.subarray(start, start + rows), (n) => this.notes[n]!),
      text: (row, column) => printedCell(part, lookBack, rowStart[row]!, column),
    };
  }

  private usual(values: Float64Array, decimals: Int8Array): number {
    const { count } = this;
    count.clear();
    for (let n = 0; n < values.length; n++) if (decimals[n] !== NO_CELL) count.add(values[n]!, decimals[n]!);
    return count.usual();
  }

  private grow(): void {
    this.room *= 2;
    this.line = longer(this.line, new Int32Array(this.room));
    this.rowStart = longer(this.rowStart, new Uint32Array(this.room));
    this.groupOf = longer(this.groupOf, new Int32Array(this.room));
    this.order = new Int32Array(this.room);
    this.values = this.values.map((values) => longer(values, new Float64Array(this.room)));
    this.decimals = this.decimals.map((decimals) => longer(decimals, new Int8Array(this.room)));
    this.corrected = this.corrected.map((marks) => (marks === null ? null : longer(marks, new Uint8Array(this.room))));
  }
}

const columnOf = (from: WordFrom | undefined): number => (from !== undefined && 'column' in from ? from.column : -1);

function longer<T extends { set(from: ArrayLike<number>): void }>(old: ArrayLike<number>, fresh: T): T {
  fresh.set(old);
  return fresh;
}

// One loop for each kind of array: the same loop over several kinds is several times slower.
function pickNumbers(from: Float64Array, order: Int32Array, start: number, to: Float64Array): Float64Array {
  for (let i = 0; i < to.length; i++) to[i] = from[order[start + i]!]!;
  return to;
}

function pickDecimals(from: Int8Array, order: Int32Array, start: number, to: Int8Array): Int8Array {
  for (let i = 0; i < to.length; i++) to[i] = from[order[start + i]!]!;
  return to;
}

function pickIntegers(from: Int32Array, order: Int32Array, start: number, to: Int32Array): Int32Array {
  for (let i = 0; i < to.length; i++) to[i] = from[order[start + i]!]!;
  return to;
}

function pickOffsets(from: Uint32Array, order: Int32Array, start: number, to: Uint32Array): Uint32Array {
  for (let i = 0; i < to.length; i++) to[i] = from[order[start + i]!]!;
  return to;
}
