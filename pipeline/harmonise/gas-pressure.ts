/** The standard pressure that a gas's entropy refers to. */
import { R_J_PER_MOL_K, STANDARD_PRESSURE_PA } from '../core/constants.js';

/** `g`, or `g` with a label. */
export function isGas(phase: string): boolean {
  return phase === 'g' || phase.startsWith('g-');
}

/** What S(gas) at the standard pressure p1 [Pa] lacks of S at 1 bar: R ln(p1/p0), 0.1094 J/(mol K) for 1 atm. */
export function standardPressureTerm(standardPressurePa: number): number {
  return R_J_PER_MOL_K * Math.log(standardPressurePa / STANDARD_PRESSURE_PA);
}
