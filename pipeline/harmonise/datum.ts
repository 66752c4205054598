/** One stated number of an anchor, a transition or a vapour pressure, in SI, with its uncertainty and its address. */
import type { Datum } from '../../schemas/harmonised.js';
import type { Policy } from '../../schemas/policy.js';
import type { NumberQuantity } from '../../schemas/quantities.js';
import { QUANTITY_UNITS } from '../../schemas/quantities.js';
import type { RawCell, RawRow } from '../../schemas/raw.js';
import { halfUnitOf } from './rounding.js';
import { originOf, type Part, partOf, policyPart, takesDefault } from './uncertainty.js';
import { FROM_DESCRIPTOR, type UnitBook } from './unit-book.js';

/**
 * Null where the row has no such cell or its unit is refused. The last place is as `lastPlace` says; a value from the descriptor's constants is exact. `u` is the stated or default one and the rounding in
 * quadrature; a formation quantity of exactly 0 is a definition and takes no default.
 */
export function datumOf(row: RawRow, quantity: NumberQuantity, book: UnitBook, policy: Policy): Datum | null {
  const cell = row.cells[quantity];
  if (cell === undefined) return null;
  const { table, line } = row;
  const conversion = book.conversion(table, cell.column, quantity);
  if (conversion === null) return null;
  const { factor, offset } = conversion;
  const value = cell.value * factor + offset;
  const constant = cell.column === FROM_DESCRIPTOR;
  const defined = cell.value === 0 && FORMATION.has(quantity);
  const halfUnit = constant || defined ? 0 : halfUnitOf(lastPlace(cell, quantity), factor);
  const uRounding = halfUnit / Math.sqrt(3);
  const { parts, origin } = statedParts(row, cell, quantity, factor, book, policy);
  let variance = uRounding ** 2;
  for (const part of parts) variance += (part.relative * value) ** 2 + part.absolute ** 2;
  return {
    value,
    u: Math.sqrt(variance),
    uBeside: beside(quantity, value, Math.sqrt(variance), origin, constant || defined, policy),
    uRounding,
    halfUnit,
    origin,
    address: {
      source: table.source,
      file: table.file,
      line: constant ? 0 : line,
      column: constant ? quantity : table.columns[cell.column].header,
    },
    printed: cell.printed,
    unit: (constant ? null : table.columns[cell.column].unit) ?? QUANTITY_UNITS[quantity],
    factor,
    offset,
  };
}

/** A number whose digits alone speak is known no better than a measured one, as soon as it stands beside another source's. */
function beside(
  quantity: NumberQuantity,
  value: number,
  u: number,
  origin: Datum['origin'],
  exact: boolean,
  policy: Policy,
): number | undefined {
  if (exact || origin !== 'printed digits') return undefined;
  const { relative, absolute } = policyPart(policy, quantity);
  return Math.hypot(u, relative * value, absolute);
}

/** Zero of a formation quantity is a definition. */
const FORMATION: ReadonlySet<NumberQuantity> = new Set(['enthalpy-of-formation', 'gibbs-energy-of-formation']);

/**
 * Decimals of a single cell: its own, or the column's usual ones where it leaves zeros at its end out ("0." is not zero
 * decimals). A temperature that leaves out two or more is a coarser one: 1184 among 600.60 is known to a kelvin.
 */
function lastPlace({ value, decimals, usualDecimals }: RawCell, quantity: NumberQuantity): number {
  if (value === 0) return usualDecimals;
  const temperature = quantity === 'transition-temperature' || quantity === 'temperature';
  if (temperature && decimals < usualDecimals - 1) return decimals;
  return Math.max(decimals, usualDecimals);
}

/** `datum` moved by `shift`, with a further standard uncertainty for the move; its rounding stays. */
export function moved(datum: Datum, shift: number, uShift = 0): Datum {
  return {
    ...datum,
    value: datum.value + shift,
    offset: datum.offset + shift,
    u: uShift === 0 ? datum.u : Math.hypot(datum.u, uShift),
    uBeside: datum.uBeside === undefined ? undefined : Math.hypot(datum.uBeside, uShift),
  };
}

function statedParts(
  row: RawRow,
  cell: RawCell,
  quantity: NumberQuantity,
  factor: number,
  book: UnitBook,
  policy: Policy,
): { readonly parts: readonly Part[]; readonly origin: Datum['origin'] } {
  const { table } = row;
  const declared = cell.column === FROM_DESCRIPTOR ? [] : table.columns[cell.column].uncertainty;
  const parts = declared.map((entry) => partOf(entry, factor));
  if (cell.uncertainty !== null) {
    const column = table.columns.findIndex((entry) => entry.is === 'uncertainty' && entry.of === quantity);
    const scale = column < 0 ? null : book.uncertainty(table, column, quantity, cell.column);
    if (scale !== null) {
      const u = (cell.uncertainty * scale.factor) / table.columns[column].coverage;
      const shared = declared.filter((entry) => entry.shared).map((entry) => partOf(entry, factor));
      return {
        parts: [scale.relative ? { relative: u, absolute: 0 } : { relative: 0, absolute: u }, ...shared],
        origin: 'stated',
      };
    }
  }
  if (parts.length === 0 && takesDefault(table.basis)) {
    const defined =
      cell.value === 0 && (quantity === 'enthalpy-of-formation' || quantity === 'gibbs-energy-of-formation');
    if (!defined && cell.column !== FROM_DESCRIPTOR) {
      return { parts: [policyPart(policy, quantity)], origin: 'policy default' };
    }
    return { parts: [], origin: 'printed digits' };
  }
  return { parts, origin: originOf(false, declared.length > 0, table) };
}
