import type { NamedCell } from '../../../schemas/checked.js';
import type { Finding, RuleName, Suspect } from '../../../schemas/finding.js';
import type { Series } from '../../../schemas/harmonised.js';
import { makeFinding } from '../../../schemas/make-finding.js';
import type { Policy } from '../../../schemas/policy.js';
import { QUANTITY_UNITS } from '../../../schemas/quantities.js';
import { NON_CENTRALITY } from '../../core/physics/adjustment.js';
import { addressOf, evidenceOf } from '../place.js';
import type { WholeColumns } from '../table/column-cause.js';
import { type ColumnCells, columnCells } from '../table/column-cells.js';
import { type ColumnChange, changedValue, quantityIn, quantityName, type TableColumn } from '../table/column-change.js';
import type { ColumnHypothesis } from '../table/column-hypothesis.js';

export interface ColumnFindings {
  readonly findings: Finding[];
  readonly named: NamedCell[];
  readonly suspects: Suspect[];
}

/**
 * One finding for each column that a law puts right, those of one cause after its first; one suspect for all cells of a
 * column, and in its group the other columns that the table cannot tell from it.
 */
export function columnFindings(
  substance: string,
  series: Series,
  index: number,
  whole: readonly WholeColumns[],
  policy: Policy,
): ColumnFindings {
  const out: ColumnFindings = { findings: [], named: [], suspects: [] };
  for (const one of whole) {
    let cause: string | null = null;
    for (const change of one.changes) {
      const cells = columnCells(series, change, one.run, one.uToo, one.uFactor, one.uShift);
      if (cells === null) continue;
      const finding = findingOf(substance, series, change, cells, one.explanation, cause, policy);
      if (out.findings.some(({ id }) => id === finding.id)) continue;
      out.findings.push(finding);
      const quantity = quantityName(series, change.column);
      for (const row of cells.rows) out.named.push({ series: index, row, quantity, finding: finding.id });
      const group = [suspectOf(finding, series, cells, cells.rows.length, one.explanation, one.w, 1)];
      if (cause === null) group.push(...rivalsOf(finding, series, one));
      const toldApartBy = group.length > 1 ? `an entropy of ${series.phase} at 298.15 K from elsewhere` : null;
      out.suspects.push(...group.map((suspect) => ({ ...suspect, toldApartBy })));
      cause ??= finding.id;
    }
  }
  return out;
}

/** A column shows in its own rule; temperatures in the first that the table allows. */
const RULE_OF: Readonly<Record<TableColumn, RuleName>> = {
  entropy: 'entropy-follows-heat-capacity',
  enthalpy: 'enthalpy-follows-heat-capacity',
  gibbsFunction: 'functions-close',
  heatCapacity: 'heat-capacity-smooth',
  temperature: 'entropy-follows-heat-capacity',
};

function ruleOf(series: Series, column: TableColumn): RuleName {
  if (column !== 'temperature' || (series.entropy !== null && series.heatCapacity !== null)) return RULE_OF[column];
  const hasH = series.enthalpyIncrement !== null || series.enthalpy !== null;
  return hasH && series.heatCapacity !== null ? RULE_OF.enthalpy : 'value-possible';
}

function findingOf(
  substance: string,
  series: Series,
  change: ColumnChange,
  cells: ColumnCells,
  explanation: string | null,
  cause: string | null,
  policy: Policy,
): Finding {
  const quantity = quantityName(series, change.column);
  const { rows, column, firstRow, observed, proposed, uProposed } = cells;
  return makeFinding({
    rule: ruleOf(series, change.column),
    severity: rows.some((row) => isMaterial(series, change, row, policy)) ? 'fault' : 'doubt',
    substance,
    fromPhase: series.phase,
    temperatureK: series.temperatureK[firstRow],
    observed,
    expected: proposed,
    difference: observed - proposed,
    // Temperatures of an evaluated table have no last place.
    tolerance: uProposed > 0 ? policy.cell.threshold * uProposed : null,
    unit: QUANTITY_UNITS[quantity],
    address: addressOf(series, firstRow, column),
    evidence: rows.map((row) => evidenceOf(series, row, column)),
    quantity: `${quantity} column`,
    cause,
    detail: {
      code: 'column',
      quantity,
      cells: rows.length,
      factor: change.factor === 1 ? null : change.factor,
      shift: change.shift === 0 ? null : change.shift,
      explanation,
    },
  });
}

function isMaterial(series: Series, change: ColumnChange, row: number, { material }: Policy): boolean {
  const proposed = changedValue(series, quantityName(series, change.column), row, change);
  const size = Math.abs((quantityIn(series, change.column)?.values[row] ?? series.temperatureK[row]) - proposed);
  switch (change.column) {
    case 'temperature':
      return size >= material.transitionTemperatureK;
    case 'heatCapacity':
      return size >= material.heatCapacityRelative * Math.abs(proposed);
    case 'enthalpy':
      return size >= material.enthalpyJPerMol;
    default:
      return size >= Math.max(material.entropyRelative * Math.abs(proposed), material.entropyJPerMolK);
  }
}

/** Of several columns the first stands for all. */
function rivalsOf(finding: Finding, series: Series, { rivals, run, uToo, w }: WholeColumns): Suspect[] {
  return rivals.flatMap((rival: ColumnHypothesis, i) => {
    const cells = rival.changes.map((change) => columnCells(series, change, run, uToo, rival.uFactor, rival.uShift));
    const [first] = cells;
    if (first === undefined || first === null) return [];
    const count = cells.reduce((sum, one) => sum + (one?.rows.length ?? 0), 0);
    return [suspectOf(finding, series, first, count, rival.explanation, w, i + 2)];
  });
}

function suspectOf(
  finding: Finding,
  series: Series,
  cells: ColumnCells,
  count: number,
  explanation: string | null,
  w: number,
  place: number,
): Suspect {
  const { firstRow, column, observed, proposed, uProposed, proposedPrinted } = cells;
  return {
    finding: finding.id,
    substance: finding.substance,
    place,
    group: 1,
    cells: count,
    address: addressOf(series, firstRow, column),
    printed: series.text(firstRow, column),
    observed,
    unit: finding.unit ?? '',
    normalisedResidual: w,
    // Every other column of the table checks it.
    redundancy: 1,
    proposed,
    uProposed,
    proposedPrinted,
    smallestDetectable: NON_CENTRALITY * uProposed,
    explanation,
    explainedPrinted: explanation === null ? null : proposedPrinted,
    toldApartBy: null,
  };
}
