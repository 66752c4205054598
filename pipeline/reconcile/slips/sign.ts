/** The sign lost. */
import { writeLike } from './printed-number.js';
import type { Slip } from './slip.js';

export const signLost: Slip = {
  code: 'sign-lost',
  weight: 0.06,
  propose: (cell) => {
    if (cell.value === 0) return [];
    const { number, value } = cell;
    const candidate = { value: -value, step: cell.lastPlace, share: 1 };
    return [number === null ? candidate : { ...candidate, printed: () => writeLike(number, -value, number.decimals) }];
  },
};
