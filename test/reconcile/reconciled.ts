/** An invented medium taken through reconcile, with what is asked of it in short. */
import { reconcile } from '../../pipeline/reconcile/reconcile.js';
import type { Acceptance } from '../../schemas/accepted.js';
import type { ReconciledCase } from '../../schemas/checked.js';
import type { Finding, Suspect } from '../../schemas/finding.js';
import { checked, type Printed, settings } from '../check/medium.js';

export function reconciled(
  printed: Printed,
  { accepted = [], date = '2026-01-01' }: { accepted?: Acceptance[]; date?: string } = {},
): ReconciledCase {
  return reconcile([checked(printed)], { ...settings, accepted, date }).artefact[0]!;
}

/** Findings graver than a note that follow from no other. */
export function rootsOf({ findings }: ReconciledCase): readonly Finding[] {
  return findings.filter(({ severity, cause }) => severity !== 'note' && cause === null);
}

/** `file:line column` of the suspects of one group of one finding, best first. */
export function groupOf({ suspects }: ReconciledCase, finding: Finding, group = 1): string[] {
  return suspectsOf(suspects, finding, group).map(({ address }) => `${address.file}:${address.line} ${address.column}`);
}

export function suspectsOf(suspects: readonly Suspect[], finding: Finding, group = 1): Suspect[] {
  return suspects.filter((one) => one.finding === finding.id && one.group === group).sort((a, b) => a.place - b.place);
}

/** The same medium without its gas. */
export function withoutGas(printed: Printed): Printed {
  const { g: _, ...tables } = printed.tables;
  return { ...printed, tables, anchors: printed.anchors.slice(0, 2), transitions: printed.transitions.slice(0, 1) };
}
