/** Slips that touch many numbers at once, or a number by another curve, each tried as one hypothesis with nothing left to choose. */
import type { ConditionDatum, ConditionSystem } from '../system/system.js';
import { columnsOfOtherUnits } from './columns.js';
import { exchangedPairs } from './exchanged.js';
import { formationScales } from './formation-scales.js';
import { pressuresOfIsobars } from './isobars.js';
import { pressureColumns } from './pressures.js';
import { seriesSlips } from './series.js';
import { temperatureColumns } from './temperatures.js';

export interface WholeSlip {
  /** Code of the usual slip. */
  readonly code: string;
  /** How many printed cells it touches. */
  readonly cells: number;
  /** The data of the conditions that it touches, the first to be shown first; a stand-in where it is a table's column. */
  readonly data: readonly ConditionDatum[];
  readonly corrected: number;
  readonly uCorrected: number;
  /** The first cell as it would stand. */
  readonly correctedPrinted: string;
  /** What undoing the slip adds to the misclosures; or, where its size is open, the direction that it moves them in. */
  readonly change: Float64Array;
  readonly open: boolean;
  /** How usual it is, on the scale of the slips of single cells; judgement. */
  readonly weight: number;
}

export function wholeSlips(system: ConditionSystem): readonly WholeSlip[] {
  return [
    ...exchangedPairs(system),
    ...columnsOfOtherUnits(system),
    ...temperatureColumns(system),
    ...seriesSlips(system),
    ...formationScales(system),
    ...pressureColumns(system),
    ...pressuresOfIsobars(system),
  ].filter(({ change }) => change.some((v) => v !== 0));
}
