/** What ingest's steps hand to each other. All of it is plain data, so that it can be sent to a worker. */
import type { Correction } from '../../schemas/corrections.js';
import type { Finding } from '../../schemas/finding.js';
import type { NumberQuantity, TextQuantity } from '../../schemas/quantities.js';
import type { Basis, TableMeaning } from '../../schemas/table-meaning.js';

/** How the bytes of a table are cut into cells. */
export interface Layout {
  /** One ASCII character; a run of spaces where `spaces` is set. */
  readonly delimiter: string;
  readonly spaces: boolean;
  /** Lines before the header. */
  readonly skipLines: number;
  readonly headerless: boolean;
  /** Lines that begin with this are skipped. */
  readonly comment: string | null;
  readonly decimal: '.' | ',';
  /** Cells that mean "no value"; an empty cell always does. */
  readonly missing: readonly string[];
}

/** Keeps the rows whose cell fulfils all that is set; numbers by `from` and `to` (inclusive), words by `is` and `not`. */
export interface WhereClause {
  readonly header: string;
  readonly from: number | null;
  readonly to: number | null;
  readonly is: readonly string[] | null;
  readonly not: readonly string[] | null;
}

/** A value that the descriptor gives for every row: SI, with the digits it was written with. */
export interface ConstantNumber {
  readonly value: number;
  readonly decimals: number;
  readonly printed: string;
}

/** A word that every row shares, or the column (an index into `TableMeaning.columns`) that holds it. */
export type WordFrom = { readonly constant: string } | { readonly column: number };

/** One table of one file, its descriptor resolved. */
export interface TablePlan {
  readonly meaning: TableMeaning;
  readonly file: string;
  readonly layout: Layout;
  /** null only where the descriptor is too broken to say. */
  readonly substance: WordFrom | null;
  readonly words: Readonly<Partial<Record<TextQuantity, WordFrom>>>;
  readonly numbers: Readonly<Partial<Record<NumberQuantity, ConstantNumber>>>;
  readonly where: readonly WhereClause[];
  /** What the source calls a substance -> its id. */
  readonly names: Readonly<Record<string, string>>;
  /** What the source calls a phase -> its label; or nested by substance id. */
  readonly phases: Readonly<Record<string, string | Readonly<Record<string, string>>>>;
  /** True: columns that nobody names are passed over in silence. */
  readonly othersIgnored: boolean;
  /** Headers that other tables of this source name in the same file. */
  readonly namedElsewhere: readonly string[];
  /** Why nothing of this table can be used; the substances that it touches are withheld. */
  readonly broken: Finding | null;
}

/** What a release says about a source; and its tables. */
export interface DescriptorResult {
  readonly source: SourceInfo | null;
  readonly plans: readonly TablePlan[];
  readonly findings: readonly Finding[];
}

export interface SourceInfo {
  readonly id: string;
  readonly title: string;
  readonly citation: string;
  readonly doi: string | null;
  readonly year: number | null;
  readonly licence: string | null;
  readonly basis: Basis | null;
}

/** Stretches of lines of one substance, in file order. */
export interface Runs {
  readonly count: number;
  /** Index into the list of all substances. */
  readonly substance: Uint32Array;
  readonly byteStart: Uint32Array;
  /** One past the last byte. */
  readonly byteEnd: Uint32Array;
  /** 1-based, header included. */
  readonly firstLine: Uint32Array;
}

/** One fast pass over one table's bytes. */
export interface RowIndex {
  readonly runs: Runs;
  /** Position of each of `TableMeaning.columns` among the cells of a row; -1 where the file has no such column. */
  readonly cellAt: Int32Array;
  /** Position of each `where` clause's column. */
  readonly whereAt: Int32Array;
  /** Cells in the header. */
  readonly cells: number;
  /** Line break: 10, or 13 where a file has no line feed at all. */
  readonly newline: number;
  /** File-wide usual decimals of each of `TableMeaning.columns` (row tables only, else NO_CELL). */
  readonly usualDecimals: Int8Array;
  /** Why nothing of this table can be used (a missing column, a descriptor that could not be read). */
  readonly broken: Finding | null;
  /** Faults of the table that do not keep it from being read (an unknown column): each substance is given its own. */
  readonly flaws: readonly Finding[];
  /** Findings that belong to no substance. */
  readonly findings: readonly Finding[];
}

/** One table, as `ingest` wants it. `index` may be narrowed to a partition by `selectRuns`. */
export interface IngestPart {
  readonly plan: TablePlan;
  readonly bytes: Uint8Array;
  readonly index: RowIndex;
  /** Those of this plan's file. */
  readonly corrections: readonly Correction[];
}
