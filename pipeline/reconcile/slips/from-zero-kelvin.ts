/** An enthalpy counted from 0 K where 298.15 K is meant, or the reverse: off by H(Tr) - H(0) of the phase. */
import { isEnthalpy } from './quantity-kinds.js';
import { movedBy } from './ratio.js';
import type { Slip } from './slip.js';

/** Shares of: counted from 0 K, and too low by as much. A formation enthalpy at 0 K may be off either way. */
const INCREMENT = [0.8, 0.2] as const;
const FORMATION = [0.5, 0.5] as const;

export const countedFromZeroKelvin: Slip = {
  code: 'counted-from-zero-kelvin',
  weight: 0.03,
  propose: (cell) => {
    const { quantity, enthalpiesFromZero: steps = [] } = cell;
    if (!isEnthalpy(quantity) || quantity === 'transition-enthalpy' || quantity === 'enthalpy-from-zero') return [];
    const [down, up] = quantity === 'enthalpy-of-formation' ? FORMATION : INCREMENT;
    return steps.flatMap((step) => [
      movedBy(cell, step, -1, down / steps.length),
      movedBy(cell, step, 1, up / steps.length),
    ]);
  },
};
