/** Which quantities a slip of units can befall. */
import type { NumberQuantity } from '../../../schemas/quantities.js';

const PER_KELVIN: readonly NumberQuantity[] = ['heat-capacity', 'entropy', 'gibbs-function', 'transition-entropy'];
const GIBBS: readonly NumberQuantity[] = ['gibbs-energy', 'gibbs-energy-of-formation'];
const ENTHALPY: readonly NumberQuantity[] = [
  'enthalpy-increment',
  'enthalpy',
  'enthalpy-of-formation',
  'enthalpy-from-zero',
  'transition-enthalpy',
];

/** Enthalpies, which a transition or another zero moves. */
export const isEnthalpy = (quantity: NumberQuantity): boolean => ENTHALPY.includes(quantity);
export const isPerKelvin = (quantity: NumberQuantity): boolean => PER_KELVIN.includes(quantity);
export const isEntropy = (quantity: NumberQuantity): boolean => quantity !== 'heat-capacity' && isPerKelvin(quantity);
export const isGibbsEnergy = (quantity: NumberQuantity): boolean => GIBBS.includes(quantity);
/** Holds an energy: enthalpies, Gibbs energies, and what is per kelvin. */
export const isEnergetic = (quantity: NumberQuantity): boolean =>
  ENTHALPY.includes(quantity) || isGibbsEnergy(quantity) || isPerKelvin(quantity);
/** Counted per amount of substance. */
export const isMolar = (quantity: NumberQuantity): boolean =>
  isEnergetic(quantity) || quantity === 'molar-volume' || quantity === 'second-virial-coefficient';
export const isTemperature = (quantity: NumberQuantity): boolean =>
  quantity === 'temperature' || quantity === 'transition-temperature';
export const isPressure = (quantity: NumberQuantity): boolean => quantity === 'pressure';
