import { cubicIntegral, cubicIntegralOverT } from '../core/numeric/cubic.js';
import { type ChainResult, smoothChain } from '../core/numeric/gaussian-chain.js';
import { Room } from '../core/numeric/room.js';
import type { Stretch } from './stretch.js';

const room = new Room();

/** A chain run over a stretch, with the steps that it was given. */
export interface ChainRun {
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
export function runChain(stretch: Stretch, exactK: number, exactSK: number, countsThere: boolean): ChainRun {
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
export function bend(stretch: Stretch, run: ChainRun): void {
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
export function smoothed(stretch: Stretch): Stretch {
  if (!stretch.hasH && !stretch.hasS) return stretch;
  bend(stretch, runChain(stretch, stretch.referenceK, stretch.referenceK, stretch.countsFromItself));
  return stretch;
}
