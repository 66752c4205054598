import { join } from 'node:path';
import type { ReconciledCase } from '../../schemas/checked.js';
import type { Finding, Suspect } from '../../schemas/finding.js';
import { type NumberQuantity, QUANTITY_UNITS } from '../../schemas/quantities.js';
import type { Substance } from '../../schemas/substances.js';
import type { ColumnMeaning } from '../../schemas/table-meaning.js';
import { printedNumber } from '../core/numeric/printed-like.js';
import { knownCodes } from '../core/units/known-codes.js';
import { conversionTo } from '../core/units/ucum.js';
import { sayExplanation, sayPlace } from '../report/report.js';
import { EXIT, Stop } from './exit-status.js';
import type { FoundFinding } from './find-finding.js';
import type { Library } from './library.js';

/**
 * An entry in corrections.json stands for one cell. Throws a `Stop` that says which declaration would put a suspect right
 * that is a whole column.
 */
export function refuseWholeColumn(found: FoundFinding, suspect: Suspect, sources: string): void {
  if (suspect.cells <= 1) return;
  const { finding, before, library } = found;
  const { address, cells, explanation } = suspect;
  const others = followers(before.findings, finding, suspect);
  const first = `${cells} cells, of which ${sayPlace(address)} is the first, are concerned by one law`;
  const because = explanation === null ? '' : ` (${sayExplanation(explanation)})`;
  const descriptor = join(sources, address.source, 'source.json');
  const remedies = [suspect, ...others.flatMap(({ id }) => before.suspects.find((one) => one.finding === id) ?? [])];
  const said = remedies.map((one) => remedy(one, before, library));
  throw new Stop(
    `${first}${because}: an entry in corrections.json stands for a single cell, so none is written.`,
    `${[...new Set(said)].join(' ')} The descriptor is ${descriptor}; what it says of a column holds for every row of its ` +
      'table. Rows that are not concerned need an entry of their own under "tables", parted by "where".',
    EXIT.nothing,
  );
}

/** Columns that went wrong by the same cause, where the suspect is that of the finding itself. */
function followers(findings: readonly Finding[], finding: Finding, suspect: Suspect): Finding[] {
  if (suspect.place !== 1) return [];
  const root = finding.cause ?? finding.id;
  return findings.filter(
    ({ id, cause, detail }) => id !== finding.id && (id === root || cause === root) && detail.code === 'column',
  );
}

function remedy(suspect: Suspect, { checked }: ReconciledCase, library: Library): string {
  const { address, explanation } = suspect;
  const column = columnAt(library, suspect);
  const name = `column "${address.column}" of ${address.file}`;
  const { substance } = checked.assembled.examined.harmonised;
  switch (explanation) {
    case 'atmosphere-for-bar':
      return (
        `If ${name} is at 1 atm, its table needs "standardPressure": { "value": 1, "unit": "atm" }; columns at 1 bar ` +
        'beside it need an entry of their own under "tables" for the same file.'
      );
    case 'counted-from-zero-kelvin':
      return (
        `If ${name} counts from 0 K, its table needs "from": 0; where -[G - H(Tr)]/T beside it counts from 298.15 K, that ` +
        'column needs an entry of its own under "tables" for the same file.'
      );
    case 'old-temperature-scale':
      return `The table of ${name} needs its own "temperatureScale".`;
    case 'other-formula-molar-mass':
      if (column !== null && isPerMass(column, substance))
        return `Compare the formula and the molar mass of ${substance.id} in substances.csv with what ${name} counts by.`;
      return `No declaration says that ${name} counts by another formula unit: convert it in a new file.`;
  }
  const unit = column === null ? null : unitThatFits(suspect, column, substance);
  if (column !== null && unit !== null) return `Give ${name} "unit": "${unit}" instead of "${column.unit}".`;
  return `No unit that can be declared puts ${name} right: compare its heading with the original, and convert it in a new file.`;
}

function columnAt({ parts }: Library, { address: { source, file, column } }: Suspect): ColumnMeaning | null {
  for (const { plan } of parts) {
    if (plan.meaning.source !== source || plan.file !== file) continue;
    const found = plan.meaning.columns.find(({ header }) => header === column);
    if (found !== undefined) return found;
  }
  return null;
}

/** The known code by which the printed number becomes the proposed value. */
function unitThatFits(suspect: Suspect, column: ColumnMeaning, substance: Substance): string | null {
  if (column.is in QUANTITY_UNITS === false || column.unit === null) return null;
  const target = QUANTITY_UNITS[column.is as NumberQuantity];
  const number = printedNumber(suspect.printed);
  const declared = conversionTo(target, column.unit, { ...substance, per: column.per });
  if (!Number.isFinite(number) || !declared.ok) return null;
  // A scale of temperature or a standard pressure may have moved the value after its unit was applied.
  const moved = suspect.observed - (number * declared.factor + declared.offset);
  let best: string | null = null;
  let nearest = Math.max(suspect.uProposed, 1e-5 * Math.max(Math.abs(suspect.proposed), Math.abs(suspect.observed)));
  for (const code of knownCodes(target)) {
    const one = conversionTo(target, code, { ...substance, per: column.per });
    if (!one.ok || code === column.unit) continue;
    const distance = Math.abs(number * one.factor + one.offset + moved - suspect.proposed);
    if (distance >= nearest) continue;
    nearest = distance;
    best = code;
  }
  return best;
}

function isPerMass(column: ColumnMeaning, substance: Substance): boolean {
  const target = QUANTITY_UNITS[column.is as NumberQuantity];
  const one = conversionTo(target, column.unit ?? '', { ...substance, per: column.per });
  const heavier = { ...substance, per: column.per, molarMassGPerMol: 2 * substance.molarMassGPerMol };
  const other = conversionTo(target, column.unit ?? '', heavier);
  return one.ok && other.ok && one.factor !== other.factor;
}
