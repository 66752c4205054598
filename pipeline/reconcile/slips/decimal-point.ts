/** The decimal point moved by up to three places. */

import { type PrintedNumber, writeLike } from './printed-number.js';
import type { Candidate, Slip, SuspectCell } from './slip.js';

/** [places to the right, share]. */
const MOVES = [
  [1, 0.3],
  [-1, 0.3],
  [2, 0.12],
  [-2, 0.12],
  [3, 0.08],
  [-3, 0.08],
] as const;

export const decimalPointMoved: Slip = {
  code: 'decimal-point-moved',
  weight: 0.08,
  propose: (cell) => {
    const { number, value } = cell;
    return number === null || value === 0 ? [] : MOVES.map(([places, share]) => moved(cell, number, places, share));
  },
};

function moved(cell: SuspectCell, number: PrintedNumber, places: number, share: number): Candidate {
  // Division by a power of ten keeps decimal numbers decimal: 123 / 10 is 12.3, 123 * 0.1 is not.
  const scale = 10 ** Math.abs(places);
  const value = places > 0 ? cell.value * scale : cell.value / scale;
  const step = places > 0 ? cell.lastPlace * scale : cell.lastPlace / scale;
  return { value, step, share, printed: () => writeLike(number, value, number.decimals - places) };
}
