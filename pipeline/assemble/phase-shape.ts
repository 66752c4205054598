import type { NamedCell } from '../../schemas/checked.js';
import type { CurveOrigin } from '../../schemas/curves.js';
import type { Series } from '../../schemas/harmonised.js';
import type { Policy } from '../../schemas/policy.js';
import { cubicIntegral, cubicIntegralOverT } from '../core/numeric/cubic.js';
import { type ChainResult, smoothChain } from '../core/numeric/gaussian-chain.js';
import { baseCurve } from './base-curve.js';
import { debyeTail } from './debye-tail.js';
import { knotsOf } from './knots.js';
import { limitPieces } from './limit-interval.js';
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

interface Stepped {
  readonly chain: ChainResult;
  readonly exact: number;
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
): Stepped {
  const { n, temperatureK: t } = stretch;
  const stepH = new Float64Array(n);
  const stepS = new Float64Array(n);
  const stepVarH = new Float64Array(n);
  const stepCovHS = new Float64Array(n);
  const stepVarS = new Float64Array(n);
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
    const alpha = cubicIntegralOverT(0, 6 / (w * w), -6 / w ** 3, 0, t[i], w);
    const beta = cubicIntegralOverT(0, 60 / (w * w), -180 / w ** 3, 120 / w ** 4, t[i], w);
    const a = stretch.errorJPerMol[i] + 0.001 * w;
    const b = a / 2;
    stepVarH[i] = a * a + stretch.ownVarH[i];
    stepCovHS[i] = a * a * alpha + stretch.ownVarH[i] * alpha;
    stepVarS[i] = a * a * alpha * alpha + b * b * beta * beta + stretch.ownVarH[i] * alpha * alpha;
  }
  const h = stretch.h.slice();
  const hVar = stretch.hVar.slice();
  const s = stretch.s.slice();
  const sVar = stretch.sVar.slice();
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
  return { chain, exact };
}

function firstFinite(variance: Float64Array): number {
  for (let i = 0; i < variance.length; i++) if (variance[i] !== Number.POSITIVE_INFINITY) return i;
  return -1;
}

/** Bends each interval's cubic by its two bumps until its integrals are the chain's steps. */
function bend(stretch: Stretch, chain: ChainResult): void {
  const { n, temperatureK: t } = stretch;
  for (let i = 0; i < n - 1; i++) {
    const w = t[i + 1] - t[i];
    if (w === 0) continue;
    const dH =
      chain.h[i + 1] - chain.h[i] - cubicIntegral(stretch.c0[i], stretch.c1[i], stretch.c2[i], stretch.c3[i], w);
    const dS =
      chain.s[i + 1] -
      chain.s[i] -
      cubicIntegralOverT(stretch.c0[i], stretch.c1[i], stretch.c2[i], stretch.c3[i], t[i], w);
    const alpha = cubicIntegralOverT(0, 6 / (w * w), -6 / w ** 3, 0, t[i], w);
    const beta = cubicIntegralOverT(0, 60 / (w * w), -180 / w ** 3, 120 / w ** 4, t[i], w);
    const b = (dS - dH * alpha) / beta;
    stretch.c1[i] += (6 * dH + 60 * b) / (w * w);
    stretch.c2[i] += (-6 * dH - 180 * b) / w ** 3;
    stretch.c3[i] += (120 * b) / w ** 4;
  }
}

