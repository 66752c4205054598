import type { Datum } from '../../../schemas/harmonised.js';
import { makeFinding } from '../../../schemas/make-finding.js';
import { cellOf, isFirstOrder, type Judgement, type TransitionContext, transitionKey } from '../curve/judgement.js';
import { outcome } from '../place.js';

/** dH > 0 and dS > 0 from the low- to the high-temperature phase at equilibrium, as stated and as the curves have it. */
export function heatingRaisesEntropy({ substance, view, limits }: TransitionContext): Judgement {
  const rule = 'heating-raises-entropy';
  const { stated, pair } = view;
  if (!isFirstOrder(view)) {
    return {
      outcome: outcome(substance, rule, view.place, 'untestable', null, { missing: 'a first-order transition' }),
      findings: [],
    };
  }
  const falls = [stated.enthalpy, stated.entropy].find((d): d is Datum => d !== null && d.value < -3 * d.halfUnit);
  const curves = pair !== null && !view.byConstruction ? pair.at : null;
  if (falls === undefined && curves === null && stated.enthalpy === null && stated.entropy === null) {
    return {
      outcome: outcome(substance, rule, view.place, 'untestable', null, {
        missing: view.missing ?? 'a stated enthalpy or entropy of the transition',
      }),
      findings: [],
    };
  }
  const uS = pair === null ? 0 : pair.uGapJPerMol / pair.atK;
  const curvesFall = curves !== null && curves.entropyJPerMolK < -limits.fault * uS;
  if (falls === undefined && !curvesFall) {
    return { outcome: outcome(substance, rule, view.place, 'agrees', view.evidence), findings: [] };
  }
  const about = falls ?? stated.entropy ?? stated.enthalpy ?? stated.temperature;
  const observed = falls?.value ?? curves?.entropyJPerMolK ?? 0;
  const isEnthalpy = falls !== undefined && falls === stated.enthalpy;
  const finding = makeFinding({
    rule,
    severity: 'fault',
    substance,
    fromPhase: stated.from,
    toPhase: stated.to,
    temperatureK: stated.temperature.value,
    observed,
    expected: null,
    unit: isEnthalpy ? 'J/mol' : 'J/(mol.K)',
    address: about.address,
    evidence: [cellOf(about)],
    transition: transitionKey(view),
    detail: {
      code: 'transition',
      what: 'falls',
      statedK: stated.temperature.value,
      computedK: view.crossing?.temperatureK ?? null,
      smallestDetectable: null,
    },
  });
  return { outcome: outcome(substance, rule, view.place, 'disagrees', view.evidence), findings: [finding] };
}
