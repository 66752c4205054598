/** What the checks hand on: verdicts on tables, then on curves and transitions, then the suspects. */
import type { AssembledCase } from './curves.js';
import type { EvidenceKind, Finding, Outcome, OutcomeKind, Suspect } from './finding.js';
import type { HarmonisedCase, StatedTransition } from './harmonised.js';
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

/** A stated transition beside what the curves give. */
export interface JudgedTransition {
  readonly stated: StatedTransition;
  /** Index of the transition among the substance's, and of its two curves among the assembled ones; -1 where there is none. */
  readonly index: number;
  readonly fromCurve: number;
  readonly toCurve: number;
  readonly computedK: number | null;
  readonly uComputedK: number | null;
  /** G(to) - G(from) at the stated temperature. */
  readonly gapJPerMol: number | null;
  readonly uGapJPerMol: number | null;
  /** dH and dS of the curves at the stated temperature. */
  readonly curveEnthalpyJPerMol: number | null;
  readonly curveEntropyJPerMolK: number | null;
  readonly stable: boolean | null;
  readonly outcome: OutcomeKind;
  readonly evidence: EvidenceKind | null;
}

export interface CheckedCase {
  readonly assembled: AssembledCase;
  readonly judged: readonly JudgedTransition[];
  readonly outcomes: readonly Outcome[];
  readonly findings: readonly Finding[];
}

export interface ReconciledCase {
  readonly checked: CheckedCase;
  /** Everything found about the substance, causes filled in, worst first. */
  readonly findings: readonly Finding[];
  readonly outcomes: readonly Outcome[];
  readonly suspects: readonly Suspect[];
  readonly verdict: 'cleared' | 'flagged' | 'withheld';
}
