import type { Acceptance } from '../../schemas/accepted.js';
import type { CheckedCase, ReconciledCase } from '../../schemas/checked.js';
import type { Finding, Outcome, Suspect } from '../../schemas/finding.js';
import type { Policy } from '../../schemas/policy.js';
import { testCount } from '../core/physics/adjustment.js';
import { acceptedOf } from './acceptances.js';
import { type Adjusted, adjusted, adjustmentFindings, adjustmentOutcomes } from './adjustment-closes.js';
import { withCauses } from './causes.js';
import { explained, scoreInGroup, withExplanations } from './explained.js';
import { oneOutcomeAPlace } from './one-outcome.js';
import { type RankedDatum, type SuspectGroup, suspectGroups } from './rank-data.js';
import { suspectsOf } from './suspects.js';
import { systemOf } from './system/system.js';

export interface ReconcileSettings {
  readonly policy: Policy;
  readonly accepted: readonly Acceptance[];
  /** YYYY-MM-DD: what acceptances are in force on. */
  readonly date: string;
}

const SEVERITY_ORDER = { fault: 0, doubt: 1, note: 2 } as const;

/**
 * Names the stated numbers that would close what does not, gives each finding its cause, takes acceptances into account and
 * says the verdict: a fault withholds, a doubt flags.
 */
export function reconcile(
  cases: readonly CheckedCase[],
  settings: ReconcileSettings,
): { artefact: ReconciledCase[]; findings: Finding[] } {
  const loose: Finding[] = [];
  const artefact = cases.map((c) => reconcileCase(c, settings, loose));
  return { artefact, findings: loose };
}

function reconcileCase(checked: CheckedCase, settings: ReconcileSettings, loose: Finding[]): ReconciledCase {
  const { policy } = settings;
  const tableSuspects = checked.assembled.examined.suspects;
  let suspects: Suspect[] = [...tableSuspects];
  const solved = solvedOf(checked, policy);
  const outcomes: Outcome[] = [...checked.outcomes];
  const found: Finding[] = [...checked.findings];
  const groups: SuspectGroup[] = [];
  const wanted = checked.findings.some((f) => TRANSITION_RULES.has(f.rule) && f.severity !== 'note');
  const { harmonised } = checked.assembled.examined;
  const scoreOf = ({ of, proposed, uProposed }: RankedDatum, alone = false): number | null =>
    scoreInGroup(harmonised, { address: of.datum.address, proposed, uProposed }, policy, alone);
  for (const one of solved) {
    outcomes.push(...adjustmentOutcomes(one));
    if (!wanted && !one.open) continue;
    const own = suspectGroups(one.system, one.critical.doubt, one.whitened, scoreOf, policy);
    groups.push(...own);
    found.push(...adjustmentFindings(one, own, policy));
  }
  let findings: readonly Finding[] = found;
  if (found.length > 0) {
    const rooted = withCauses({ ...checked, findings: found }, groups);
    findings = rooted.findings;
    for (const { finding, group, number } of rooted.groups) {
      suspects.push(...suspectsOf(checked, finding, group, number));
    }
    suspects = explained(checked, suspects, policy);
    findings = withExplanations(findings, suspects);
    const taken = acceptedOf(findings, settings);
    findings = taken.findings;
    loose.push(...taken.lapsed);
  }
  const ordered = [...findings].sort((a, b) => SEVERITY_ORDER[a.severity] - SEVERITY_ORDER[b.severity]);
  const open = ordered.filter((f) => !f.accepted);
  const verdict = open.some((f) => f.severity === 'fault')
    ? 'withheld'
    : open.some((f) => f.severity === 'doubt')
      ? 'flagged'
      : 'cleared';
  return { checked, findings: ordered, outcomes: oneOutcomeAPlace(outcomes), suspects, verdict };
}

/** The adjustment of each isobar's curves. */
function solvedOf(checked: CheckedCase, policy: Policy): Adjusted[] {
  const { curves, examined } = checked.assembled;
  const { transitions, anchors, vapourPressures } = examined.harmonised;
  const tests = testCount(transitions.length, anchors.length, vapourPressures.length);
  const isobars = new Set<number | null>([null, ...curves.map((c) => c.family.isobarPa)]);
  return [...isobars].map((isobar) => adjusted(systemOf(checked, isobar), tests, policy));
}

const TRANSITION_RULES: ReadonlySet<string> = new Set([
  'gibbs-continuous',
  'crossing-agrees',
  'transition-entropy-closes',
  'stated-transition-jumps',
  'heating-raises-entropy',
  'entropy-rises',
  'lowest-curve-is-the-stated-phase',
]);
