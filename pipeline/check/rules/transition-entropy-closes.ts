import type { FindingDetail } from '../../../schemas/finding.js';
import type { Datum } from '../../../schemas/harmonised.js';
import { makeFinding } from '../../../schemas/make-finding.js';
import { NON_CENTRALITY } from '../../core/physics/adjustment.js';
import { uStated } from '../../core/physics/stated-u.js';
import { differenceUncertainty } from '../curve/difference-uncertainty.js';
import {
  isFirstOrder,
  type Judgement,
  statedCells,
  type TransitionContext,
  transitionKey,
} from '../curve/judgement.js';
import { gravity } from '../curve/significance.js';
import { outcome } from '../place.js';

type Compared = NonNullable<Extract<FindingDetail, { code: 'transition' }>['of']>;

/**
 * dH = T dS of the stated numbers; where only one of them is stated, or the curves give their own, against the curves'
 * difference at that temperature. In J/mol; the worst of the comparisons is the one kept.
 */
export function transitionEntropyCloses({ substance, view, policy, limits }: TransitionContext): Judgement {
  const rule = 'transition-entropy-closes';
  const { stated, pair } = view;
  const { enthalpy, entropy, temperature } = stated;
  const t = temperature.value;
  const within = view.evidence === 'arithmetic' || stated.table.basis !== 'measured';
  const uOf = (d: Datum): number => (within ? d.uRounding : d.u);
  const comparisons: { observed: number; expected: number; u: number; of: Compared; about: Datum }[] = [];
  if (enthalpy !== null && entropy !== null) {
    comparisons.push({
      observed: enthalpy.value,
      expected: t * entropy.value,
      u: Math.hypot(uOf(enthalpy), t * uOf(entropy), entropy.value * (within ? temperature.uRounding : temperature.u)),
      of: 'stated',
      about: enthalpy,
    });
  }
  if (isFirstOrder(view) && pair !== null && pair.atK === t && !view.byConstruction) {
    const { at } = pair;
    const uCurves = differenceUncertainty(pair);
    if (enthalpy !== null && !view.carriesH) {
      comparisons.push({
        observed: enthalpy.value,
        expected: at.enthalpyJPerMol,
        u: Math.hypot(
          uStated(enthalpy, view.evidence === 'arithmetic'),
          uCurves.enthalpyJPerMol,
          Math.abs(at.heatCapacityJPerMolK) * view.uStatedK,
        ),
        of: 'enthalpy',
        about: enthalpy,
      });
    }
    if (entropy !== null && !view.carriesS) {
      comparisons.push({
        observed: t * entropy.value,
        expected: t * at.entropyJPerMolK,
        u: Math.hypot(
          t * uStated(entropy, view.evidence === 'arithmetic'),
          uCurves.entropyTimesTJPerMol,
          Math.abs(at.heatCapacityJPerMolK) * view.uStatedK,
        ),
        of: 'entropy',
        about: entropy,
      });
    }
  }
  if (comparisons.length === 0) {
    const missing =
      enthalpy === null && entropy === null
        ? 'a stated enthalpy or entropy of the transition'
        : 'both the enthalpy and the entropy of the transition, or levels of both phases that do not rest on it';
    return { outcome: outcome(substance, rule, view.place, 'untestable', null, { missing }), findings: [] };
  }
  const worst = comparisons.reduce((a, b) =>
    Math.abs(a.observed - a.expected) / a.u >= Math.abs(b.observed - b.expected) / b.u ? a : b,
  );
  const difference = worst.observed - worst.expected;
  const dS = Math.abs(entropy?.value ?? (enthalpy as Datum).value / t);
  const material = policy.material.transitionTemperatureK * Math.max(dS, Math.abs(worst.expected) / t);
  const severity = gravity(difference, worst.u, material, limits);
  const smallestDetectable = NON_CENTRALITY * worst.u;
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
    temperatureK: t,
    observed: worst.observed,
    expected: worst.expected,
    difference,
    tolerance: limits.fault * worst.u,
    unit: 'J/mol',
    address: worst.about.address,
    evidence: statedCells(view),
    transition: transitionKey(view),
    detail: {
      code: 'transition',
      what: 'closure',
      of: worst.of,
      statedK: t,
      computedK: view.crossing?.temperatureK ?? null,
      smallestDetectable,
    },
  });
  return {
    outcome: outcome(substance, rule, view.place, 'disagrees', view.evidence, { smallestDetectable }),
    findings: [finding],
  };
}
