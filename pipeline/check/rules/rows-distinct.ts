import type { Finding, Outcome } from '../../../schemas/finding.js';
import type { Series, SeriesQuantity } from '../../../schemas/harmonised.js';
import { makeFinding } from '../../../schemas/make-finding.js';
import { addressOf, evidenceOf, kindOf, outcome, placeOf } from '../place.js';

/**
 * No two rows of a series at one temperature disagree, two-sided rows aside (equal S and H, other Cp: a glass or lambda
 * note), and temperatures rise in tables that are not measured series; a measured one may repeat and return.
 */
export function rowsDistinct(substance: string, series: Series): { outcome: Outcome; findings: Finding[] } {
  const findings: Finding[] = [];
  const t = series.temperatureK;
  const measured = series.table.basis === 'measured';
  if (measured) return runsAgree(substance, series);
  if (series.rows < 2) return untestable(substance, series, 'at least two rows');
  for (let i = 1; i < series.rows; i++) {
    if (t[i] > t[i - 1]) continue;
    if (t[i] < t[i - 1]) {
      if (findings.some((f) => f.detail.code === 'temperatures-fall')) continue;
      findings.push(
        makeFinding({
          rule: 'rows-distinct',
          severity: 'fault',
          substance,
          fromPhase: series.phase,
          temperatureK: t[i],
          observed: t[i],
          expected: t[i - 1],
          difference: t[i] - t[i - 1],
          tolerance: 0,
          unit: 'K',
          address: addressOf(series, i, series.temperatureColumn),
          evidence: [
            evidenceOf(series, i, series.temperatureColumn),
            evidenceOf(series, i - 1, series.temperatureColumn),
          ],
          quantity: 'temperature',
          detail: { code: 'temperatures-fall', previousK: t[i - 1] },
        }),
      );
      continue;
    }
    const clash = disagreement(series, i - 1, i);
    // Both S and H apart: the two sides of a jump, which slope-jumps-only-at-transitions judges.
    if (clash === null || clash.both) continue;
    findings.push(
      makeFinding({
        rule: 'rows-distinct',
        severity: 'fault',
        substance,
        fromPhase: series.phase,
        temperatureK: t[i],
        observed: clash.q.values[i],
        expected: clash.q.values[i - 1],
        difference: clash.q.values[i] - clash.q.values[i - 1],
        tolerance: clash.q.halfUnit[i] + clash.q.halfUnit[i - 1],
        unit: clash.q.is === 'entropy' ? 'J/(mol.K)' : 'J/mol',
        address: addressOf(series, i, clash.q.column),
        evidence: [evidenceOf(series, i, clash.q.column), evidenceOf(series, i - 1, clash.q.column)],
        detail: {
          code: 'rows-disagree',
          otherLine: series.line[i - 1],
          quantity: clash.q.is,
          first: series.text(i - 1, clash.q.column),
          second: series.text(i, clash.q.column),
        },
      }),
    );
  }
  const kind = findings.length > 0 ? 'disagrees' : 'agrees';
  return { outcome: outcome(substance, 'rows-distinct', placeOf(series), kind, kindOf([series.table])), findings };
}

function untestable(substance: string, series: Series, missing: string): { outcome: Outcome; findings: Finding[] } {
  return {
    outcome: outcome(substance, 'rows-distinct', placeOf(series), 'untestable', null, { missing }),
    findings: [],
  };
}

/** Where a measured series returns to a temperature, its heat capacities agree within five standard uncertainties. */
function runsAgree(substance: string, series: Series): { outcome: Outcome; findings: Finding[] } {
  const cp = series.heatCapacity;
  const t = series.temperatureK;
  const rows = Array.from({ length: series.rows }, (_, i) => i).filter((i) => cp !== null && cp.present[i] === 1);
  rows.sort((a, b) => t[a] - t[b] || a - b);
  let compared = 0;
  let worst: { ratio: number; a: number; b: number; tolerance: number } | null = null;
  for (let k = 1; k < rows.length; k++) {
    const [a, b] = [rows[k - 1], rows[k]];
    if (cp === null || t[a] !== t[b]) continue;
    compared++;
    const tolerance = cp.halfUnit[a] + cp.halfUnit[b] + 5 * Math.hypot(cp.uOwn[a], cp.uOwn[b]);
    const ratio = Math.abs(cp.values[b] - cp.values[a]) / tolerance;
    if (ratio > 1 && (worst === null || ratio > worst.ratio)) worst = { ratio, a, b, tolerance };
  }
  if (cp === null || compared === 0) {
    return untestable(substance, series, 'two rows at one temperature: a measured series may return to one');
  }
  const evidence = kindOf([series.table]);
  if (worst === null) {
    return { outcome: outcome(substance, 'rows-distinct', placeOf(series), 'agrees', evidence), findings: [] };
  }
  const { a, b, tolerance } = worst;
  const finding = makeFinding({
    rule: 'rows-distinct',
    severity: 'doubt',
    substance,
    fromPhase: series.phase,
    temperatureK: t[b],
    observed: cp.values[b],
    expected: cp.values[a],
    difference: cp.values[b] - cp.values[a],
    tolerance,
    unit: 'J/(mol.K)',
    address: addressOf(series, b, cp.column),
    evidence: [evidenceOf(series, b, cp.column), evidenceOf(series, a, cp.column)],
    detail: {
      code: 'rows-disagree',
      otherLine: series.line[a],
      quantity: cp.is,
      first: series.text(a, cp.column),
      second: series.text(b, cp.column),
    },
  });
  return { outcome: outcome(substance, 'rows-distinct', placeOf(series), 'disagrees', evidence), findings: [finding] };
}

function disagreement(series: Series, a: number, b: number): { q: SeriesQuantity; both: boolean } | null {
  let found: SeriesQuantity | null = null;
  let count = 0;
  let compared = 0;
  for (const q of [series.entropy, series.enthalpyIncrement ?? series.enthalpy]) {
    if (q === null || q.present[a] === 0 || q.present[b] === 0) continue;
    compared++;
    if (
      Math.abs(q.values[a] - q.values[b]) >
      1.01 * (q.halfUnit[a] + q.halfUnit[b]) + 3 * Math.hypot(q.uOwn[a], q.uOwn[b])
    ) {
      found ??= q;
      count++;
    }
  }
  if (compared === 0) {
    const q = series.heatCapacity;
    if (q === null || q.present[a] === 0 || q.present[b] === 0) return null;
    // Cp alone printed twice: a step of Cp is ordinary (glass, lambda).
    return null;
  }
  return found === null ? null : { q: found, both: compared > 1 && count === compared };
}
