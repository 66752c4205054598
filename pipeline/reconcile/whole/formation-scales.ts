/** Formation enthalpies of some phases on another scale than those of the others: all of one source off by the same. */
import { printedLike } from '../../core/numeric/printed-like.js';
import type { ConditionDatum, ConditionSystem } from '../system/system.js';
import { addTo } from './exchanged.js';
import type { WholeSlip } from './whole-slips.js';

export function formationScales(system: ConditionSystem): WholeSlip[] {
  const all = system.data.filter((d) => d.kind === 'formation-enthalpy');
  const bySource = new Map<string, ConditionDatum[]>();
  for (const d of all) {
    const { source } = d.datum.address;
    const known = bySource.get(source);
    if (known === undefined) bySource.set(source, [d]);
    else known.push(d);
  }
  const slips: WholeSlip[] = [];
  for (const data of bySource.values()) {
    // One number alone is its own suspect; and where only one stands on the other side, that one is.
    if (data.length < 2 || all.length - data.length < 2) continue;
    const [first] = data;
    const direction = new Float64Array(system.m);
    for (const d of data) addTo(direction, d.direction, 1);
    slips.push({
      code: 'different-enthalpy-scales',
      cells: data.length,
      data,
      corrected: first.datum.value,
      uCorrected: first.u,
      correctedPrinted: printedLike(first.datum.printed, (first.datum.value - first.datum.offset) / first.datum.factor),
      change: direction,
      open: true,
      weight: 0.02,
    });
  }
  return slips;
}
