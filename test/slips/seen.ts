/** What a run says, as far as the scores need it; field for field as published. */
export interface Seen {
  /** In the published order. */
  readonly findings: readonly SeenFinding[];
  readonly suspects: readonly SeenSuspect[];
  readonly coverage: readonly SeenOutcome[];
}

export interface SeenFinding {
  readonly finding: string;
  readonly evidenceHash: string;
  readonly substance: string;
  readonly rule: string;
  readonly severity: string;
  readonly cause: string | null;
}

export interface SeenSuspect {
  readonly finding: string;
  readonly place: number;
  readonly group: number;
  readonly cells: number;
  readonly source: string;
  readonly file: string;
  readonly line: number;
  readonly column: string;
  readonly explanation: string | null;
  readonly explainedPrinted: string | null;
  readonly proposedPrinted: string;
  readonly normalisedResidual: number;
}

export interface SeenOutcome {
  readonly substance: string;
  readonly rule: string;
  readonly place: string;
  readonly outcome: string;
  readonly smallestDetectable: number | null;
}
