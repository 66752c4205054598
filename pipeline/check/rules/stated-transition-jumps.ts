import { makeFinding } from '../../../schemas/make-finding.js';
import { NON_CENTRALITY } from '../../core/physics/adjustment.js';
import { stateCovariance } from '../../core/physics/curve-uncertainty.js';
import {
  isFirstOrder,
  type Judgement,
  statedCells,
  type TransitionContext,
  transitionKey,
} from '../curve/judgement.js';
import { gravity } from '../curve/significance.js';
import { outcome } from '../place.js';

/** A first-order transition has a jump of S; a continuous one and a glass transition have none. */
export function statedTransitionJumps({ substance, view, policy, limits }: TransitionContext): Judgement {
  const rule = 'stated-transition-jumps';
  const { stated, pair } = view;
  const t = stated.temperature.value;
  const first = isFirstOrder(view);
  const materialS = policy.material.entropyJPerMolK;
  let jump: number | null = null;
  let u = 0;
  if (pair !== null && !view.byConstruction && stated.from !== stated.to) {
    jump = pair.at.entropyJPerMolK;
    const a = stateCovariance(pair.from.source, pair.atK).ss;
    const b = stateCovariance(pair.to.source, pair.atK).ss;
    u = Math.sqrt(Math.max(0, a + b));
  } else if (stated.entropy !== null || stated.enthalpy !== null) {
    jump = stated.entropy?.value ?? (stated.enthalpy?.value ?? 0) / t;
    u = stated.entropy?.uRounding ?? (stated.enthalpy?.uRounding ?? 0) / t;
  } else if (stated.from === stated.to && pair !== null) {
    // One curve runs through it; S is continuous there, or slope-jumps-only-at-transitions says otherwise.
    jump = 0;
  }
  if (jump === null) {
    return {
      outcome: outcome(substance, rule, view.place, 'untestable', null, {
        missing: view.missing ?? 'an entropy of the transition, or levels of both phases that do not rest on it',
      }),
      findings: [],
    };
  }
  const smallestDetectable = NON_CENTRALITY * u;
  const agrees: Judgement = {
    outcome: outcome(substance, rule, view.place, 'agrees', view.evidence, { smallestDetectable }),
    findings: [],
  };
  const base = () =>
    ({
      rule,
      substance,
      fromPhase: stated.from,
      toPhase: stated.to,
      temperatureK: t,
      observed: jump,
      expected: first ? null : 0,
      difference: first ? null : jump,
      tolerance: limits.fault * u,
      unit: 'J/(mol.K)',
      address: stated.entropy?.address ?? stated.temperature.address,
      evidence: statedCells(view),
      transition: transitionKey(view),
    }) as const;
  if (first) {
    // No jump although one is stated: S of both curves is the same within a small u.
    if (Math.abs(jump) > limits.doubt * u || u > materialS) return agrees;
    return {
      outcome: outcome(substance, rule, view.place, 'disagrees', view.evidence, { smallestDetectable }),
      findings: [
        makeFinding({
          ...base(),
          severity: 'doubt',
          detail: { code: 'transition', what: 'no-jump', statedK: t, computedK: null, smallestDetectable },
        }),
      ],
    };
  }
  const severity = gravity(jump, u, materialS, limits);
  if (severity === null) return agrees;
  return {
    outcome: outcome(substance, rule, view.place, 'disagrees', view.evidence, { smallestDetectable }),
    findings: [
      makeFinding({
        ...base(),
        severity,
        detail: { code: 'transition', what: 'jump', statedK: t, computedK: null, smallestDetectable },
      }),
    ],
  };
}
