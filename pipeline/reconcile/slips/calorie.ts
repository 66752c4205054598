/** Calorie and joule exchanged, the thermochemical calorie or that of the International Table. */
import { CALORIES_J } from '../../core/units/calories.js';
import { isInCalories } from './column-unit.js';
import { isEnergetic } from './quantity-kinds.js';
import { times } from './ratio.js';
import type { Candidate, Slip, SuspectCell } from './slip.js';

/** Where the column is not declared so, the number was converted twice; that is as much more seldom. */
const TWICE = 0.15;

/** The cell holds calories where joules are declared. */
export const calorieReadAsJoule: Slip = {
  code: 'calorie-read-as-joule',
  weight: 0.05,
  propose: (cell) => proposed(cell, isInCalories(cell) ? TWICE : 1, (joules) => joules),
};

/** The cell holds joules where calories are declared, or calories became joules twice. */
export const jouleReadAsCalorie: Slip = {
  code: 'joule-read-as-calorie',
  weight: 0.05,
  propose: (cell) => proposed(cell, isInCalories(cell) ? 1 : TWICE, (joules) => 1 / joules),
};

function proposed(cell: SuspectCell, part: number, ratio: (joules: number) => number): Candidate[] {
  if (!isEnergetic(cell.quantity)) return [];
  return CALORIES_J.map(([joules, share]) => times(cell, ratio(joules), part * share));
}
