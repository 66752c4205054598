/**
 * A temperature on the practical scale of 1968 or of 1948 where one on ITS-90 is taken; where the source declares the old
 * scale, one that was on ITS-90 already.
 */
import { toIts90 } from '../../core/units/temperature-scale.js';
import { isTemperature } from './quantity-kinds.js';
import { plus } from './ratio.js';
import type { Candidate, Slip, SuspectCell } from './slip.js';

const OLD = [
  ['IPTS-68', 0.7],
  ['IPTS-48', 0.3],
] as const;

export const oldTemperatureScale: Slip = {
  code: 'old-temperature-scale',
  weight: 0.03,
  propose: (cell) => {
    const { quantity, observed, temperatureScale: declared } = cell;
    if (!isTemperature(quantity) || declared === 'thermodynamic') return [];
    if (declared === 'IPTS-68' || declared === 'IPTS-48') {
      // The printed number's own shift is nearly that of the converted one.
      return moved(cell, observed - toIts90(observed, declared).temperatureK, 1);
    }
    return OLD.flatMap(([scale, share]) => moved(cell, toIts90(observed, scale).temperatureK - observed, share));
  },
};

function moved(cell: SuspectCell, shiftK: number, share: number): Candidate[] {
  return shiftK === 0 ? [] : [plus(cell, shiftK / cell.factor, share)];
}