/** A stretch whose H and S are the smoothed ones of its own observations; what it lends to another is its steps. */
function smoothed(stretch: Stretch): Stretch {
  if (!stretch.hasH && !stretch.hasS) return stretch;
  const { chain } = runChain(stretch, stretch.referenceK);
  bend(stretch, chain);
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
  const { chain } = runChain(stretch, exactK, thirdLaw ? measuredFromK : exactK, countsThere);
  bend(stretch, chain);

  let { temperatureK: knotK, c0, c1, c2, c3 } = stretch;
  let { h, s, varH, covHS, varS, gain } = chain;
  let kind = stretch.kind;
  let uCp = stretch.uHeatCapacity;

  if (knotK[0] === 0 && stretch.n > 2) {
    const dips = [0.02, 0.05, 0.1, 0.2, 0.3].some((f) => {
      const x = f * knotK[1];
      return c0[0] + x * (c1[0] + x * (c2[0] + x * c3[0])) < 0;
    });
    const pieces = dips ? limitPieces(knotK[1], c0[1], h[1] - h[0], s[1] - s[0]) : null;
    if (pieces !== null) {
      const { thetaK, beta } = pieces;
      knotK = inserted(knotK, 1, thetaK);
      c0 = inserted(c0, 1, pieces.c0);
      c1 = inserted(c1, 1, pieces.c1);
      c2 = inserted(c2, 1, pieces.c2);
      c3 = inserted(c3, 1, pieces.c3);
      c0[0] = 0;
      c1[0] = 0;
      c2[0] = 0;
      c3[0] = beta;
      h = inserted(h, 1, h[0] + (beta * thetaK ** 4) / 4);
      s = inserted(s, 1, s[0] + (beta * thetaK ** 3) / 3);
      varH = inserted(varH, 1, (varH[0] + varH[1]) / 2);
      covHS = inserted(covHS, 1, (covHS[0] + covHS[1]) / 2);
      varS = inserted(varS, 1, (varS[0] + varS[1]) / 2);
      gain = insertedGain(gain);
      kind = insertedKind(kind, 1);
      uCp = inserted(uCp, 1, uCp[1]);
    }
  } else if (tail !== null) {
    const t = knotK[0];
    const dH = (tail.gamma * t * t) / 2 + (tail.beta * t ** 4) / 4;
    const dS = tail.gamma * t + (tail.beta * t ** 3) / 3;
    // What the dropped terms cost: a few per cent of the tail's own entropy.
    const uS = 0.03 * dS;
    const uH = 0.03 * dH;
    if (thirdLaw) {
      for (let i = 0; i < s.length; i++) {
        s[i] += dS;
        varS[i] += uS * uS;
      }
    }
    knotK = inserted(knotK, 0, 0);
    c0 = inserted(c0, 0, 0);
    c1 = inserted(c1, 0, tail.gamma);
    c2 = inserted(c2, 0, 0);
    c3 = inserted(c3, 0, tail.beta);
    varH = inserted(varH, 0, varH[0] + uH * uH);
    covHS = inserted(covHS, 0, covHS[0]);
    varS = inserted(varS, 0, thirdLaw ? 0 : varS[0] + uS * uS);
    h = inserted(h, 0, h[0] - dH);
    s = inserted(s, 0, s[0] - dS);
    gain = concat(new Float64Array([1, 0, 0, 1]), gain);
    kind = insertedKind(kind, 0);
    uCp = inserted(uCp, 0, 0);
  }

  if (policy.continuation.method === 'hold') {
    const reach = policy.continuation.reachRelative;
    if (knotK[0] > 0) {
      const low = knotK[0] * (1 - reach);
      const w = knotK[0] - low;
      const cp = c0[0];
      knotK = inserted(knotK, 0, low);
      c0 = inserted(c0, 0, cp);
      c1 = inserted(c1, 0, 0);
      c2 = inserted(c2, 0, 0);
      c3 = inserted(c3, 0, 0);
      h = inserted(h, 0, h[0] - cp * w);
      s = inserted(s, 0, s[0] - cp * Math.log(knotK[1] / low));
      varH = inserted(varH, 0, varH[0]);
      covHS = inserted(covHS, 0, covHS[0]);
      varS = inserted(varS, 0, varS[0]);
      gain = concat(new Float64Array([1, 0, 0, 1]), gain);
      kind = insertedKind(kind, 0);
      kind[0] = 2;
      uCp = inserted(uCp, 0, uCp[0]);
    }
    const n = knotK.length;
    const last = knotK[n - 1];
    const i = n - 2;
    const x = last - knotK[i];
    const cp = c0[i] + x * (c1[i] + x * (c2[i] + x * c3[i]));
    const high = last * (1 + reach);
    knotK = inserted(knotK, n, high);
    c0 = inserted(c0, n - 1, cp);
    c1 = inserted(c1, n - 1, 0);
    c2 = inserted(c2, n - 1, 0);
    c3 = inserted(c3, n - 1, 0);
    h = inserted(h, n, h[n - 1] + cp * (high - last));
    s = inserted(s, n, s[n - 1] + cp * Math.log(high / last));
    varH = inserted(varH, n, varH[n - 1]);
    covHS = inserted(covHS, n, covHS[n - 1]);
    varS = inserted(varS, n, varS[n - 1]);
    gain = concat(gain, new Float64Array(4));
    gain[4 * (n - 1)] = 1;
    gain[4 * (n - 1) + 3] = 1;
    kind = insertedKind(kind, n);
    kind[n] = 2;
    uCp = inserted(uCp, n, uCp[n - 1]);
  }

  const cp = main.heatCapacity;
  return {
    phase,
    knotK,
    c0,
    c1,
    c2,
    c3,
    enthalpy: h,
    entropy: s,
    varH,
    covHS,
    varS,
    gain,
    knotKind: kind,
    uHeatCapacity: uCp,
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

function nearer(x: number, a: number, b: number): number {
  return Math.abs(x - a) <= Math.abs(x - b) ? a : b;
}

function inserted(a: Float64Array, at: number, value: number): Float64Array {
  const out = new Float64Array(a.length + 1);
  out.set(a.subarray(0, at), 0);
  out[at] = value;
  out.set(a.subarray(at), at + 1);
  return out;
}

function insertedKind(a: Uint8Array, at: number): Uint8Array {
  const out = new Uint8Array(a.length + 1);
  out.set(a.subarray(0, at), 0);
  out[at] = 1;
  out.set(a.subarray(at), at + 1);
  return out;
}

function insertedGain(gain: Float64Array): Float64Array {
  // The first interval becomes two; the inner knot follows the first one's gain, then runs on.
  return concat(new Float64Array([1, 0, 0, 1]), gain);
}

function concat(a: Float64Array, b: Float64Array): Float64Array {
  const out = new Float64Array(a.length + b.length);
  out.set(a, 0);
  out.set(b, a.length);
  return out;
}
