import type { CurveFamily, LevelOrigin, PhaseCurve } from '../../schemas/curves.js';
import type { Anchor, Datum, HarmonisedCase } from '../../schemas/harmonised.js';
import type { Policy } from '../../schemas/policy.js';
import { numbers } from '../core/numeric/room.js';
import { type CurveArrays, enthalpyAt, entropyAt } from '../core/physics/curve.js';
import { datumKey } from '../core/physics/datum-keys.js';
import { uStated } from '../core/physics/stated-u.js';
import { carryAll, type Level, type Origin, relative } from './carry-levels.js';
import type { PhaseShape } from './phase-shape.js';

/** Puts levels on the shapes of one family: see `levelled`. */
export interface Family {
  readonly zeros: CurveFamily;
  readonly substance: HarmonisedCase;
  /** On the family's zeros and pressure. */
  readonly anchors: readonly Anchor[];
}

/**
 * Puts the shapes of one family on its zeros. H and S come, in this order, from the table's own declared values, from an
 * anchor at the reference temperature, from the third law (S, with what is left of it at 0 K), and through a stated transition
 * from a phase whose level is known. A family in which nothing is anchored counts from its first phase.
 */
export function levelled(shapes: readonly PhaseShape[], family: Family, policy: Policy): PhaseCurve[] {
  const growth = policy.continuation.relativePer100K / 100;
  const residual = family.substance.substance.residualEntropyJPerMolK;
  const levels = shapes.map((shape) => ownLevel(shape, family, growth, residual));
  shareEvaluations(levels);
  let { zeros } = family;
  for (;;) {
    carryAll(shapes, levels, family);
    const openH = levels.every((l) => l.h === null);
    const openS = levels.every((l) => l.s === null);
    if (!openH && !openS) break;
    // Nothing anchors the family: it counts from its first phase, and says so.
    if (openH) {
      levels[0] = { ...levels[0], h: 0, uH: 0, hFrom: 'none' };
      zeros = { ...zeros, enthalpyZero: ownZero(shapes[0].phase, shapes[0].referenceK) };
    }
    if (openS) {
      levels[0] = { ...levels[0], s: 0, uS: 0, sFrom: 'none' };
      zeros = { ...zeros, entropyZero: ownZero(shapes[0].phase, shapes[0].entropyReferenceK) };
    }
  }
  const curves = shapes.map((shape, k) => curveOf(shape, levels[k], { ...family, zeros }, growth));
  curves.forEach((curve, k) => {
    const { hOrigin, sOrigin } = levels[k];
    if (hOrigin !== null) curve.enthalpyLevel = originOf(hOrigin, curves);
    if (sOrigin !== null) curve.entropyLevel = originOf(sOrigin, curves);
  });
  return curves;
}

function ownZero(phase: string, atK: number): string {
  return `${phase} at ${atK} K`;
}

function originOf(origin: Origin, curves: readonly PhaseCurve[]): LevelOrigin {
  const { source, atK, scale, errors } = origin;
  return { from: source < 0 ? null : curves[source], atK, scale, errors };
}

