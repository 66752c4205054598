/** What the printed digits leave open. */
import { NO_CELL } from '../../schemas/raw.js';
import { constant, numbers } from '../core/numeric/room.js';

/** Half a unit of the place `decimals`, in SI. */
export function halfUnitOf(decimals: number, factor: number): number {
  return 0.5 * 10 ** -decimals * Math.abs(factor);
}

/**
 * Half a unit of the last place of each row [SI]: the column's usual one, since zeros at the end are often not written
 * ("0." is not zero decimals). Where a fifth or more of the rows print fewer decimals and all of those are at least as
 * large as the rest, the column keeps its significant digits and those rows have their own last place. The array may be
 * shared with other columns: never to be written to.
 */
export function halfUnits(
  values: Float64Array,
  decimals: Int8Array,
  usualDecimals: number,
  factor: number,
): Float64Array {
  const usual = halfUnitOf(usualDecimals, factor);
  let coarse = 0;
  for (let i = 0; i < decimals.length; i++) if (decimals[i] < usualDecimals) coarse++;
  if (coarse * 5 < decimals.length || !keepsSignificantDigits(values, decimals, usualDecimals)) {
    return constant(values.length, usual);
  }
  const halves = numbers(values.length).fill(usual);
  for (let i = 0; i < values.length; i++) {
    if (isCoarse(values[i], decimals[i], usualDecimals)) halves[i] = halfUnitOf(decimals[i], factor);
  }
  return halves;
}

function isCoarse(value: number, decimals: number, usualDecimals: number): boolean {
  return decimals !== NO_CELL && value !== 0 && decimals < usualDecimals;
}

function keepsSignificantDigits(values: Float64Array, decimals: Int8Array, usualDecimals: number): boolean {
  let coarse = 0;
  let cells = 0;
  let smallestCoarse = Number.POSITIVE_INFINITY;
  let largestFine = 0;
  for (let i = 0; i < values.length; i++) {
    if (decimals[i] === NO_CELL || values[i] === 0) continue;
    const size = Math.abs(values[i]);
    cells++;
    if (isCoarse(values[i], decimals[i], usualDecimals)) {
      coarse++;
      if (size < smallestCoarse) smallestCoarse = size;
    } else if (size > largestFine) largestFine = size;
  }
  return coarse > 0 && coarse * 5 >= cells && smallestCoarse >= largestFine;
}
