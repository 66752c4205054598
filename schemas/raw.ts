/**
 * What ingest hands on: raw tables gathered by substance, numbers as printed (units not yet touched), every cell with
 * its address. Long tables are columns; anchors, transitions and vapour pressures, a few a substance, are rows.
 */
import type { Finding } from './finding.js';
import type { NumberQuantity, TextQuantity } from './quantities.js';
import type { Substance } from './substances.js';
import type { TableMeaning } from './table-meaning.js';

/** Marks an absent cell in `decimals`. */
export const NO_CELL = -128;

/** One numeric column of one series. */
export interface RawColumn {
  readonly is: NumberQuantity;
  /** Index into `TableMeaning.columns`. */
  readonly column: number;
  /** As printed, in the printed unit; 0 where absent. */
  readonly values: Float64Array;
  /** The last printed digit stands for 10^-decimals (exponents counted in); NO_CELL where the cell is empty. */
  readonly decimals: Int8Array;
  /** The usual `decimals` of this column: the largest that at least a fifth of its non-zero cells print. */
  readonly usualDecimals: number;
  /** 1 where a correction is in force; null when none is. */
  readonly corrected: Uint8Array | null;
}

/** The rows of one `thermal-functions` table that belong to one phase of one substance, in file order. */
export interface RawSeries {
  readonly table: TableMeaning;
  readonly phase: string;
  /** The `series` column's word, or ''. */
  readonly series: string;
  /** Phase whose H(Tr) increments count from; null: each phase counts from its own. */
  readonly incrementsFrom: string | null;
  readonly rows: number;
  /** 1-based line in the file, header included. */
  readonly line: Int32Array;
  readonly columns: readonly RawColumn[];
  /** Separate uncertainty columns (`is: uncertainty`), same length. */
  readonly uncertainties: readonly {
    readonly of: NumberQuantity;
    readonly column: number;
    readonly values: Float64Array;
    readonly decimals: Int8Array;
  }[];
  /** The row's note, '' where none; null when the table has no note column. */
  readonly notes: readonly string[] | null;
  /** The cell's text exactly as printed (after corrections: the printed one, before them). */
  readonly text: (row: number, column: number) => string;
}

export interface RawCell {
  /** Index into `TableMeaning.columns`; -1 for a value from the descriptor's `constants`. */
  readonly column: number;
  readonly value: number;
  readonly decimals: number;
  readonly usualDecimals: number;
  readonly printed: string;
  readonly corrected: boolean;
  /** The row's own uncertainty cell (`is: uncertainty`, `of` this quantity), when there is one. */
  readonly uncertainty: number | null;
}

/** One row of `anchors`, `transitions` or `vapour-pressures`. */
export interface RawRow {
  readonly table: TableMeaning;
  readonly line: number;
  readonly cells: Readonly<Partial<Record<NumberQuantity, RawCell>>>;
  readonly words: Readonly<Partial<Record<TextQuantity, string>>>;
  /** The cells of the phases of a transition as printed, before corrections; none where a constant gives the phase. */
  readonly printedPhases?: { readonly from: string | null; readonly to: string | null };
}

export interface RawCase {
  readonly substance: Substance;
  readonly series: readonly RawSeries[];
  /** `words.phase` is set. */
  readonly anchors: readonly RawRow[];
  /** `words['from-phase']` and `words['to-phase']` are set. */
  readonly transitions: readonly RawRow[];
  /** `words.phase` is set: the condensed phase; `cells` hold `temperature` and `pressure`. */
  readonly vapourPressures: readonly RawRow[];
  readonly findings: readonly Finding[];
}
