/** The enthalpy and the entropy of one transition exchanged: each number stands in the other's column. */
import { lastPlaceOf, readPrinted } from './printed-number.js';
import type { Slip, SuspectCell } from './slip.js';

/** What dH = T dS of the two numbers put back may be off by: the temperature, and a unit of energy between two columns. */
const CLOSES = 0.3;

export const enthalpyAndEntropyExchanged: Slip = {
  code: 'enthalpy-and-entropy-exchanged',
  weight: 0.04,
  propose: (cell) => {
    if (cell.quantity !== 'transition-enthalpy' && cell.quantity !== 'transition-entropy') return [];
    const other = cell.partner === null ? null : readPrinted(cell.partner.printed, null);
    if (other === null || other.value === cell.value || !putBackCloses(cell, other.value)) return [];
    return [{ value: other.value, step: lastPlaceOf(other), share: 1, printed: () => other.text }];
  },
};

/** Whether both numbers, each in the other's column, meet dH = T dS; taken for granted where that cannot be said. */
function putBackCloses(cell: SuspectCell, other: number): boolean {
  const { temperatureK, partner, quantity } = cell;
  if (temperatureK === null || partner === null || !Number.isFinite(partner.observed) || other === 0) return true;
  const back = other * cell.factor;
  const away = cell.value * (partner.observed / other);
  const [enthalpy, entropy] = quantity === 'transition-enthalpy' ? [back, away] : [away, back];
  return Math.abs(enthalpy - temperatureK * entropy) <= CLOSES * Math.abs(enthalpy);
}
