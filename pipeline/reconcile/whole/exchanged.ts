/** From and to of a transition exchanged; its dH and dS exchanged. */
import { printedLike } from '../../core/numeric/printed-like.js';
import type { ConditionDatum, ConditionSystem } from '../system/system.js';
import type { WholeSlip } from './whole-slips.js';

export function exchangedPairs(system: ConditionSystem): WholeSlip[] {
  const slips: WholeSlip[] = [];
  for (const { judged } of system.joined) {
    const of = (kind: ConditionDatum['kind']): ConditionDatum | undefined =>
      system.data.find((d) => d.transition === judged.index && d.kind === kind);
    const dH = of('enthalpy');
    const dS = of('entropy');
    const sizes = [dH, dS].filter((d) => d !== undefined);
    if (sizes.length === 0) continue;
    const { stated } = judged;
    const reversed = new Float64Array(system.m);
    for (const d of sizes) addTo(reversed, d.direction, -2 * d.datum.value);
    const [size] = sizes;
    const cell = phaseCell(size, system);
    slips.push({
      code: 'from-and-to-exchanged',
      cells: cell === size ? sizes.length : 2,
      data: [cell, ...sizes],
      corrected: cell === size ? -size.datum.value : size.datum.value,
      uCorrected: size.u,
      correctedPrinted: cell === size ? printedLike(size.datum.printed, -numberOf(size)) : (stated.printedTo ?? ''),
      change: reversed,
      open: false,
      weight: 0.04,
    });
    if (dH === undefined || dS === undefined) continue;
    const meantH = numberOf(dS) * dH.datum.factor;
    const meantS = numberOf(dH) * dS.datum.factor;
    const swapped = new Float64Array(system.m);
    addTo(swapped, dH.direction, meantH - dH.datum.value);
    addTo(swapped, dS.direction, meantS - dS.datum.value);
    slips.push({
      code: 'enthalpy-and-entropy-exchanged',
      cells: 2,
      data: [dH, dS],
      corrected: meantH,
      uCorrected: Math.abs((dS.u / dS.datum.factor) * dH.datum.factor),
      correctedPrinted: dS.datum.printed,
      change: swapped,
      open: false,
      weight: 0.04,
    });
  }
  return slips;
}

function numberOf({ datum }: ConditionDatum): number {
  return (datum.value - datum.offset) / datum.factor;
}

/** The cell of the transition's first phase: what would be exchanged; the size itself where no columns name the phases. */
function phaseCell(size: ConditionDatum, system: ConditionSystem): ConditionDatum {
  const { stated } = system.joined.find((j) => j.judged.index === size.transition)!.judged;
  const column = stated.table.columns.find((c) => c.is === 'from-phase');
  if (column === undefined || stated.printedFrom === null || stated.printedTo === null) return size;
  return {
    ...size,
    place: size.place.replace(/^\S+/, 'from'),
    datum: { ...size.datum, address: { ...size.datum.address, column: column.header }, printed: stated.printedFrom },
  };
}

export function addTo(sum: Float64Array, direction: Float64Array, by: number): void {
  for (let i = 0; i < sum.length; i++) sum[i] += by * direction[i];
}
