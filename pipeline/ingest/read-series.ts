/** Gathers the rows of a `thermal-functions` table, by phase and series, into columns in file order. */
import type { NumberQuantity, TextQuantity } from '../../schemas/quantities.js';
import { NO_CELL, type RawColumn, type RawSeries } from '../../schemas/raw.js';
import { phaseWanted, resolvePhase } from './phase.js';
import type { IngestPart, WordFrom } from './plan.js';
import { printedCell, type RowReader } from './row-reader.js';
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
  private notes: string[] = [];
  private values: Float64Array<ArrayBuffer>[];
  private decimals: Int8Array<ArrayBuffer>[];
  private corrected: (Uint8Array<ArrayBuffer> | null)[];
  /** Positions of the number and uncertainty columns; the temperature's place among them. */
  private readonly positions: readonly number[];
  private readonly temperature: number;
  private readonly zeroKelvin: number;
  private readonly infinityAllowed: readonly boolean[];
  private readonly notePosition: number;
  private readonly keyPositions: readonly number[];
  private readonly count = new DecimalsCount();

  constructor(
    private readonly part: IngestPart,
    private readonly reader: RowReader,
  ) {
    const { meaning, words } = part.plan;
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
    const { part, rows, positions } = this;
    const { meaning } = part.plan;
    for (let n = 0; n < rows; n++) groups[this.groupOf[n]!]!.rows++;
    const result: RawSeries[] = [];
    for (const [number, group] of groups.entries()) {
      if (group.rows === 0) continue;
      const pick = group.rows === rows ? null : this.rowsOf(number, group.rows);
      const rowStart = take(this.rowStart, pick, rows);
      const columns: RawColumn[] = [];
      const uncertainties: RawSeries['uncertainties'][number][] = [];
      for (const [k, column] of positions.entries()) {
        const { is, of } = meaning.columns[column]!;
        const values = take(this.values[k]!, pick, rows);
        const decimals = take(this.decimals[k]!, pick, rows);
        if (is === 'uncertainty') uncertainties.push({ of: of!, column, values, decimals });
        else {
          const marks = this.corrected[k] == null ? null : take(this.corrected[k], pick, rows);
          const corrected = marks?.includes(1) ? marks : null;
          columns.push({
            is: is as NumberQuantity,
            column,
            values,
            decimals,
            usualDecimals: this.usual(values, decimals),
            corrected,
          });
        }
      }
      result.push({
        table: meaning,
        phase: group.phase,
        series: group.series,
        incrementsFrom: group.incrementsFrom,
        rows: group.rows,
        line: take(this.line, pick, rows),
        columns,
        uncertainties,
        notes: this.notePosition < 0 ? null : pick === null ? this.notes : Array.from(pick, (n) => this.notes[n]!),
        text: (row, column) => printedCell(part, rowStart[row]!, column),
      });
    }
    return result;
  }

  private rowsOf(group: number, rows: number): Int32Array {
    const pick = new Int32Array(rows);
    let at = 0;
    for (let n = 0; n < this.rows; n++) if (this.groupOf[n] === group) pick[at++] = n;
    return pick;
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
    this.values = this.values.map((values) => longer(values, new Float64Array(this.room)));
    this.decimals = this.decimals.map((decimals) => longer(decimals, new Int8Array(this.room)));
    this.corrected = this.corrected.map((marks) => (marks === null ? null : longer(marks, new Uint8Array(this.room))));
  }
}

/** The phase label that a row gives for `quantity`, '' where a column of increments is empty; null where it is unknown, and reported. */
export function readPhase(
  part: IngestPart,
  reader: RowReader,
  substance: string,
  quantity: TextQuantity,
): string | null {
  const { words, phases } = part.plan;
  const from = words[quantity];
  const word = wordOf(reader, from);
  if (word === '' && quantity === 'increments-from') return '';
  const label = resolvePhase(phases, substance, word);
  if (label !== null) return label;
  reader.readings().add({
    problem: 'phase-unmapped',
    subject: word,
    address:
      from !== undefined && 'column' in from
        ? reader.address(from.column)
        : { ...reader.address(-1), column: quantity },
    read: word,
    wanted: phaseWanted(word, phases),
    remedy: `add "${word}" to "phases" in source.json; its rows are not used`,
  });
  return null;
}

export function wordOf(reader: RowReader, from: WordFrom | undefined): string {
  if (from === undefined) return '';
  return 'constant' in from ? from.constant : reader.text(from.column);
}

const columnOf = (from: WordFrom | undefined): number => (from !== undefined && 'column' in from ? from.column : -1);

function longer<T extends { set(from: ArrayLike<number>): void }>(old: ArrayLike<number>, fresh: T): T {
  fresh.set(old);
  return fresh;
}

/** The rows of `pick`, or the first `rows` of them where all are wanted. */
function take<
  T extends
    | Float64Array<ArrayBuffer>
    | Int32Array<ArrayBuffer>
    | Uint32Array<ArrayBuffer>
    | Int8Array<ArrayBuffer>
    | Uint8Array<ArrayBuffer>,
>(from: T, pick: Int32Array | null, rows: number): T {
  if (pick === null) return from.slice(0, rows) as T;
  const result = from.slice(0, pick.length) as T;
  for (let i = 0; i < pick.length; i++) result[i] = from[pick[i]!]!;
  return result;
}
