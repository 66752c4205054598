import type { EvidenceCell, Finding, Outcome } from '../../../schemas/finding.js';
import type { Datum, HarmonisedCase, Series, SeriesQuantity, VapourPressure } from '../../../schemas/harmonised.js';
import { makeFinding, type PartialFinding } from '../../../schemas/make-finding.js';
import { addressOf, evidenceOf, kindOf, outcome, placeOf } from '../place.js';

/** Above this a temperature in kelvin or a molar heat capacity per kelvin is no longer one (order of magnitude only). */
const HOTTEST_K = 50_000;
const LARGEST_J_PER_MOL_K = 1e6;

/**
 * T >= 0; Cp > 0 above 0 K; S >= 0 where the zero is absolute; orders of magnitude. A row at 0 K is a limit row: Cp and S
 * may be zero there.
 */
export function valuePossible(substance: string, series: Series): { outcome: Outcome; findings: Finding[] } {
  const findings: Finding[] = [];
  const t = series.temperatureK;
  const cp = series.heatCapacity;
  const s = series.table.entropyZero === 'absolute' ? series.entropy : null;
  const report = (row: number, column: number, quantity: string, value: number, wanted: string, unit: string): void => {
    const same = findings.findIndex((f) => 'quantity' in f.detail && f.detail.quantity === quantity);
    const cell = evidenceOf(series, row, column);
    if (same >= 0) {
      findings[same] = { ...findings[same], evidence: [...findings[same].evidence, cell] };
      return;
    }
    findings.push(
      makeFinding({
        rule: 'value-possible',
        severity: 'fault',
        substance,
        fromPhase: series.phase,
        temperatureK: t[row],
        observed: value,
        unit,
        address: addressOf(series, row, column),
        evidence: [cell],
        detail: { code: 'impossible', quantity, read: cell.printed, wanted },
      }),
    );
  };
  for (let i = 0; i < series.rows; i++) {
    if (!(t[i] >= 0)) report(i, series.temperatureColumn, 'temperature', t[i], 'a temperature of 0 K or more', 'K');
    else if (t[i] > HOTTEST_K)
      report(i, series.temperatureColumn, 'temperature', t[i], `a temperature below ${HOTTEST_K} K`, 'K');
    if (cp !== null && cp.present[i] === 1 && impossibleCp(cp, i, t[i]))
      report(
        i,
        cp.column,
        'heat-capacity',
        cp.values[i],
        'a heat capacity above 0 and below 1e6 J/(mol K)',
        'J/(mol.K)',
      );
    if (s !== null && s.present[i] === 1 && s.values[i] < -s.halfUnit[i])
      report(
        i,
        s.column,
        'entropy',
        s.values[i],
        'an entropy of 0 or more, counted from the absolute zero',
        'J/(mol.K)',
      );
  }
  const kind = findings.length > 0 ? 'disagrees' : 'agrees';
  return { outcome: outcome(substance, 'value-possible', placeOf(series), kind, kindOf([series.table])), findings };
}

function impossibleCp(cp: SeriesQuantity, i: number, temperatureK: number): boolean {
  const v = cp.values[i];
  if (temperatureK <= 0) return v < 0;
  // Near 0 K a printed 0.000 is a rounded small number.
  return v < 0 || (v === 0 && temperatureK > 20) || v > LARGEST_J_PER_MOL_K;
}

/**
 * Stated numbers: temperatures and pressures of transitions and of vapours above 0, entropies of anchors 0 or more on the
 * absolute zero.
 */
export function statedValuesPossible(harmonised: HarmonisedCase): { outcome: Outcome; findings: Finding[] } | null {
  const { anchors, transitions, vapourPressures } = harmonised;
  if (anchors.length + transitions.length + vapourPressures.length === 0) return null;
  const substance = harmonised.substance.id;
  const findings: Finding[] = [];
  const report = (datum: Datum, phases: readonly [string, string | null], quantity: string, wanted: string): void => {
    findings.push(
      makeFinding({
        rule: 'value-possible',
        severity: 'fault',
        substance,
        fromPhase: phases[0],
        toPhase: phases[1],
        observed: datum.value,
        unit: quantity === 'entropy' ? 'J/(mol.K)' : 'K',
        address: datum.address,
        evidence: [{ ...datum.address, printed: datum.printed }],
        detail: { code: 'impossible', quantity, read: datum.printed, wanted },
      }),
    );
  };
  for (const { from, to, temperature, pressure, pressurePa, table } of transitions) {
    if (!(pressurePa > 0)) {
      const header = table.columns.find(({ is }) => is === 'pressure')?.header ?? 'pressure';
      const address = pressure?.address ?? { ...temperature.address, column: header };
      findings.push(
        makeFinding({
          rule: 'value-possible',
          severity: 'fault',
          substance,
          fromPhase: from,
          toPhase: to,
          observed: pressurePa,
          unit: 'Pa',
          address,
          evidence: [{ ...address, printed: pressure?.printed ?? `${pressurePa} Pa` }],
          detail: { code: 'impossible', quantity: 'pressure', read: `${pressurePa} Pa`, wanted: 'a pressure above 0' },
        }),
      );
    }
    if (!(temperature.value > 0 && temperature.value <= HOTTEST_K))
      report(temperature, [from, to], 'transition-temperature', `a temperature above 0 K and below ${HOTTEST_K} K`);
  }
  for (const { phase, entropy, table } of anchors) {
    if (entropy !== null && table.entropyZero === 'absolute' && entropy.value < -entropy.halfUnit)
      report(entropy, [phase, null], 'entropy', 'an entropy of 0 or more, counted from the absolute zero');
  }
  findings.push(...impossibleVapours(substance, vapourPressures));
  const tables = [...anchors, ...transitions, ...vapourPressures].map(({ table }) => table);
  const kind = findings.length > 0 ? 'disagrees' : 'agrees';
  return { outcome: outcome(substance, 'value-possible', '', kind, kindOf(tables)), findings };
}

/** One finding a source, phase and quantity, its further cells in the evidence. */
function impossibleVapours(substance: string, rows: readonly VapourPressure[]): Finding[] {
  const found = new Map<string, { readonly first: PartialFinding; readonly cells: EvidenceCell[] }>();
  const report = (phase: string, datum: Datum, quantity: string, unit: string, wanted: string): void => {
    const key = `${datum.address.source}\n${phase}\n${quantity}`;
    const cell = { ...datum.address, printed: datum.printed };
    const known = found.get(key);
    if (known !== undefined) {
      known.cells.push(cell);
      return;
    }
    const first: PartialFinding = {
      rule: 'value-possible',
      severity: 'fault',
      substance,
      fromPhase: phase,
      observed: datum.value,
      unit,
      address: datum.address,
      detail: { code: 'impossible', quantity, read: datum.printed, wanted },
    };
    found.set(key, { first, cells: [cell] });
  };
  for (const { phase, temperature, pressure } of rows) {
    if (!(temperature.value > 0 && temperature.value <= HOTTEST_K))
      report(phase, temperature, 'temperature', 'K', `a temperature above 0 K and below ${HOTTEST_K} K`);
    if (!(pressure.value > 0)) report(phase, pressure, 'pressure', 'Pa', 'a pressure above 0');
  }
  return [...found.values()].map(({ first, cells }) => makeFinding({ ...first, evidence: cells }));
}
