/** Every single number that is stated about a substance outside its tables. */
import type { Datum, HarmonisedCase } from '../../schemas/harmonised.js';
import type { NumberQuantity } from '../../schemas/quantities.js';
import type { TableMeaning } from '../../schemas/table-meaning.js';

export interface StatedCell {
  readonly quantity: NumberQuantity;
  readonly datum: Datum;
  /** The other of a transition's enthalpy and entropy. */
  readonly partner: Datum | null;
  readonly temperatureK: number;
  /** One, or a transition's two from low to high temperature. */
  readonly phases: readonly string[];
  readonly table: TableMeaning;
  /** Index among the substance's transitions; -1 for what belongs to none. */
  readonly transition: number;
}

export function statedCells(substance: HarmonisedCase): readonly StatedCell[] {
  const found: StatedCell[] = [];
  substance.transitions.forEach((t, transition) => {
    const around = { temperatureK: t.temperature.value, phases: [t.from, t.to], table: t.table, transition };
    found.push({ quantity: 'transition-temperature', datum: t.temperature, partner: null, ...around });
    if (t.enthalpy !== null)
      found.push({ quantity: 'transition-enthalpy', datum: t.enthalpy, partner: t.entropy, ...around });
    if (t.entropy !== null)
      found.push({ quantity: 'transition-entropy', datum: t.entropy, partner: t.enthalpy, ...around });
    if (t.pressure !== null) found.push({ quantity: 'pressure', datum: t.pressure, partner: null, ...around });
  });
  for (const a of substance.anchors) {
    const around = { temperatureK: a.referenceTemperatureK, phases: [a.phase], table: a.table, transition: -1 };
    const data: readonly (readonly [NumberQuantity, Datum | null])[] = [
      ['enthalpy-of-formation', a.enthalpyOfFormation],
      ['entropy', a.entropy],
      ['gibbs-energy-of-formation', a.gibbsEnergyOfFormation],
      ['enthalpy-from-zero', a.enthalpyFromZero],
      ['heat-capacity', a.heatCapacity],
    ];
    for (const [quantity, datum] of data) if (datum !== null) found.push({ quantity, datum, partner: null, ...around });
  }
  for (const { table, phase, temperature, pressure } of substance.vapourPressures) {
    const around = { partner: null, temperatureK: temperature.value, phases: [phase], table, transition: -1 };
    found.push({ quantity: 'temperature', datum: temperature, ...around });
    found.push({ quantity: 'pressure', datum: pressure, ...around });
  }
  return found;
}
