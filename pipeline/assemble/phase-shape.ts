import type { NamedCell } from '../../schemas/checked.js';
import type { CurveOrigin } from '../../schemas/curves.js';
import type { Series } from '../../schemas/harmonised.js';
import type { Policy } from '../../schemas/policy.js';
import { cubicIntegral, cubicIntegralOverT } from '../core/numeric/cubic.js';
import { type ChainResult, smoothChain } from '../core/numeric/gaussian-chain.js';
import { Room } from '../core/numeric/room.js';
import { baseCurve } from './base-curve.js';
import { CurveDraft } from './curve-draft.js';
import { type DebyeTail, debyeTail } from './debye-tail.js';
import { knotsOf } from './knots.js';
import { limitPieces } from './limit-interval.js';
import { type Stretch, splitAt, stretchOf } from './stretch.js';

const room = new Room();

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
  readonly knotKind: Uint8Array;
  readonly uHeatCapacity: Float64Array;
  readonly measuredFromK: number;
  readonly measuredToK: number;
  /** `declared`: from the zero of the table; `increment`: H(T) - H(Tr); `relative`: from `referenceK`. */
  readonly enthalpyMeans: 'declared' | 'increment' | 'relative';
  readonly entropyMeans: 'declared' | 'relative';
  readonly thirdLaw: boolean;
  readonly referenceK: number;
  readonly uCalibrationRelative: number;
  readonly incrementsFrom: string | null;
  readonly origins: readonly CurveOrigin[];
  readonly sources: readonly string[];
  /** The series that the curve mainly rests on. */
  readonly main: Series;
}

/**
 * The curve of one phase from its series, preferred first. The preferred series gives its whole range; the others give what
 * lies beyond it, joined at its ends, H and S running on.
 */
