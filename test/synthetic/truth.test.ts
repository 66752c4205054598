import { describe, expect, it } from 'vitest';
import { integral } from '../core/numeric/quadrature.js';
import { KINDS } from './kinds.js';
import { enthalpyBetween, entropyBetween, entropyFromZero, heatCapacity, type Law } from './law.js';
import { drawTruth, logVapourPressure, REFERENCE_K, STANDARD_PRESSURE_PA } from './truth.js';

const LAW: Law = {
  constant: 21.5,
  linear: 0.013,
  modes: [
    { count: 3, thetaK: 140 },
    { count: 5.5, thetaK: 900 },
  ],
};

describe('a heat capacity in closed form', () => {
  it('has the H and S that quadrature of it gives', () => {
    for (const [low, high] of [
      [50, 120],
      [298.15, 640],
      [900, 2400],
    ] as const) {
      const h = integral((t) => heatCapacity(LAW, t), low, high);
      const s = integral((t) => heatCapacity(LAW, t) / t, low, high);
      expect(enthalpyBetween(LAW, low, high) / h).toBeCloseTo(1, 10);
      expect(entropyBetween(LAW, low, high) / s).toBeCloseTo(1, 10);
      expect(enthalpyBetween(LAW, high, low)).toBe(-enthalpyBetween(LAW, low, high));
    }
  });

  it('reaches 3 R an oscillator triple at high temperature, and has an entropy from 0 K without its constant only', () => {
    const crystal: Law = { constant: 0, linear: 0, modes: [{ count: 3, thetaK: 200 }] };
    // 1 - x^2/12 to first order, x = theta/T.
    expect(heatCapacity(crystal, 20_000) / (3 * 8.31446261815324)).toBeCloseTo(1 - 1e-4 / 12, 10);
    const slow = integral((t) => heatCapacity(crystal, t) / t, 2, 300);
    expect(entropyFromZero(crystal, 300) / slow).toBeCloseTo(1, 8);
    expect(() => entropyFromZero(LAW, 300)).toThrow('diverges');
  });
});

describe.each(KINDS.flatMap((kind) => [1, 2].map((crystals) => ({ kind, crystals }))))(
  'invented substances: $kind, $crystals crystal phases',
  ({ kind, crystals }) => {
    const truths = Array.from({ length: 20 }, (_, seed) => drawTruth(1000 + seed, kind, crystals));

    it('have equal G at their transitions, and the H and S that close with them', () => {
      for (const { phases, transitions } of truths) {
        expect(transitions).toHaveLength(crystals + 1);
        transitions.forEach(({ from, to, temperatureK: t, enthalpy, entropy }, i) => {
          const [a, b] = [phases[i]!, phases[i + 1]!];
          expect([a.label, b.label]).toEqual([from, to]);
          expect(Math.abs(a.g(t) - b.g(t))).toBeLessThan(1e-8 * Math.abs(a.g(t)));
          expect(enthalpy).toBeCloseTo(b.h(t) - a.h(t), 9);
          expect(entropy / (enthalpy / t)).toBeCloseTo(1, 9);
          expect(enthalpy).toBeGreaterThan(0);
        });
      }
    });

    it('have at 298.15 K just the formation enthalpy and the entropy that are stated, the crystal by the third law', () => {
      for (const { phases } of truths) {
        for (const { h, s, formationEnthalpy, referenceEntropy } of phases) {
          expect(h(REFERENCE_K)).toBe(formationEnthalpy);
          expect(s(REFERENCE_K)).toBe(referenceEntropy);
        }
        const first = phases[0]!;
        expect(first.referenceEntropy).toBeCloseTo(entropyFromZero(first.law, REFERENCE_K), 3);
        expect(first.formationEnthalpy === 0).toBe(kind === 'metal');
      }
    });

    it('have each phase lowest in G just where it is said to be stable', () => {
      for (const { phases, transitions } of truths) {
        for (let t = 150; t < 1.3 * transitions.at(-1)!.temperatureK; t += 7) {
          const lowest = phases.reduce((best, phase) => (phase.g(t) < best.g(t) ? phase : best));
          expect(lowest.stableK[0]).toBeLessThanOrEqual(t);
          expect(lowest.stableK[1]).toBeGreaterThanOrEqual(t);
        }
      }
    });

    it('boil where their vapour pressure is 1 bar, which it is by the slope of Clausius and Clapeyron', () => {
      for (const { phases, transitions } of truths) {
        const [liquid, gas] = phases.slice(-2) as [(typeof phases)[0], (typeof phases)[0]];
        const { temperatureK: t, enthalpy } = transitions.at(-1)!;
        const log = (x: number): number => logVapourPressure(liquid, gas, x);
        expect(Math.abs(log(t))).toBeLessThan(1e-9);
        expect(STANDARD_PRESSURE_PA * Math.exp(log(t - 20))).toBeLessThan(STANDARD_PRESSURE_PA);
        const slope = (log(t + 0.01) - log(t - 0.01)) / 0.02;
        expect(slope / (enthalpy / (8.31446261815324 * t * t))).toBeCloseTo(1, 5);
      }
    });
  },
);
