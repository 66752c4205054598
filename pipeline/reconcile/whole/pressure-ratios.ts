/** Ratios by which a whole column of pressures is off when its unit is another one: meant value over printed value. */
import { STANDARD_ATMOSPHERE_PA, STANDARD_PRESSURE_PA, TORR_PA } from '../../core/constants.js';
import type { UnitRatio } from './unit-ratios.js';

/** @param unitPa of the column as declared */
export function pressureRatios(unitPa: number): UnitRatio[] {
  const ratios: UnitRatio[] = [];
  const add = (code: string, ratio: number, weight: number): number => ratios.push({ code, ratio, weight });
  // UCUM's millimetre of mercury is 133.322 Pa.
  if (isUnit(unitPa, TORR_PA, 1e-4)) {
    add('pascal-read-as-torr', 1 / unitPa, 0.02);
    add('pascal-read-as-torr', 1000 / unitPa, 0.01);
  } else {
    add('torr-read-as-pascal', TORR_PA / unitPa, 0.03);
    // Converted twice.
    add('pascal-read-as-torr', 1 / TORR_PA, 0.02);
  }
  add('kilo-dropped', 1000, 0.03);
  add('kilo-added', 1e-3, 0.02);
  if (isUnit(unitPa, STANDARD_PRESSURE_PA) || isUnit(unitPa, STANDARD_ATMOSPHERE_PA)) {
    add('pascal-read-as-bar-or-atmosphere', 1 / unitPa, 0.02);
    add('pascal-read-as-bar-or-atmosphere', 1000 / unitPa, 0.02);
  } else {
    add('bar-or-atmosphere-read-as-pascal', STANDARD_PRESSURE_PA / unitPa, 0.02);
    add('bar-or-atmosphere-read-as-pascal', STANDARD_ATMOSPHERE_PA / unitPa, 0.02);
  }
  return ratios;
}

function isUnit(unitPa: number, otherPa: number, share = 1e-9): boolean {
  return Math.abs(unitPa / otherPa - 1) < share;
}
