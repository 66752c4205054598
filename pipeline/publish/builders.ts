/** Growable columns: a published table is filled cell by cell without an object a row. */
import {
  ABSENT_CODE,
  type BooleanColumn,
  type Column,
  type ColumnTable,
  type IntegerColumn,
  type NumberColumn,
  type TextColumn,
} from '../../schemas/columns.js';
import type { FieldKind, PublishedTable } from '../../schemas/release-tables.js';

type Store = Float64Array | Int32Array | Uint8Array | Uint32Array;

function grown<S extends Store>(store: S, needed: number): S {
  if (needed <= store.length) return store;
  const larger = new (store.constructor as new (length: number) => S)(Math.max(needed, 2 * store.length));
  larger.set(store as never);
  return larger;
}

/** `lent`: the builder's own store, good until the builder is filled again. */
function cut<S extends Store>(store: S, length: number, lent: boolean): S {
  return (lent ? store.subarray(0, length) : store.slice(0, length)) as S;
}

/** Numbers, integers and flags: values with absence marked beside them. An absent cell holds 0. */
class ValueBuilder<S extends Float64Array | Int32Array | Uint8Array> {
  length = 0;
  #values: S;
  #absent = new Uint8Array(0);
  #anyAbsent = false;

  constructor(empty: S) {
    this.#values = empty;
  }

  push(value: number | null): void {
    this.#reserve(1);
    if (value === null) this.#markAbsent(1);
    else this.#values[this.length] = value === 0 ? 0 : value; // -0 is published as 0
    this.length++;
  }

  append(values: ArrayLike<number>): void {
    this.#reserve(values.length);
    this.#values.set(values, this.length);
    this.length += values.length;
  }

  fill(value: number | null, count: number): void {
    this.#reserve(count);
    if (value === null) this.#markAbsent(count);
    else this.#values.fill(value, this.length, this.length + count);
    this.length += count;
  }

