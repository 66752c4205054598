/** Ratios by which a whole column is off when its unit is another one: meant value over printed value. */
import {
  INTERNATIONAL_TABLE_CALORIE,
  R_J_PER_MOL_K,
  THERMOCHEMICAL_CALORIE,
  WATER_G_PER_MOL,
} from '../../core/constants.js';

export interface UnitRatio {
  readonly code: string;
  readonly ratio: number;
  /** How usual it is; judgement. */
  readonly weight: number;
}

/** @param perKelvin whether the column may be in units of R */
export function unitRatios(molarMassGPerMol: number, perKelvin: boolean): UnitRatio[] {
  const ratios: UnitRatio[] = [];
  const add = (code: string, ratio: number, weight: number): number => ratios.push({ code, ratio, weight });
  add('calorie-read-as-joule', THERMOCHEMICAL_CALORIE.value, 0.05);
  add('joule-read-as-calorie', 1 / THERMOCHEMICAL_CALORIE.value, 0.03);
  add('calorie-read-as-joule', INTERNATIONAL_TABLE_CALORIE.value, 0.008);
  add('joule-read-as-calorie', 1 / INTERNATIONAL_TABLE_CALORIE.value, 0.005);
  add('kilo-dropped', 1000, 0.04);
  add('kilo-added', 1e-3, 0.04);
  if (molarMassGPerMol > 0) {
    add('per-gram-read-as-per-mole', molarMassGPerMol, 0.02);
    add('per-mole-read-as-per-gram', 1 / molarMassGPerMol, 0.02);
  }
  // Another formula: double or half of it, or its hydrates.
  add('other-formula-molar-mass', 2, 0.008);
  add('other-formula-molar-mass', 0.5, 0.008);
  if (molarMassGPerMol > 0) {
    for (let waters = 1; waters <= 10; waters++) {
      const heavier = (molarMassGPerMol + waters * WATER_G_PER_MOL) / molarMassGPerMol;
      add('other-formula-molar-mass', heavier, 0.001);
      add('other-formula-molar-mass', 1 / heavier, 0.001);
    }
  }
  if (perKelvin) add('in-units-of-r', R_J_PER_MOL_K, 0.02);
  return ratios;
}
