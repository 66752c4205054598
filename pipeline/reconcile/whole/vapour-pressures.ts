/** All vapour pressures of one table in another unit, or their temperatures in degrees. */
import { ICE_POINT_K, STANDARD_ATMOSPHERE_PA } from '../../core/constants.js';
import { printedLike } from '../../core/numeric/printed-like.js';
import { equilibrium } from '../../core/physics/equilibrium.js';
import type { ConditionDatum, ConditionSystem } from '../system/system.js';
import { byColumn } from './columns.js';
import { addTo } from './exchanged.js';
import type { WholeSlip } from './whole-slips.js';

/** 1 mmHg, conventional: NIST SP 811 (2008), B.8. */
const TORR_PA = STANDARD_ATMOSPHERE_PA / 760;

/** By code: meant pressure over printed one. */
const RATIOS = [
  ['torr-read-as-pascal', TORR_PA, 0.03],
  ['pascal-read-as-torr', 1 / TORR_PA, 0.02],
  ['kilo-dropped', 1000, 0.03],
  ['kilo-added', 1e-3, 0.02],
  ['bar-or-atmosphere-read-as-pascal', 1e5, 0.02],
  ['bar-or-atmosphere-read-as-pascal', STANDARD_ATMOSPHERE_PA, 0.02],
] as const;

const SHIFTS = [
  ['celsius-read-as-kelvin', ICE_POINT_K, 0.04],
  ['kelvin-read-as-celsius', -ICE_POINT_K, 0.03],
] as const;

export function vapourPressureColumns(system: ConditionSystem): WholeSlip[] {
  const slips: WholeSlip[] = [];
  for (const data of byColumn(system.data.filter((d) => d.kind === 'saturation-pressure'))) {
    for (const [code, ratio, weight] of RATIOS) {
      const change = new Float64Array(system.m);
      for (const d of data) addTo(change, d.direction, Math.log(ratio));
      slips.push(
        slipOf(code, data, data[0].datum.value * ratio, data[0].u * data[0].datum.value * ratio, change, weight),
      );
    }
    // lg p printed where ln p was meant, or the reverse: p to the power of ln 10, or of lg e.
    for (const power of [Math.LN10, Math.LOG10E]) {
      const change = new Float64Array(system.m);
      for (const d of data) addTo(change, d.direction, (power - 1) * Math.log(d.datum.value));
      const corrected = data[0].datum.value ** power;
      slips.push(slipOf('log10-taken-for-ln', data, corrected, data[0].u * corrected, change, 0.01));
    }
  }
  for (const data of byColumn(system.data.filter((d) => d.kind === 'saturation-temperature'))) {
    for (const [code, shift, weight] of SHIFTS) {
      const change = new Float64Array(system.m);
      const reached = data.every((d) => {
        const pair = system.saturated.find((one) => d.key.endsWith(` ${one.index}`));
        const t = d.datum.value + shift;
        if (pair === undefined) return false;
        if (!(t > Math.max(pair.from.lowK, pair.to.lowK) && t < Math.min(pair.from.highK, pair.to.highK))) return false;
        const i = d.direction.findIndex((v) => v !== 0);
        change[i] = -equilibrium(pair.from, pair.to, t).gapJPerMol - system.y[i];
        return true;
      });
      if (reached) slips.push(slipOf(code, data, data[0].datum.value + shift, data[0].u, change, weight));
    }
  }
  return slips;
}

function slipOf(
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