  /** Takes back all from row `length` on. */
  truncate(length: number): void {
    if (this.#anyAbsent) this.#absent.fill(0, length);
    this.#values.fill(0, length, this.length);
    this.length = length;
    if (length === 0) this.#anyAbsent = false;
  }

  /** The first row from `from` on that holds a number that is none and is not marked absent; -1 where there is none. */
  firstBroken(from: number): number {
    for (let row = from; row < this.length; row++) {
      const value = this.#values[row]!;
      if (value - value !== 0 && !(this.#anyAbsent && this.#absent[row] === 1)) return row;
    }
    return -1;
  }

  valueAt(row: number): number {
    return this.#values[row]!;
  }

  protected finish(lent: boolean): { values: S; absent: Uint8Array | null } {
    const length = this.length;
    this.#absent = this.#anyAbsent ? grown(this.#absent, length) : this.#absent;
    return {
      values: cut(this.#values, length, lent),
      absent: this.#anyAbsent ? cut(this.#absent, length, lent) : null,
    };
  }

  #reserve(count: number): void {
    this.#values = grown(this.#values, this.length + count);
  }

  #markAbsent(count: number): void {
    this.#absent = grown(this.#absent, Math.max(this.length + count, this.#values.length));
    this.#absent.fill(1, this.length, this.length + count);
    this.#anyAbsent = true;
  }
}

export class NumberBuilder extends ValueBuilder<Float64Array> {
  constructor(capacity: number) {
    super(new Float64Array(capacity));
  }
  column(lent = false): NumberColumn {
    return { kind: 'number', ...this.finish(lent) };
  }
}

export class IntegerBuilder extends ValueBuilder<Int32Array> {
  constructor(capacity: number) {
    super(new Int32Array(capacity));
  }
  column(lent = false): IntegerColumn {
    return { kind: 'integer', ...this.finish(lent) };
  }
}

export class BooleanBuilder extends ValueBuilder<Uint8Array> {
  constructor(capacity: number) {
    super(new Uint8Array(capacity));
  }
  pushFlag(value: boolean | null): void {
    this.push(value === null ? null : value ? 1 : 0);
  }
  column(lent = false): BooleanColumn {
    return { kind: 'boolean', ...this.finish(lent) };
  }
}

/** Text by dictionary, words in order of first use. An empty text is an empty cell: CSV cannot tell them apart. */
export class TextBuilder {
  length = 0;
  #codes: Uint32Array;
  readonly #codeOf = new Map<string, number>();

  constructor(capacity: number) {
    this.#codes = new Uint32Array(capacity);
  }

  push(word: string | null): void {
    this.#codes = grown(this.#codes, this.length + 1);
    this.#codes[this.length++] = this.code(word);
  }

  fill(word: string | null, count: number): void {
    this.#codes = grown(this.#codes, this.length + count);
    this.#codes.fill(this.code(word), this.length, this.length + count);
    this.length += count;
  }

  /** One cell a choice, each an index into `words`. */
  appendChoice(words: readonly (string | null)[], choices: Uint8Array): void {
    const codes = new Map<number, number>();
    this.#codes = grown(this.#codes, this.length + choices.length);
    let last = -1;
    let code = ABSENT_CODE;
    for (let i = 0; i < choices.length; i++) {
      const choice = choices[i]!;
      if (choice !== last) {
        code = codes.get(choice) ?? this.code(words[choice]!);
        codes.set(choice, code);
        last = choice;
      }
      this.#codes[this.length + i] = code;
    }
    this.length += choices.length;
  }

  code(word: string | null): number {
    if (word === null || word === '') return ABSENT_CODE;
    let code = this.#codeOf.get(word);
    if (code === undefined) {
      code = this.#codeOf.size;
      this.#codeOf.set(word, code);
    }
    return code;
  }

  /** Takes back all from row `length` on; the words of what was taken back stay in the dictionary until it is empty. */
  truncate(length: number): void {
    this.length = length;
    if (length === 0) this.#codeOf.clear();
  }

  column(lent = false): TextColumn {
    return { kind: 'text', codes: cut(this.#codes, this.length, lent), words: [...this.#codeOf.keys()] };
  }
}

interface BuilderOf {
  number: NumberBuilder;
  integer: IntegerBuilder;
  boolean: BooleanBuilder;
  text: TextBuilder;
}

/** One builder a field, by the field's name. */
export type Builders<T extends PublishedTable> = {
  readonly [F in T['fields'][number] as F['name']]: BuilderOf[F['kind']];
};

/** Room for `rows` rows is made at once; where their number is known, nothing is copied later. */
export function buildersFor<const T extends PublishedTable>(table: T, rows = 16): Builders<T> {
  const made: Record<string, BuilderOf[FieldKind]> = {};
  for (const field of table.fields) made[field.name] = builder(field.kind, rows);
  return made as Builders<T>;
}

function builder(kind: FieldKind, rows: number): BuilderOf[FieldKind] {
  switch (kind) {
    case 'number':
      return new NumberBuilder(rows);
    case 'integer':
      return new IntegerBuilder(rows);
    case 'boolean':
      return new BooleanBuilder(rows);
    case 'text':
      return new TextBuilder(rows);
  }
}

export type AnyBuilders = Readonly<Record<string, BuilderOf[FieldKind]>>;

/** Takes back all rows from `length` on. */
export function truncateTable(builders: AnyBuilders, length: number): void {
  for (const made of Object.values(builders)) made.truncate(length);
}

/** Throws where the columns are not equally long: a cell was forgotten or written twice. */
export function finishTable(builders: AnyBuilders, lent = false): ColumnTable {
  const columns: Record<string, Column> = {};
  let rows = -1;
  for (const [name, made] of Object.entries(builders)) {
    if (rows < 0) rows = made.length;
    if (made.length !== rows) throw new Error(`column ${name} has ${made.length} rows, the first column ${rows}`);
    columns[name] = made.column(lent);
  }
  return { rows: Math.max(0, rows), columns };
}
