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

/** G_from = G_to at the stated temperature and pressure, within u(dG) and dS u(T). */
export function gibbsContinuous({ substance, view, policy, limits }: TransitionContext): Judgement {
  const rule = 'gibbs-continuous';
  const { stated, pair } = view;
  if (!isFirstOrder(view)) {
    return {
      outcome: outcome(substance, rule, view.place, 'untestable', null, {
        missing: 'a first-order transition: one curve runs through a continuous one',
      }),
      findings: [],
    };
  }
  if (pair === null || pair.atK !== stated.temperature.value || view.byConstruction) {
    const missing = view.byConstruction
      ? `an anchor or an entropy of its own for one of the two phases: its level is carried through this transition`
      : (view.missing ?? 'tables of both phases that reach the stated temperature');
    return { outcome: outcome(substance, rule, view.place, 'untestable', null, { missing }), findings: [] };
  }
  const dS = pair.at.entropyJPerMolK;
  const u = Math.hypot(pair.uGapJPerMol, dS * view.uStatedK);
  const material = policy.material.transitionTemperatureK * Math.abs(dS);
  const severity = gravity(pair.at.gapJPerMol, u, material, limits);
  const smallestDetectable = NON_CENTRALITY * u;
  if (severity === null) {
    return {
      outcome: outcome(substance, rule, view.place, 'agrees', view.evidence, { smallestDetectable }),
      findings: [],
    };
  }
  const finding = makeFinding({
    rule,
    severity,
    substance,
    fromPhase: stated.from,
    toPhase: stated.to,
    temperatureK: stated.temperature.value,
    observed: pair.at.gapJPerMol,
    expected: 0,
    difference: pair.at.gapJPerMol,
    tolerance: limits.fault * u,
    unit: 'J/mol',
    address: stated.temperature.address,
    evidence: statedCells(view),
    transition: transitionKey(view),
    detail: {
      code: 'transition',
      what: 'gap',
      statedK: stated.temperature.value,
      computedK: view.crossing?.temperatureK ?? null,
      smallestDetectable,
    },
  });
  return {
    outcome: outcome(substance, rule, view.place, 'disagrees', view.evidence, { smallestDetectable }),
    findings: [finding],
  };
}
