/** What the checks of the tables hand on, before a curve is made. */
import type { Finding, Outcome, Suspect } from './finding.js';
import type { HarmonisedCase } from './harmonised.js';
import type { NumberQuantity } from './quantities.js';

/** A cell that the row checks name; it is left out when the curve is made. */
export interface NamedCell {
  /** Index into `HarmonisedCase.series`. */
  readonly series: number;
  readonly row: number;
  readonly quantity: NumberQuantity;
  /** Id of the finding that names it. */
  readonly finding: string;
}

/** After the tables are checked row by row, before a curve is made. */
export interface ExaminedCase {
  readonly harmonised: HarmonisedCase;
  readonly named: readonly NamedCell[];
  readonly outcomes: readonly Outcome[];
  /** Includes the findings of reading and harmonising. */
  readonly findings: readonly Finding[];
  readonly suspects: readonly Suspect[];
}
