/** The transition temperatures of one table all in degrees, or on an old scale. */
import { ICE_POINT_K } from '../../core/constants.js';
import { equilibrium } from '../../core/physics/equilibrium.js';
import { t90MinusT48, t90MinusT68 } from '../../core/units/temperature-scale.js';
import { atTemperature } from '../system/conditions.js';
import type { ConditionSystem } from '../system/system.js';
import { byColumn, columnSlip } from './columns.js';
import type { WholeSlip } from './whole-slips.js';

/** By code: the temperature that was meant [K]; null where it is not known. */
const READINGS: readonly (readonly [string, (kelvin: number) => number | null])[] = [
  ['celsius-read-as-kelvin', (t) => t + ICE_POINT_K],
  ['kelvin-read-as-celsius', (t) => t - ICE_POINT_K],
  ['fahrenheit-not-converted', (t) => ((t - 32) * 5) / 9 + ICE_POINT_K],
  ['old-temperature-scale', (t) => plus(t, t90MinusT68(t - ICE_POINT_K))],
  ['old-temperature-scale', (t) => plus(t, t90MinusT48(t - ICE_POINT_K))],
];

export function temperatureColumns(system: ConditionSystem): WholeSlip[] {
  const slips: WholeSlip[] = [];
  for (const data of byColumn(system.data.filter((d) => d.kind === 'temperature'))) {
    const [first] = data;
    for (const [code, meant] of READINGS) {
      const change = new Float64Array(system.m);
      const reached = data.every((d) => {
        const k = system.joined.findIndex((j) => j.judged.index === d.transition);
        const j = system.joined[k];
        const t = meant(d.datum.value);
        if (j === undefined || t === null) return false;
        if (!(t > Math.max(j.from.lowK, j.to.lowK) && t < Math.min(j.from.highK, j.to.highK))) return false;
        const there = equilibrium(j.from, j.to, t);
        system.conditions.forEach((c, i) => {
          if (c.joined === k) change[i] = atTemperature(c, there, t, j.judged.stated) - c.value;
        });
        return true;
      });
      if (!reached) continue;
      const corrected = meant(first.datum.value) as number;
      const weight = code === 'old-temperature-scale' ? 0.005 : 0.02;
      slips.push(columnSlip(code, data, corrected, first.u, change, weight));
    }
  }
  return slips;
}

function plus(t: number, difference: number | null): number | null {
  return difference === null ? null : t + difference;
}
