/** Ratios by which a whole column is off when its unit is another one: meant value over printed value. */
import { INTERNATIONAL_TABLE_CALORIE, R_J_PER_MOL_K, THERMOCHEMICAL_CALORIE } from '../../core/constants.js';

export interface UnitRatio {
  readonly code: string;
  readonly ratio: number;
}

/** @param perKelvin whether the column may be in units of R */
export function unitRatios(molarMassGPerMol: number, perKelvin: boolean): UnitRatio[] {
  const ratios: UnitRatio[] = [];
  for (const { value } of [THERMOCHEMICAL_CALORIE, INTERNATIONAL_TABLE_CALORIE]) {
    ratios.push({ code: 'calorie-read-as-joule', ratio: value });
    ratios.push({ code: 'joule-read-as-calorie', ratio: 1 / value });
  }
  ratios.push({ code: 'kilo-dropped', ratio: 1000 }, { code: 'kilo-added', ratio: 1e-3 });
  if (molarMassGPerMol > 0) {
    ratios.push({ code: 'per-gram-read-as-per-mole', ratio: molarMassGPerMol });
    ratios.push({ code: 'per-mole-read-as-per-gram', ratio: 1 / molarMassGPerMol });
  }
  if (perKelvin) ratios.push({ code: 'in-units-of-r', ratio: R_J_PER_MOL_K });
  return ratios;
}
