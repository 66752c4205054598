import type { NamedCell } from '../../schemas/checked.js';
import type { CurveOrigin } from '../../schemas/curves.js';
import type { Series } from '../../schemas/harmonised.js';
import type { Policy } from '../../schemas/policy.js';
import { baseCurve } from './base-curve.js';
import { bend, bendUncertainty, runChain, smoothed } from './chain-run.js';
import { CurveDraft } from './curve-draft.js';
import { debyeTail } from './debye-tail.js';
import { type Extended, extend } from './join.js';
import { knotsOf } from './knots.js';
import { addTail, keepPositive, tailIntegrals } from './low-end.js';
import { type Stretch, splitAt, stretchOf } from './stretch.js';

/** One phase's curve before its levels are known. */
export interface PhaseShape {
  readonly phase: string;
  readonly knotK: Float64Array;
  readonly c0: Float64Array;
  readonly c1: Float64Array;
  readonly c2: Float64Array;
  readonly c3: Float64Array;
  /** As the chain leaves them: see `enthalpyMeans` and `entropyMeans`. */
  readonly enthalpy: Float64Array;
  readonly entropy: Float64Array;
  readonly varH: Float64Array;
  readonly covHS: Float64Array;
  readonly varS: Float64Array;
  readonly gain: Float64Array;
  /** Of the bend inside each interval [J/mol]. */
  readonly uBend: Float64Array;
  readonly knotKind: Uint8Array;
  readonly uHeatCapacity: Float64Array;
  readonly measuredFromK: number;
  readonly measuredToK: number;
  /** `declared`: from the zero of the table; `increment`: H(T) - H(Tr); `relative`: from `referenceK`. */
  readonly enthalpyMeans: 'declared' | 'increment' | 'relative';
  readonly entropyMeans: 'declared' | 'relative';
  readonly thirdLaw: boolean;
  readonly referenceK: number;
  /** Where S counts from: 0 K by the third law, else as H. */
  readonly entropyReferenceK: number;
  readonly uCalibrationRelative: number;
  readonly incrementsFrom: string | null;
  readonly origins: readonly CurveOrigin[];
  readonly sources: readonly string[];
  /** The series that the levels rest on: the preferred one, or the one that alone prints H or S. */
  readonly main: Series;
}

/**
 * The curve of one phase from its series, preferred first. The preferred series gives its whole range; the others give what
 * lies beyond it, joined at its ends, H and S running on. A series that does not reach yet waits for one that closes the way;
 * a gap is bridged only when none does, and no wider than a phase is continued. Where an anchor states S within the range
 * (`entropyAnchorsK`), the third law is not needed for it.
 */
export function phaseShape(
  phase: string,
  series: readonly { readonly series: Series; readonly named: readonly NamedCell[] }[],
  metal: boolean,
  policy: Policy,
  entropyAnchorsK: readonly number[] = [],
): PhaseShape | null {
  let stretch: Stretch | null = null;
  const origins: CurveOrigin[] = [];
  const sources: string[] = [];
  const waiting: { readonly series: Series; readonly stretch: Stretch }[] = [];
  for (const { series: one, named } of series) {
    const knots = knotsOf(one, named);
    if (knots === null) continue;
    const scatter = one.table.basis === 'measured' && hasOwn(one);
    const next = stretchOf(knots, baseCurve(knots, scatter ? one.table.referenceTemperatureK : null), one);
    if (stretch === null) {
      stretch = next;
      origins.push(originOf(one, next.temperatureK[0], next.temperatureK[next.n - 1], null));
      sources.push(one.table.source);
    } else {
      waiting.push({ series: one, stretch: smoothed(next) });
    }
  }
  if (stretch === null) return null;
  const reach = policy.continuation.method === 'hold' ? policy.continuation.reachRelative : 0;
  while (waiting.length > 0) {
    const added: Added | null = firstThatReaches(stretch, waiting, 0) ?? firstThatReaches(stretch, waiting, reach);
    if (added === null) break;
    const [{ series: one, stretch: other }] = waiting.splice(added.index, 1);
    const low = other.temperatureK[0];
    const high = other.temperatureK[other.n - 1];
    const first = stretch.temperatureK[0];
    const last = stretch.temperatureK[stretch.n - 1];
    if (low < first) origins.unshift(originOf(one, low, Math.min(first, high), added.extended.lowStep));
    if (high > last) origins.push(originOf(one, Math.max(last, low), high, added.extended.highStep));
    if (!sources.includes(one.table.source)) sources.push(one.table.source);
    stretch = added.extended.stretch;
  }
  return finish(phase, stretch, origins, sources, metal, policy, entropyAnchorsK);
}

