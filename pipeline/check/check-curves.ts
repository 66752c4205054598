import type { CheckedCase, JudgedTransition } from '../../schemas/checked.js';
import type { AssembledCase } from '../../schemas/curves.js';
import type { Finding, Outcome } from '../../schemas/finding.js';
import type { Policy } from '../../schemas/policy.js';
import { testCount } from '../core/physics/adjustment.js';
import { isFirstOrder, type Judgement, type TransitionContext } from './curve/judgement.js';
import { thresholds } from './curve/significance.js';
import { type TransitionView, transitionViews } from './curve/transition-view.js';
import { crossingAgrees } from './rules/crossing-agrees.js';
import { entropyRisesAcross, entropyRisesInTable } from './rules/entropy-rises.js';
import { gibbsContinuous } from './rules/gibbs-continuous.js';
import { heatingRaisesEntropy } from './rules/heating-raises-entropy.js';
import { lowestCurveIsTheStatedPhase } from './rules/lowest-curve-is-the-stated-phase.js';
import { slopeJumpsOnlyAtTransitions } from './rules/slope-jumps-only-at-transitions.js';
import { statedTransitionJumps } from './rules/stated-transition-jumps.js';
import { transitionEntropyCloses } from './rules/transition-entropy-closes.js';

const TRANSITION_RULES: readonly ((context: TransitionContext) => Judgement)[] = [
  gibbsContinuous,
  crossingAgrees,
  transitionEntropyCloses,
  statedTransitionJumps,
  heatingRaisesEntropy,
  entropyRisesAcross,
];

/** Judges curves and transitions: the tables' own checks went before. */
export function checkCurves(
  cases: readonly AssembledCase[],
  settings: { readonly policy: Policy },
): { artefact: CheckedCase[]; findings: Finding[] } {
  return { artefact: cases.map((c) => checkCase(c, settings.policy)), findings: [] };
}

function checkCase(assembled: AssembledCase, policy: Policy): CheckedCase {
  const { examined } = assembled;
  const { harmonised } = examined;
  const substance = harmonised.substance.id;
  const outcomes: Outcome[] = [...examined.outcomes];
  const findings: Finding[] = [...examined.findings];
  harmonised.series.forEach((series, index) => {
    const named = examined.named.filter((n) => n.series === index && n.quantity === 'entropy');
    const rises = entropyRisesInTable(substance, series, (row) => named.some((n) => n.row === row));
    const jumps = slopeJumpsOnlyAtTransitions(substance, series, harmonised.transitions);
    outcomes.push(rises.outcome, jumps.outcome);
    findings.push(...rises.findings, ...jumps.findings);
  });
  const views = transitionViews(assembled);
  const limits = thresholds(
    policy,
    testCount(views.length, harmonised.anchors.length, harmonised.vapourPressures.length),
  );
  const judged: JudgedTransition[] = [];
  for (const view of views) {
    const results = TRANSITION_RULES.map((rule) => rule({ substance, view, policy, limits }));
    for (const r of results) {
      outcomes.push(r.outcome);
      findings.push(...r.findings);
    }
    judged.push(judgedOf(view, results));
  }
  const lowest = lowestCurveIsTheStatedPhase(substance, views, policy, limits);
  outcomes.push(lowest.outcome);
  findings.push(...lowest.findings);
  return { assembled, judged, outcomes, findings };
}

/**
 * The published row of a transition takes the gap's and the crossing's outcome, the graver of the two; a continuous one and a
 * glass transition, which have neither, that of their jump.
 */
function judgedOf(view: TransitionView, results: readonly Judgement[]): JudgedTransition {
  const gap = results[0].outcome;
  const crossing = results[1].outcome;
  const graver = !isFirstOrder(view)
    ? results[3].outcome
    : crossing.outcome === 'disagrees' || gap.outcome === 'untestable'
      ? crossing
      : gap;
  const { pair } = view;
  const atStated = pair !== null && pair.atK === view.stated.temperature.value;
  return {
    stated: view.stated,
    index: view.index,
    fromCurve: view.fromCurve,
    toCurve: view.toCurve,
    computedK: view.crossing?.temperatureK ?? null,
    uComputedK: view.crossing?.uK ?? null,
    gapJPerMol: atStated && pair !== null ? 0 - pair.at.gapJPerMol : null,
    uGapJPerMol: atStated ? (pair?.uGapJPerMol ?? null) : null,
    curveEnthalpyJPerMol: pair?.at.enthalpyJPerMol ?? null,
    curveEntropyJPerMolK: pair?.at.entropyJPerMolK ?? null,
    stable: view.crossing?.stable ?? null,
    outcome: graver.outcome,
    evidence: graver.evidence,
  };
}
