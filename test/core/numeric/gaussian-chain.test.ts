import { describe, expect, it } from 'vitest';
import { type ChainInput, type ChainResult, smoothChain } from '../../../pipeline/core/numeric/gaussian-chain.js';
import { type Matrix, product, solved, transposed, zeros } from './dense.js';
import { seeded } from './random.js';

/**
 * The same linear Gaussian system solved at once: the joint prior of all 2n states, conditioned on all observations by
 * generalised least squares, m + C M'(M C M' + R)^-1 (y - M m) (C. R. Rao, Linear Statistical Inference, 2nd ed. 1973, 4a).
 */
function solvedAtOnce(input: ChainInput): { mean: number[]; covariance: Matrix } {
  const { n } = input;
  const mean: number[] = [input.startH, input.startS];
  const c = zeros(2 * n, 2 * n);
  let p = [input.startHVar, 0, input.startSVar];
  const block = (at: number): void => {
    for (let j = at; j < n; j++) {
      for (const [a, b, v] of [
        [0, 0, p[0]],
        [0, 1, p[1]],
        [1, 0, p[1]],
        [1, 1, p[2]],
      ]) {
        c[2 * at + a][2 * j + b] = v;
        c[2 * j + b][2 * at + a] = v;
      }
    }
  };
  block(0);
  for (let k = 0; k + 1 < n; k++) {
    mean.push(mean[2 * k] + input.stepH[k], mean[2 * k + 1] + input.stepS[k]);
    p = [p[0] + input.stepVarH[k], p[1] + input.stepCovHS[k], p[2] + input.stepVarS[k]];
    block(k + 1);
  }
  const rows: Matrix = [];
  const y: number[] = [];
  const r: number[] = [];
  for (let k = 0; k < n; k++) {
    const observe = (h: number, s: number, value: number, variance: number): void => {
      if (variance === Number.POSITIVE_INFINITY) return;
      const row = zeros(1, 2 * n)[0];
      row[2 * k] = h;
      row[2 * k + 1] = s;
      rows.push(row);
      y.push(value);
      r.push(variance);
    };
    observe(1, 0, input.observedH[k], input.observedHVar[k]);
    observe(0, 1, input.observedS[k], input.observedSVar[k]);
    observe(-1 / input.temperatureK[k], 1, input.observedF[k], input.observedFVar[k]);
  }
  const cm = product(c, transposed(rows));
  const s = product(rows, cm);
  for (let i = 0; i < r.length; i++) s[i][i] += r[i];
  const innovation = y.map((value, i) => [value - rows[i].reduce((sum, v, j) => sum + v * mean[j], 0)]);
  const shift = product(cm, solved(s, innovation));
  const less = product(cm, solved(s, transposed(cm)));
  return {
    mean: mean.map((v, i) => v + shift[i][0]),
    covariance: c.map((row, i) => row.map((v, j) => v - less[i][j])),
  };
}

/** Cov(x_k, x_j), k <= j, from the gains: G_k ... G_{j-1} P_j. */
function crossFromGains(result: ChainResult, k: number, j: number): Matrix {
  let m: Matrix = [
    [result.varH[j], result.covHS[j]],
    [result.covHS[j], result.varS[j]],
  ];
  for (let i = j - 1; i >= k; i--) {
    const g = result.gain.subarray(4 * i, 4 * i + 4);
    m = product(
      [
        [g[0], g[1]],
        [g[2], g[3]],
      ],
      m,
    );
  }
  return m;
}

interface Kind {
  readonly seed: number;
  readonly n: number;
  readonly exactH?: number;
  readonly exactS?: number;
  readonly zeroWidth?: number;
  readonly startVariance?: number;
}

/** A chain like those of real tables: H to some 30 kJ/mol in J/mol, steps of 10 to 100 K, printed values here and there. */
function chainOf({ seed, n, exactH, exactS, zeroWidth, startVariance = 100 }: Kind): ChainInput {
  const { unit, normal } = seeded(seed);
  const array = (f: (i: number) => number): Float64Array => Float64Array.from({ length: n }, (_, i) => f(i));
  const temperatureK = array(() => 0);
  for (let i = 0; i < n; i++) {
    const width = i - 1 === zeroWidth ? 0 : 10 + 90 * unit();
    temperatureK[i] = i === 0 ? 150 + 200 * unit() : temperatureK[i - 1] + width;
  }
  const none = Number.POSITIVE_INFINITY;
  const wide = (i: number): boolean => i < n - 1 && i !== zeroWidth;
  const error = array(() => 0.1 + 2 * unit());
  const middle = array((i) => (i < n - 1 ? (temperatureK[i] + temperatureK[i + 1]) / 2 : 1));
  const stepVarH = array((i) => (wide(i) ? error[i] ** 2 : 0));
  const stepCovHS = array((i) => (wide(i) ? error[i] ** 2 / middle[i] : 0));
  const stepVarS = array((i) => (wide(i) ? (error[i] / middle[i]) ** 2 * (1 + 0.05 * unit()) : 0));
  const stepH = array((i) => (wide(i) ? 30 * (temperatureK[i + 1] - temperatureK[i]) : 0));
  const stepS = array((i) => (wide(i) ? stepH[i] / middle[i] : 0));
  let h = 40 * normal();
  let s = 50 + normal();
  const truthH: number[] = [];
  const truthS: number[] = [];
  for (let i = 0; i < n; i++) {
    truthH.push(h);
    truthS.push(s);
    const a = normal();
    h += stepH[i] + Math.sqrt(stepVarH[i]) * a;
    s += stepS[i] + (wide(i) ? (stepCovHS[i] / Math.sqrt(stepVarH[i])) * a : 0);
  }
  const seen = (size: number, share: number): Float64Array => array(() => (unit() < share ? size ** 2 : none));
  const observedHVar = seen(3, 0.8);
  const observedSVar = seen(0.003, 0.8);
  const observedFVar = seen(0.003, 0.6);
  const observedH = array((i) => truthH[i] + 3 * normal());
  const observedS = array((i) => truthS[i] + 0.003 * normal());
  const observedF = array((i) => truthS[i] - truthH[i] / temperatureK[i] + 0.003 * normal());
  if (exactH !== undefined) {
    observedH[exactH] = truthH[exactH];
    observedHVar[exactH] = 0;
  }
  if (exactS !== undefined) {
    observedS[exactS] = truthS[exactS];
    observedSVar[exactS] = 0;
  }
  return {
    n,
    temperatureK,
    stepH,
    stepS,
    stepVarH,
    stepCovHS,
    stepVarS,
    observedH,
    observedHVar,
    observedS,
    observedSVar,
    observedF,
    observedFVar,
    startH: truthH[0] + 5,
    startHVar: startVariance,
    startS: truthS[0] - 0.05,
    startSVar: startVariance / 1e4,
  };
}

