import { type NumberQuantity, QUANTITY_UNITS } from '../../schemas/quantities.js';
import type { ColumnMeaning, TableMeaning } from '../../schemas/table-meaning.js';
import { conversionTo, differenceTo } from '../core/units/ucum.js';
import { figure } from '../report/report.js';
import { table } from './text.js';

/** What one declared column means in SI: how `check` shows each descriptor's units before they can do harm. */
export interface DeclaredUnit {
  readonly source: string;
  readonly file: string;
  readonly column: string;
  readonly is: string;
  readonly unit: string;
  readonly siUnit: string;
  /** `× 4.184`, `× 4.184 M` (molar mass in g/mol), `+ 273.15`; or why it cannot be converted. */
  readonly conversion: string;
}

/** Every column of every table that has a unit, once a source and header. */
export function declaredUnits(tables: readonly TableMeaning[]): DeclaredUnit[] {
  const seen = new Map<string, DeclaredUnit>();
  for (const { source, file, columns } of tables) {
    for (const column of columns) {
      const quantity = quantityOf(column);
      if (quantity === null || column.unit === null) continue;
      const key = [source, column.header, column.is, quantity, column.unit, column.per].join('\u0000');
      if (seen.has(key)) continue;
      seen.set(key, {
        source,
        file,
        column: column.header,
        is: column.is === 'uncertainty' ? `u(${quantity})` : quantity,
        unit: column.unit,
        siUnit: QUANTITY_UNITS[quantity],
        conversion: conversionInWords(column, quantity, column.unit),
      });
    }
  }
  return [...seen.values()];
}

export function declaredUnitLines(units: readonly DeclaredUnit[]): string[] {
  return table(
    units.map(({ source, column, is, unit, siUnit, conversion }) => [source, column, is, unit, conversion, siUnit]),
  );
}

function quantityOf({ is, of }: ColumnMeaning): NumberQuantity | null {
  if (is === 'uncertainty') return of;
  return is in QUANTITY_UNITS ? (is as NumberQuantity) : null;
}

function conversionInWords(column: ColumnMeaning, quantity: NumberQuantity, unit: string): string {
  const convert = column.is === 'uncertainty' ? differenceTo : conversionTo;
  const ask = (molarMassGPerMol: number, atomsPerFormula: number) =>
    convert(QUANTITY_UNITS[quantity], unit, { molarMassGPerMol, atomsPerFormula, per: column.per });
  const one = ask(1, 1);
  if (!one.ok) return one.fault;
  const heavier = ask(2, 1);
  const larger = ask(1, 2);
  const by =
    heavier.ok && heavier.factor !== one.factor ? ' M' : larger.ok && larger.factor !== one.factor ? ' atoms' : '';
  const sign = one.offset < 0 ? '−' : '+';
  const plus = one.offset === 0 ? '' : ` ${sign} ${figure(Math.abs(one.offset))}`;
  return `× ${figure(one.factor)}${by}${plus}`;
}
