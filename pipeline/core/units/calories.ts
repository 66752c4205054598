import { INTERNATIONAL_TABLE_CALORIE, THERMOCHEMICAL_CALORIE } from '../constants.js';

/** [J per calorie, share]: tables of pure substances are mostly in thermochemical calories; the shares are judgement. */
export const CALORIES_J = [
  [THERMOCHEMICAL_CALORIE.value, 0.85],
  [INTERNATIONAL_TABLE_CALORIE.value, 0.15],
] as const;
