import { describe, expect, it } from 'vitest';
import { smoothChain } from '../../../pipeline/core/numeric/gaussian-chain.js';
import { gibbsWeights, type MovedState, sensitivity } from '../../../pipeline/core/physics/gibbs-weights.js';

const T = 500;

describe('a sensitivity', () => {
  it('is exact where H and S are linear in the number, in SI whatever unit it is printed in', () => {
    const printed = 12.5;
    const state = (by: number): MovedState => ({
      number: 1000 * (printed + by),
      enthalpyJPerMol: 40_000 + 0.8 * 1000 * (printed + by),
      entropyJPerMolK: 90 + 0.002 * 1000 * (printed + by),
    });
    const { enthalpy, entropy, gibbs } = sensitivity(state(0), state, 0.25, T);
    expect(enthalpy).toBeCloseTo(0.8, 9);
    expect(entropy).toBeCloseTo(0.002, 12);
    expect(gibbs).toBeCloseTo(0.8 - T * 0.002, 9);
  });

  it('has no second derivative in it', () => {
    const state = (by: number): MovedState => ({
      number: 3 + by,
      enthalpyJPerMol: (3 + by) ** 2,
      entropyJPerMolK: 0,
    });
    expect(sensitivity(state(0), state, 0.01, T).enthalpy).toBeCloseTo(6, 9);
  });

  it('does not take a decision that a long step crosses for a slope', () => {
    const state = (by: number): MovedState => ({
      number: by,
      enthalpyJPerMol: 2 * by + (by > 0.2 ? 50 : 0),
      entropyJPerMolK: 0,
    });
    expect(sensitivity(state(0), state, 0.25, T).gibbs).toBeCloseTo(2, 9);
  });

  it('is nothing where the number does not move, or nothing follows from it', () => {
    const still = (): MovedState => ({ number: 1, enthalpyJPerMol: 5, entropyJPerMolK: 5 });
    expect(sensitivity(still(), still, 1, T).gibbs).toBe(0);
    const idle = (by: number): MovedState => ({ number: by, enthalpyJPerMol: 5, entropyJPerMolK: 5 });
    expect(sensitivity(idle(0), idle, 1, T).gibbs).toBe(0);
  });
});

describe('weights', () => {
  const number = (name: string, gibbs: number, u: number) => ({
    name,
    u,
    sensitivity: { enthalpy: gibbs, entropy: 0, gibbs },
  });

  it('come largest first, exact numbers last by their sensitivity, and shares are squares', () => {
    const found = gibbsWeights([number('a', 0.5, 0), number('b', -3, 1), number('c', 1, 4), number('d', 2, 0)], 8);
    expect(found.map(({ of }) => of.name)).toEqual(['c', 'b', 'd', 'a']);
    expect(found.map(({ weightJPerMol }) => weightJPerMol)).toEqual([4, 3, 0, 0]);
    expect(found.map(({ share }) => share)).toEqual([0.25, 0.140625, 0, 0]);
  });

  it('have no shares of an uncertainty that is none', () => {
    expect(gibbsWeights([number('a', 1, 0)], 0)[0]!.share).toBeNull();
  });

  it('of the observations of a chain with exact steps make up the whole of u(G)²', () => {
    const temperatureK = Float64Array.from([300, 400, 500, 600, 700]);
    const n = temperatureK.length;
    const cp = 30;
    const stepH = Float64Array.from({ length: n }, (_, k) => (k < n - 1 ? cp * 100 : 0));
    const stepS = Float64Array.from({ length: n }, (_, k) =>
      k < n - 1 ? cp * Math.log(temperatureK[k + 1]! / temperatureK[k]!) : 0,
    );
    const h = Float64Array.from(temperatureK, (t) => cp * (t - 300) + 3 * Math.sin(t));
    const s = Float64Array.from(temperatureK, (t) => 60 + cp * Math.log(t / 300) + 0.01 * Math.cos(t));
    const f = Float64Array.from(temperatureK, (t, k) => s[k]! - h[k]! / t);
    const [uH, uS, uF] = [4, 0.012, 0.02];
    const wide = (u: number) => 1e7 * u * u;
    const run = (observed: { h: Float64Array; s: Float64Array; f: Float64Array }) =>
      smoothChain({
        n,
        temperatureK,
        stepH,
        stepS,
        stepVarH: new Float64Array(n),
        stepCovHS: new Float64Array(n),
        stepVarS: new Float64Array(n),
        observedH: observed.h,
        observedHVar: new Float64Array(n).fill(uH * uH),
        observedS: observed.s,
        observedSVar: new Float64Array(n).fill(uS * uS),
        observedF: observed.f,
        observedFVar: new Float64Array(n).fill(uF * uF),
        startH: 0,
        startHVar: wide(uH),
        startS: 60,
        startSVar: wide(uS),
      });
    const at = 3;
    const t = temperatureK[at]!;
    const base = run({ h, s, f });
    const centre = { enthalpyJPerMol: base.h[at]!, entropyJPerMolK: base.s[at]! };
    const numbers = (['h', 's', 'f'] as const).flatMap((name) =>
      Array.from({ length: n }, (_, k) => {
        const moved = (by: number): MovedState => {
          const observed = { h: h.slice(), s: s.slice(), f: f.slice() };
          observed[name][k]! += by;
          const chain = run(observed);
          return { number: observed[name][k]!, enthalpyJPerMol: chain.h[at]!, entropyJPerMolK: chain.s[at]! };
        };
        const u = { h: uH, s: uS, f: uF }[name];
        return { name, u, sensitivity: sensitivity(centre, moved, u, t) };
      }),
    );
    const u = Math.sqrt(base.varH[at]! - 2 * t * base.covHS[at]! + t * t * base.varS[at]!);
    const sum = gibbsWeights(numbers, u).reduce((total, { share }) => total + share!, 0);
    expect(sum).toBeCloseTo(1, 5);
    // Raising every H by 1 and every S - H/T with it raises H by 1.
    const raised = numbers.reduce((total, { name, sensitivity: { enthalpy } }, i) => {
      const by = name === 'h' ? 1 : name === 'f' ? -1 / temperatureK[i % n]! : 0;
      return total + by * enthalpy;
    }, 0);
    expect(raised).toBeCloseTo(1, 5);
  });
});
