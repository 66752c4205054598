/** One series to SI, molar, ITS-90 and the standard pressure of 1 bar; its reference temperature comes later. */
import type { Finding } from '../../schemas/finding.js';
import type { Policy } from '../../schemas/policy.js';
import type { NumberQuantity } from '../../schemas/quantities.js';
import { NO_CELL, type RawColumn, type RawSeries } from '../../schemas/raw.js';
import { constant, numbers, ones } from '../core/numeric/room.js';
import { type Draft, type DraftQuantity, writable } from './draft.js';
import { isGas, standardPressureTerm } from './gas-pressure.js';
import { readingFinding } from './reading-finding.js';
import { halfUnitOf, halfUnits } from './rounding.js';
import { followScale, scaledTemperatures } from './scale.js';
import { seriesUncertainty } from './uncertainty.js';
import { FROM_DESCRIPTOR, type UnitBook } from './unit-book.js';
import { withTemperatures } from './with-temperatures.js';

/** Null where no temperatures can be had; a column whose unit is refused is left out. Both are said in `findings`. */
export function draftSeries(
  given: RawSeries,
  substance: string,
  book: UnitBook,
  policy: Policy,
  findings: Finding[],
): Draft | null {
  const temperature = given.columns.find((column) => column.is === 'temperature');
  if (temperature === undefined) {
    findings.push(
      readingFinding({
        substance,
        table: given.table,
        problem: 'required-missing',
        read: 'A temperature column',
        wanted: 'a column that `is` "temperature"',
        remedy: 'Name it in the descriptor; nothing of this table is used until then.',
        line: 0,
        column: '',
        fromPhase: given.phase,
      }),
    );
    return null;
  }
  const conversion = book.conversion(given.table, temperature.column, 'temperature');
  if (conversion === null) return null;
  const raw = withTemperatures(given, temperature, substance, findings);
  const column = raw === given ? temperature : raw.columns[given.columns.indexOf(temperature)];
  const { temperatureK, printedK, slope, scaleDoubtK } = scaledTemperatures(
    raw,
    column.values,
    conversion,
    substance,
    findings,
  );

  const quantities: Partial<Record<NumberQuantity, DraftQuantity>> = {};
  for (const entry of raw.columns) {
    if (entry.is === 'temperature' || quantities[entry.is] !== undefined) continue;
    const quantity = draftQuantity(raw, entry, book, policy);
    if (quantity !== null) quantities[entry.is] = quantity;
  }
  const heatCapacityColumn = quantities['heat-capacity']?.column ?? FROM_DESCRIPTOR;
  const draft: Draft = {
    raw,
    rank: raw.table.columns[heatCapacityColumn]?.rank ?? raw.table.rank,
    temperatureK,
    scaleDoubtK,
    temperatureHalfUnitK: temperatureHalfUnit(raw, column, conversion.factor),
    temperatureColumn: column.column,
    quantities,
  };
  if (printedK !== null && slope !== null) followScale(draft, printedK, slope);
  if (isGas(raw.phase)) toStandardPressure(draft);
  return draft;
}

function draftQuantity(raw: RawSeries, column: RawColumn, book: UnitBook, policy: Policy): DraftQuantity | null {
  const conversion = book.conversion(raw.table, column.column, column.is);
  if (conversion === null) return null;
  const { factor, offset } = conversion;
  const { decimals, is } = column;
  const present = presence(decimals);
  let values = column.values;
  const owned = factor !== 1 || offset !== 0;
  if (owned) {
    values = numbers(raw.rows);
    for (let i = 0; i < raw.rows; i++) if (present[i] === 1) values[i] = column.values[i] * factor + offset;
  }
  const halfUnit =
    column.column === FROM_DESCRIPTOR
      ? constant(raw.rows, 0)
      : halfUnits(column.values, decimals, column.usualDecimals, factor);
  const { uOwn, uSharedRelative, origin } = seriesUncertainty(
    raw,
    is,
    column.column,
    values,
    present,
    factor,
    book,
    policy,
  );
  return { is, column: column.column, values, owned, present, halfUnit, uOwn, uSharedRelative, origin };
}

function presence(decimals: Int8Array): Uint8Array {
  if (decimals.indexOf(NO_CELL) < 0) return ones(decimals.length);
  const present = new Uint8Array(decimals.length);
  for (let i = 0; i < present.length; i++) present[i] = decimals[i] === NO_CELL ? 0 : 1;
  return present;
}

/** The temperatures of an evaluated or computed table are chosen, not measured: they have no last place. */
function temperatureHalfUnit(raw: RawSeries, column: RawColumn, factor: number): number {
  const chosen = raw.table.basis === 'evaluated' || raw.table.basis === 'computed';
  return chosen || column.column === FROM_DESCRIPTOR ? 0 : halfUnitOf(column.usualDecimals, factor);
}

/** Tables on a stated isobar hold the real gas at that pressure and stay as they are; so does a row at 0 K, a limit. */
function toStandardPressure(draft: Draft): void {
  const { table } = draft.raw;
  const term = table.isobarPa === null ? standardPressureTerm(table.standardPressurePa) : 0;
  if (term === 0) return;
  const temperature = draft.temperatureK;
  for (const is of ['entropy', 'gibbs-function', 'gibbs-energy'] as const) {
    const quantity = draft.quantities[is];
    if (quantity === undefined) continue;
    const values = writable(quantity);
    for (let i = 0; i < values.length; i++) {
      if (quantity.present[i] === 0 || temperature[i] === 0) continue;
      values[i] += is === 'gibbs-energy' ? -temperature[i] * term : term;
    }
  }
}
