/** An entropy or a heat capacity in units of R. */
import { R_J_PER_MOL_K } from '../../core/constants.js';
import { isPerKelvin } from './quantity-kinds.js';
import { readAs } from './ratio.js';
import type { Slip } from './slip.js';

/** The cell holds S/R where S is declared. */
export const unitsOfR: Slip = {
  code: 'in-units-of-r',
  weight: 0.02,
  propose: (cell) => (isPerKelvin(cell.quantity) ? [readAs(cell, R_J_PER_MOL_K)] : []),
};
