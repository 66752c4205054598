/** Vapour pressures over a condensed phase: Pa, their temperatures on ITS-90. */
import type { EvidenceCell, Finding } from '../../schemas/finding.js';
import type { VapourPressure } from '../../schemas/harmonised.js';
import type { Policy } from '../../schemas/policy.js';
import type { RawRow } from '../../schemas/raw.js';
import type { TableMeaning } from '../../schemas/table-meaning.js';
import { datumOf } from './datum.js';
import { datumOnIts90, publishedRange } from './datum-on-its90.js';
import { pressurePlaces } from './pressure-places.js';
import { readingFinding } from './reading-finding.js';
import type { UnitBook } from './unit-book.js';

/** In the order of the rows. Rows of a column whose unit is refused are left out; that is said once in `findings`. */
export function harmoniseVapourPressures(
  rows: readonly RawRow[],
  substance: string,
  book: UnitBook,
  policy: Policy,
  findings: Finding[],
): VapourPressure[] {
  const made: VapourPressure[] = [];
  const unconverted = new Map<string, Unconverted>();
  for (const row of withPressurePlaces(rows)) {
    const { table } = row;
    const { phase } = row.words;
    const printed = datumOf(row, 'temperature', book, policy);
    const pressure = datumOf(row, 'pressure', book, policy);
    if (phase === undefined || printed === null || pressure === null) continue;
    const { datum: temperature, doubtK } = datumOnIts90(printed, table.temperatureScale);
    if (doubtK !== null) {
      const key = [table.source, table.table, table.file, phase].join('\n');
      const known = unconverted.get(key) ?? { table, phase, atK: printed.value, doubtK, cells: [] };
      known.cells.push({ ...printed.address, printed: printed.printed });
      unconverted.set(key, { ...known, doubtK: Math.max(doubtK, known.doubtK) });
    }
    made.push({ table, phase, temperature, pressure });
  }
  for (const one of unconverted.values()) findings.push(leftOnItsScale(one, substance));
  return made;
}

/** Temperatures of one table and phase that stay on their scale: the first of them, the largest doubt, all cells. */
interface Unconverted {
  readonly table: TableMeaning;
  readonly phase: string;
  readonly atK: number;
  readonly doubtK: number;
  readonly cells: EvidenceCell[];
}

function leftOnItsScale({ table, phase, atK, doubtK, cells }: Unconverted, substance: string): Finding {
  const [first] = cells;
  return readingFinding({
    substance,
    table,
    problem: 'required-missing',
    severity: 'note',
    read: `A published difference between ${table.temperatureScale} and ITS-90 at ${atK} K`,
    wanted: publishedRange(table.temperatureScale),
    remedy: `Such temperatures stay as printed; what they may be off by, up to ${doubtK.toPrecision(2)} K, is in their uncertainty.`,
    line: first.line,
    column: first.column,
    fromPhase: phase,
    evidence: cells,
  });
}

/** The rows, each pressure with the last place that the pressures of its table tell. */
function withPressurePlaces(rows: readonly RawRow[]): RawRow[] {
  const places = new Map<RawRow, number>();
  for (const table of new Set(rows.map((row) => row.table))) {
    const own = rows.filter((row) => row.table === table && row.cells.pressure !== undefined);
    const found = pressurePlaces(own.flatMap(({ cells: { pressure } }) => pressure ?? []));
    for (const [i, row] of own.entries()) places.set(row, found[i]);
  }
  return rows.map((row) => {
    const { pressure } = row.cells;
    const usualDecimals = places.get(row);
    if (pressure === undefined || usualDecimals === undefined) return row;
    return { ...row, cells: { ...row.cells, pressure: { ...pressure, usualDecimals } } };
  });
}
