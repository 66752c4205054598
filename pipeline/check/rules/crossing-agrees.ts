import { makeFinding } from '../../../schemas/make-finding.js';
import { NON_CENTRALITY } from '../../core/physics/adjustment.js';
import {
  isFirstOrder,
  type Judgement,
  statedCells,
  type TransitionContext,
  transitionKey,
} from '../curve/judgement.js';
import { gravity } from '../curve/significance.js';
import { outcome } from '../place.js';

/** A crossing of the two G curves lies at the stated temperature, within u(dG)/|dS| and the stated temperature's own u. */
export function crossingAgrees({ substance, view, policy, limits }: TransitionContext): Judgement {
  const rule = 'crossing-agrees';
  const { stated, pair, crossing } = view;
  if (!isFirstOrder(view)) {
    return {
      outcome: outcome(substance, rule, view.place, 'untestable', null, {
        missing: 'a first-order transition: curves do not cross at a continuous one',
      }),
      findings: [],
    };
  }
  if (pair === null || view.byConstruction) {
    const missing = view.byConstruction
      ? 'an anchor or an entropy of its own for one of the two phases: its level is carried through this transition'
      : view.missing;
    return { outcome: outcome(substance, rule, view.place, 'untestable', null, { missing }), findings: [] };
  }
  const statedK = stated.temperature.value;
  const dS = pair.at.entropyJPerMolK;
  const uK = Math.hypot(pair.uGapJPerMol / Math.abs(dS), view.uStatedK);
  const smallestDetectable = NON_CENTRALITY * uK;
  const base = () =>
    ({
      rule,
      substance,
      fromPhase: stated.from,
      toPhase: stated.to,
      temperatureK: statedK,
      unit: 'K',
      address: stated.temperature.address,
      evidence: statedCells(view),
      transition: transitionKey(view),
      observed: statedK,
    }) as const;
  if (crossing === null) {
    // Without a crossing the distance is known from the gap's slope alone, and is at least that of the tables' ends.
    const distance = pair.at.gapJPerMol / dS;
    const severity = gravity(distance, uK, policy.material.transitionTemperatureK, limits);
    if (severity === null) {
      return {
        outcome: outcome(substance, rule, view.place, 'agrees', view.evidence, { smallestDetectable }),
        findings: [],
      };
    }
    const finding = makeFinding({
      ...base(),
      severity,
      tolerance: limits.fault * uK,
      detail: { code: 'transition', what: 'not-crossed', statedK, computedK: null, smallestDetectable },
    });
    return {
      outcome: outcome(substance, rule, view.place, 'disagrees', view.evidence, { smallestDetectable }),
      findings: [finding],
    };
  }
  const difference = statedK - crossing.temperatureK;
  const u = Math.hypot(crossing.uK, view.uStatedK);
  const severity = gravity(difference, u, policy.material.transitionTemperatureK, limits);
  if (severity === null) {
    return {
      outcome: outcome(substance, rule, view.place, 'agrees', view.evidence, { smallestDetectable }),
      findings: [],
    };
  }
  const finding = makeFinding({
    ...base(),
    severity,
    expected: crossing.temperatureK,
    difference,
    tolerance: limits.fault * u,
    detail: { code: 'transition', what: 'crossing', statedK, computedK: crossing.temperatureK, smallestDetectable },
  });
  return {
    outcome: outcome(substance, rule, view.place, 'disagrees', view.evidence, { smallestDetectable }),
    findings: [finding],
  };
}
