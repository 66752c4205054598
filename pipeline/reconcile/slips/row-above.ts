/** The cell of the row above copied; only where both print the same. What stood here before is open. */
import type { Slip } from './slip.js';

export const copiedFromRowAbove: Slip = {
  code: 'copied-from-row-above',
  weight: 0.9,
  propose: (cell, proposed) => {
    if (cell.rowAbove === null || cell.printed.trim() !== cell.rowAbove.printed.trim()) return [];
    return [{ value: (proposed - cell.toSi(0)) / cell.factor, step: cell.lastPlace, share: 1, told: true }];
  },
};
