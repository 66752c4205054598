/** The prefix kilo dropped or added. */
import { isTemperature } from './quantity-kinds.js';
import { times } from './ratio.js';
import type { Slip } from './slip.js';

/** The cell holds a number a thousand times too small, as of kJ where J is declared. */
export const kiloDropped: Slip = {
  code: 'kilo-dropped',
  weight: 0.04,
  propose: (cell) => (isTemperature(cell.quantity) ? [] : [times(cell, 1000)]),
};

/** The cell holds a number a thousand times too large, as of J where kJ is declared. */
export const kiloAdded: Slip = {
  code: 'kilo-added',
  weight: 0.04,
  propose: (cell) => (isTemperature(cell.quantity) ? [] : [times(cell, 1e-3)]),
};
