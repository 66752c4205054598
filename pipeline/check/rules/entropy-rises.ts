import type { Finding, Outcome } from '../../../schemas/finding.js';
import type { Series } from '../../../schemas/harmonised.js';
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
import { addressOf, evidenceOf, kindOf, outcome, placeOf } from '../place.js';

/** S rises with T inside a table: a row whose S lies below the row before it by more than both roundings. */
export function entropyRisesInTable(
  substance: string,
  series: Series,
  named: (row: number) => boolean,
): { outcome: Outcome; findings: Finding[] } {
  const s = series.entropy;
  const place = placeOf(series);
  if (s === null) {
    return {
      outcome: outcome(substance, 'entropy-rises', place, 'untestable', null, { missing: 'a column of entropies' }),
      findings: [],
    };
  }
  const findings: Finding[] = [];
  let last = -1;
  for (let i = 0; i < series.rows; i++) {
    if (s.present[i] === 0 || named(i)) continue;
    if (last >= 0 && series.temperatureK[i] > series.temperatureK[last] && findings.length === 0) {
      const fall = s.values[last] - s.values[i];
      const tolerance = s.halfUnit[i] + s.halfUnit[last] + 5 * Math.hypot(s.uOwn[i], s.uOwn[last]);
      if (fall > tolerance) {
        findings.push(
          makeFinding({
            rule: 'entropy-rises',
            severity: 'fault',
            substance,
            fromPhase: series.phase,
            temperatureK: series.temperatureK[i],
            observed: s.values[i],
            expected: s.values[last],
            difference: -fall,
            tolerance,
            unit: 'J/(mol.K)',
            address: addressOf(series, i, s.column),
            evidence: [evidenceOf(series, i, s.column), evidenceOf(series, last, s.column)],
            detail: {
              code: 'interval',
              quantity: 'entropy',
              lowK: series.temperatureK[last],
              highK: series.temperatureK[i],
              named: false,
            },
          }),
        );
      }
    }
    last = i;
  }
  const kind = findings.length > 0 ? 'disagrees' : 'agrees';
  return { outcome: outcome(substance, 'entropy-rises', place, kind, kindOf([series.table])), findings };
}

/** At a first-order transition the phase of the higher temperature has the higher entropy: S(cr) < S(l) < S(g). */
export function entropyRisesAcross({ substance, view, limits }: TransitionContext): Judgement {
  const { stated, pair } = view;
  if (!isFirstOrder(view) || pair === null || view.byConstruction) {
    return {
      outcome: outcome(substance, 'entropy-rises', view.place, 'untestable', null, {
        missing: view.missing ?? 'levels of both phases that do not rest on the transition',
      }),
      findings: [],
    };
  }
  const u = Math.sqrt(stateCovariance(pair.from.source, pair.atK).ss + stateCovariance(pair.to.source, pair.atK).ss);
  const dS = pair.at.entropyJPerMolK;
  if (dS >= -limits.fault * u) {
    return {
      outcome: outcome(substance, 'entropy-rises', view.place, 'agrees', view.evidence, {
        smallestDetectable: NON_CENTRALITY * u,
      }),
      findings: [],
    };
  }
  return {
    outcome: outcome(substance, 'entropy-rises', view.place, 'disagrees', view.evidence),
    findings: [
      makeFinding({
        rule: 'entropy-rises',
        severity: 'fault',
        substance,
        fromPhase: stated.from,
        toPhase: stated.to,
        temperatureK: pair.atK,
        observed: dS,
        tolerance: limits.fault * u,
        unit: 'J/(mol.K)',
        address: stated.temperature.address,
        evidence: statedCells(view),
        transition: transitionKey(view),
        detail: { code: 'entropy-order', above: stated.to, below: stated.from },
      }),
    ],
  };
}
