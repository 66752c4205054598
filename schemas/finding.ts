/** A finding is data: a code of a closed union with typed evidence. Sentences are made in one file, `pipeline/report/words.ts`. */
import type { Address } from './address.js';

export const RULES = [
  'row-readable',
  'rows-distinct',
  'value-possible',
  'entropy-follows-heat-capacity',
  'enthalpy-follows-heat-capacity',
  'functions-close',
  'heat-capacity-smooth',
  'entropy-rises',
  'gibbs-continuous',
  'crossing-agrees',
  'transition-entropy-closes',
  'slope-jumps-only-at-transitions',
  'stated-transition-jumps',
  'heating-raises-entropy',
  'lowest-curve-is-the-stated-phase',
  'adjustment-closes',
] as const;
export type RuleName = (typeof RULES)[number];

export type Severity = 'fault' | 'doubt' | 'note';
export type OutcomeKind = 'agrees' | 'disagrees' | 'untestable';
export type EvidenceKind = 'independent' | 'arithmetic';

/** One printed cell behind a finding. */
export interface EvidenceCell extends Address {
  readonly printed: string;
}

/** What reading a file can stumble over; `expected` and `hint` are words made from the descriptor, never from guesswork. */
export type ReadingProblem =
  | 'cell-not-a-number'
  | 'cell-not-finite'
  | 'row-too-short'
  | 'row-too-long'
  | 'column-missing'
  | 'column-unknown'
  | 'unit-unknown'
  | 'unit-unfit'
  | 'name-unmapped'
  | 'phase-unmapped'
  | 'substance-unknown'
  | 'substance-twice'
  | 'file-missing'
  | 'file-unreadable'
  | 'encoding-converted'
  | 'descriptor-unreadable'
  | 'descriptor-invalid'
  | 'correction-out-of-date'
  | 'required-missing'
  | 'kind-not-yet-read'
  | 'key-without-row'
  | 'molar-mass-unknown'
  | 'acceptance-lapsed';

/**
 * `substance` '' : the finding belongs to a source or to the whole run.
 * Numbers are SI; `unit` is their UCUM code. All that varies with the rule is in `detail`, a closed union.
 */
export interface Finding {
  readonly id: string;
  readonly evidenceHash: string;
  readonly substance: string;
  readonly rule: RuleName;
  readonly severity: Severity;
  readonly fromPhase: string | null;
  readonly toPhase: string | null;
  readonly temperatureK: number | null;
  readonly observed: number | null;
  readonly expected: number | null;
  readonly difference: number | null;
  readonly tolerance: number | null;
  readonly unit: string | null;
  /** The cell to look at first; null where a finding has no cell (a broken descriptor has file and line 0). */
  readonly address: Address | null;
  readonly evidence: readonly EvidenceCell[];
  readonly detail: FindingDetail;
  /** Id of the finding that this one follows from. */
  readonly cause: string | null;
  readonly accepted: boolean;
}

export type FindingDetail =
  | {
      readonly code: 'reading';
      readonly problem: ReadingProblem;
      readonly read: string;
      readonly wanted: string;
      readonly remedy: string;
    }
  | {
      readonly code: 'rows-disagree';
      readonly otherLine: number;
      readonly quantity: string;
      readonly first: string;
      readonly second: string;
    }
  | { readonly code: 'temperatures-fall'; readonly previousK: number }
  | { readonly code: 'impossible'; readonly quantity: string; readonly read: string; readonly wanted: string }
  | {
      readonly code: 'interval';
      readonly quantity: string;
      readonly lowK: number;
      readonly highK: number;
      readonly named: boolean;
    }
  | {
      readonly code: 'cell';
      readonly quantity: string;
      readonly proposed: number;
      readonly uProposed: number;
      readonly explanation: string | null;
    }
  /** A whole column, or a run of its rows: true = printed * factor + shift, in SI; neither where the law is another. */
  | {
      readonly code: 'column';
      readonly quantity: string;
      readonly cells: number;
      readonly factor: number | null;
      readonly shift: number | null;
      readonly explanation: string | null;
    }
  | { readonly code: 'anomaly'; readonly quantity: string; readonly lowK: number; readonly highK: number }
  | {
      readonly code: 'transition';
      readonly what: 'gap' | 'crossing' | 'closure' | 'jump' | 'no-jump' | 'falls' | 'not-crossed';
      /**
       * Of a closure, what was compared [J/mol]: dH with T dS, both as stated; the stated dH with the curves'; T times the
       * stated dS with T times the curves' dS.
       */
      readonly of?: 'stated' | 'enthalpy' | 'entropy';
      readonly statedK: number;
      readonly computedK: number | null;
      readonly smallestDetectable: number | null;
    }
  | {
      readonly code: 'phase-order';
      readonly lower: string;
      readonly stated: string;
      readonly lowK: number;
      readonly highK: number;
    }
  | { readonly code: 'entropy-order'; readonly above: string; readonly below: string }
  /** `closes`: dH = T dS within what both are printed to, as at a transition. */
  | { readonly code: 'unstated-jump'; readonly quantity: string; readonly closes?: true }
  /** All stated numbers taken together; `place` names one (`T cr>l`), or is '' where only the whole does not close. */
  | {
      readonly code: 'adjustment';
      readonly place: string;
      /** How many printed cells one law for all of them would put right; 1 where a single one stands off. */
      readonly cells: number;
      readonly w: number | null;
      readonly critical: number;
      readonly chiSquare: number;
      readonly freedom: number;
    }
  /** The program broke down on this substance; nothing about it is known. */
  | { readonly code: 'calculation-failed'; readonly message: string };

/** One rule at one place. */
export interface Outcome {
  readonly substance: string;
  readonly rule: RuleName;
  /** A phase, `cr>l` for a transition, or '' for the substance. */
  readonly place: string;
  readonly outcome: OutcomeKind;
  readonly evidence: EvidenceKind | null;
  /** What is missing, for `untestable`. */
  readonly missing: string | null;
  /** In the unit of the rule; null where it has none. */
  readonly smallestDetectable: number | null;
}

/** A cell under suspicion for a finding; place 1 is first, `group` collects those that the data cannot tell apart. */
export interface Suspect {
  readonly finding: string;
  readonly substance: string;
  readonly place: number;
  readonly group: number;
  /** How many cells the hypothesis touches: 1 for a single cell; for a whole column the address is that of its first. */
  readonly cells: number;
  readonly address: Address;
  readonly printed: string;
  readonly observed: number;
  readonly normalisedResidual: number;
  readonly redundancy: number;
  /** UCUM code of what is in SI here. */
  readonly unit: string;
  /** SI, and as it would be printed in the column's own unit. */
  readonly proposed: number;
  readonly uProposed: number;
  readonly proposedPrinted: string;
  readonly smallestDetectable: number;
  /** Code of the usual slip that would explain it, and the cell as that slip would have it. */
  readonly explanation: string | null;
  readonly explainedPrinted: string | null;
  /** The measurement that would tell a group's first two suspects apart; null where it has one. */
  readonly toldApartBy: string | null;
}
