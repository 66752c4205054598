/** Findings of this stage: what a descriptor or a row leaves open. */
import type { EvidenceCell, Finding, ReadingProblem, Severity } from '../../schemas/finding.js';
import { makeFinding } from '../../schemas/make-finding.js';
import type { TableMeaning } from '../../schemas/table-meaning.js';

export interface ReadingNote {
  readonly substance: string;
  readonly table: TableMeaning;
  readonly problem: ReadingProblem;
  readonly read: string;
  readonly wanted: string;
  readonly remedy: string;
  /** 0: the descriptor. */
  readonly line: number;
  readonly column: string;
  readonly severity?: Severity;
  readonly fromPhase?: string;
  readonly toPhase?: string;
  readonly evidence?: readonly EvidenceCell[];
}

export function readingFinding(note: ReadingNote): Finding {
  const { table } = note;
  return makeFinding({
    rule: 'row-readable',
    severity: note.severity ?? 'fault',
    substance: note.substance,
    fromPhase: note.fromPhase ?? null,
    toPhase: note.toPhase ?? null,
    address: { source: table.source, file: table.file, line: note.line, column: note.column },
    evidence: note.evidence ?? [],
    quantity: `${note.problem} ${table.table} ${table.file} ${note.column}`,
    detail: {
      code: 'reading',
      problem: note.problem,
      read: note.read,
      wanted: note.wanted,
      remedy: note.remedy,
    },
  });
}
