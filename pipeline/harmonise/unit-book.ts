/** The conversions of one substance's columns: each worked out once, each refusal reported once. */

import type { Finding } from '../../schemas/finding.js';
import { type NumberQuantity, QUANTITY_UNITS } from '../../schemas/quantities.js';
import type { Substance } from '../../schemas/substances.js';
import type { TableMeaning } from '../../schemas/table-meaning.js';
import { conversionTo, differenceTo, type LinearConversion, ratioOf, type UnitConversion } from '../core/units/ucum.js';
import { readingFinding } from './reading-finding.js';

/** Index of a value that the descriptor's `constants` give, already in SI. */
export const FROM_DESCRIPTOR = -1;

/** A printed uncertainty: a share of the value, or a difference in SI. */
export interface UncertaintyScale {
  readonly relative: boolean;
  readonly factor: number;
}

const AS_IT_IS: LinearConversion = { ok: true, factor: 1, offset: 0 };

export class UnitBook {
  private readonly values = new Map<TableMeaning, (LinearConversion | null | undefined)[]>();
  private readonly uncertainties = new Map<TableMeaning, (UncertaintyScale | null | undefined)[]>();

  constructor(
    private readonly substance: Substance,
    private readonly findings: Finding[],
  ) {}

  /** From the column's printed numbers to SI; null where the unit is refused (the finding is made then). */
  conversion(table: TableMeaning, column: number, quantity: NumberQuantity): LinearConversion | null {
    if (column === FROM_DESCRIPTOR) return AS_IT_IS;
    const known = rowOf(this.values, table);
    let conversion = known[column];
    if (conversion === undefined) {
      const meaning = table.columns[column];
      conversion = this.accept(
        table,
        column,
        conversionTo(QUANTITY_UNITS[quantity], meaning.unit ?? '', { ...this.substance, per: meaning.per }),
      );
      known[column] = conversion;
    }
    return conversion;
  }

  /** How an uncertainty column of `quantity` is read; without a unit of its own it is in that of `valueColumn`. */
  uncertainty(
    table: TableMeaning,
    column: number,
    quantity: NumberQuantity,
    valueColumn: number,
  ): UncertaintyScale | null {
    const known = rowOf(this.uncertainties, table);
    let scale = known[column];
    if (scale === undefined) {
      const meaning = table.columns[column];
      const shared = meaning.unit === null && valueColumn !== FROM_DESCRIPTOR ? table.columns[valueColumn] : meaning;
      const unit = shared.unit ?? (valueColumn === FROM_DESCRIPTOR ? QUANTITY_UNITS[quantity] : '');
      const ratio = ratioOf(unit);
      if (ratio !== null) {
        scale = { relative: true, factor: ratio };
      } else {
        const per = meaning.per ?? shared.per;
        const difference = this.accept(
          table,
          column,
          differenceTo(QUANTITY_UNITS[quantity], unit, { ...this.substance, per }),
        );
        scale = difference === null ? null : { relative: false, factor: Math.abs(difference.factor) };
      }
      known[column] = scale;
    }
    return scale;
  }

  private accept(table: TableMeaning, column: number, conversion: UnitConversion): LinearConversion | null {
    if (conversion.ok) return conversion;
    const { header, unit } = table.columns[column];
    this.findings.push(
      readingFinding({
        substance: this.substance.id,
        table,
        problem: conversion.problem,
        read: unit ?? '',
        wanted: conversion.wanted,
        remedy: `${conversion.remedy}, at column ${header} in the descriptor.`,
        line: 0,
        column: header,
      }),
    );
    return null;
  }
}

function rowOf<T>(map: Map<TableMeaning, T[]>, table: TableMeaning): T[] {
  let row = map.get(table);
  if (row === undefined) {
    row = [];
    map.set(table, row);
  }
  return row;
}
