/** Which quantities each kind of table may hold, and which it must. */
import type { NumberQuantity, TextQuantity } from '../../schemas/quantities.js';
import type { READ_KINDS } from '../../schemas/source.js';

export type Kind = (typeof READ_KINDS)[number];

export const WORDS: Readonly<Record<Kind, readonly TextQuantity[]>> = {
  'thermal-functions': ['substance', 'phase', 'increments-from', 'series', 'note'],
  anchors: ['substance', 'phase', 'note'],
  transitions: ['substance', 'from-phase', 'to-phase', 'order', 'gas', 'note'],
  'vapour-pressures': ['substance', 'phase', 'note'],
};

export const NUMBERS: Readonly<Record<Kind, readonly NumberQuantity[]>> = {
  'thermal-functions': [
    'temperature',
    'heat-capacity',
    'entropy',
    'enthalpy-increment',
    'gibbs-function',
    'enthalpy',
    'gibbs-energy',
  ],
  anchors: ['enthalpy-of-formation', 'entropy', 'gibbs-energy-of-formation', 'enthalpy-from-zero', 'heat-capacity'],
  transitions: ['transition-temperature', 'pressure', 'transition-enthalpy', 'transition-entropy'],
  'vapour-pressures': ['temperature', 'pressure'],
};

export const REQUIRED: Readonly<Record<Kind, readonly (NumberQuantity | TextQuantity)[]>> = {
  'thermal-functions': ['substance', 'phase', 'temperature'],
  anchors: ['substance', 'phase'],
  transitions: ['substance', 'from-phase', 'to-phase', 'transition-temperature'],
  'vapour-pressures': ['substance', 'phase', 'temperature', 'pressure'],
};

/** The numbers that no row of such a table can do without. */
export function neededNumbers(kind: Kind): readonly NumberQuantity[] {
  return NUMBERS[kind].filter((quantity) => REQUIRED[kind].includes(quantity));
}
