/** What the checks hand on: verdicts on tables, then on curves and transitions, then the suspects. */
import type { AssembledCase } from './curves.js';
import type { EvidenceKind, Finding, Outcome, OutcomeKind, Suspect } from './finding.js';
import type { StatedTransition } from './harmonised.js';

export type { ExaminedCase, NamedCell } from './examined.js';

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
