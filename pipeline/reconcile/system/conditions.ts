import type { PhaseCurve } from '../../../schemas/curves.js';
import type { Anchor, Datum, HarmonisedCase, StatedTransition } from '../../../schemas/harmonised.js';
import { R_J_PER_MOL_K } from '../../core/constants.js';
import { enthalpyAt, entropyAt, gibbsAt, heatCapacityAt, intervalOf } from '../../core/physics/curve.js';
import { datumKey } from '../../core/physics/datum-keys.js';
import { ErrorSum } from '../../core/physics/error-sum.js';
import { imperfection } from '../../core/physics/imperfection-error.js';
import { gasTermUncertainty } from '../../core/physics/placed-phase.js';
import { condensedTermUncertainty } from '../../core/physics/pressure-terms.js';
import type { Joined, Pair, Saturated } from './joined.js';

export type ConditionKind =
  | 'gap'
  | 'enthalpy'
  | 'entropy'
  | 'closure'
  | 'anchor-enthalpy'
  | 'anchor-entropy'
  | 'from-zero'
  | 'heat-capacity'
  | 'formation'
  | 'saturation';

/** One value that should vanish, with all that its error is made of. */
export interface Condition {
  readonly kind: ConditionKind;
  /** Index among the joined transitions, and among the substance's; or -1. */
  readonly joined: number;
  readonly transition: number;
  readonly value: number;
  /** Its error: of curves' rows and of data, by key. */
  readonly sum: ErrorSum;
  /** Variance that is this condition's own. */
  readonly variance: number;
  /** All of its numbers are one evaluated source's. */
  readonly within: boolean;
}

/** Per transition that two curves meet at: G_to - G_from = 0, dH - stated dH = 0, dS - stated dS = 0. */
export function transitionConditions(joined: readonly Joined[]): Condition[] {
  const conditions: Condition[] = [];
  for (let k = 0; k < joined.length; k++) {
    const j = joined[k];
    // With both levels carried through it, G is equal on both sides whatever is stated.
    if (j.carriesH && j.carriesS) continue;
    const { judged, at, atK, within } = j;
    const { stated, index } = judged;
    const { enthalpy, entropy } = stated;
    const { entropyJPerMolK: dS, heatCapacityJPerMolK: dCp } = at;
    const keyT = datumKey.temperature(index);
    const keyP = datumKey.transitionPressure(index);
    const offset = stated.temperature.value - atK;
    const uGas = gasTermUncertainty(j.from, j.to, atK);
    const isobar = j.from.source.family.isobarPa;
    const byPressure = isobar !== null || stated.pressure === null ? 0 : R_J_PER_MOL_K * gasUnits(j);
    const volume = isobar === null ? condensedTermUncertainty(stated.pressurePa) : 0;
    const add = (kind: ConditionKind, value: number, sum: ErrorSum, h: number, s: number, variance: number): void => {
      for (const { key, by, u } of imperfection(uGas, h, s, atK)) sum.addDatum(key, by, u);
      conditions.push({ kind, joined: k, transition: index, value, sum, variance, within });
    };
    const gap = addPressure(difference(j, 1, -atK).addDatum(keyT, -dS, 0), keyP, atK * byPressure);
    add('gap', -(at.gapJPerMol + dS * offset), gap, 1, -atK, volume * volume);
    if (enthalpy !== null && !j.carriesH) {
      const sum = difference(j, 1, 0).addDatum(keyT, dCp, 0).addDatum(datumKey.enthalpy(index), -1, 0);
      add('enthalpy', at.enthalpyJPerMol + dCp * offset - enthalpy.value, sum, 1, 0, 0);
    }
    if (entropy !== null && !j.carriesS) {
      const sum = difference(j, 0, 1)
        .addDatum(keyT, dCp / atK, 0)
        .addDatum(datumKey.entropy(index), -1, 0);
      add('entropy', dS + (dCp * offset) / atK - entropy.value, addPressure(sum, keyP, -byPressure), 0, 1, 0);
    }
  }
  return conditions;
}

/** dH - T dS = 0 of the stated numbers, where no curve of its own stands on both sides of the transition. */
export function closureConditions(
  transitions: readonly StatedTransition[],
  onIsobar: (transition: number) => boolean,
  joined: readonly Joined[],
): Condition[] {
  const conditions: Condition[] = [];
  transitions.forEach(({ enthalpy, entropy, temperature, order }, index) => {
    const k = joined.findIndex((j) => j.judged.index === index);
    if (order !== 'first' || enthalpy === null || entropy === null || !onIsobar(index)) return;
    if (k >= 0 && !(joined[k].carriesH && joined[k].carriesS)) return;
    const t = temperature.value;
    const sum = new ErrorSum()
      .addDatum(datumKey.enthalpy(index), 1, 0)
      .addDatum(datumKey.entropy(index), -t, 0)
      .addDatum(datumKey.temperature(index), -entropy.value, 0);
    const within = joined[k]?.within ?? false;
    conditions.push({
      kind: 'closure',
      joined: k,
      transition: index,
      value: enthalpy.value - t * entropy.value,
      sum,
      variance: 0,
      within,
    });
  });
  return conditions;
}

