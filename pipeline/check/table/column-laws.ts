import type { Series } from '../../../schemas/harmonised.js';
import type { NumberQuantity } from '../../../schemas/quantities.js';
import type { Substance } from '../../../schemas/substances.js';
import {
  ICE_POINT_K,
  INTERNATIONAL_TABLE_CALORIE,
  R_J_PER_MOL_K,
  THERMOCHEMICAL_CALORIE,
  WATER_G_PER_MOL,
} from '../../core/constants.js';
import { printedNumber } from '../../core/numeric/printed-like.js';
import { CALORIES_J } from '../../core/units/calories.js';
import { readUnit } from '../../core/units/expression.js';
import { type ColumnChange, quantityIn, type TableColumn } from './column-change.js';

/** A usual slip of a whole column: the factor that would put its SI values right, and the code of the slip. */
export interface RatioLaw {
  readonly code: string;
  readonly factor: number;
  /** How usual it is; judgement, only ratios matter. */
  readonly weight: number;
}

/** A factor that nobody can explain. */
export const UNEXPLAINED_WEIGHT = 1e-4;

const MOST_WATERS = 10;

/** The usual slips that multiply a column, by what its unit counts in. */
export function ratioLaws(series: Series, column: TableColumn, substance: Substance): RatioLaw[] {
  const { perMass, calories, kilo, perKelvin, factor: unit } = unitOf(series, column);
  const mass = substance.molarMassGPerMol;
  const laws: RatioLaw[] = [
    { code: 'kilo-dropped', factor: 1000, weight: 0.04 },
    { code: 'kilo-added', factor: 1e-3, weight: 0.04 },
    { code: 'sign-lost', factor: -1, weight: 0.03 },
    { code: 'other-formula-molar-mass', factor: 2, weight: 0.002 },
    { code: 'other-formula-molar-mass', factor: 0.5, weight: 0.002 },
  ];
  for (const [joules, share] of CALORIES_J) {
    laws.push({ code: 'calorie-read-as-joule', factor: joules, weight: 0.05 * share });
    laws.push({ code: 'joule-read-as-calorie', factor: 1 / joules, weight: 0.03 * share });
    if (perKelvin || perMass) continue;
    const weight = 0.015 * share;
    if (calories && kilo) laws.push({ code: 'joule-read-as-kilocalorie', factor: 1 / (1000 * joules), weight });
    else if (calories) laws.push({ code: 'kilojoule-read-as-calorie', factor: 1000 / joules, weight });
    else if (kilo) laws.push({ code: 'calorie-read-as-kilojoule', factor: joules / 1000, weight });
    else laws.push({ code: 'kilocalorie-read-as-joule', factor: 1000 * joules, weight });
  }
  if (perKelvin) laws.push({ code: 'in-units-of-r', factor: R_J_PER_MOL_K / unit, weight: 0.02 });
  if (!(mass > 0)) return laws;
  laws.push(
    perMass
      ? { code: 'per-mole-read-as-per-gram', factor: 1 / mass, weight: 0.02 }
      : { code: 'per-gram-read-as-per-mole', factor: mass, weight: 0.02 },
  );
  if (!perKelvin && perMass) {
    laws.push({ code: 'kilo-per-mole-read-as-per-gram', factor: 1000 / mass, weight: 0.02 });
  }
  if (!perKelvin && kilo) {
    laws.push({ code: 'per-gram-read-as-kilo-per-mole', factor: mass / 1000, weight: 0.02 });
  }
  if (!calories && !perMass) {
    for (const [joules, share] of CALORIES_J) {
      const code = 'calorie-per-gram-read-as-joule-per-mole';
      laws.push({ code, factor: (joules * mass) / (kilo ? 1000 : 1), weight: 0.01 * share });
    }
  }
  for (let n = 1; n <= MOST_WATERS; n++) {
    const factor = (mass + n * WATER_G_PER_MOL) / mass;
    laws.push({ code: 'other-formula-molar-mass', factor, weight: 0.001 });
    laws.push({ code: 'other-formula-molar-mass', factor: 1 / factor, weight: 0.001 });
  }
  return laws;
}

/** A usual slip of a column of temperatures. */
export interface TemperatureLaw {
  readonly code: string;
  readonly change: ColumnChange;
  readonly weight: number;
}

const DEGREE = 5 / 9;
const FAHRENHEIT_ZERO_K = ICE_POINT_K - 32 * DEGREE;

/** From the temperatures as read [K] to what they would be if the column held another unit than the declared one. */
export function temperatureLaws(series: Series): TemperatureLaw[] {
  const declared = series.table.columns[series.temperatureColumn]?.unit ?? 'K';
  const law = (code: string, weight: number, factor: number, shift: number): TemperatureLaw => ({
    code,
    weight,
    change: { column: 'temperature', factor, shift, shiftOverT: 0 },
  });
  if (declared === '[degF]') {
    // The printed number is (T - 255.37 K) / (5/9).
    const zero = -FAHRENHEIT_ZERO_K / DEGREE;
    return [
      law('read-as-fahrenheit', 0.024, 1 / DEGREE, zero + ICE_POINT_K),
      law('read-as-fahrenheit', 0.016, 1 / DEGREE, zero),
    ];
  }
  const offset = declared === 'Cel' ? ICE_POINT_K : 0;
  return [
    law('celsius-read-as-kelvin', 0.06, 1, ICE_POINT_K),
    law('kelvin-read-as-celsius', 0.04, 1, -ICE_POINT_K),
    law('fahrenheit-not-converted', 0.02, DEGREE, FAHRENHEIT_ZERO_K - offset * DEGREE),
  ];
}

export interface ColumnUnit {
  readonly perMass: boolean;
  readonly calories: boolean;
  readonly kilo: boolean;
  readonly perKelvin: boolean;
  /** SI value of one printed unit, the molar mass included. */
  readonly factor: number;
}

const PER_KELVIN: readonly NumberQuantity[] = ['heat-capacity', 'entropy', 'gibbs-function'];

/** What the declared unit of a column counts in; its factor as the column's own cells show it. */
export function unitOf(series: Series, column: TableColumn): ColumnUnit {
  const q = quantityIn(series, column);
  const code = q === null ? '' : (series.table.columns[q.column]?.unit ?? '');
  const reading = readUnit(code);
  const parts = 'parts' in reading ? reading.parts : null;
  const perMass = parts !== null && parts.moles === 0 && !parts.atoms.has('eV') && !parts.atoms.has('[k]');
  const calories = code.includes('cal');
  const joules = !calories ? 1 : (code.includes('cal_IT') ? INTERNATIONAL_TABLE_CALORIE : THERMOCHEMICAL_CALORIE).value;
  const factor = q === null ? 1 : factorShown(series, column);
  return {
    perMass,
    calories,
    kilo: !perMass && Math.abs(factor / joules - 1000) < 1,
    perKelvin: q !== null && PER_KELVIN.includes(q.is),
    factor,
  };
}

/** From the cell that shows it best, which is the largest. */
function factorShown(series: Series, column: TableColumn): number {
  const q = quantityIn(series, column);
  if (q === null) return 1;
  let largest = -1;
  for (let row = 0; row < series.rows; row++) {
    if (q.present[row] === 1 && (largest < 0 || Math.abs(q.values[row]) > Math.abs(q.values[largest]))) largest = row;
  }
  const printed = largest < 0 ? Number.NaN : printedNumber(series.text(largest, q.column));
  const factor = largest < 0 ? 1 : q.values[largest] / printed;
  return Number.isFinite(factor) && factor > 0 ? factor : 1;
}
