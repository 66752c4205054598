import type { NamedCell } from '../../../schemas/checked.js';
import type { EvidenceCell, Finding, RuleName, Suspect } from '../../../schemas/finding.js';
import type { Series, SeriesQuantity } from '../../../schemas/harmonised.js';
import { makeFinding } from '../../../schemas/make-finding.js';
import type { Policy } from '../../../schemas/policy.js';
import { type NumberQuantity, QUANTITY_UNITS } from '../../../schemas/quantities.js';
import { printedLike, printedNumber } from '../../core/numeric/printed-like.js';
import { NON_CENTRALITY } from '../../core/physics/adjustment.js';
import { addressOf, evidenceOf } from '../place.js';
import { type Anomaly, materialS } from '../table/left-over.js';
import type { SuspectCell, TableVerdict } from '../table/name-cells.js';

/** What one table rule makes of a table's verdict: shared by the four of them, each of which says only what is its own. */
export interface TableRule {
  readonly rule: RuleName;
  /** The quantity whose cells this rule names. */
  readonly names: readonly NumberQuantity[];
  readonly anomaly: Anomaly['check'];
  readonly unit: string;
  readonly missing: (series: Series) => string | null;
  readonly detectable: (verdict: TableVerdict) => number | null;
}

export interface TableJudgement {
  readonly outcome: 'agrees' | 'disagrees' | 'untestable';
  readonly missing: string | null;
  readonly smallestDetectable: number | null;
  readonly findings: Finding[];
  readonly named: NamedCell[];
  readonly suspects: Suspect[];
}

export function judgeTable(
  rule: TableRule,
  substance: string,
  series: Series,
  index: number,
  verdict: TableVerdict | null,
  policy: Policy,
): TableJudgement {
  const missing = rule.missing(series);
  if (missing !== null || verdict === null) {
    return untestable(series.heatCapacity === null ? 'a column of heat capacities' : (missing ?? 'at least two rows'));
  }
  const cells = verdict.cells.filter((c) => rule.names.includes(c.quantity));
  const findings: Finding[] = [];
  const named: NamedCell[] = [];
  const suspects: Suspect[] = [];
  if (cells.length > 0) {
    const first = cells[0];
    const q = quantityOf(series, first.quantity) as SeriesQuantity;
    const evidence: EvidenceCell[] = [];
    for (const c of cells) for (const k of involved(series, c)) evidence.push(evidenceOf(series, k.row, k.q.column));
    const severity = cells.some((c) => isMaterial(c, policy)) ? 'fault' : 'doubt';
    const finding = makeFinding({
      rule: rule.rule,
      severity,
      substance,
      fromPhase: series.phase,
      temperatureK: series.temperatureK[first.row],
      observed: first.observed,
      expected: first.proposed,
      difference: first.observed - first.proposed,
      tolerance: policy.cell.threshold * first.uProposed,
      unit: rule.unit,
      address: addressOf(series, first.row, q.column),
      evidence,
      detail: {
        code: 'cell',
        quantity: first.quantity,
        proposed: first.proposed,
        uProposed: first.uProposed,
        explanation: null,
      },
    });
    findings.push(finding);
    let place = 0;
    let group = 0;
    for (const c of cells) {
      group++;
      place++;
      suspects.push(suspectOf(finding.id, substance, series, c, place, group));
      for (const k of involved(series, c)) {
        named.push({ series: index, row: k.row, quantity: k.q.is, finding: finding.id });
      }
      for (const rival of c.rivals) {
        place++;
        suspects.push(
          suspectOf(
            finding.id,
            substance,
            series,
            { ...c, ...rival, observed: cellValue(series, rival) },
            place,
            group,
          ),
        );
      }
    }
  }
  for (const a of verdict.anomalies) {
    if (a.check !== rule.anomaly) continue;
    const quantity = rule.names[0];
    const q = quantityOf(series, quantity);
    const column = q === null ? series.temperatureColumn : q.column;
    const evidence = [evidenceOf(series, a.row, column)];
    if (a.nextRow !== a.row) evidence.push(evidenceOf(series, a.nextRow, column));
    findings.push(
      makeFinding({
        rule: rule.rule,
        severity: a.material && a.gross ? 'fault' : 'note',
        substance,
        fromPhase: series.phase,
        temperatureK: series.temperatureK[a.row],
        observed: a.difference,
        expected: 0,
        difference: a.difference,
        tolerance: a.tolerance,
        unit: rule.unit,
        address: addressOf(series, a.row, column),
        evidence,
        quantity: `${quantity} anomaly`,
        detail: {
          code: 'anomaly',
          quantity,
          lowK: series.temperatureK[a.row],
          highK: series.temperatureK[a.nextRow],
        },
      }),
    );
  }
  const disagrees = findings.some((f) => f.severity !== 'note');
  const smallestDetectable = rule.detectable(verdict);
  if (findings.length === 0 && smallestDetectable === null) {
    // Nowhere in the table do the cells that the rule needs stand side by side.
    return untestable('rows side by side that hold what the rule compares');
  }
  return {
    outcome: disagrees ? 'disagrees' : 'agrees',
    missing: null,
    smallestDetectable,
    findings,
    named,
    suspects,
  };
}

