/** Physical constants and conventional values: value, unit (UCUM), standard uncertainty, reference. */
export interface Constant {
  readonly value: number;
  readonly unit: string;
  /** Standard uncertainty in `unit`; 0 where the value is exact by definition. */
  readonly uncertainty: number;
  readonly reference: string;
}

const exact = (value: number, unit: string, reference: string): Constant => ({
  value,
  unit,
  uncertainty: 0,
  reference,
});

const SI_2019 = 'SI Brochure, 9th ed. (BIPM 2019), defining constants; CODATA 2018';

export const BOLTZMANN_CONSTANT = exact(1.380649e-23, 'J/K', SI_2019);
export const AVOGADRO_CONSTANT = exact(6.02214076e23, '/mol', SI_2019);
/** The product of the Avogadro and Boltzmann constants, all of its digits. */
export const GAS_CONSTANT = exact(8.31446261815324, 'J/(mol.K)', SI_2019);

export const STANDARD_PRESSURE = exact(
  100000,
  'Pa',
  'IUPAC Green Book, 3rd ed. (2007), 2.11.1 (iv); recommended since 1982',
);
export const STANDARD_ATMOSPHERE = exact(101325, 'Pa', '10th CGPM (1954); NIST SP 811 (2008), B.8');
export const REFERENCE_TEMPERATURE = exact(298.15, 'K', 'IUPAC Green Book, 3rd ed. (2007), 2.11.1');
/** 0 degrees Celsius. */
export const ICE_POINT = exact(273.15, 'K', 'SI Brochure, 9th ed. (BIPM 2019), 2.3.1');

export const THERMOCHEMICAL_CALORIE = exact(4.184, 'J', 'NIST SP 811 (2008), B.8; ISO 31-4 (1992), annex B');
export const INTERNATIONAL_TABLE_CALORIE = exact(
  4.1868,
  'J',
  '5th International Conference on the Properties of Steam (1956); NIST SP 811 (2008), B.8',
);

/** The conventional millimetre of mercury is 1.4e-7 larger. */
export const TORR = exact(101325 / 760, 'Pa', 'NIST SP 811 (2008), B.8');
/** H2O; the isotopes of natural waters spread by ± 0.001, taken for a rectangular distribution. */
export const WATER_MOLAR_MASS: Constant = {
  value: 18.015,
  unit: 'g/mol',
  uncertainty: 0.0006,
  reference: 'abridged standard atomic weights, IUPAC/CIAAW (2021): 2 x 1.0080 + 15.999',
};

/** Plain numbers for formulas. */
export const R_J_PER_MOL_K = GAS_CONSTANT.value;
export const STANDARD_PRESSURE_PA = STANDARD_PRESSURE.value;
export const STANDARD_ATMOSPHERE_PA = STANDARD_ATMOSPHERE.value;
export const REFERENCE_TEMPERATURE_K = REFERENCE_TEMPERATURE.value;
export const TORR_PA = TORR.value;
export const WATER_G_PER_MOL = WATER_MOLAR_MASS.value;
export const ICE_POINT_K = ICE_POINT.value;
