import type { CheckedCase } from '../../schemas/checked.js';
import type { Finding, Suspect } from '../../schemas/finding.js';
import type { Datum, HarmonisedCase, Series, SeriesQuantity } from '../../schemas/harmonised.js';
import type { Policy } from '../../schemas/policy.js';
import type { NumberQuantity } from '../../schemas/quantities.js';
import { printedNumber } from '../core/numeric/printed-like.js';
import { explain, type SuspectContext } from './explain.js';

/** Suspects with the usual slip that leads to their proposed value, where one does. */
export function explained(checked: CheckedCase, suspects: readonly Suspect[], policy: Policy): Suspect[] {
  const substance = checked.assembled.examined.harmonised;
  return suspects.map((suspect) => {
    const found = tableContext(substance, suspect) ?? datumContext(substance, suspect);
    if (found === null) return suspect;
    const [best] = explain(found, suspect.proposed, suspect.uProposed, materialOf(found, policy));
    return best === undefined
      ? suspect
      : { ...suspect, explanation: best.slip, explainedPrinted: best.correctedPrinted };
  });
}

/** Findings that name a cell take their first suspect's explanation. */
export function withExplanations(findings: readonly Finding[], suspects: readonly Suspect[]): Finding[] {
  return findings.map((finding) => {
    if (finding.detail.code !== 'cell') return finding;
    const first = suspects.find((s) => s.finding === finding.id && s.place === 1);
    if (first === undefined || first.explanation === null) return finding;
    return { ...finding, detail: { ...finding.detail, explanation: first.explanation } };
  });
}

function tableContext(substance: HarmonisedCase, suspect: Suspect): SuspectContext | null {
  const { address } = suspect;
  for (const series of substance.series) {
    if (series.table.source !== address.source || series.table.file !== address.file) continue;
    const row = series.line.indexOf(address.line);
    const q = row < 0 ? null : quantityAt(series, address.column);
    if (q === null || q.present[row] === 0) continue;
    const above = row > 0 && q.present[row - 1] === 1 ? row - 1 : -1;
    const printed = series.text(row, q.column);
    const number = printedNumber(printed);
    const observed = q.values[row];
    return {
      quantity: q.is,
      printed,
      observed,
      // The unit's factor as the cell itself shows it: series carry no other.
      factor: Number.isFinite(number) && number !== 0 ? observed / number : 1,
      offset: 0,
      unit: series.table.columns[q.column].unit ?? '',
      molarMassGPerMol: substance.substance.molarMassGPerMol,
      temperatureK: series.temperatureK[row],
      rowAbove: above < 0 ? null : { printed: series.text(above, q.column), observed: q.values[above] },
      partner: null,
      gas: series.phase.startsWith('g'),
    };
  }
  return null;
}

function quantityAt(series: Series, column: string): SeriesQuantity | null {
  for (const q of [
    series.heatCapacity,
    series.entropy,
    series.enthalpyIncrement,
    series.gibbsFunction,
    series.enthalpy,
    series.gibbsEnergy,
  ]) {
    if (q !== null && series.table.columns[q.column]?.header === column) return q;
  }
  return null;
}

function datumContext(substance: HarmonisedCase, suspect: Suspect): SuspectContext | null {
  const is = (datum: Datum | null): boolean =>
    datum !== null &&
    datum.address.source === suspect.address.source &&
    datum.address.file === suspect.address.file &&
    datum.address.line === suspect.address.line &&
    datum.address.column === suspect.address.column;
  for (const t of substance.transitions) {
    const data: [NumberQuantity, Datum | null, Datum | null][] = [
      ['transition-temperature', t.temperature, null],
      ['transition-enthalpy', t.enthalpy, t.entropy],
      ['transition-entropy', t.entropy, t.enthalpy],
    ];
    for (const [quantity, datum, partner] of data) {
      if (datum === null || !is(datum)) continue;
      return contextOf(quantity, datum, partner, t.temperature.value, t.to.startsWith('g'), substance);
    }
  }
  for (const a of substance.anchors) {
    const data: [NumberQuantity, Datum | null][] = [
      ['enthalpy-of-formation', a.enthalpyOfFormation],
      ['entropy', a.entropy],
    ];
    for (const [quantity, datum] of data) {
      if (datum === null || !is(datum)) continue;
      return contextOf(quantity, datum, null, a.referenceTemperatureK, a.phase.startsWith('g'), substance);
    }
  }
  return null;
}

function contextOf(
  quantity: NumberQuantity,
  datum: Datum,
  partner: Datum | null,
  temperatureK: number,
  gas: boolean,
  substance: HarmonisedCase,
): SuspectContext {
  return {
    quantity,
    printed: datum.printed,
    observed: datum.value,
    factor: datum.factor,
    offset: datum.offset,
    unit: datum.unit,
    molarMassGPerMol: substance.substance.molarMassGPerMol,
    temperatureK,
    rowAbove: null,
    partner: partner === null ? null : { printed: partner.printed, observed: partner.value },
    gas,
  };
}

function materialOf(context: SuspectContext, policy: Policy): number {
  const { material } = policy;
  const t = context.temperatureK ?? 298.15;
  switch (context.quantity) {
    case 'transition-temperature':
      return material.transitionTemperatureK;
    case 'transition-enthalpy':
      return (material.transitionTemperatureK * Math.abs(context.observed)) / t;
    case 'heat-capacity':
      return 0.5 * material.heatCapacityRelative * Math.abs(context.observed);
    case 'entropy':
    case 'transition-entropy':
    case 'gibbs-function':
      return material.entropyJPerMolK;
    default:
      return material.enthalpyJPerMol;
  }
}
