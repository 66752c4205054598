/**
 * The decimal logarithm taken for the natural one, or the reverse. What is proportional to a logarithm (an entropy from
 * Cp over lg T, a Gibbs energy from lg K, an enthalpy from the slope of lg p) is off by ln 10; a pressure is off by that power.
 */
import { isEntropy, isGibbsEnergy, isPressure } from './quantity-kinds.js';
import { times } from './ratio.js';
import type { Candidate, Slip, SuspectCell } from './slip.js';

const MORE_USUAL = 0.6;

export const log10TakenForLn: Slip = {
  code: 'log10-taken-for-ln',
  weight: 0.02,
  propose: (cell) => {
    if (isPressure(cell.quantity))
      return [raised(cell, Math.LN10, MORE_USUAL), raised(cell, Math.LOG10E, 1 - MORE_USUAL)];
    const proportional =
      isEntropy(cell.quantity) || isGibbsEnergy(cell.quantity) || cell.quantity === 'transition-enthalpy';
    return proportional ? [times(cell, Math.LN10, MORE_USUAL), times(cell, Math.LOG10E, 1 - MORE_USUAL)] : [];
  },
};

function raised(cell: SuspectCell, power: number, share: number): Candidate {
  const value = cell.value ** power;
  return { value, step: Math.abs((cell.lastPlace * power * value) / cell.value), share };
}
