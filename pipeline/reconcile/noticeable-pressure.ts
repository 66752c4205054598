import type { Policy } from '../../schemas/policy.js';
import { R_J_PER_MOL_K } from '../core/constants.js';

/** By Trouton's rule, of vapour over what boils normally [J/(mol K)]. */
const TROUTON_J_PER_MOL_K = 88;

/** The error of a vapour pressure that moves its temperature by what a user would notice: dp/p = (dS/R) dT/T [Pa]. */
export function noticeablePressurePa(pressurePa: number, temperatureK: number, { material }: Policy): number {
  const relative = ((TROUTON_J_PER_MOL_K / R_J_PER_MOL_K) * material.transitionTemperatureK) / temperatureK;
  return relative * Math.abs(pressurePa);
}