function untestable(missing: string): TableJudgement {
  return { outcome: 'untestable', missing, smallestDetectable: null, findings: [], named: [], suspects: [] };
}

/** The cells of a pattern: a pair is the cell and the one computed from it. */
function involved(series: Series, cell: SuspectCell): { row: number; q: SeriesQuantity }[] {
  const out: { row: number; q: SeriesQuantity }[] = [];
  const first = quantityOf(series, cell.quantity);
  if (first !== null) out.push({ row: cell.row, q: first });
  if (cell.pattern.endsWith('+gibbs') && series.gibbsFunction !== null) {
    out.push({ row: cell.row, q: series.gibbsFunction });
  }
  return out;
}

export function quantityOf(series: Series, quantity: NumberQuantity): SeriesQuantity | null {
  if (quantity === 'entropy') return series.entropy;
  if (quantity === 'enthalpy-increment' || quantity === 'enthalpy') return series.enthalpyIncrement ?? series.enthalpy;
  if (quantity === 'gibbs-function') return series.gibbsFunction;
  return series.heatCapacity;
}

function cellValue(series: Series, at: { row: number; quantity: NumberQuantity }): number {
  return (quantityOf(series, at.quantity) as SeriesQuantity).values[at.row];
}

function isMaterial(cell: SuspectCell, policy: Policy): boolean {
  const size = Math.abs(cell.observed - cell.proposed);
  if (cell.quantity === 'heat-capacity') return size >= policy.material.heatCapacityRelative * Math.abs(cell.proposed);
  if (cell.quantity === 'enthalpy-increment' || cell.quantity === 'enthalpy')
    return size >= policy.material.enthalpyJPerMol;
  return size >= materialS(policy, cell.proposed);
}

function suspectOf(
  finding: string,
  substance: string,
  series: Series,
  cell: Omit<SuspectCell, 'rivals' | 'pattern'>,
  place: number,
  group: number,
): Suspect {
  const q = quantityOf(series, cell.quantity) as SeriesQuantity;
  const rounding = q.halfUnit[cell.row] / Math.sqrt(3);
  const u = Math.hypot(q.uOwn[cell.row], rounding);
  // r = u^2 / (u^2 + u_proposed^2): what share of an error of this cell shows in its residual.
  const redundancy = (u * u) / Math.max(u * u, cell.uProposed * cell.uProposed);
  return {
    finding,
    substance,
    place,
    group,
    cells: 1,
    address: addressOf(series, cell.row, q.column),
    printed: series.text(cell.row, q.column),
    observed: cell.observed,
    unit: QUANTITY_UNITS[q.is],
    normalisedResidual: cell.w,
    redundancy,
    proposed: cell.proposed,
    uProposed: cell.uProposed,
    proposedPrinted: proposedPrinted(series.text(cell.row, q.column), cell.observed, cell.proposed),
    smallestDetectable: NON_CENTRALITY * cell.uProposed,
    explanation: null,
    explainedPrinted: null,
    toldApartBy: null,
  };
}

/** By proportion, since a series carries no factor of its unit; empty where the cell cannot be read so. */
function proposedPrinted(printed: string, observed: number, proposed: number): string {
  const number = printedNumber(printed);
  if (!Number.isFinite(number) || observed === 0 || number === 0) return '';
  return printedLike(printed, (proposed * number) / observed);
}
