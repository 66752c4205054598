/** Degrees Fahrenheit and another scale exchanged. */
import { ICE_POINT_K } from '../../core/constants.js';
import { isTemperature } from './quantity-kinds.js';
import { readAs } from './ratio.js';
import type { Slip, SuspectCell } from './slip.js';

const DEGREE_K = 5 / 9;

/** The cell holds degrees Fahrenheit where kelvin or degrees Celsius are declared. */
export const fahrenheitNotConverted: Slip = {
  code: 'fahrenheit-not-converted',
  weight: 0.02,
  propose: (cell) =>
    isTemperature(cell.quantity) && !isFahrenheit(cell) ? [readAs(cell, DEGREE_K, ICE_POINT_K - 32 * DEGREE_K)] : [],
};

/** The cell holds kelvin or degrees Celsius where degrees Fahrenheit are declared. */
export const readAsFahrenheit: Slip = {
  code: 'read-as-fahrenheit',
  weight: 0.04,
  propose: (cell) =>
    isTemperature(cell.quantity) && isFahrenheit(cell)
      ? [readAs(cell, 1, ICE_POINT_K, 0.6), readAs(cell, 1, 0, 0.4)]
      : [],
};

function isFahrenheit(cell: SuspectCell): boolean {
  return Math.abs(cell.factor - DEGREE_K) < 1e-6;
}
