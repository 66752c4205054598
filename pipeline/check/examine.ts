import type { ExaminedCase, NamedCell } from '../../schemas/checked.js';
import type { Finding, Outcome, Suspect } from '../../schemas/finding.js';
import type { HarmonisedCase, Series } from '../../schemas/harmonised.js';
import type { Policy } from '../../schemas/policy.js';
import { kindOf, outcome, placeOf } from './place.js';
import { columnFindings } from './rules/column-findings.js';
import { enthalpyFollowsHeatCapacity } from './rules/enthalpy-follows-heat-capacity.js';
import { entropyFollowsHeatCapacity } from './rules/entropy-follows-heat-capacity.js';
import { functionsClose } from './rules/functions-close.js';
import { heatCapacitySmooth } from './rules/heat-capacity-smooth.js';
import { rowReadable } from './rules/row-readable.js';
import { rowsDistinct } from './rules/rows-distinct.js';
import { judgeTable } from './rules/table-rules.js';
import { statedValuesPossible, valuePossible } from './rules/value-possible.js';
import { belowZero } from './table/below-zero.js';
import type { WholeColumns } from './table/column-cause.js';
import { nameCells, type TableVerdict } from './table/name-cells.js';

const TABLE_RULES = [entropyFollowsHeatCapacity, enthalpyFollowsHeatCapacity, functionsClose, heatCapacitySmooth];

/** Checks every table row by row, from Cp alone, before any curve is made. */
export function examine(
  cases: readonly HarmonisedCase[],
  settings: { readonly policy: Policy },
): { artefact: ExaminedCase[]; findings: Finding[] } {
  return { artefact: cases.map((c) => examineCase(c, settings.policy)), findings: [] };
}

function examineCase(harmonised: HarmonisedCase, policy: Policy): ExaminedCase {
  const id = harmonised.substance.id;
  const outcomes: Outcome[] = [rowReadable(harmonised, harmonised.findings)];
  const findings: Finding[] = [...harmonised.findings];
  const named: NamedCell[] = [];
  const suspects: Suspect[] = [];
  const stated = statedValuesPossible(harmonised);
  if (stated !== null) {
    outcomes.push(stated.outcome);
    findings.push(...stated.findings);
  }
  harmonised.series.forEach((series, index) => {
    const distinct = rowsDistinct(id, series);
    const possible = valuePossible(id, series);
    findings.push(...distinct.findings, ...possible.findings);
    outcomes.push(distinct.outcome, possible.outcome);
    const verdict = nameCells(series, policy, harmonised);
    const evidence = kindOf([series.table]);
    const whole = wholeOf(series, verdict, possible.findings.length > 0);
    const columns = whole === null ? null : columnFindings(id, series, index, whole, policy);
    if (columns !== null) {
      followColumns(findings, columns.findings, [...distinct.findings, ...possible.findings]);
      named.push(...columns.named);
      suspects.push(...columns.suspects);
    }
    for (const rule of TABLE_RULES) {
      const judged = judgeTable(rule, id, series, index, verdict, policy);
      const off = columns?.findings.some((f) => f.rule === rule.rule) === true;
      outcomes.push(
        outcome(id, rule.rule, placeOf(series), off ? 'disagrees' : judged.outcome, evidence, {
          missing: judged.missing,
          smallestDetectable: judged.smallestDetectable,
        }),
      );
      findings.push(...judged.findings);
      named.push(...judged.named);
      suspects.push(...judged.suspects);
    }
  });
  return { harmonised, named, outcomes, findings, suspects };
}

/** The columns that the row checks find wrong as a whole; temperatures below 0 K where nothing else shows what they are. */
function wholeOf(series: Series, verdict: TableVerdict | null, impossible: boolean): readonly WholeColumns[] | null {
  if (verdict !== null && verdict.columns.length > 0) return verdict.columns;
  const cold = impossible ? belowZero(series) : null;
  return cold === null ? null : [cold];
}

/** What else a table shows of a column that is wrong as a whole follows from that. */
function followColumns(findings: Finding[], columns: readonly Finding[], shown: readonly Finding[]): void {
  const quantities = new Map(columns.map((one) => [(one.detail as { quantity: string }).quantity, one.id]));
  for (const one of shown) {
    const own = 'quantity' in one.detail ? quantities.get(one.detail.quantity) : undefined;
    // Wrong temperatures make any of the cells beside them impossible.
    const cause = own ?? quantities.get('temperature');
    if (cause !== undefined) findings[findings.indexOf(one)] = { ...one, cause };
  }
  findings.push(...columns);
}
