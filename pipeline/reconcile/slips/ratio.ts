/** Candidates that multiply the printed number or add to it. */
import type { Candidate, KnownStep, SuspectCell } from './slip.js';

export function times(cell: SuspectCell, ratio: number, share = 1): Candidate {
  return { value: cell.value * ratio, step: cell.lastPlace * Math.abs(ratio), share };
}

/** @param change in the column's unit */
export function plus(cell: SuspectCell, change: number, share = 1): Candidate {
  return { value: cell.value + change, step: cell.lastPlace, share };
}

/** The printed number taken for one of another unit, whose SI value is number * factor + offset. */
export function readAs(cell: SuspectCell, factor: number, offset = 0, share = 1): Candidate {
  const value = (cell.value * factor + offset - cell.offset) / cell.factor;
  return { value, step: cell.lastPlace * Math.abs(factor / cell.factor), share };
}

/** A difference that is stated elsewhere [SI] added (`sign` 1) or taken off (-1); it is known no better than its u. */
export function movedBy(cell: SuspectCell, step: KnownStep, sign: 1 | -1, share: number): Candidate {
  const spread = Math.abs((step.u * Math.sqrt(12)) / cell.factor);
  return { ...plus(cell, (sign * step.value) / cell.factor, share), step: Math.hypot(cell.lastPlace, spread) };
}
