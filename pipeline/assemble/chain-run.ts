import { cubicIntegral, cubicIntegralOverT } from '../core/numeric/cubic.js';
import { type ChainResult, smoothChain } from '../core/numeric/gaussian-chain.js';
import { numbers } from '../core/numeric/room.js';
import { LEAST_ERROR, type Stretch } from './stretch.js';

/** A chain run over a stretch, with the steps that it was given. */
export interface ChainRun {
  readonly chain: ChainResult;
  /** Of each interval: the integrals of Cp and Cp/T, and those of the two bumps over T. */
  readonly stepH: Float64Array;
  readonly stepS: Float64Array;
  readonly alpha: Float64Array;
  readonly beta: Float64Array;
}

/** Variance of the start over that of what is known of it: so wide that it says nothing, so narrow that digits are left. */
const WIDE = 1e7;

/** Where H and S are held at zero when nothing observes them. */
export interface Zero {
  readonly enthalpyK: number;
  readonly entropyK: number;
  /** Variance of that zero of S: by the third law, that of what lies below it. */
  readonly entropyVar: number;
  /** Printed increments are held at zero at `enthalpyK` too: it is their own H(Tr). */
  readonly countsThere: boolean;
}

export function runChain(stretch: Stretch, zero: Zero): ChainRun {
  const { n, temperatureK: t } = stretch;
  const stepH = numbers(n);
  const stepS = numbers(n);
  const stepVarH = numbers(n);
  const stepCovHS = numbers(n);
  const stepVarS = numbers(n);
  const alphas = numbers(n);
  const betas = numbers(n);
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
    const a = stretch.errorJPerMol[i] + LEAST_ERROR * w;
    const b = a / 2;
    stepVarH[i] = a * a + stretch.ownVarH[i];
    stepCovHS[i] = a * a * alpha + stretch.ownCovHS[i];
    stepVarS[i] = a * a * alpha * alpha + b * b * beta * beta + stretch.ownVarS[i];
  }
  const copy = (a: Float64Array): Float64Array => {
    const out = numbers(n);
    out.set(a);
    return out;
  };
  const h = copy(stretch.h);
  const hVar = copy(stretch.hVar);
  const s = copy(stretch.s);
  const sVar = copy(stretch.sVar);
  const exact = nearestTo(t, n, zero.enthalpyK);
  const start = { h: 0, hVar: 0, s: 0, sVar: 0 };
  if (stretch.hasH) {
    if (zero.countsThere && !stretch.absoluteH && t[exact] === zero.enthalpyK) {
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
      start.hVar = WIDE * spread;
    }
  } else {
    h[exact] = 0;
    hVar[exact] = 0;
    start.h = 0;
    let spread = 1e-6;
    for (let i = 0; i < exact; i++) {
      start.h -= stepH[i];
      spread += stepVarH[i];
    }
    start.hVar = WIDE * spread;
  }
  if (stretch.hasS) {
    const first = firstFinite(sVar);
    start.s = s[first];
    let spread = Math.max(sVar[first], 1e-12);
    for (let i = 0; i < first; i++) {
      start.s -= stepS[i];
      spread += stepVarS[i];
    }
    start.sVar = WIDE * spread;
  } else {
    const exactS = nearestTo(t, n, zero.entropyK);
    s[exactS] = 0;
    sVar[exactS] = zero.entropyVar;
    start.s = 0;
    let spread = 1e-12 + zero.entropyVar;
    for (let i = 0; i < exactS; i++) {
      start.s -= stepS[i];
      spread += stepVarS[i];
    }
    start.sVar = WIDE * spread;
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

function nearestTo(t: Float64Array, n: number, temperatureK: number): number {
  let at = 0;
  for (let i = 1; i < n; i++) if (Math.abs(t[i] - temperatureK) < Math.abs(t[at] - temperatureK)) at = i;
  return at;
}

function firstFinite(variance: Float64Array): number {
  for (let i = 0; i < variance.length; i++) if (variance[i] !== Number.POSITIVE_INFINITY) return i;
  return -1;
}

/**
 * How sure each interval's second bump is [J/mol]: what the smoothed steps of H and S leave of it, b = (dS - alpha dH) / beta,
 * and no more than the chain was given it with.
 */
export function bendUncertainty(stretch: Stretch, { chain, alpha, beta }: ChainRun): Float64Array {
  const { n, temperatureK: t, errorJPerMol } = stretch;
  const { varH, covHS, varS, gain } = chain;
  const out = numbers(n - 1);
  for (let i = 0; i < n - 1; i++) {
    const w = t[i + 1] - t[i];
    if (w === 0) continue;
    const j = i + 1;
    const g = 4 * i;
    const hh = varH[i] + varH[j] - 2 * (gain[g] * varH[j] + gain[g + 1] * covHS[j]);
    const ss = varS[i] + varS[j] - 2 * (gain[g + 2] * covHS[j] + gain[g + 3] * varS[j]);
    const cross = gain[g] * covHS[j] + gain[g + 1] * varS[j] + gain[g + 2] * varH[j] + gain[g + 3] * covHS[j];
    const hs = covHS[i] + covHS[j] - cross;
    const left = Math.sqrt(Math.max(0, ss - 2 * alpha[i] * hs + alpha[i] * alpha[i] * hh)) / Math.abs(beta[i]);
    out[i] = Math.min(left, (errorJPerMol[i] + LEAST_ERROR * w) / 2);
  }
  return out;
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
  const at = stretch.referenceK;
  bend(
    stretch,
    runChain(stretch, { enthalpyK: at, entropyK: at, entropyVar: 0, countsThere: stretch.countsFromItself }),
  );
  return stretch;
}
