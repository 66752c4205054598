/** What a column's declared unit counts by. */
import { INTERNATIONAL_TABLE_CALORIE, THERMOCHEMICAL_CALORIE } from '../../core/constants.js';
import { readUnit } from '../../core/units/expression.js';
import type { SuspectCell } from './slip.js';

/** Per gram or kilogram (or pound): the molar mass stands in its factor. */
export function isPerMass({ unit, molarMassGPerMol }: SuspectCell): boolean {
  if (!(molarMassGPerMol > 0)) return false;
  const reading = readUnit(unit);
  if (!('parts' in reading)) return false;
  const { moles, atoms } = reading.parts;
  return moles === 0 && !atoms.has('eV') && !atoms.has('[k]');
}

/** Joules of one calorie where the unit is in calories, 1 where it is in joules. */
export function joulesOfUnit({ unit }: SuspectCell): number {
  if (!unit.includes('cal')) return 1;
  return unit.includes('cal_IT') ? INTERNATIONAL_TABLE_CALORIE.value : THERMOCHEMICAL_CALORIE.value;
}

export const isInCalories = (cell: SuspectCell): boolean => cell.unit.includes('cal');

/** Kilojoules or kilocalories per mole. */
export function isKiloPerMole(cell: SuspectCell): boolean {
  return !isPerMass(cell) && Math.abs(cell.factor / joulesOfUnit(cell) - 1000) < 1e-6;
}

/** Joules or calories per mole, without kilo. */
export function isPlainPerMole(cell: SuspectCell): boolean {
  return !isPerMass(cell) && Math.abs(cell.factor / joulesOfUnit(cell) - 1) < 1e-6;
}
