import type { CheckedCase, JudgedTransition } from '../../../schemas/checked.js';
import type { PhaseCurve } from '../../../schemas/curves.js';
import { type Equilibrium, equilibrium } from '../../core/physics/equilibrium.js';
import { boilingTemperature, isGas, type PlacedPhase, placePhase } from '../../core/physics/placed-phase.js';

/** Two phases that are stated to be in equilibrium, placed in a diagram at the stated pressure. */
export interface Pair {
  readonly from: PlacedPhase<PhaseCurve>;
  readonly to: PlacedPhase<PhaseCurve>;
  /** Where the two are compared: the stated temperature, or the nearest that both curves reach. */
  readonly atK: number;
  readonly at: Equilibrium;
}

/** A stated transition whose two curves can be compared. */
export interface Joined extends Pair {
  readonly judged: JudgedTransition;
  /** Everything is from one evaluated source: rounding alone stands between its numbers. */
  readonly within: boolean;
  /** H, and S, of one of the phases was carried through this very transition: its stated dH, or dS, closes by construction. */
  readonly carriesH: boolean;
  readonly carriesS: boolean;
}

export function joinedTransitions(checked: CheckedCase, isobarPa: number | null): Joined[] {
  const { curves } = checked.assembled;
  const { substance, transitions } = checked.assembled.examined.harmonised;
  const joined: Joined[] = [];
  const boiling = boilingTemperature(transitions);
  for (const judged of checked.judged) {
    const { stated } = judged;
    // An estimate witnesses nothing.
    if (!(stated.pressurePa > 0) || stated.table.basis === 'estimated') continue;
    if (stated.order !== 'first' || stated.from === stated.to || judged.fromCurve < 0 || judged.toCurve < 0) continue;
    const a = curves[judged.fromCurve];
    const b = curves[judged.toCurve];
    if (a.family.isobarPa !== isobarPa || b.family.isobarPa !== isobarPa) continue;
    if (!hasLevels(a) || !hasLevels(b)) continue;
    const setting = { pressurePa: stated.pressurePa, gas: stated.gas ?? ('real' as const) };
    const from = placePhase(a, substance, setting, boiling);
    const to = placePhase(b, substance, setting, boiling);
    const low = Math.max(from.lowK, to.lowK);
    const high = Math.min(from.highK, to.highK);
    if (!(high > low)) continue;
    let atK = stated.temperature.value;
    if (atK < low || atK > high) atK = judged.computedK ?? Math.min(high, Math.max(low, atK));
    const { source, basis } = stated.table;
    const within = basis !== 'measured' && a.sources.every((s) => s === source) && b.sources.every((s) => s === source);
    const carriesH = a.enthalpyThrough === judged.index || b.enthalpyThrough === judged.index;
    const carriesS = a.entropyThrough === judged.index || b.entropyThrough === judged.index;
    joined.push({ judged, from, to, atK, at: equilibrium(from, to, atK), within, carriesH, carriesS });
  }
  return joined;
}

/** A measured (T, p) over a condensed phase, by its index among the substance's. */
export interface Saturated extends Pair {
  readonly index: number;
  /** How far the stated temperature lies beyond what both curves cover. */
  readonly beyondK: number;
}

/** The virial equation cut after B is good to about this. */
const HIGHEST_REAL_PA = 1e7;

/** Vapour pressures bear on the standard state, on both curves' data. */
export function saturatedPairs(checked: CheckedCase): Saturated[] {
  const { curves } = checked.assembled;
  const { substance, transitions, vapourPressures } = checked.assembled.examined.harmonised;
  if (vapourPressures.length === 0) return [];
  const gas = curves.find((c) => isGas(c.phase) && c.family.isobarPa === null && hasLevels(c));
  if (gas === undefined) return [];
  const boiling = boilingTemperature(transitions);
  const pairs: Saturated[] = [];
  vapourPressures.forEach((stated, index) => {
    const condensed = curves.find((c) => c.phase === stated.phase && c.family.isobarPa === null && hasLevels(c));
    const pressurePa = stated.pressure.value;
    const statedK = stated.temperature.value;
    if (condensed === undefined || !(pressurePa > 0) || !(statedK > 0)) return;
    // Beyond what a second virial coefficient can do, its uncertainty would hide any slip.
    const setting = { pressurePa, gas: pressurePa > HIGHEST_REAL_PA ? ('ideal' as const) : ('real' as const) };
    const from = placePhase(condensed, substance, setting, boiling);
    const to = placePhase(gas, substance, setting, boiling);
    const low = Math.max(from.lowK, to.lowK);
    const high = Math.min(from.highK, to.highK);
    if (!(high > low)) return;
    const atK = Math.min(high, Math.max(low, statedK));
    pairs.push({ index, from, to, atK, at: equilibrium(from, to, atK), beyondK: statedK - atK });
  });
  return pairs;
}

function hasLevels(curve: PhaseCurve): boolean {
  return curve.hasEnthalpyLevel && curve.hasEntropyLevel;
}
