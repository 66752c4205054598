/** One table of one file with its descriptor resolved: what each column is, and what holds for every row. */
import type { NumberQuantity, TextQuantity } from './quantities.js';

export type Basis = 'measured' | 'evaluated' | 'computed' | 'estimated';
export type TemperatureScale = 'ITS-90' | 'IPTS-68' | 'IPTS-48' | 'thermodynamic' | 'not-stated';

export interface StatedUncertainty {
  /** A fraction of the value, or null. */
  readonly relative: number | null;
  /** In the column's unit (a difference), or null. */
  readonly absolute: number | null;
  readonly coverage: number;
  /** True: an error common to the series (calibration). */
  readonly shared: boolean;
}

export interface ColumnMeaning {
  /** The header as printed. */
  readonly header: string;
  readonly is: NumberQuantity | TextQuantity | 'uncertainty' | 'ignored';
  /** For `uncertainty`: which quantity it belongs to. */
  readonly of: NumberQuantity | null;
  /** UCUM code as declared; null for words. */
  readonly unit: string | null;
  readonly per: 'atom' | null;
  readonly uncertainty: readonly StatedUncertainty[];
  /** Overrides the table's rank. */
  readonly rank: number | null;
  /** For `is: uncertainty`: the coverage factor k of the printed figure. */
  readonly coverage: number;
  readonly shared: boolean;
}

export interface TableMeaning {
  /** Source id: the folder's name. */
  readonly source: string;
  /** Path inside the source's folder, with forward slashes. */
  readonly file: string;
  /** The table's id, or its position: `#0`. */
  readonly table: string;
  readonly holds: 'thermal-functions' | 'anchors' | 'transitions' | 'vapour-pressures';
  readonly basis: Basis;
  /** Sources and table ids that this one was computed from. */
  readonly restsOn: readonly string[];
  readonly rank: number;
  readonly temperatureScale: TemperatureScale;
  /** What gas entropies refer to. */
  readonly standardPressurePa: number;
  readonly referenceTemperatureK: number;
  /** 'elements-298.15', or a shared label, or null when nothing was declared. */
  readonly enthalpyZero: string | null;
  /** 'absolute', or a shared label, or null when nothing was declared. */
  readonly entropyZero: string | null;
  /** Set where the table states the real fluid's isobar; null is the standard state. */
  readonly isobarPa: number | null;
  /** Increments count from 0 K instead of the reference temperature. */
  readonly incrementsFromZeroK: boolean;
  readonly columns: readonly ColumnMeaning[];
}