/** G_g(T, p) - G_condensed(T, p) = 0 of each measured vapour pressure, its error in p taken in ln p. */
/** Of the heat capacities of a vapour and what it is over [J/(mol K)]; a bound for most substances: judgement. */
const USUAL_DIFFERENCE = 50;
/** However far, the entropy of vaporization changes by less than this share of itself on the way; judgement. */
const LARGEST_CHANGE = 0.2;

/** Standard uncertainty of G beyond the curves' end, taken on by the entropy there: dCp x^2 / 2T, bounded [J/mol]. */
function beyondCurves({ at, atK, beyondK: x }: Saturated): number {
  const dCp = Math.max(USUAL_DIFFERENCE, 2 * Math.abs(at.heatCapacityJPerMolK));
  return Math.min((dCp * x * x) / (2 * atK), LARGEST_CHANGE * Math.abs(at.entropyJPerMolK * x));
}

export function saturationConditions(saturated: readonly Saturated[]): Condition[] {
  return saturated.map((pair) => {
    const { atK, at, to, index, beyondK } = pair;
    const sum = difference(pair, 1, -atK)
      .addDatum(datumKey.saturationTemperature(index), -at.entropyJPerMolK, 0)
      .addDatum(datumKey.saturationPressure(index), (R_J_PER_MOL_K * atK) / to.formulaUnits, 0);
    for (const { key, by, u } of imperfection(gasTermUncertainty(pair.from, to, atK), 1, -atK, atK))
      sum.addDatum(key, by, u);
    return {
      kind: 'saturation',
      joined: -1,
      transition: -1,
      // Beyond the curves by the entropy at their end; what the heat capacities may add is allowed for.
      value: -(at.gapJPerMol + at.entropyJPerMolK * beyondK),
      sum,
      variance: beyondCurves(pair) ** 2,
      within: false,
    };
  });
}

/**
 * Anchors that no level rests on, against the curves: S and dfH at the reference temperature, H(Tr) - H(0) where a crystal's
 * curve reaches 0 K, Cp where the table has a row there. What one source took from another is no witness of it.
 */
export function anchorConditions(
  substance: HarmonisedCase,
  curves: readonly PhaseCurve[],
  isobarPa: number | null,
): Condition[] {
  const conditions: Condition[] = [];
  substance.anchors.forEach((anchor, index) => {
    if (anchor.table.isobarPa !== isobarPa || anchor.table.basis === 'estimated') return;
    const curve = curves.find((c) => c.phase === anchor.phase && c.family.isobarPa === isobarPa);
    if (curve === undefined) return;
    const t = anchor.referenceTemperatureK;
    if (t < curve.measuredFromK || t > curve.measuredToK || restsOnAnother(anchor, curve, substance)) return;
    const within = anchor.table.basis !== 'measured' && curve.sources.every((s) => s === anchor.table.source);
    const add = (kind: ConditionKind, value: number, sum: ErrorSum, variance = 0): void => {
      conditions.push({ kind, joined: -1, transition: -1, value, sum, variance, within });
    };
    const { entropy, enthalpyOfFormation, enthalpyFromZero, heatCapacity } = anchor;
    if (
      entropy !== null &&
      curve.hasEntropyLevel &&
      curve.entropyAnchor !== index &&
      anchor.table.entropyZero === curve.family.entropyZero
    ) {
      const sum = new ErrorSum().add(curve, t, 0, -1).addDatum(datumKey.anchorEntropy(index), 1, 0);
      add('anchor-entropy', entropy.value - entropyAt(curve, t), sum);
    }
    if (
      enthalpyOfFormation !== null &&
      curve.hasEnthalpyLevel &&
      curve.enthalpyAnchor !== index &&
      anchor.table.enthalpyZero === curve.family.enthalpyZero
    ) {
      const sum = new ErrorSum().add(curve, t, -1, 0).addDatum(datumKey.formationEnthalpy(index), 1, 0);
      add('anchor-enthalpy', enthalpyOfFormation.value - enthalpyAt(curve, t), sum);
    }
    if (enthalpyFromZero !== null && curve.knotK[0] === 0) {
      const sum = new ErrorSum().add(curve, t, -1, 0).add(curve, 0, 1, 0).addDatum(datumKey.fromZero(index), 1, 0);
      add('from-zero', enthalpyFromZero.value - (enthalpyAt(curve, t) - enthalpyAt(curve, 0)), sum);
    }
    if (heatCapacity !== null) {
      const i = intervalOf(curve, t);
      if (curve.knotK[i] === t && curve.knotKind[i] === 0) {
        const u = Math.hypot(curve.uHeatCapacityJPerMolK[i], curve.uCalibrationRelative * heatCapacity.value);
        const sum = new ErrorSum().addDatum(datumKey.heatCapacity(index), 1, 0);
        add('heat-capacity', heatCapacity.value - heatCapacityAt(curve, t, i), sum, u * u);
      }
    }
  });
  return conditions;
}

