/** Torr and pascal exchanged. */
import { TORR_PA } from '../../core/constants.js';
import { isPressure } from './quantity-kinds.js';
import { readAs, times } from './ratio.js';
import type { Slip, SuspectCell } from './slip.js';

/** The cell holds torr where pascal (or kPa, bar, atm) are declared. */
export const torrReadAsPascal: Slip = {
  code: 'torr-read-as-pascal',
  weight: 0.04,
  propose: (cell) => (isPressure(cell.quantity) && !isTorr(cell) ? [readAs(cell, TORR_PA)] : []),
};

/** The cell holds pascal or kilopascal where torr are declared, or was converted twice. */
export const pascalReadAsTorr: Slip = {
  code: 'pascal-read-as-torr',
  weight: 0.03,
  propose: (cell) => {
    if (!isPressure(cell.quantity)) return [];
    return isTorr(cell) ? [readAs(cell, 1, 0, 0.6), readAs(cell, 1000, 0, 0.4)] : [times(cell, 1 / TORR_PA, 0.2)];
  },
};

/** The millimetre of mercury is 1.4e-7 larger; UCUM has 133.322 Pa. */
const isTorr = (cell: SuspectCell): boolean => Math.abs(cell.factor / TORR_PA - 1) < 1e-4;
