import type { ReconciledCase } from '../../schemas/checked.js';
import type { PhaseCurve } from '../../schemas/curves.js';
import type { Policy } from '../../schemas/policy.js';
import type { RawCase } from '../../schemas/raw.js';
import { assemble } from '../assemble/assemble.js';
import { enthalpyAt, entropyAt, heatCapacityAt } from '../core/physics/curve.js';
import { stateCovariance } from '../core/physics/curve-uncertainty.js';
import {
  type GibbsWeight,
  gibbsWeights,
  type MovedState,
  type Sensitivity,
  sensitivity,
} from '../core/physics/gibbs-weights.js';
import { harmonise } from '../harmonise/harmonise.js';
import { movable, type RawNumber } from './trace-numbers.js';

/** A raw cell with what it does to H, S and G. */
export interface TracedNumber extends RawNumber {
  readonly sensitivity: Sensitivity;
  /** Its SI value. */
  readonly value: number;
}

/** An error that several cells of a series share: its calibration. */
export interface SharedWeight {
  readonly cells: number;
  readonly first: TracedNumber;
  readonly relative: number;
  readonly weightJPerMol: number;
}

/** One curve at one temperature, with the raw numbers behind it, largest weight in G first. */
export interface Trace {
  readonly curve: PhaseCurve;
  readonly temperatureK: number;
  readonly heatCapacityJPerMolK: number;
  readonly enthalpyJPerMol: number;
  readonly entropyJPerMolK: number;
  readonly gibbsEnergyJPerMol: number;
  readonly uEnthalpyJPerMol: number;
  readonly uEntropyJPerMolK: number;
  readonly uGibbsEnergyJPerMol: number;
  /** Cells that G, H or S depends on. */
  readonly weights: readonly GibbsWeight<TracedNumber>[];
  readonly shared: readonly SharedWeight[];
  /** How many cells were moved in turn. */
  readonly tried: number;
}

/**
 * Traces one curve at one temperature: each raw cell of the substance is moved in turn and the calculation done again, from
 * harmonising to the curve, with the cells left out that the checks named. `onProgress` hears how many are done
 * of how many.
 */
export function trace(
  raw: RawCase,
  judged: ReconciledCase,
  curve: PhaseCurve,
  temperatureK: number,
  policy: Policy,
  onProgress: (done: number, total: number) => void = () => {},
): Trace {
  const { examined, curves } = judged.checked.assembled;
  const { raw: copy, numbers } = movable(raw, examined.harmonised, curves);
  const index = curves.filter(({ phase }) => phase === curve.phase).indexOf(curve);
  const state = (read: RawNumber['read']): MovedState => {
    const [harmonised] = harmonise([copy], { policy }).artefact;
    const [assembled] = assemble([{ ...examined, harmonised: harmonised! }], { policy }).artefact;
    const again = assembled!.curves.filter(({ phase }) => phase === curve.phase)[index]!;
    return {
      enthalpyJPerMol: enthalpyAt(again, temperatureK),
      entropyJPerMolK: entropyAt(again, temperatureK),
      number: read(harmonised!),
    };
  };
  const centre = { enthalpyJPerMol: enthalpyAt(curve, temperatureK), entropyJPerMolK: entropyAt(curve, temperatureK) };
  const traced = numbers.map((number, i): TracedNumber => {
    const moved = (by: number): MovedState => {
      number.move(by);
      return state(number.read);
    };
    const found = sensitivity(centre, moved, number.step, temperatureK);
    number.move(0);
    onProgress(i + 1, numbers.length);
    return { ...number, sensitivity: found, value: number.read(examined.harmonised) };
  });
  const acting = traced.filter(({ sensitivity: { enthalpy, entropy } }) => enthalpy !== 0 || entropy !== 0);
  const { hh, hs, ss } = stateCovariance(curve, temperatureK);
  const variance = hh - 2 * temperatureK * hs + temperatureK * temperatureK * ss;
  const uGibbsEnergyJPerMol = Math.sqrt(Math.max(0, variance));
  return {
    curve,
    temperatureK,
    heatCapacityJPerMolK: heatCapacityAt(curve, temperatureK),
    ...centre,
    gibbsEnergyJPerMol: centre.enthalpyJPerMol - temperatureK * centre.entropyJPerMolK,
    uEnthalpyJPerMol: Math.sqrt(Math.max(0, hh)),
    uEntropyJPerMolK: Math.sqrt(Math.max(0, ss)),
    uGibbsEnergyJPerMol,
    weights: gibbsWeights(acting, uGibbsEnergyJPerMol),
    shared: sharedWeights(acting),
    tried: numbers.length,
  };
}

/** A calibration acts on all cells of its series at once: their sensitivities add up with their signs. */
function sharedWeights(numbers: readonly TracedNumber[]): SharedWeight[] {
  const series = new Map<string, TracedNumber[]>();
  for (const number of numbers) {
    if (number.uSharedRelative > 0) series.set(number.series, [...(series.get(number.series) ?? []), number]);
  }
  return [...series.values()].map((cells) => {
    const [first] = cells as [TracedNumber];
    const sum = cells.reduce((total, { sensitivity: { gibbs }, value }) => total + gibbs * value, 0);
    return {
      cells: cells.length,
      first,
      relative: first.uSharedRelative,
      weightJPerMol: Math.abs(sum) * first.uSharedRelative,
    };
  });
}
