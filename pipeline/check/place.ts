import type { EvidenceCell, EvidenceKind, Outcome, OutcomeKind, RuleName } from '../../schemas/finding.js';
import type { Address, Series } from '../../schemas/harmonised.js';
import type { TableMeaning } from '../../schemas/table-meaning.js';

/** An outcome with nothing missing and no smallest detectable error unless given. */
export function outcome(
  substance: string,
  rule: RuleName,
  place: string,
  kind: OutcomeKind,
  evidence: EvidenceKind | null,
  more: { readonly missing?: string | null; readonly smallestDetectable?: number | null } = {},
): Outcome {
  return {
    substance,
    rule,
    place,
    outcome: kind,
    evidence: kind === 'untestable' ? null : evidence,
    missing: more.missing ?? null,
    smallestDetectable: more.smallestDetectable ?? null,
  };
}

/** Where a series' outcomes stand in the coverage: its phase, and the isobar of a real fluid's table. */
export function placeOf(series: Series): string {
  const { isobarPa } = series.table;
  return isobarPa === null ? series.phase : `${series.phase} at ${isobarPa} Pa`;
}

export function addressOf(series: Series, row: number, column: number): Address {
  return {
    source: series.table.source,
    file: series.table.file,
    line: series.line[row],
    column: series.table.columns[column]?.header ?? '',
  };
}

export function evidenceOf(series: Series, row: number, column: number): EvidenceCell {
  return { ...addressOf(series, row, column), printed: series.text(row, column) };
}

/** One evaluated source against itself is arithmetic; separate measurements are independent. */
export function kindOf(tables: readonly TableMeaning[]): EvidenceKind {
  const first = tables[0];
  const one = tables.every((t) => t.source === first.source || related(t, first));
  return one && tables.every((t) => t.basis !== 'measured') ? 'arithmetic' : 'independent';
}

function related(a: TableMeaning, b: TableMeaning): boolean {
  return a.restsOn.includes(b.source) || b.restsOn.includes(a.source);
}
