import type { Datum } from '../../schemas/harmonised.js';
import type { TemperatureScale } from '../../schemas/table-meaning.js';
import { possibleDifferenceK, toIts90 } from '../core/units/temperature-scale.js';
import { moved } from './datum.js';

export interface DatumOnIts90 {
  readonly datum: Datum;
  /** What an unconverted temperature may be off by [K], in its u too; null where it was converted or needed no conversion. */
  readonly doubtK: number | null;
}

/** A stated temperature on ITS-90; unchanged, with the possible difference in u, where none is published. */
export function datumOnIts90(printed: Datum, scale: TemperatureScale): DatumOnIts90 {
  const { temperatureK, converted } = toIts90(printed.value, scale);
  if (converted) {
    const shift = temperatureK - printed.value;
    return { datum: shift === 0 ? printed : moved(printed, shift), doubtK: null };
  }
  const doubtK = possibleDifferenceK(printed.value, scale);
  return { datum: moved(printed, 0, doubtK / Math.sqrt(3)), doubtK };
}

/** Where differences to ITS-90 are published, for messages. */
export function publishedRange(scale: TemperatureScale): string {
  return scale === 'IPTS-68' ? '73.15 K or more' : '93.15 to 533.15 K';
}