interface Added {
  readonly index: number;
  readonly extended: Extended;
}

function firstThatReaches(
  stretch: Stretch,
  waiting: readonly { readonly stretch: Stretch }[],
  reach: number,
): Added | null {
  for (let index = 0; index < waiting.length; index++) {
    const extended = extend(stretch, waiting[index].stretch, reach);
    if (extended !== null) return { index, extended };
  }
  return null;
}

function hasOwn(series: Series): boolean {
  const own = series.heatCapacity?.uOwn;
  if (own === undefined) return false;
  for (let i = 0; i < own.length; i++) if (own[i] > 0) return true;
  return false;
}

function originOf(series: Series, lowK: number, highK: number, step: number | null): CurveOrigin {
  return {
    lowK,
    highK,
    source: series.table.source,
    file: series.table.file,
    firstLine: series.line[0],
    lastLine: series.line[series.rows - 1],
    corrections: series.corrections,
    stepHeatCapacityJPerMolK: step,
  };
}

function finish(
  phase: string,
  whole: Stretch,
  origins: readonly CurveOrigin[],
  sources: readonly string[],
  metal: boolean,
  policy: Policy,
  entropyAnchorsK: readonly number[],
): PhaseShape {
  const main = whole.series;
  const referenceTemperature = whole.referenceK;
  let stretch = whole;
  const measuredFromK = stretch.temperatureK[0];
  const measuredToK = stretch.temperatureK[stretch.n - 1];
  const inside = referenceTemperature >= measuredFromK && referenceTemperature <= measuredToK;
  if (inside) stretch = splitAt(stretch, referenceTemperature);
  const exactK = inside ? referenceTemperature : nearer(referenceTemperature, measuredFromK, measuredToK);
  const crystal = !phase.startsWith('g') && !phase.startsWith('l');
  const tail = crystal && measuredFromK > 0 ? debyeTail(stretch.temperatureK, stretch.heatCapacity, metal) : null;
  const anchored = entropyAnchorsK.some((t) => t >= measuredFromK && t <= measuredToK);
  const thirdLaw = crystal && !stretch.hasS && !anchored && (tail !== null || measuredFromK === 0);
  const run = runChain(stretch, {
    enthalpyK: exactK,
    entropyK: thirdLaw ? measuredFromK : exactK,
    entropyVar: thirdLaw && tail !== null ? tailIntegrals(tail, measuredFromK).uS ** 2 : 0,
    countsThere: inside && stretch.countsFromItself,
  });
  const { chain } = run;
  bend(stretch, run);

  const draft = new CurveDraft(stretch, chain, bendUncertainty(stretch, run));
  if (measuredFromK === 0 && stretch.n > 2) keepPositive(draft);
  else if (tail !== null) addTail(draft, tail, thirdLaw);
  if (policy.continuation.method === 'hold') draft.addContinuations(policy.continuation.reachRelative);

  const cp = main.heatCapacity;
  return {
    phase,
    knotK: draft.view('knotK'),
    c0: draft.intervals('c0'),
    c1: draft.intervals('c1'),
    c2: draft.intervals('c2'),
    c3: draft.intervals('c3'),
    enthalpy: draft.view('h'),
    entropy: draft.view('s'),
    varH: draft.view('varH'),
    covHS: draft.view('covHS'),
    varS: draft.view('varS'),
    gain: draft.gains(),
    uBend: draft.intervals('uBend'),
    knotKind: draft.kinds(),
    uHeatCapacity: draft.view('uCp'),
    measuredFromK: tail !== null ? 0 : measuredFromK,
    measuredToK,
    enthalpyMeans: stretch.hasH ? (stretch.absoluteH ? 'declared' : 'increment') : 'relative',
    entropyMeans: stretch.hasS || thirdLaw ? 'declared' : 'relative',
    thirdLaw,
    referenceK: exactK,
    entropyReferenceK: thirdLaw ? 0 : exactK,
    uCalibrationRelative: stretch.hasH || stretch.hasS ? 0 : (cp?.uSharedRelative ?? 0),
    incrementsFrom: main.incrementsFrom,
    origins,
    sources,
    main,
  };
}

function nearer(x: number, a: number, b: number): number {
  return Math.abs(x - a) <= Math.abs(x - b) ? a : b;
}