export function phaseShape(
  phase: string,
  series: readonly { readonly series: Series; readonly named: readonly NamedCell[] }[],
  metal: boolean,
  policy: Policy,
): PhaseShape | null {
  let stretch: Stretch | null = null;
  let main: Series | null = null;
  const origins: CurveOrigin[] = [];
  for (const { series: one, named } of series) {
    const knots = knotsOf(one, named);
    if (knots === null) continue;
    const scatter = one.table.basis === 'measured' && hasOwn(one);
    const next = stretchOf(knots, baseCurve(knots, scatter), one, scatter);
    if (stretch === null) {
      stretch = next;
      main = one;
      origins.push(originOf(one, next.temperatureK[0], next.temperatureK[next.n - 1], null));
      continue;
    }
    const smooth = smoothed(next);
    const grown: { stretch: Stretch; low: number | null; high: number | null } = extend(stretch, smooth);
    const before: Stretch = stretch;
    stretch = grown.stretch;
    if (grown.low !== null) origins.unshift(originOf(one, smooth.temperatureK[0], before.temperatureK[0], grown.low));
    if (grown.high !== null)
      origins.push(originOf(one, before.temperatureK[before.n - 1], smooth.temperatureK[smooth.n - 1], grown.high));
  }
  if (stretch === null || main === null) return null;
  return finish(phase, stretch, main, origins, metal, policy);
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

interface ChainRun {
  readonly chain: ChainResult;
  /** Of each interval: the integrals of Cp and Cp/T, and those of the two bumps over T. */
  readonly stepH: Float64Array;
  readonly stepS: Float64Array;
  readonly alpha: Float64Array;
  readonly beta: Float64Array;
}

/**
 * Runs the chain over a stretch; `exactK` and `exactSK` are where H and S are held at zero when nothing observes them.
 * Printed increments are held at zero at `exactK` too where `countsThere`: it is their own H(Tr).
 */
function runChain(
  stretch: Stretch,
  exactK: number,
  exactSK = exactK,
  countsThere = exactK === stretch.referenceK,
): ChainRun {
  const { n, temperatureK: t } = stretch;
  const stepH = room.numbers(n);
  const stepS = room.numbers(n);
  const stepVarH = room.numbers(n);
  const stepCovHS = room.numbers(n);
  const stepVarS = room.numbers(n);
  const alphas = room.numbers(n);
  const betas = room.numbers(n);
  for (let i = 0; i < n - 1; i++) {
    const w = t[i + 1] - t[i];
    if (w === 0) {
      if (stretch.jump[i + 1] === 1) {
        stepVarH[i] = 1e8;
        stepVarS[i] = 1e4;
      }
      continue;
    }
    stepH[i] = cubicIntegral(stretch.c0[i], stretch.c1[i], stretch.c2[i], stretch.c3[i], w);
    stepS[i] = cubicIntegralOverT(stretch.c0[i], stretch.c1[i], stretch.c2[i], stretch.c3[i], t[i], w);
    const w2 = w * w;
    const alpha = cubicIntegralOverT(0, 6 / w2, -6 / (w2 * w), 0, t[i], w);
    const beta = cubicIntegralOverT(0, 60 / w2, -180 / (w2 * w), 120 / (w2 * w2), t[i], w);
    alphas[i] = alpha;
    betas[i] = beta;
    const a = stretch.errorJPerMol[i] + 0.001 * w;
    const b = a / 2;
    stepVarH[i] = a * a + stretch.ownVarH[i];
    stepCovHS[i] = a * a * alpha + stretch.ownVarH[i] * alpha;
    stepVarS[i] = a * a * alpha * alpha + b * b * beta * beta + stretch.ownVarH[i] * alpha * alpha;
  }
  const copy = (a: Float64Array): Float64Array => {
    const out = room.numbers(n);
    out.set(a);
    return out;
  };
  const h = copy(stretch.h);
  const hVar = copy(stretch.hVar);
  const s = copy(stretch.s);
  const sVar = copy(stretch.sVar);
  let exact = 0;
  for (let i = 0; i < n; i++) if (Math.abs(t[i] - exactK) < Math.abs(t[exact] - exactK)) exact = i;
  const start = { h: 0, hVar: 1e10, s: 0, sVar: 1e4 };
  if (stretch.hasH) {
    if (countsThere && !stretch.absoluteH && t[exact] === exactK) {
      h[exact] = 0;
      hVar[exact] = 0;
    }
    const first = firstFinite(hVar);
    if (first >= 0) {
      start.h = h[first];
      let spread = Math.max(hVar[first], 1e-6);
      for (let i = 0; i < first; i++) {
        start.h -= stepH[i];
        spread += stepVarH[i];
      }
      start.hVar = 1e8 * spread;
    }
  } else {
    h[exact] = 0;
    hVar[exact] = 0;
    start.h = 0;
    for (let i = 0; i < exact; i++) start.h -= stepH[i];
  }
  if (stretch.hasS) {
    const first = firstFinite(sVar);
    start.s = s[first];
    let spread = Math.max(sVar[first], 1e-12);
    for (let i = 0; i < first; i++) {
      start.s -= stepS[i];
      spread += stepVarS[i];
    }
    start.sVar = 1e8 * spread;
  } else {
    let exactS = 0;
    for (let i = 0; i < n; i++) if (Math.abs(t[i] - exactSK) < Math.abs(t[exactS] - exactSK)) exactS = i;
    s[exactS] = 0;
    sVar[exactS] = 0;
    start.s = 0;
    for (let i = 0; i < exactS; i++) start.s -= stepS[i];
  }
  const chain = smoothChain({
    n,
    temperatureK: t,
    stepH,
    stepS,
    stepVarH,
    stepCovHS,
    stepVarS,
    observedH: h,
    observedHVar: hVar,
    observedS: s,
    observedSVar: sVar,
    observedF: stretch.f,
    observedFVar: stretch.fVar,
    startH: start.h,
    startHVar: start.hVar,
    startS: start.s,
    startSVar: start.sVar,
  });
  return { chain, stepH, stepS, alpha: alphas, beta: betas };
}

function firstFinite(variance: Float64Array): number {
  for (let i = 0; i < variance.length; i++) if (variance[i] !== Number.POSITIVE_INFINITY) return i;
  return -1;
}

/** Bends each interval's cubic by its two bumps until its integrals are the chain's steps. */
function bend(stretch: Stretch, run: ChainRun): void {
  if (!stretch.hasH && !stretch.hasS) return;
  const { n, temperatureK: t } = stretch;
  const { chain } = run;
  for (let i = 0; i < n - 1; i++) {
    const w = t[i + 1] - t[i];
    if (w === 0) continue;
    const dH = chain.h[i + 1] - chain.h[i] - run.stepH[i];
    const dS = chain.s[i + 1] - chain.s[i] - run.stepS[i];
    const b = (dS - dH * run.alpha[i]) / run.beta[i];
    stretch.c1[i] += (6 * dH + 60 * b) / (w * w);
    stretch.c2[i] += (-6 * dH - 180 * b) / (w * w * w);
    stretch.c3[i] += (120 * b) / (w * w * w * w);
  }
}

/** A stretch whose H and S are the smoothed ones of its own observations; what it lends to another is its steps. */
function smoothed(stretch: Stretch): Stretch {
  if (!stretch.hasH && !stretch.hasS) return stretch;
  bend(stretch, runChain(stretch, stretch.referenceK));
  return stretch;
}

/** Adds what `other` has below and above `base`; returns Cp(other) - Cp(base) at each join. */
function extend(base: Stretch, other: Stretch): { stretch: Stretch; low: number | null; high: number | null } {
  let stretch = base;
  let low: number | null = null;
  let high: number | null = null;
  const first = base.temperatureK[0];
  const last = base.temperatureK[base.n - 1];
  if (other.temperatureK[0] < first && other.temperatureK[other.n - 1] >= first && first > 0) {
    const cut = splitAt(other, first);
    const upTo = indexOf(cut, first);
    low = cut.c0[Math.min(upTo, cut.n - 2)] - base.c0[0];
    stretch = cut.slice(0, upTo).joinedTo(stretch);
  }
  if (other.temperatureK[other.n - 1] > last && other.temperatureK[0] <= last) {
    const cut = splitAt(other, last);
    const from = indexOf(cut, last);
    const i = base.n - 2;
    const w = last - base.temperatureK[i];
    high = cut.c0[from] - (base.c0[i] + w * (base.c1[i] + w * (base.c2[i] + w * base.c3[i])));
    stretch = stretch.joinedTo(cut.slice(from, cut.n - 1));
  }
  return { stretch, low, high };
}

function indexOf(stretch: Stretch, temperatureK: number): number {
  let at = 0;
  for (let i = 0; i < stretch.n; i++) if (stretch.temperatureK[i] <= temperatureK) at = i;
  return at;
}

function finish(
  phase: string,
  whole: Stretch,
  main: Series,
  origins: readonly CurveOrigin[],
  metal: boolean,
  policy: Policy,
): PhaseShape {
  const referenceTemperature = main.table.referenceTemperatureK;
  let stretch = whole;
  const measuredFromK = stretch.temperatureK[0];
  const measuredToK = stretch.temperatureK[stretch.n - 1];
  const inside = referenceTemperature >= measuredFromK && referenceTemperature <= measuredToK;
  if (inside) stretch = splitAt(stretch, referenceTemperature);
  const exactK = inside ? referenceTemperature : nearer(referenceTemperature, measuredFromK, measuredToK);
  const crystal = !phase.startsWith('g') && !phase.startsWith('l');
  const tail = crystal && measuredFromK > 0 ? debyeTail(stretch.temperatureK, stretch.heatCapacity, metal) : null;
  const thirdLaw = crystal && !stretch.hasS && (tail !== null || measuredFromK === 0);
  const countsThere = inside && (main.incrementsFrom === null || main.incrementsFrom === phase);
  const run = runChain(stretch, exactK, thirdLaw ? measuredFromK : exactK, countsThere);
  const { chain } = run;
  bend(stretch, run);

  const draft = new CurveDraft(stretch, chain);
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
    knotKind: draft.kinds(),
    uHeatCapacity: draft.view('uCp'),
    measuredFromK: tail !== null ? 0 : measuredFromK,
    measuredToK,
    enthalpyMeans: stretch.hasH ? (stretch.absoluteH ? 'declared' : 'increment') : 'relative',
    entropyMeans: stretch.hasS || thirdLaw ? 'declared' : 'relative',
    thirdLaw,
    referenceK: exactK,
    uCalibrationRelative: stretch.hasH || stretch.hasS ? 0 : (cp?.uSharedRelative ?? 0),
    incrementsFrom: main.incrementsFrom,
    origins,
    sources: [...new Set(origins.map((o) => o.source))],
    main,
  };
}

