/** Columns of invented tables: what they hold, in which unit, and how large the numbers are. */
import type { NumberQuantity } from '../../../schemas/quantities.js';

export interface Column {
  readonly quantity: NumberQuantity;
  readonly unit: string;
  readonly factor: number;
  readonly offset: number;
  /** Range of the numbers as printed; drawn log-uniform. */
  readonly low: number;
  readonly high: number;
  readonly decimals: readonly number[];
  readonly sign?: -1;
}

const column = (
  quantity: NumberQuantity,
  unit: string,
  factor: number,
  low: number,
  high: number,
  decimals: readonly number[],
  more: { offset?: number; sign?: -1 } = {},
): Column => ({ quantity, unit, factor, offset: 0, low, high, decimals, ...more });

export const J = [
  column('entropy', 'J/(mol.K)', 1, 15, 400, [2, 3]),
  column('gibbs-function', 'J/(mol.K)', 1, 15, 300, [2, 3]),
  column('heat-capacity', 'J/(mol.K)', 1, 12, 150, [2, 3]),
];
export const ENTROPIES = J.slice(0, 2);
export const INCREMENT_KJ = [column('enthalpy-increment', 'kJ/mol', 1000, 1, 150, [3])];
export const FORMATION_KJ = [column('enthalpy-of-formation', 'kJ/mol', 1000, 40, 1600, [2, 3], { sign: -1 })];
export const TRANSITION_KJ = [column('transition-enthalpy', 'kJ/mol', 1000, 0.8, 300, [3])];
export const KJ = [...INCREMENT_KJ, ...FORMATION_KJ, ...TRANSITION_KJ];
export const WHOLE_J = [
  column('enthalpy-increment', 'J/mol', 1, 900, 150000, [0, 1]),
  column('transition-enthalpy', 'J/mol', 1, 800, 300000, [0, 1]),
];
export const CAL_ENTROPY = [column('entropy', 'cal_th/(mol.K)', 4.184, 4, 90, [2, 3])];
export const KCAL = [
  column('enthalpy-of-formation', 'kcal_th/mol', 4184, 10, 400, [2, 3], { sign: -1 }),
  column('transition-enthalpy', 'kcal_th/mol', 4184, 0.3, 70, [3]),
];
export const WHOLE_CAL = [
  column('enthalpy-increment', 'cal_th/mol', 4.184, 200, 40000, [0, 1]),
  column('transition-enthalpy', 'cal_th/mol', 4.184, 200, 70000, [0, 1]),
];
export const CAL = [...CAL_ENTROPY, KCAL[0]!];
export const PER_GRAM_ENTROPY = [column('entropy', 'J/(g.K)', 1, 0.3, 6, [4])];
export const PER_GRAM_ENTHALPY = [
  column('enthalpy-increment', 'kJ/kg', 1, 5, 900, [2, 3]),
  column('transition-enthalpy', 'J/g', 1, 20, 600, [1, 2]),
];
export const PER_GRAM = [...PER_GRAM_ENTROPY, ...PER_GRAM_ENTHALPY];
export const KELVIN = [
  column('transition-temperature', 'K', 1, 60, 3000, [1, 2]),
  column('temperature', 'K', 1, 60, 3000, [1, 2]),
];
export const CELSIUS = [column('transition-temperature', 'Cel', 1, 30, 2700, [1, 2], { offset: 273.15 })];
export const DEG_F = [column('transition-temperature', '[degF]', 5 / 9, 90, 4000, [1], { offset: (459.67 * 5) / 9 })];
export const PASCAL = [column('pressure', 'Pa', 1, 500, 100000, [0, 1])];
export const KILOPASCAL = [column('pressure', 'kPa', 1000, 1, 200, [3])];
export const TORR = [column('pressure', 'mm[Hg]', 133.322387415, 5, 760, [2])];
export const BAR = [column('pressure', 'bar', 1e5, 0.02, 3, [4, 5])];
export const ATM = [column('pressure', 'atm', 101325, 0.02, 3, [4, 5])];
export const TRANSITION_PAIR = [
  column('transition-enthalpy', 'kJ/mol', 1000, 0.8, 300, [2, 3]),
  column('transition-entropy', 'J/(mol.K)', 1, 0.9, 140, [2, 3]),
];
export const ANY = [
  ...[...J, ...KJ, WHOLE_J[0]!, ...CAL, ...PER_GRAM],
  ...[...KELVIN, ...CELSIUS, ...PASCAL, ...KILOPASCAL, ...TORR, ...BAR],
];
