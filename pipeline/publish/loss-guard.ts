/** Holds a release back when too much of what stands cleared would become withheld by it. */
import type { Policy } from '../../schemas/policy.js';
import type { Summary } from '../../schemas/summary.js';

export interface LossGuardResult {
  readonly held: boolean;
  /** Cleared in the release that stands, withheld in the new one. */
  readonly lost: readonly string[];
  readonly clearedBefore: number;
}

/**
 * Held: more than `share` of what was cleared is lost, and at least `atLeast` substances. With no release standing there
 * is nothing to lose; with one whose summary cannot be read nobody can say, and it is held.
 */
export function lossGuard(
  previous: Summary | 'unreadable' | null,
  next: Summary,
  policy: Policy['lossGuard'],
): LossGuardResult {
  if (previous === null) return { held: false, lost: [], clearedBefore: 0 };
  if (previous === 'unreadable') return { held: true, lost: [], clearedBefore: 0 };
  const cleared = Object.keys(previous.verdicts).filter((substance) => previous.verdicts[substance] === 'cleared');
  const lost = cleared.filter((substance) => next.verdicts[substance] === 'withheld');
  const held = lost.length >= policy.atLeast && lost.length > policy.share * cleared.length;
  return { held, lost, clearedBefore: cleared.length };
}
