/** All pressures of one column in another unit: of vapours, or of transitions; or the vapours' temperatures in degrees. */
import { ICE_POINT_K } from '../../core/constants.js';
import { datumKey } from '../../core/physics/datum-keys.js';
import { equilibrium } from '../../core/physics/equilibrium.js';
import { isPressure } from '../system/stated-data.js';
import type { ConditionDatum, ConditionSystem } from '../system/system.js';
import { byColumn, columnSlip } from './columns.js';
import { addTo } from './exchanged.js';
import { pressureRatios } from './pressure-ratios.js';
import type { WholeSlip } from './whole-slips.js';

const SHIFTS = [
  ['celsius-read-as-kelvin', ICE_POINT_K, 0.04],
  ['kelvin-read-as-celsius', -ICE_POINT_K, 0.03],
] as const;

export function pressureColumns(system: ConditionSystem): WholeSlip[] {
  const slips: WholeSlip[] = [];
  for (const data of byColumn(system.data.filter(isPressure))) {
    const [{ datum, u }] = data;
    for (const { code, ratio, weight } of pressureRatios(datum.factor)) {
      const change = new Float64Array(system.m);
      for (const d of data) addTo(change, d.direction, Math.log(ratio));
      slips.push(columnSlip(code, data, datum.value * ratio, u * datum.value * ratio, change, weight));
    }
    // lg p printed where ln p was meant, or the reverse: the number to the power of ln 10, or of lg e.
    for (const power of [Math.LN10, Math.LOG10E]) {
      const change = new Float64Array(system.m);
      const step = (d: ConditionDatum): number => (power - 1) * Math.log(d.datum.value / d.datum.factor);
      for (const d of data) addTo(change, d.direction, step(d));
      const corrected = datum.value * Math.exp(step(data[0]));
      slips.push(columnSlip('log10-taken-for-ln', data, corrected, u * corrected, change, 0.01));
    }
  }
  for (const data of byColumn(system.data.filter((d) => d.kind === 'saturation-temperature'))) {
    for (const [code, shift, weight] of SHIFTS) {
      const change = new Float64Array(system.m);
      const reached = data.every((d) => {
        const pair = system.saturated.find((one) => d.key === datumKey.saturationTemperature(one.index));
        const t = d.datum.value + shift;
        if (pair === undefined) return false;
        if (!(t > Math.max(pair.from.lowK, pair.to.lowK) && t < Math.min(pair.from.highK, pair.to.highK))) return false;
        const i = d.direction.findIndex((v) => v !== 0);
        change[i] = -equilibrium(pair.from, pair.to, t).gapJPerMol - system.y[i];
        return true;
      });
      if (reached) slips.push(columnSlip(code, data, data[0].datum.value + shift, data[0].u, change, weight));
    }
  }
  return slips;
}
