/** Torr and pascal exchanged. */
import { STANDARD_ATMOSPHERE_PA } from '../../core/constants.js';
import { isPressure } from './quantity-kinds.js';
import { readAs, times } from './ratio.js';
import type { Slip } from './slip.js';

const TORR_PA = STANDARD_ATMOSPHERE_PA / 760;

/** The cell holds torr where pascal (or kPa, bar, atm) are declared. */
export const torrReadAsPascal: Slip = {
  code: 'torr-read-as-pascal',
  weight: 0.04,
  propose: (cell) => (isPressure(cell.quantity) ? [readAs(cell, TORR_PA)] : []),
};

/** The cell holds pascal where torr are declared, or was converted twice. */
export const pascalReadAsTorr: Slip = {
  code: 'pascal-read-as-torr',
  weight: 0.03,
  propose: (cell) => (isPressure(cell.quantity) ? [times(cell, 1 / TORR_PA)] : []),
};