function ownLevel(
  shape: PhaseShape,
  { anchors, substance }: Family,
  growth: number,
  residualEntropyJPerMolK: number,
): Level {
  const level: Level = {
    h: null,
    s: null,
    uH: 0,
    uS: 0,
    hFrom: 'none',
    sFrom: 'none',
    hThrough: -1,
    sThrough: -1,
    hAnchor: null,
    sAnchor: null,
    hOrigin: null,
    sOrigin: null,
  };
  const own = preferredAnchor(anchors, shape, shape.phase, 'enthalpyOfFormation');
  const ownS = preferredAnchor(anchors, shape, shape.phase, 'entropy');
  const home =
    shape.incrementsFrom === null ? own : preferredAnchor(anchors, shape, shape.incrementsFrom, 'enthalpyOfFormation');
  const arrays = relative(shape);
  if (shape.enthalpyMeans === 'declared') {
    level.h = 0;
    level.hFrom = 'table';
  } else if (shape.enthalpyMeans === 'increment') {
    const datum = home?.enthalpyOfFormation ?? null;
    if (datum !== null) {
      level.h = datum.value;
      level.uH = uOf(datum, home, shape);
      level.hFrom = 'anchor';
      level.hAnchor = home ?? null;
      level.hOrigin = datumOf(substance, home, 'H', level.uH, datum, shape, 0);
    }
  } else if (own?.enthalpyOfFormation != null) {
    const at = valueAt(arrays, shape, own.referenceTemperatureK, growth, enthalpyAt);
    if (at !== null) {
      level.h = own.enthalpyOfFormation.value - at.value;
      const u = uOf(own.enthalpyOfFormation, own, shape);
      level.uH = Math.hypot(u, at.u);
      level.hFrom = 'anchor';
      level.hAnchor = own;
      level.hOrigin = datumOf(substance, own, 'H', u, own.enthalpyOfFormation, shape, at.u);
    }
  }
  if (shape.entropyMeans === 'declared') {
    level.s = shape.thirdLaw ? residualEntropyJPerMolK : 0;
    level.sFrom = shape.thirdLaw ? 'third-law' : 'table';
  }
  if (ownS?.entropy != null && (shape.entropyMeans === 'relative' || shape.thirdLaw)) {
    const at = valueAt(arrays, shape, ownS.referenceTemperatureK, growth, entropyAt);
    if (at !== null) {
      const u = uOf(ownS.entropy, ownS, shape);
      const uReach = at.u / ownS.referenceTemperatureK;
      level.s = ownS.entropy.value - at.value;
      level.uS = Math.hypot(u, uReach);
      level.sFrom = 'anchor';
      level.sAnchor = ownS;
      level.sOrigin = datumOf(substance, ownS, 'S', u, ownS.entropy, shape, uReach);
    }
  }
  return level;
}

/**
 * The anchor's own error, that of reaching it beyond the data, and, where one evaluated source states more than the rounding,
 * the error of its evaluation: common to all that it anchors, so that it cancels between its phases.
 */
function datumOf(
  substance: HarmonisedCase,
  anchor: Anchor | undefined,
  what: 'H' | 'S',
  u: number,
  datum: Datum,
  shape: PhaseShape,
  uReach: number,
): Origin {
  const index = anchor === undefined ? -1 : substance.anchors.indexOf(anchor);
  const key = what === 'H' ? datumKey.formationEnthalpy(index) : datumKey.anchorEntropy(index);
  const errors = [{ key, by: 1, u }];
  if (uReach > 0) errors.push({ key: `${what} reached by ${shape.phase}`, by: 1, u: uReach });
  const common = Math.sqrt(Math.max(0, datum.u * datum.u - u * u));
  if (common > 1e-9 * datum.u) {
    errors.push({ key: `${what}${EVALUATED}${anchor?.table.source ?? ''}`, by: 1, u: common });
  }
  return { source: -1, atK: 0, scale: 1, errors };
}

/** Each evaluation's common error is one number, the largest that it states; the levels' own u takes it in. */
function shareEvaluations(levels: readonly Level[]): void {
  const largest = new Map<string, number>();
  for (const { hOrigin, sOrigin } of levels) {
    for (const origin of [hOrigin, sOrigin]) {
      if (origin === null || origin.errors.length < 2) continue;
      for (const { key, u } of origin.errors) {
        if (key.includes(EVALUATED)) largest.set(key, Math.max(u, largest.get(key) ?? 0));
      }
    }
  }
  if (largest.size === 0) return;
  for (const level of levels) {
    const widened = (origin: Origin): Origin => ({
      ...origin,
      errors: origin.errors.map((error) => ({ ...error, u: largest.get(error.key) ?? error.u })),
    });
    if (level.hOrigin !== null) {
      level.hOrigin = widened(level.hOrigin);
      level.uH = Math.hypot(...level.hOrigin.errors.map((error) => error.by * error.u));
    }
    if (level.sOrigin !== null) {
      level.sOrigin = widened(level.sOrigin);
      level.uS = Math.hypot(...level.sOrigin.errors.map((error) => error.by * error.u));
    }
  }
}

const EVALUATED = ' as evaluated by ';

/** Rounding alone within one compiled source; what is stated, or the default, where sources meet. */
function uOf(datum: Datum, anchor: Anchor | undefined, shape: PhaseShape): number {
  if (anchor === undefined) return uStated(datum, false);
  const one = anchor.table.source === shape.main.table.source && anchor.table.basis === 'evaluated';
  return uStated(datum, one);
}

