/** A gas entropy at 1 atm where one at 1 bar is meant, or the reverse: S(1 bar) = S(1 atm) + R ln 1.01325. */
import { R_J_PER_MOL_K, STANDARD_ATMOSPHERE_PA, STANDARD_PRESSURE_PA } from '../../core/constants.js';
import { isEntropy } from './quantity-kinds.js';
import { plus } from './ratio.js';
import type { Slip } from './slip.js';

/** 0.1094 J/(mol K). */
const STEP_J_PER_MOL_K = R_J_PER_MOL_K * Math.log(STANDARD_ATMOSPHERE_PA / STANDARD_PRESSURE_PA);

export const atmosphereForBar: Slip = {
  code: 'atmosphere-for-bar',
  weight: 0.05,
  propose: (cell) => {
    if (!cell.gas || !isEntropy(cell.quantity)) return [];
    const change = STEP_J_PER_MOL_K / cell.factor;
    return [plus(cell, change, 0.7), plus(cell, -change, 0.3)];
  },
};
