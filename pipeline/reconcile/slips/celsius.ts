/** Celsius read as kelvin, and the reverse. */
import { ICE_POINT_K } from '../../core/constants.js';
import { isTemperature } from './quantity-kinds.js';
import { plus } from './ratio.js';
import type { Candidate, Slip, SuspectCell } from './slip.js';

/** The cell holds degrees Celsius where kelvin are declared. */
export const celsiusReadAsKelvin: Slip = {
  code: 'celsius-read-as-kelvin',
  weight: 0.06,
  propose: (cell) => moved(cell, ICE_POINT_K),
};

/** The cell holds kelvin where degrees Celsius are declared, or 273.15 was added twice. */
export const kelvinReadAsCelsius: Slip = {
  code: 'kelvin-read-as-celsius',
  weight: 0.04,
  propose: (cell) => moved(cell, -ICE_POINT_K),
};

/** Between kelvin and degrees Celsius a column's unit does not matter: either way the number is off by 273.15. */
function moved(cell: SuspectCell, change: number): readonly Candidate[] {
  return isTemperature(cell.quantity) && cell.factor === 1 ? [plus(cell, change)] : [];
}
