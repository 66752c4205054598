/**
 * Formation enthalpies of two phases from different scales: this one is off by what lies between the scales, as another
 * phase or another source states it (the liquid counted from the crystal, two compilations with zeros of their own).
 */
import { movedBy } from './ratio.js';
import type { Slip } from './slip.js';

export const differentEnthalpyScales: Slip = {
  code: 'different-enthalpy-scales',
  weight: 0.03,
  propose: (cell) => {
    const { quantity, enthalpyScaleSteps: steps = [] } = cell;
    if (quantity !== 'enthalpy-of-formation' && quantity !== 'enthalpy') return [];
    const share = 1 / (2 * steps.length);
    return steps.flatMap((step) => [movedBy(cell, step, 1, share), movedBy(cell, step, -1, share)]);
  },
};
