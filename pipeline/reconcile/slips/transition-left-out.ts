/** A transition left out: its entropy, or its enthalpy, is lacking; more seldom it is counted in where it should not be. */
import { isEnthalpy, isEntropy } from './quantity-kinds.js';
import { movedBy } from './ratio.js';
import type { Slip } from './slip.js';

const LEFT_OUT = 0.7;

export const transitionLeftOut: Slip = {
  code: 'transition-left-out',
  weight: 0.04,
  propose: (cell) => {
    const { quantity, transitionEntropies = [], transitionEnthalpies = [] } = cell;
    const steps = isEntropy(quantity) ? transitionEntropies : isEnthalpy(quantity) ? transitionEnthalpies : [];
    return steps.flatMap((step) => [
      movedBy(cell, step, 1, LEFT_OUT / steps.length),
      movedBy(cell, step, -1, (1 - LEFT_OUT) / steps.length),
    ]);
  },
};
