/**
 * A boiling point whose source has the real fluid on an isobar, and whose pressure names that isobar in another unit: read as
 * printed it is held against the standard state, at a pressure where the gas is another one.
 */
import { printedLike } from '../../core/numeric/printed-like.js';
import { equilibrium } from '../../core/physics/equilibrium.js';
import { boilingTemperature, placePhase } from '../../core/physics/placed-phase.js';
import { atTemperature } from '../system/conditions.js';
import type { ConditionDatum, ConditionSystem } from '../system/system.js';
import { pressureRatios } from './pressure-ratios.js';
import type { UnitRatio } from './unit-ratios.js';
import type { WholeSlip } from './whole-slips.js';

/** As printed, 1.013 bar is 1 atm. */
const SAME = 1e-3;
const DECIMALS = [1, -1, 2, -2, 3, -3].map((places) => ({
  code: 'decimal-point-moved',
  ratio: 10 ** places,
  weight: 0.01,
}));

export function pressuresOfIsobars(system: ConditionSystem): WholeSlip[] {
  const slips: WholeSlip[] = [];
  for (const d of system.data) {
    if (d.kind !== 'transition-pressure') continue;
    for (const isobarPa of isobarsOf(d, system)) {
      const law = lawTo(isobarPa, d);
      const change = law === null ? null : changeTo(isobarPa, d, system);
      if (law === null || change === null) continue;
      const { printed, offset, factor } = d.datum;
      slips.push({
        code: law.code,
        cells: 1,
        data: [d],
        corrected: isobarPa,
        uCorrected: SAME * isobarPa,
        correctedPrinted: printedLike(printed, (isobarPa - offset) / factor),
        change,
        open: false,
        weight: law.weight,
      });
    }
  }
  return slips;
}

/** Of the transition's own source, with a curve of both phases. */
function isobarsOf({ transition }: ConditionDatum, { curves, substance }: ConditionSystem): number[] {
  const { from, to, table } = substance.transitions[transition];
  const pressures = (phase: string): (number | null)[] =>
    curves.filter((c) => c.phase === phase && c.sources.includes(table.source)).map((c) => c.family.isobarPa);
  const others = pressures(to);
  return pressures(from).flatMap((p) => (p !== null && others.includes(p) ? [p] : []));
}

function lawTo(isobarPa: number, { datum }: ConditionDatum): UnitRatio | null {
  const ratio = isobarPa / datum.value;
  return [...pressureRatios(datum.factor), ...DECIMALS].find((law) => Math.abs(ratio / law.ratio - 1) < SAME) ?? null;
}

/** What the conditions of the transition become on the isobar's curves; null where these do not reach its temperature. */
function changeTo(isobarPa: number, { transition }: ConditionDatum, system: ConditionSystem): Float64Array | null {
  const { transitions, substance } = system.substance;
  const stated = transitions[transition];
  const place = (phase: string) => {
    const curve = system.curves.find((c) => c.phase === phase && c.family.isobarPa === isobarPa);
    if (curve === undefined) return null;
    return placePhase(curve, substance, { pressurePa: isobarPa, gas: 'real' }, boilingTemperature(transitions));
  };
  const [from, to, atK] = [place(stated.from), place(stated.to), stated.temperature.value];
  if (from === null || to === null || atK < Math.max(from.lowK, to.lowK) || atK > Math.min(from.highK, to.highK))
    return null;
  const there = equilibrium(from, to, atK);
  return Float64Array.from(system.conditions, (c, i) =>
    c.transition === transition ? atTemperature(c, there, atK, stated) - system.y[i] : 0,
  );
}
