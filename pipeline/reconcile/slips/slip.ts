/** What a usual slip is: from a printed cell to what may have been meant. */
import type { NumberQuantity } from '../../../schemas/quantities.js';
import type { TemperatureScale } from '../../../schemas/table-meaning.js';
import type { PrintedNumber } from './printed-number.js';

/** A printed cell and the SI value that it was read as. */
export interface PrintedCell {
  readonly printed: string;
  readonly observed: number;
}

/** A cell under suspicion and what stands around it. SI value = number * factor + offset. */
export interface SuspectContext extends PrintedCell {
  readonly quantity: NumberQuantity;
  readonly factor: number;
  readonly offset: number;
  /** UCUM code as declared. */
  readonly unit: string;
  readonly molarMassGPerMol: number;
  /** Of the row or the transition. */
  readonly temperatureK: number | null;
  /** The cell above in the same column. */
  readonly rowAbove: PrintedCell | null;
  /** The other of the enthalpy and the entropy of one transition. */
  readonly partner: PrintedCell | null;
  readonly gas: boolean;
  /** What the source says its temperatures are on; absent where nothing is known. */
  readonly temperatureScale?: TemperatureScale;
  /** The transition that the number belongs to, among the substance's; absent where there is none. */
  readonly transition?: number;
  /** Between what the value has to lie [SI]. */
  readonly possible?: readonly [low: number, high: number];
  /** H(Tr) - H(0) of the phase [J/mol], each way that it is stated. */
  readonly enthalpiesFromZero?: readonly KnownStep[];
  /** What lies between two scales of enthalpy that meet in this substance [J/mol]. */
  readonly enthalpyScaleSteps?: readonly KnownStep[];
  /** Of the substance's stated transitions, the cell's own left out: enthalpies [J/mol] and entropies [J/(mol K)]. */
  readonly transitionEnthalpies?: readonly KnownStep[];
  readonly transitionEntropies?: readonly KnownStep[];
}

/** A difference that is stated somewhere else about the same substance, SI. */
export interface KnownStep {
  readonly value: number;
  /** Standard uncertainty. */
  readonly u: number;
}

/** The cell with its digits read. */
export interface SuspectCell extends SuspectContext {
  /** null where the text cannot be read or does not lead to the observed value. */
  readonly number: PrintedNumber | null;
  /** In the column's unit. */
  readonly value: number;
  /** One unit of the last printed place, in the column's unit. */
  readonly lastPlace: number;
  /** SI value of a number in the column's unit, with whatever was done to the observed value after its unit. */
  toSi(value: number): number;
}

/** One value that may have been meant, in the column's unit. */
export interface Candidate {
  readonly value: number;
  /** What one unit of the printed last place becomes: how far the printed digits determine `value`. */
  readonly step: number;
  /** Of the kind's prior; the shares of one cell sum to at most 1. */
  readonly share: number;
  /** As it would stand in the column, where that is more than the value in figures. */
  readonly printed?: () => string;
  /** The cell's text itself tells of this slip, which says nothing about the value. */
  readonly told?: true;
}

export interface Slip {
  readonly code: string;
  /** How usual it is among slips of single cells; judgement, only ratios matter. */
  readonly weight: number;
  /** It leads to so many values that one of them lies near any proposal. */
  readonly ofDigits?: true;
  /** @param proposed what would close the system [SI]; used by slips that leave the value open */
  propose(cell: SuspectCell, proposed: number): readonly Candidate[];
}
