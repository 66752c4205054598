/** What harmonise hands on: SI, molar, ITS-90 as far as known, standard pressure 1 bar, k = 1 uncertainties. */
import type { Address } from './address.js';
import type { Finding } from './finding.js';
import type { NumberQuantity } from './quantities.js';
import type { Substance } from './substances.js';
import type { TableMeaning } from './table-meaning.js';

export type { Address } from './address.js';

export type UncertaintyOrigin = 'stated' | 'source default' | 'policy default' | 'printed digits';

/** One quantity of one series, in SI. */
export interface SeriesQuantity {
  readonly is: NumberQuantity;
  /** Index into `TableMeaning.columns`; the header is found there. */
  readonly column: number;
  readonly values: Float64Array;
  readonly present: Uint8Array;
  /** Half a unit of the column's usual last place, in SI: a bound. Over sqrt(3) it is a standard uncertainty. */
  readonly halfUnit: Float64Array;
  /** Each point's own standard uncertainty without rounding: stated or default; 0 where only the digits speak. */
  readonly uOwn: Float64Array;
  /** Relative standard uncertainty common to the series (calibration); 0 when none is stated. */
  readonly uSharedRelative: number;
  readonly origin: UncertaintyOrigin;
}

export interface Series {
  readonly table: TableMeaning;
  readonly phase: string;
  readonly series: string;
  readonly rank: number;
  readonly incrementsFrom: string | null;
  readonly rows: number;
  readonly line: Int32Array;
  /** In file order; not sorted. K on ITS-90 where the scale is known. */
  readonly temperatureK: Float64Array;
  /** Largest possible difference to ITS-90 where the scale is unknown or outside a known range [K]. */
  readonly scaleDoubtK: number;
  /** Half a unit of the temperature's last place [K]. */
  readonly temperatureHalfUnitK: number;
  readonly temperatureColumn: number;
  readonly heatCapacity: SeriesQuantity | null;
  readonly entropy: SeriesQuantity | null;
  /** H(T) - H(Tr) [J/mol]. */
  readonly enthalpyIncrement: SeriesQuantity | null;
  /** -[G(T) - H(Tr)]/T [J/(mol K)]. */
  readonly gibbsFunction: SeriesQuantity | null;
  /** H(T) from the declared zero. */
  readonly enthalpy: SeriesQuantity | null;
  /** G(T) from the declared zero. */
  readonly gibbsEnergy: SeriesQuantity | null;
  readonly notes: readonly string[] | null;
  /** How many cells of this series have a correction in force. */
  readonly corrections: number;
  readonly text: (row: number, column: number) => string;
}

/** One stated number of a row table, in SI. */
export interface Datum {
  readonly value: number;
  /** Standard uncertainty as stated or by default, rounding included. */
  readonly u: number;
  /** Standard uncertainty of the rounding alone. */
  readonly uRounding: number;
  /**
   * Beside another source's numbers: `u`, and where only digits speak, what the policy takes for a measured number on top.
   * Absent: `u`.
   */
  readonly uBeside?: number | undefined;
  readonly halfUnit: number;
  readonly origin: UncertaintyOrigin;
  readonly address: Address;
  readonly printed: string;
  /** The unit as declared, and the factor from the printed number to SI (value = printed * factor + offset). */
  readonly unit: string;
  readonly factor: number;
  readonly offset: number;
}

export interface Anchor {
  readonly table: TableMeaning;
  readonly phase: string;
  readonly referenceTemperatureK: number;
  readonly enthalpyOfFormation: Datum | null;
  readonly entropy: Datum | null;
  readonly gibbsEnergyOfFormation: Datum | null;
  readonly enthalpyFromZero: Datum | null;
  readonly heatCapacity: Datum | null;
}

export interface StatedTransition {
  readonly table: TableMeaning;
  readonly from: string;
  readonly to: string;
  /** What the cells of the two phases say, before corrections; null where a constant gives the phase. */
  readonly printedFrom: string | null;
  readonly printedTo: string | null;
  readonly order: 'first' | 'continuous' | 'glass';
  /** `real`: a measured boiling or sublimation point; `ideal`: fugacity equals the pressure; null where no gas is involved. */
  readonly gas: 'real' | 'ideal' | null;
  readonly pressurePa: number;
  /**
   * The cell that `pressurePa` is from; null where the descriptor, the table or the source gives it. Its `u` is what is
   * stated: a nominal pressure is exact as printed.
   */
  readonly pressure: Datum | null;
  readonly temperature: Datum;
  readonly enthalpy: Datum | null;
  readonly entropy: Datum | null;
}

/** One measured or evaluated (T, p) of the vapour over a condensed phase. */
export interface VapourPressure {
  readonly table: TableMeaning;
  /** The condensed phase. */
  readonly phase: string;
  /** K, ITS-90 where the scale is known. */
  readonly temperature: Datum;
  /** Pa. */
  readonly pressure: Datum;
}

export interface HarmonisedCase {
  readonly substance: Substance;
  readonly series: readonly Series[];
  readonly anchors: readonly Anchor[];
  readonly transitions: readonly StatedTransition[];
  /** In file order; T and p as stated, so that either may be impossible (`value-possible` says so). */
  readonly vapourPressures: readonly VapourPressure[];
  readonly findings: readonly Finding[];
}
