/** The enthalpy and the entropy of one transition exchanged: each number stands in the other's column. */
import { lastPlaceOf, readPrinted } from './printed-number.js';
import type { Slip } from './slip.js';

export const enthalpyAndEntropyExchanged: Slip = {
  code: 'enthalpy-and-entropy-exchanged',
  weight: 0.04,
  propose: (cell) => {
    if (cell.quantity !== 'transition-enthalpy' && cell.quantity !== 'transition-entropy') return [];
    const other = cell.partner === null ? null : readPrinted(cell.partner.printed, null);
    if (other === null || other.value === cell.value) return [];
    return [{ value: other.value, step: lastPlaceOf(other), share: 1, printed: () => other.text }];
  },
};
