import type { Closing } from './closing.js';
import type { ColumnChange, RowRun } from './column-change.js';
import type { ColumnHypothesis } from './column-hypothesis.js';
import type { Tried } from './try-columns.js';

/** One cause that puts one or more whole columns of a table wrong, by one law. */
export interface WholeColumns {
  readonly changes: readonly ColumnChange[];
  readonly run: RowRun;
  /** Uncertainties stated apart from the column were in its unit too. */
  readonly uToo: boolean;
  readonly explanation: string | null;
  readonly uFactor: number;
  readonly uShift: number;
  /** Root of what the sum of squared residuals falls by. */
  readonly w: number;
  /** Other columns by other laws that the table cannot tell from these, best first. */
  readonly rivals: readonly ColumnHypothesis[];
}

/** Hypotheses whose chi squared lies within this of the best cannot be told apart. */
const ALIKE = 9;

/** @param tried what may be a rival, likeliest first */
export function described(
  best: Tried,
  tried: readonly Tried[],
  run: RowRun,
  before: Closing,
  uToo: boolean,
): WholeColumns {
  const { changes, explanation, uFactor, uShift } = best.hypothesis;
  const own = columnsOf(best.hypothesis);
  const seen = new Set([own]);
  const rivals: ColumnHypothesis[] = [];
  for (const other of tried) {
    if (best.score - other.score >= ALIKE || seen.has(columnsOf(other.hypothesis))) continue;
    seen.add(columnsOf(other.hypothesis));
    rivals.push(other.hypothesis);
  }
  return {
    changes,
    run,
    uToo,
    explanation,
    uFactor,
    uShift,
    w: Math.sqrt(Math.max(0, before.squares - best.closing.squares)),
    rivals,
  };
}

export const columnsOf = ({ changes }: ColumnHypothesis): string => changes.map(({ column }) => column).join(' ');
