import type { Finding, Outcome } from '../../../schemas/finding.js';
import type { Series, SeriesQuantity, StatedTransition } from '../../../schemas/harmonised.js';
import { makeFinding } from '../../../schemas/make-finding.js';
import { addressOf, evidenceOf, kindOf, outcome, placeOf } from '../place.js';

/** No jump of S and H between two rows at one temperature inside a phase where no first-order transition is stated. */
export function slopeJumpsOnlyAtTransitions(
  substance: string,
  series: Series,
  transitions: readonly StatedTransition[],
): { outcome: Outcome; findings: Finding[] } {
  const rule = 'slope-jumps-only-at-transitions';
  const findings: Finding[] = [];
  const s = series.entropy;
  const h = series.enthalpyIncrement ?? series.enthalpy;
  const t = series.temperatureK;
  if (s === null && h === null) {
    return {
      outcome: outcome(substance, rule, placeOf(series), 'untestable', null, {
        missing: 'a column of entropies or enthalpies',
      }),
      findings,
    };
  }
  if (series.table.basis === 'measured') {
    return {
      outcome: outcome(substance, rule, placeOf(series), 'untestable', null, {
        missing: 'an evaluated table: a measured series may return to a temperature',
      }),
      findings,
    };
  }
  const q = s ?? (h as NonNullable<typeof h>);
  for (let i = 1; i < series.rows; i++) {
    if (t[i] !== t[i - 1]) continue;
    const apart = (x: typeof s): boolean =>
      x !== null &&
      x.present[i] === 1 &&
      x.present[i - 1] === 1 &&
      Math.abs(x.values[i] - x.values[i - 1]) > mostByChance(x, i);
    if (!(apart(s) && (h === null || apart(h)))) continue;
    const stated = transitions.some(
      (x) =>
        x.order === 'first' &&
        (x.from === series.phase || x.to === series.phase) &&
        Math.abs(x.temperature.value - t[i]) < 0.01 * t[i],
    );
    if (stated || findings.length > 0) continue;
    findings.push(
      makeFinding({
        rule,
        severity: 'fault',
        substance,
        fromPhase: series.phase,
        temperatureK: t[i],
        observed: q.values[i] - q.values[i - 1],
        expected: 0,
        difference: q.values[i] - q.values[i - 1],
        tolerance: q.halfUnit[i] + q.halfUnit[i - 1],
        unit: q === s ? 'J/(mol.K)' : 'J/mol',
        address: addressOf(series, i, q.column),
        evidence: [evidenceOf(series, i - 1, q.column), evidenceOf(series, i, q.column)],
        detail: { code: 'unstated-jump', quantity: q.is, ...(closes(s, h, i, t[i]) && { closes: true }) },
      }),
    );
  }
  const kind = findings.length > 0 ? 'disagrees' : 'agrees';
  return { outcome: outcome(substance, rule, placeOf(series), kind, kindOf([series.table])), findings };
}

/** What rounding and each point's own error may part rows i - 1 and i by. */
function mostByChance({ halfUnit, uOwn }: SeriesQuantity, i: number): number {
  return 2 * (halfUnit[i] + halfUnit[i - 1]) + 6 * Math.hypot(uOwn[i], uOwn[i - 1]);
}

/** Whether the jump takes up heat and dH = T dS, as at a transition. */
function closes(s: SeriesQuantity | null, h: SeriesQuantity | null, i: number, temperatureK: number): boolean {
  if (s === null || h === null) return false;
  const dS = s.values[i] - s.values[i - 1];
  const dH = h.values[i] - h.values[i - 1];
  return dS > 0 && Math.abs(dH - temperatureK * dS) <= mostByChance(h, i) + temperatureK * mostByChance(s, i);
}
