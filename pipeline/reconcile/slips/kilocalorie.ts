/** Calorie and joule exchanged and the prefix kilo beside: kilocalories in a column of joules, and its fellows. */
import { CALORIES_J } from '../../core/units/calories.js';
import { isInCalories, isKiloPerMole, isPlainPerMole } from './column-unit.js';
import { isEnergetic, isPerKelvin } from './quantity-kinds.js';
import { times } from './ratio.js';
import type { Slip, SuspectCell } from './slip.js';

/** The cell holds kilocalories where joules are declared. */
export const kilocalorieReadAsJoule: Slip = {
  code: 'kilocalorie-read-as-joule',
  weight: 0.015,
  propose: (cell) => proposed(cell, isPlainPerMole(cell) && !isInCalories(cell), (joules) => 1000 * joules),
};

/** The cell holds calories where kilojoules are declared. */
export const calorieReadAsKilojoule: Slip = {
  code: 'calorie-read-as-kilojoule',
  weight: 0.015,
  propose: (cell) => proposed(cell, isKiloPerMole(cell) && !isInCalories(cell), (joules) => joules / 1000),
};

/** The cell holds kilojoules where calories are declared. */
export const kilojouleReadAsCalorie: Slip = {
  code: 'kilojoule-read-as-calorie',
  weight: 0.015,
  propose: (cell) => proposed(cell, isPlainPerMole(cell) && isInCalories(cell), (joules) => 1000 / joules),
};

/** The cell holds joules where kilocalories are declared. */
export const jouleReadAsKilocalorie: Slip = {
  code: 'joule-read-as-kilocalorie',
  weight: 0.015,
  propose: (cell) => proposed(cell, isKiloPerMole(cell) && isInCalories(cell), (joules) => 1 / (1000 * joules)),
};

/** What is per kelvin is a few calories: nobody writes it in kilocalories. */
function proposed(cell: SuspectCell, declared: boolean, ratio: (joules: number) => number) {
  if (!declared || !isEnergetic(cell.quantity) || isPerKelvin(cell.quantity)) return [];
  return CALORIES_J.map(([joules, share]) => times(cell, ratio(joules), share));
}
