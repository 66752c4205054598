/** The quantities that a column of a raw table may hold (`is` in a descriptor), with the SI unit they are kept in. */
export const QUANTITY_UNITS = {
  temperature: 'K',
  'heat-capacity': 'J/(mol.K)',
  entropy: 'J/(mol.K)',
  'enthalpy-increment': 'J/mol',
  'gibbs-function': 'J/(mol.K)',
  enthalpy: 'J/mol',
  'gibbs-energy': 'J/mol',
  'enthalpy-of-formation': 'J/mol',
  'gibbs-energy-of-formation': 'J/mol',
  'enthalpy-from-zero': 'J/mol',
  'transition-temperature': 'K',
  'transition-enthalpy': 'J/mol',
  'transition-entropy': 'J/(mol.K)',
  pressure: 'Pa',
  'molar-volume': 'm3/mol',
  density: 'kg/m3',
  'second-virial-coefficient': 'm3/mol',
} as const;

export type NumberQuantity = keyof typeof QUANTITY_UNITS;

/** Columns that hold words, not numbers. */
export const TEXT_QUANTITIES = [
  'substance',
  'phase',
  'from-phase',
  'to-phase',
  'order',
  'gas',
  'increments-from',
  'note',
  'series',
] as const;
export type TextQuantity = (typeof TEXT_QUANTITIES)[number];
