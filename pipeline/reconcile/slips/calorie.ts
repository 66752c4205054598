/** Calorie and joule exchanged, the thermochemical calorie or that of the International Table. */
import { INTERNATIONAL_TABLE_CALORIE, THERMOCHEMICAL_CALORIE } from '../../core/constants.js';
import { isEnergetic } from './quantity-kinds.js';
import { times } from './ratio.js';
import type { Slip } from './slip.js';

/** [J per calorie, share]: tables of pure substances are mostly in thermochemical calories. */
const CALORIES = [
  [THERMOCHEMICAL_CALORIE.value, 0.85],
  [INTERNATIONAL_TABLE_CALORIE.value, 0.15],
] as const;

/** The cell holds calories where joules are declared. */
export const calorieReadAsJoule: Slip = {
  code: 'calorie-read-as-joule',
  weight: 0.05,
  propose: (cell) => (isEnergetic(cell.quantity) ? CALORIES.map(([joules, share]) => times(cell, joules, share)) : []),
};

/** The cell holds joules where calories are declared, or was converted twice. */
export const jouleReadAsCalorie: Slip = {
  code: 'joule-read-as-calorie',
  weight: 0.03,
  propose: (cell) =>
    isEnergetic(cell.quantity) ? CALORIES.map(([joules, share]) => times(cell, 1 / joules, share)) : [],
};
