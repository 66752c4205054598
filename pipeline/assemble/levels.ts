import type { CurveFamily, PhaseCurve } from '../../schemas/curves.js';
import type { Anchor, Datum, StatedTransition } from '../../schemas/harmonised.js';
import type { Policy } from '../../schemas/policy.js';
import { Room } from '../core/numeric/room.js';
import { type CurveArrays, enthalpyAt, entropyAt } from '../core/physics/curve.js';
import type { PhaseShape } from './phase-shape.js';

interface Level {
  h: number | null;
  s: number | null;
  uH: number;
  uS: number;
  hFrom: PhaseCurve['enthalpyLevelFrom'];
  sFrom: PhaseCurve['entropyLevelFrom'];
  through: number;
  hAnchor: Anchor | null;
  sAnchor: Anchor | null;
}

/**
 * Puts the shapes of one family on its zeros. H and S come, in this order, from the table's own declared values, from an
 * anchor at the reference temperature, from the third law (S, with what is left of it at 0 K), and through a stated transition
 * from a phase whose level is known. A family in which nothing is anchored counts from its first phase.
 */
export function levelled(
  shapes: readonly PhaseShape[],
  anchors: readonly Anchor[],
  transitions: readonly StatedTransition[],
  family: CurveFamily,
  policy: Policy,
  all: readonly Anchor[],
  residualEntropyJPerMolK: number,
): PhaseCurve[] {
  const growth = policy.continuation.relativePer100K / 100;
  const levels = shapes.map((shape) => ownLevel(shape, anchors, growth, residualEntropyJPerMolK));
  for (;;) {
    carryAll(shapes, levels, transitions);
    const openH = levels.every((l) => l.h === null) ? 0 : -1;
    const openS = levels.every((l) => l.s === null) ? 0 : -1;
    if (openH < 0 && openS < 0) break;
    if (openH === 0) levels[0] = { ...levels[0], h: 0, uH: 0, hFrom: 'none' };
    if (openS === 0) levels[0] = { ...levels[0], s: 0, uS: 0, sFrom: 'none' };
  }
  return shapes.map((shape, k) => curveOf(shape, levels[k], family, growth, all));
}

function ownLevel(
  shape: PhaseShape,
  anchors: readonly Anchor[],
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
    through: -1,
    hAnchor: null,
    sAnchor: null,
  };
  const own = preferredAnchor(anchors, shape, shape.phase);
  const home = shape.incrementsFrom === null ? own : preferredAnchor(anchors, shape, shape.incrementsFrom);
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
    }
  } else if (own?.enthalpyOfFormation != null) {
    const at = valueAt(arrays, shape, own.referenceTemperatureK, growth, enthalpyAt);
    if (at !== null) {
      level.h = own.enthalpyOfFormation.value - at.value;
      level.uH = Math.hypot(uOf(own.enthalpyOfFormation, own, shape), at.u);
      level.hFrom = 'anchor';
      level.hAnchor = own;
    }
  }
  if (shape.entropyMeans === 'declared') {
    level.s = shape.thirdLaw ? residualEntropyJPerMolK : 0;
    level.sFrom = shape.thirdLaw ? 'third-law' : 'table';
  }
  if (own?.entropy != null && (shape.entropyMeans === 'relative' || shape.thirdLaw)) {
    const at = valueAt(arrays, shape, own.referenceTemperatureK, growth, entropyAt);
    if (at !== null) {
      level.s = own.entropy.value - at.value;
      level.uS = Math.hypot(uOf(own.entropy, own, shape), at.u / own.referenceTemperatureK);
      level.sFrom = 'anchor';
      level.sAnchor = own;
    }
  }
  return level;
}

/** Rounding alone within one compiled source; what is stated, or the default, where sources meet. */
function uOf(datum: Datum, anchor: Anchor | undefined, shape: PhaseShape): number {
  if (anchor === undefined) return datum.u;
  const one = anchor.table.source === shape.main.table.source && anchor.table.basis === 'evaluated';
  return one ? datum.uRounding : datum.u;
}

export function preferredAnchor(anchors: readonly Anchor[], shape: PhaseShape, phase: string): Anchor | undefined {
  let best: Anchor | undefined;
  for (const a of anchors) {
    if (a.phase !== phase) continue;
    if (best === undefined || cost(a, shape) < cost(best, shape)) best = a;
  }
  return best;
}

