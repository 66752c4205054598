/** A whole column of anchors or transitions in another unit. */
import { printedLike } from '../../core/numeric/printed-like.js';
import type { ConditionDatum, ConditionSystem } from '../system/system.js';
import { addTo } from './exchanged.js';
import { unitRatios } from './unit-ratios.js';
import type { WholeSlip } from './whole-slips.js';

const PER_KELVIN: ReadonlySet<string> = new Set(['entropy', 'anchor-entropy']);
const SCALED: ReadonlySet<string> = new Set(['enthalpy', 'formation-enthalpy', ...PER_KELVIN]);

export function columnsOfOtherUnits(system: ConditionSystem): WholeSlip[] {
  const slips: WholeSlip[] = [];
  for (const data of byColumn(system.data.filter((d) => SCALED.has(d.kind)))) {
    const [first] = data;
    const perKelvin = PER_KELVIN.has(first.kind);
    for (const { code, ratio, weight } of unitRatios(system.substance.substance.molarMassGPerMol, perKelvin)) {
      const change = new Float64Array(system.m);
      for (const d of data) addTo(change, d.direction, (ratio - 1) * d.datum.value);
      slips.push(columnSlip(code, data, first.datum.value * ratio, first.u * ratio, change, weight));
    }
  }
  return slips;
}

/** All data of a column off by one law, the first cell as it would stand. */
export function columnSlip(
  code: string,
  data: readonly ConditionDatum[],
  corrected: number,
  uCorrected: number,
  change: Float64Array,
  weight: number,
): WholeSlip {
  const { printed, offset, factor } = data[0].datum;
  const correctedPrinted = printedLike(printed, (corrected - offset) / factor);
  return { code, cells: data.length, data, corrected, uCorrected, correctedPrinted, change, open: false, weight };
}

/** Data of one column of one file, where it is more than one that is not zero. */
export function byColumn(data: readonly ConditionDatum[]): ConditionDatum[][] {
  const columns = new Map<string, ConditionDatum[]>();
  for (const d of data) {
    if (d.datum.value === 0) continue;
    const { source, file, column } = d.datum.address;
    const key = `${source}\n${file}\n${column}`;
    const known = columns.get(key);
    if (known === undefined) columns.set(key, [d]);
    else known.push(d);
  }
  return [...columns.values()].filter((one) => one.length > 1);
}