/** A cubic from 0 K that would dip below zero gives way to the two pieces of `limitPieces`. */
function keepPositive(draft: CurveDraft): void {
  const high = draft.view('knotK')[1];
  const c0 = draft.view('c0')[0];
  const c1 = draft.view('c1')[0];
  const c2 = draft.view('c2')[0];
  const c3 = draft.view('c3')[0];
  const dips = [0.02, 0.05, 0.1, 0.2, 0.3].some((f) => {
    const x = f * high;
    return c0 + x * (c1 + x * (c2 + x * c3)) < 0;
  });
  if (!dips) return;
  const h = draft.view('h');
  const s = draft.view('s');
  const pieces = limitPieces(high, draft.view('c0')[1], h[1] - h[0], s[1] - s[0]);
  if (pieces === null) return;
  const { thetaK, beta } = pieces;
  const middle = (name: 'varH' | 'covHS' | 'varS'): number => (draft.view(name)[0] + draft.view(name)[1]) / 2;
  draft.splitFirst(
    { c0: 0, c1: 0, c2: 0, c3: beta },
    {
      knotK: thetaK,
      c0: pieces.c0,
      c1: pieces.c1,
      c2: pieces.c2,
      c3: pieces.c3,
      h: h[0] + (beta * thetaK ** 4) / 4,
      s: s[0] + (beta * thetaK ** 3) / 3,
      varH: middle('varH'),
      covHS: middle('covHS'),
      varS: middle('varS'),
      kind: 1,
      uCp: draft.view('uCp')[1],
    },
  );
}

