/** Findings about reading: one for a file, column and problem, its further cells as evidence. */
import type { EvidenceCell, Finding, ReadingProblem, Severity } from '../../schemas/finding.js';
import type { Address } from '../../schemas/harmonised.js';
import { makeFinding } from '../../schemas/make-finding.js';

export interface ReadingNote {
  readonly problem: ReadingProblem;
  readonly address: Address;
  readonly read: string;
  readonly wanted: string;
  readonly remedy: string;
  readonly severity?: Severity;
  readonly substance?: string;
  readonly cause?: string | null;
  /** Tells findings of one file, column and problem apart (a name that is not known). */
  readonly subject?: string;
  readonly evidence?: readonly EvidenceCell[];
}

export function readingFinding(note: ReadingNote): Finding {
  const { address, problem, read, wanted, remedy } = note;
  return makeFinding({
    rule: 'row-readable',
    severity: note.severity ?? 'fault',
    substance: note.substance ?? '',
    address,
    evidence: note.evidence ?? [{ ...address, printed: read }],
    detail: { code: 'reading', problem, read, wanted, remedy },
    cause: note.cause ?? null,
    quantity: `${problem} ${address.file} ${address.column} ${note.subject ?? ''}`,
  });
}

/** Gathers what is wrong with the rows of one substance. */
export class Readings {
  private readonly notes = new Map<string, { readonly note: ReadingNote; readonly evidence: EvidenceCell[] }>();

  constructor(
    private readonly substance: string,
    private readonly mostEvidence: number,
  ) {}

  add(note: ReadingNote): void {
    const key = `${note.problem}\n${note.address.file}\n${note.address.column}\n${note.subject ?? ''}`;
    const cell = { ...note.address, printed: note.read };
    const known = this.notes.get(key);
    if (known === undefined) this.notes.set(key, { note, evidence: [cell] });
    else if (known.evidence.length < this.mostEvidence && !known.evidence.some((other) => other.line === cell.line))
      known.evidence.push(cell);
  }

  findings(): Finding[] {
    return [...this.notes.values()].map(({ note, evidence }) =>
      readingFinding({ ...note, substance: this.substance, evidence }),
    );
  }
}