/** The preferred anchor of the phase that states the quantity. */
function preferredAnchor(
  anchors: readonly Anchor[],
  shape: PhaseShape,
  phase: string,
  quantity: 'enthalpyOfFormation' | 'entropy',
): Anchor | undefined {
  let best: Anchor | undefined;
  for (const a of anchors) {
    if (a.phase !== phase || a[quantity] === null) continue;
    if (best === undefined || cost(a, shape) < cost(best, shape)) best = a;
  }
  return best;
}

function cost(a: Anchor, shape: PhaseShape): number {
  return a.table.rank - (a.table.source === shape.main.table.source ? 0.5 : 0);
}

/** How far beyond its data a phase may be continued to meet an anchor [K]. */
const FARTHEST_ANCHOR_K = 150;

function valueAt(
  arrays: CurveArrays,
  shape: PhaseShape,
  temperatureK: number,
  growth: number,
  f: (c: CurveArrays, t: number) => number,
): { value: number; u: number } | null {
  const beyond = Math.max(shape.measuredFromK - temperatureK, temperatureK - shape.measuredToK, 0);
  if (beyond === 0) return { value: f(arrays, temperatureK), u: 0 };
  const continued = shape.knotKind[shape.knotKind.length - 1] === 2;
  if (beyond > FARTHEST_ANCHOR_K || !continued) return null;
  const n = arrays.knotK.length;
  const cp = temperatureK < shape.measuredFromK ? arrays.c0[0] : arrays.c0[n - 2];
  return { value: f(arrays, temperatureK), u: (growth * cp * beyond * beyond) / 2 };
}

/** A curve whose level's origin is filled in once all curves of the family stand: it may be another of them. */
interface OpenCurve extends PhaseCurve {
  enthalpyLevel: LevelOrigin | undefined;
  entropyLevel: LevelOrigin | undefined;
}

function curveOf(shape: PhaseShape, level: Level, family: Family, growth: number): OpenCurve {
  const all = family.substance.anchors;
  const h = level.h ?? 0;
  const s = level.s ?? 0;
  return {
    phase: shape.phase,
    family: family.zeros,
    knotK: shape.knotK,
    c0: shape.c0,
    c1: shape.c1,
    c2: shape.c2,
    c3: shape.c3,
    enthalpyJPerMol: raised(shape.enthalpy, h),
    entropyJPerMolK: raised(shape.entropy, s),
    knotKind: shape.knotKind,
    measuredFromK: shape.measuredFromK,
    measuredToK: shape.measuredToK,
    hasEnthalpyLevel: level.h !== null,
    hasEntropyLevel: level.s !== null,
    enthalpyLevelFrom: level.hFrom,
    entropyLevelFrom: level.sFrom,
    uHeatCapacityJPerMolK: shape.uHeatCapacity,
    varH: shape.varH,
    covHS: shape.covHS,
    varS: shape.varS,
    gain: shape.gain,
    uBendJPerMol: shape.uBend,
    uEnthalpyLevelJPerMol: level.uH,
    uEntropyLevelJPerMolK: level.uS,
    uCalibrationRelative: shape.uCalibrationRelative,
    referenceK: shape.referenceK,
    entropyReferenceK: shape.entropyReferenceK,
    sources: sourcesOf(shape, level),
    enthalpyAnchor: level.hAnchor === null ? -1 : all.indexOf(level.hAnchor),
    entropyAnchor: level.sAnchor === null ? -1 : all.indexOf(level.sAnchor),
    enthalpyThrough: level.hThrough,
    entropyThrough: level.sThrough,
    continuationGrowthPerK: growth,
    origins: shape.origins,
    enthalpyLevel: undefined,
    entropyLevel: undefined,
  };
}

/** The table's own, then whose anchors its levels rest on. */
function sourcesOf({ sources }: PhaseShape, { hAnchor, sAnchor }: Level): readonly string[] {
  const more = [hAnchor, sAnchor].flatMap((anchor) => (anchor === null ? [] : [anchor.table.source]));
  return more.every((source) => sources.includes(source)) ? sources : [...new Set([...sources, ...more])];
}

function raised(values: Float64Array, by: number): Float64Array {
  if (by === 0) return values;
  const out = numbers(values.length);
  for (let i = 0; i < out.length; i++) out[i] = values[i] + by;
  return out;
}