function cost(a: Anchor, shape: PhaseShape): number {
  return a.table.rank - (a.table.source === shape.main.table.source ? 0.5 : 0);
}

function relative(shape: PhaseShape): CurveArrays {
  return {
    knotK: shape.knotK,
    c0: shape.c0,
    c1: shape.c1,
    c2: shape.c2,
    c3: shape.c3,
    enthalpyJPerMol: shape.enthalpy,
    entropyJPerMolK: shape.entropy,
  };
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

function carryAll(shapes: readonly PhaseShape[], levels: Level[], transitions: readonly StatedTransition[]): void {
  for (let moved = true; moved; ) {
    moved = false;
    for (let t = 0; t < transitions.length; t++) {
      const stated = transitions[t];
      if (stated.from === stated.to || stated.order !== 'first') continue;
      const from = shapes.findIndex((s) => s.phase === stated.from);
      const to = shapes.findIndex((s) => s.phase === stated.to);
      if (from < 0 || to < 0) continue;
      moved = carry(shapes, levels, stated, t, from, to, 1) || moved;
      moved = carry(shapes, levels, stated, t, to, from, -1) || moved;
    }
  }
}

function carry(
  shapes: readonly PhaseShape[],
  levels: Level[],
  stated: StatedTransition,
  index: number,
  known: number,
  open: number,
  sign: number,
): boolean {
  const temperatureK = stated.temperature.value;
  let moved = false;
  const target = levels[open];
  const source = levels[known];
  if (stated.enthalpy === null && stated.entropy === null) return false;
  const dH = stated.enthalpy?.value ?? (stated.entropy as Datum).value * temperatureK;
  const uDH = stated.enthalpy?.u ?? (stated.entropy as Datum).u * temperatureK;
  const dS = stated.entropy?.value ?? dH / temperatureK;
  const uDS = stated.entropy?.u ?? uDH / temperatureK;
  const a = relative(shapes[known]);
  const b = relative(shapes[open]);
  if (!reaches(shapes[known], temperatureK) || !reaches(shapes[open], temperatureK)) return false;
  if (target.h === null && source.h !== null) {
    target.h = source.h + enthalpyAt(a, temperatureK) + sign * dH - enthalpyAt(b, temperatureK);
    target.uH = Math.hypot(source.uH, uDH);
    target.hFrom = 'transition';
    target.through = index;
    moved = true;
  }
  if (target.s === null && source.s !== null) {
    target.s = source.s + entropyAt(a, temperatureK) + sign * dS - entropyAt(b, temperatureK);
    target.uS = Math.hypot(source.uS, uDS);
    target.sFrom = 'transition';
    target.through = index;
    moved = true;
  }
  return moved;
}

function reaches(shape: PhaseShape, temperatureK: number): boolean {
  return temperatureK >= shape.knotK[0] && temperatureK <= shape.knotK[shape.knotK.length - 1];
}

function curveOf(
  shape: PhaseShape,
  level: Level,
  family: CurveFamily,
  growth: number,
  all: readonly Anchor[],
): PhaseCurve {
  const h = level.h ?? 0;
  const s = level.s ?? 0;
  return {
    phase: shape.phase,
    family,
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
    uEnthalpyLevelJPerMol: level.uH,
    uEntropyLevelJPerMolK: level.uS,
    uCalibrationRelative: shape.uCalibrationRelative,
    referenceK: shape.referenceK,
    entropyReferenceK: shape.entropyReferenceK,
    sources: shape.sources,
    enthalpyAnchor: level.hAnchor === null ? -1 : all.indexOf(level.hAnchor),
    entropyAnchor: level.sAnchor === null ? -1 : all.indexOf(level.sAnchor),
    carriedThrough: level.through,
    continuationGrowthPerK: growth,
    origins: shape.origins,
  };
}

const room = new Room();

function raised(values: Float64Array, by: number): Float64Array {
  if (by === 0) return values;
  const out = room.numbers(values.length);
  for (let i = 0; i < out.length; i++) out[i] = values[i] + by;
  return out;
}