/** Largest differences: of the states in their own standard uncertainties, of the covariances as correlations. */
function compare(input: ChainInput): { state: number; covariance: number } {
  const result = smoothChain(input);
  const { mean, covariance } = solvedAtOnce(input);
  let state = 0;
  let worst = 0;
  const size = (i: number): number => Math.sqrt(Math.max(covariance[i][i], i % 2 === 0 ? 1e-2 : 1e-8));
  for (let k = 0; k < input.n; k++) {
    state = Math.max(state, Math.abs(result.h[k] - mean[2 * k]) / size(2 * k));
    state = Math.max(state, Math.abs(result.s[k] - mean[2 * k + 1]) / size(2 * k + 1));
    for (let j = k; j < input.n; j++) {
      const cross = crossFromGains(result, k, j);
      for (const a of [0, 1]) {
        for (const b of [0, 1]) {
          const other = covariance[2 * k + a][2 * j + b];
          worst = Math.max(worst, Math.abs(cross[a][b] - other) / (size(2 * k + a) * size(2 * j + b)));
        }
      }
    }
  }
  return { state, covariance: worst };
}

describe('smoothed chain of H and S', () => {
  it('is the generalised least-squares solution of the whole system: states, covariances and all cross covariances', () => {
    for (let seed = 1; seed <= 12; seed++) {
      const { state, covariance } = compare(chainOf({ seed, n: 4 + seed }));
      expect(state).toBeLessThan(1e-7);
      expect(covariance).toBeLessThan(1e-7);
    }
  });

  it('stays so with H or S held exactly at a row, and takes that value to the last bit', () => {
    for (let seed = 21; seed <= 28; seed++) {
      const input = chainOf({ seed, n: 9, exactH: seed % 9, exactS: (seed * 5) % 9 });
      const { state, covariance } = compare(input);
      expect(state).toBeLessThan(1e-7);
      expect(covariance).toBeLessThan(1e-7);
      const result = smoothChain(input);
      expect(Math.abs(result.h[seed % 9] - input.observedH[seed % 9])).toBeLessThan(1e-9);
      expect(result.varH[seed % 9]).toBeLessThan(1e-12);
      expect(result.varS[(seed * 5) % 9]).toBeLessThan(1e-15);
    }
  });

  it('stays so across two rows at one temperature, which end up equal', () => {
    for (let seed = 31; seed <= 38; seed++) {
      const input = chainOf({ seed, n: 8, zeroWidth: 1 + (seed % 5) });
      const { state, covariance } = compare(input);
      expect(state).toBeLessThan(1e-7);
      expect(covariance).toBeLessThan(1e-7);
      const result = smoothChain(input);
      const at = 1 + (seed % 5);
      expect(result.h[at]).toBe(result.h[at + 1]);
      expect(result.varS[at]).toBe(result.varS[at + 1]);
    }
  });

  it('stays so with both at once, and with a start that is nearly unknown', () => {
    for (let seed = 41; seed <= 46; seed++) {
      const { state, covariance } = compare(chainOf({ seed, n: 8, zeroWidth: 3, exactH: 6, startVariance: 1e6 }));
      // The dense solution itself loses digits against a prior a million times wider than the data.
      expect(state).toBeLessThan(1e-5);
      expect(covariance).toBeLessThan(1e-5);
    }
  });

  it('hands the start on unchanged where nothing is observed', () => {
    const input = chainOf({ seed: 51, n: 4 });
    const none = new Float64Array(4).fill(Number.POSITIVE_INFINITY);
    const result = smoothChain({ ...input, observedHVar: none, observedSVar: none, observedFVar: none });
    expect(result.h[0]).toBe(input.startH);
    expect(result.h[3]).toBeCloseTo(input.startH + input.stepH[0] + input.stepH[1] + input.stepH[2], 9);
    expect(result.varH[0]).toBeCloseTo(input.startHVar, 9);
    expect(result.varS[3]).toBeCloseTo(input.startSVar + input.stepVarS[0] + input.stepVarS[1] + input.stepVarS[2], 12);
  });
});
