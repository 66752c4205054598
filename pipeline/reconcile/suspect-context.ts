/** A suspect cell with what stands around it in its substance: what the usual slips may draw on. */
import type { Suspect } from '../../schemas/finding.js';
import type { Datum, HarmonisedCase, Series, SeriesQuantity } from '../../schemas/harmonised.js';
import { QUANTITY_UNITS } from '../../schemas/quantities.js';
import type { TableMeaning } from '../../schemas/table-meaning.js';
import { printedNumber } from '../core/numeric/printed-like.js';
import { conversionTo } from '../core/units/ucum.js';
import { knownSteps } from './known-steps.js';
import { possibleRange } from './possible-range.js';
import type { PrintedCell, SuspectContext } from './slips/slip.js';
import { statedCells } from './stated-cells.js';

type Addressed = Pick<Suspect, 'address'>;

/** null where the address is that of no number that was read. */
export function suspectContext(substance: HarmonisedCase, suspect: Addressed): SuspectContext | null {
  return tableContext(substance, suspect) ?? datumContext(substance, suspect);
}

function tableContext(substance: HarmonisedCase, { address }: Addressed): SuspectContext | null {
  for (const series of substance.series) {
    if (series.table.source !== address.source || series.table.file !== address.file) continue;
    const row = series.line.indexOf(address.line);
    const q = row < 0 ? null : quantityAt(series, address.column);
    if (q === null || q.present[row] === 0) continue;
    const above = row > 0 && q.present[row - 1] === 1 ? row - 1 : -1;
    const printed = series.text(row, q.column);
    const observed = q.values[row];
    return {
      quantity: q.is,
      printed,
      observed,
      ...unitOf(series.table, q, substance, printed, observed),
      molarMassGPerMol: substance.substance.molarMassGPerMol,
      temperatureK: series.temperatureK[row],
      rowAbove: above < 0 ? null : { printed: series.text(above, q.column), observed: q.values[above] },
      partner: null,
      gas: series.phase.startsWith('g'),
      temperatureScale: series.table.temperatureScale,
      possible: possibleRange(q.is, series.table),
      ...knownSteps(substance, { phase: series.phase, source: series.table.source }),
    };
  }
  return null;
}

function quantityAt(
  series: Series,
  column: string,
): Pick<SeriesQuantity, 'is' | 'column' | 'values' | 'present'> | null {
  const { columns } = series.table;
  for (const q of [
    series.heatCapacity,
    series.entropy,
    series.enthalpyIncrement,
    series.gibbsFunction,
    series.enthalpy,
    series.gibbsEnergy,
  ]) {
    if (q !== null && columns[q.column]?.header === column) return q;
  }
  if (columns[series.temperatureColumn]?.header !== column) return null;
  const present = new Uint8Array(series.rows).fill(1);
  return { is: 'temperature', column: series.temperatureColumn, values: series.temperatureK, present };
}

/** The unit's factor and offset; as the cell itself shows them where the unit alone does not tell. */
function unitOf(
  table: TableMeaning,
  { is, column }: Pick<SeriesQuantity, 'is' | 'column'>,
  { substance }: HarmonisedCase,
  printed: string,
  observed: number,
): Pick<SuspectContext, 'unit' | 'factor' | 'offset'> {
  const { unit, per } = table.columns[column];
  const known = conversionTo(QUANTITY_UNITS[is], unit ?? '', { ...substance, per });
  if (known.ok) return { unit: unit ?? '', factor: known.factor, offset: known.offset };
  const number = printedNumber(printed);
  return { unit: unit ?? '', factor: Number.isFinite(number) && number !== 0 ? observed / number : 1, offset: 0 };
}

function datumContext(substance: HarmonisedCase, { address }: Addressed): SuspectContext | null {
  const all = statedCells(substance);
  const stated = all.find(({ datum }) => isAt(datum, address));
  if (stated === undefined) return null;
  const { quantity, datum, partner, temperatureK, phases, table, transition } = stated;
  const above = all.find(
    (other) => other.quantity === quantity && isAt(other.datum, { ...address, line: address.line - 1 }),
  );
  return {
    quantity,
    printed: datum.printed,
    observed: datum.value,
    factor: datum.factor,
    offset: datum.offset,
    unit: datum.unit,
    molarMassGPerMol: substance.substance.molarMassGPerMol,
    temperatureK,
    rowAbove: above === undefined ? null : cellOf(above.datum),
    partner: partner === null ? null : cellOf(partner),
    gas: phases[phases.length - 1].startsWith('g'),
    transition,
    temperatureScale: table.temperatureScale,
    possible: possibleRange(quantity, table),
    ...knownSteps(substance, { phase: phases[phases.length - 1], source: table.source, transition }),
  };
}

function cellOf({ printed, value }: Datum): PrintedCell {
  return { printed, observed: value };
}

function isAt({ address: a }: Datum, b: Suspect['address']): boolean {
  return a.source === b.source && a.file === b.file && a.line === b.line && a.column === b.column;
}
