import type { Acceptance } from '../../schemas/accepted.js';
import type { CheckedCase, ReconciledCase } from '../../schemas/checked.js';
import type { Finding, Suspect } from '../../schemas/finding.js';
import type { Policy } from '../../schemas/policy.js';
import { sidakThreshold } from '../core/numeric/normal.js';
import { acceptedOf } from './acceptances.js';
import { withCauses } from './causes.js';
import { conditionsOf } from './conditions.js';
import { explained, withExplanations } from './explained.js';
import { oneOutcomeAPlace } from './one-outcome.js';
import { type SuspectGroup, suspectGroups } from './rank-data.js';
import { suspectsOf } from './suspects.js';

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
  let findings: readonly Finding[] = checked.findings;
  if (checked.findings.length > 0) {
    const groups = groupsOf(checked, policy);
    const rooted = withCauses(checked, groups);
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
  return { checked, findings: ordered, outcomes: oneOutcomeAPlace(checked.outcomes), suspects, verdict };
}

/** Only where a transition rule disagrees is the system solved; what the rules say of clean data stands already. */
function groupsOf(checked: CheckedCase, policy: Policy): SuspectGroup[] {
  const wanted = checked.findings.some((f) => TRANSITION_RULES.has(f.rule) && f.severity !== 'note');
  if (!wanted) return [];
  const groups: SuspectGroup[] = [];
  const isobars = new Set(checked.assembled.curves.map((c) => c.family.isobarPa));
  for (const isobar of isobars) {
    const system = conditionsOf(checked, isobar);
    if (system === null) continue;
    groups.push(...suspectGroups(system, sidakThreshold(policy.alphaDoubt, system.data.length)));
  }
  return groups;
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