/** The Debye tail below the first row; by the third law S counts from its end. */
function addTail(draft: CurveDraft, tail: DebyeTail, thirdLaw: boolean): void {
  const t = draft.view('knotK')[0];
  const h = draft.view('h');
  const s = draft.view('s');
  const varH = draft.view('varH');
  const covHS = draft.view('covHS');
  const varS = draft.view('varS');
  const dH = (tail.gamma * t * t) / 2 + (tail.beta * t ** 4) / 4;
  const dS = tail.gamma * t + (tail.beta * t ** 3) / 3;
  // What the dropped terms cost: a few per cent of the tail's own entropy.
  const uH = 0.03 * dH;
  const uS = 0.03 * dS;
  if (thirdLaw) {
    for (let i = 0; i < s.length; i++) {
      s[i] += dS;
      varS[i] += uS * uS;
    }
  }
  draft.addFront({
    knotK: 0,
    c0: 0,
    c1: tail.gamma,
    c2: 0,
    c3: tail.beta,
    h: h[0] - dH,
    s: s[0] - dS,
    varH: varH[0] + uH * uH,
    covHS: covHS[0],
    varS: thirdLaw ? 0 : varS[0] + uS * uS,
    kind: 1,
    uCp: 0,
  });
}

function nearer(x: number, a: number, b: number): number {
  return Math.abs(x - a) <= Math.abs(x - b) ? a : b;
}
