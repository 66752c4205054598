/** Bar or atmospheres and another unit of pressure exchanged; the two differ by 1.3 %, which few data tell apart. */
import { STANDARD_ATMOSPHERE_PA } from '../../core/constants.js';
import { isPressure } from './quantity-kinds.js';
import { readAs } from './ratio.js';
import type { Slip, SuspectCell } from './slip.js';

const UNITS_PA = [1e5, STANDARD_ATMOSPHERE_PA] as const;

/** The cell holds bar or atmospheres where pascal or torr are declared, or the one of them where the other is. */
export const barReadAsPascal: Slip = {
  code: 'bar-or-atmosphere-read-as-pascal',
  weight: 0.04,
  propose: (cell) =>
    isPressure(cell.quantity)
      ? UNITS_PA.filter((unitPa) => !isIn(cell, unitPa)).map((unitPa) => readAs(cell, unitPa, 0, 0.5))
      : [],
};

/** The cell holds pascal or kilopascal where bar or atmospheres are declared. */
export const pascalReadAsBar: Slip = {
  code: 'pascal-read-as-bar-or-atmosphere',
  weight: 0.03,
  propose: (cell) =>
    isPressure(cell.quantity) && UNITS_PA.some((unitPa) => isIn(cell, unitPa))
      ? [readAs(cell, 1, 0, 0.5), readAs(cell, 1000, 0, 0.5)]
      : [],
};

const isIn = (cell: SuspectCell, unitPa: number): boolean => Math.abs(cell.factor / unitPa - 1) < 1e-9;