/** Between two phases the elements cancel: the difference of their Gibbs energies of formation is that of their curves. */
export function formationConditions(
  substance: HarmonisedCase,
  curves: readonly PhaseCurve[],
  isobarPa: number | null,
): Condition[] {
  const stated = substance.anchors.flatMap((anchor, index) => {
    const { gibbsEnergyOfFormation: datum, phase, table, referenceTemperatureK: t } = anchor;
    const curve = curves.find((c) => c.phase === phase && c.family.isobarPa === isobarPa);
    if (datum === null || table.isobarPa !== isobarPa || curve === undefined) return [];
    const reaches = t >= curve.measuredFromK && t <= curve.measuredToK;
    if (!curve.hasEnthalpyLevel || !curve.hasEntropyLevel || !reaches) return [];
    return [{ curve, datum, index, t, source: table.source, evaluated: table.basis !== 'measured' }];
  });
  const [first, ...others] = stated;
  return others
    .filter(({ t }) => t === first.t)
    .map(({ curve, datum, index, t, source, evaluated }) => ({
      kind: 'formation',
      joined: -1,
      transition: -1,
      value: datum.value - first.datum.value - (gibbsAt(curve, t) - gibbsAt(first.curve, t)),
      sum: new ErrorSum()
        .add(curve, t, -1, t)
        .add(first.curve, t, 1, -t)
        .addDatum(datumKey.formationGibbsEnergy(index), 1, 0)
        .addDatum(datumKey.formationGibbsEnergy(first.index), -1, 0),
      variance: 0,
      within: evaluated && [...curve.sources, ...first.curve.sources, first.source].every((s) => s === source),
    }));
}

/** h H + s S of `to` less that of `from`, each per formula unit. */
function difference({ from, to, atK }: Pair, h: number, s: number): ErrorSum {
  return new ErrorSum()
    .add(to.source, atK, h / to.formulaUnits, s / to.formulaUnits)
    .add(from.source, atK, -h / from.formulaUnits, -s / from.formulaUnits);
}

/** Moles of gas that a formula unit becomes: what R ln p counts with, negative where the gas is `from`. */
function gasUnits({ from, to }: Pair): number {
  return (to.gas ? 1 / to.formulaUnits : 0) - (from.gas ? 1 / from.formulaUnits : 0);
}

/** The error of a transition's pressure, by ln p; none where it is no cell, or no gas takes part. */
function addPressure(sum: ErrorSum, key: string, by: number): ErrorSum {
  return by === 0 ? sum : sum.addDatum(key, by, 0);
}

/** The anchor's source was computed from one of the curve's, or the other way round. */
function restsOnAnother(anchor: Anchor, curve: PhaseCurve, substance: HarmonisedCase): boolean {
  const { source, restsOn } = anchor.table;
  if (curve.sources.includes(source)) return false;
  if (curve.sources.some((s) => restsOn.includes(s))) return true;
  return substance.series.some(({ table }) => table.restsOn.includes(source) && curve.sources.includes(table.source));
}

/** The value of a transition's condition with its temperature taken at `temperatureK`, where the curves give `there`. */
export function atTemperature(
  condition: Condition,
  there: Joined['at'],
  temperatureK: number,
  stated: StatedSizes,
): number {
  const dH = stated.enthalpy?.value ?? 0;
  const dS = stated.entropy?.value ?? 0;
  switch (condition.kind) {
    case 'gap':
      return -there.gapJPerMol;
    case 'enthalpy':
      return there.enthalpyJPerMol - dH;
    case 'entropy':
      return there.entropyJPerMolK - dS;
    case 'closure':
      return dH - temperatureK * dS;
    default:
      return condition.value;
  }
}

/** How the same moves with that temperature, there. */
export function slopeAtTemperature(
  condition: Condition,
  there: Joined['at'],
  temperatureK: number,
  dS: number,
): number {
  switch (condition.kind) {
    case 'gap':
      return -there.entropyJPerMolK;
    case 'enthalpy':
      return there.heatCapacityJPerMolK;
    case 'entropy':
      return there.heatCapacityJPerMolK / temperatureK;
    case 'closure':
      return -dS;
    default:
      return 0;
  }
}

interface StatedSizes {
  readonly enthalpy: Datum | null;
  readonly entropy: Datum | null;
}
