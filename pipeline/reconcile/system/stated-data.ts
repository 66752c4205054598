import type { Anchor, Datum, HarmonisedCase } from '../../../schemas/harmonised.js';
import { datumKey } from '../../core/physics/datum-keys.js';
import { isGas } from '../../core/physics/placed-phase.js';
import { uStated } from '../../core/physics/stated-u.js';
import type { Joined, Saturated } from './joined.js';

export type DatumKind =
  | 'temperature'
  | 'enthalpy'
  | 'entropy'
  | 'transition-pressure'
  | 'formation-enthalpy'
  | 'anchor-entropy'
  | 'formation-gibbs-energy'
  | 'enthalpy-from-zero'
  | 'anchor-heat-capacity'
  | 'saturation-temperature'
  | 'saturation-pressure'
  /** A table's column as a whole; no number of its own. */
  | 'column';

/** A stated number that the conditions may rest on. `key` is the one that curves' levels know it by. */
export interface StatedDatum {
  readonly key: string;
  readonly kind: DatumKind;
  readonly datum: Datum;
  /** Standard uncertainty that it enters with; of the logarithm for a pressure. */
  readonly u: number;
  /** Its transition among the substance's, or -1. */
  readonly transition: number;
  /** Phases that it is stated for. */
  readonly phases: readonly string[];
  /** As coverage names it: `T cr>l`, `dfH l`. */
  readonly place: string;
}

/** An error of a pressure's logarithm as one of the pressure; a power beyond all pressures is as good as any. */
export function inPressure(pressurePa: number, logarithm: number): number {
  return pressurePa * Math.expm1(Math.min(logarithm, 100));
}

/** Its error is one of ln p. */
export function isPressure({ kind }: Pick<StatedDatum, 'kind'>): boolean {
  return kind === 'saturation-pressure' || kind === 'transition-pressure';
}

/**
 * Every stated number of a substance on one isobar apart from its tables' cells. Within one evaluated source only the rounding of a number
 * stands between it and the others; what several sources state has its own uncertainty.
 */
export function statedData(
  substance: HarmonisedCase,
  isobarPa: number | null,
  isobarOf: (transition: number) => number | null,
  joined: readonly Joined[],
  saturated: readonly Saturated[],
  uOfAnchor: (key: string, anchor: Anchor, datum: Datum) => number,
): StatedDatum[] {
  const data: StatedDatum[] = [];
  const where = isobarPa === null ? '' : ` at ${isobarPa} Pa`;
  substance.transitions.forEach((stated, transition) => {
    if (isobarOf(transition) !== isobarPa) return;
    const within = joined.some((j) => j.judged.index === transition && j.within);
    const u = (datum: Datum): number => uStated(datum, within);
    const phases = [stated.from, stated.to];
    const name = `${stated.from}>${stated.to}${where}`;
    const add = (kind: DatumKind, key: string, symbol: string, datum: Datum | null): void => {
      if (datum === null) return;
      data.push({ key, kind, datum, u: u(datum), transition, phases, place: `${symbol} ${name}` });
    };
    add('temperature', datumKey.temperature(transition), 'T', stated.temperature);
    add('enthalpy', datumKey.enthalpy(transition), 'dH', stated.enthalpy);
    add('entropy', datumKey.entropy(transition), 'dS', stated.entropy);
    const { pressure } = stated;
    // On an isobar it only says which one.
    if (pressure === null || isobarPa !== null || !(pressure.value > 0) || !phases.some(isGas)) return;
    data.push({
      key: datumKey.transitionPressure(transition),
      kind: 'transition-pressure',
      datum: pressure,
      u: pressure.u / pressure.value,
      transition,
      phases,
      place: `p ${name}`,
    });
  });
  substance.anchors.forEach((anchor, index) => {
    if (anchor.table.isobarPa !== isobarPa) return;
    const name = `${anchor.phase}${where}`;
    const add = (kind: DatumKind, key: string, symbol: string, datum: Datum | null): void => {
      if (datum === null) return;
      const u = uOfAnchor(key, anchor, datum);
      data.push({ key, kind, datum, u, transition: -1, phases: [anchor.phase], place: `${symbol} ${name}` });
    };
    add('formation-enthalpy', datumKey.formationEnthalpy(index), 'dfH', anchor.enthalpyOfFormation);
    add('anchor-entropy', datumKey.anchorEntropy(index), 'S', anchor.entropy);
    add('formation-gibbs-energy', datumKey.formationGibbsEnergy(index), 'dfG', anchor.gibbsEnergyOfFormation);
    add('enthalpy-from-zero', datumKey.fromZero(index), 'H-H(0)', anchor.enthalpyFromZero);
    add('anchor-heat-capacity', datumKey.heatCapacity(index), 'Cp', anchor.heatCapacity);
  });
  const compared = new Set(saturated.map((one) => one.index));
  substance.vapourPressures.forEach(({ phase, temperature, pressure }, index) => {
    if (!compared.has(index)) return;
    const common = { transition: -1, phases: [phase, 'g'] };
    data.push({
      ...common,
      key: datumKey.saturationTemperature(index),
      kind: 'saturation-temperature',
      datum: temperature,
      u: uStated(temperature, false),
      place: `T over ${phase}`,
    });
    data.push({
      ...common,
      key: datumKey.saturationPressure(index),
      kind: 'saturation-pressure',
      datum: pressure,
      u: uStated(pressure, false) / pressure.value,
      place: `p over ${phase}`,
    });
  });
  return data;
}
