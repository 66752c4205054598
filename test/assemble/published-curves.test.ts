import { beforeAll, describe, expect, it } from 'vitest';
import { enthalpyAt, entropyAt, gibbsAt, heatCapacityAt } from '../../pipeline/core/physics/curve.js';
import { crossCovariance, stateCovariance } from '../../pipeline/core/physics/curve-uncertainty.js';
import { openLibrary } from '../../pipeline/shell/library.js';
import type { Log } from '../../pipeline/shell/log.js';
import { judge } from '../../pipeline/shell/night-work.js';
import type { AssembledCase, PhaseCurve } from '../../schemas/curves.js';
import { eigenvalues, zeros } from '../core/numeric/dense.js';

/** Curves of the published tables (handbook tables and IAPWS releases, cited in their folders). */
const quiet: Log = { begin: () => {}, advance: () => {}, end: () => {}, tell: () => {}, fail: () => {} };
let curves: { name: string; curve: PhaseCurve }[] = [];
let cases: AssembledCase[] = [];

beforeAll(() => {
  const library = openLibrary({ sources: 'test/published', policy: null, date: '2024-01-01', only: null }, quiet);
  const { cases: judged } = judge(
    library.work({ release: null, findings: false }),
    library.parts,
    0,
    library.substances.length,
  );
  cases = judged.map((one) => one.checked.assembled);
  curves = cases.flatMap((one) =>
    one.curves.map((curve) => ({ name: `${one.examined.harmonised.substance.id} ${curve.phase}`, curve })),
  );
});

/** Derivative over five points, exact for quartics (common practice). */
function derivative(f: (t: number) => number, t: number, step: number): number {
  return (8 * (f(t + step) - f(t - step)) - (f(t + 2 * step) - f(t - 2 * step))) / (12 * step);
}

describe('published curves', () => {
  it('have dH/dT = Cp, dS/dT = Cp/T and dG/dT = -S to 1e-9, in every interval of every phase', () => {
    let intervals = 0;
    for (const { name, curve } of curves) {
      const { knotK } = curve;
      for (let i = 0; i + 1 < knotK.length; i++) {
        const w = knotK[i + 1] - knotK[i];
        const t = (knotK[i] + knotK[i + 1]) / 2;
        // Near 0 K Cp/T and its derivatives run over many powers; the third law is looked at elsewhere.
        if (w === 0 || knotK[i] < 20) continue;
        const step = Math.min(w / 5, 3e-4 * t);
        const cp = heatCapacityAt(curve, t, i);
        const scale = Math.max(cp, 1);
        // Rounding of the differences themselves: some 1e-16 of the value over the step.
        const rounding = (value: number): number => (3e-16 * Math.abs(value)) / step;
        // What five points leave out of the slope of S, h^4/30 of its fifth derivative, 24 c3/T^2 where Cp bends sharply.
        const leftOut = (0.8 * Math.abs(curve.c3[i]) * step ** 4) / t;
        const dH = derivative((x) => enthalpyAt(curve, x, i), t, step);
        const dS = derivative((x) => entropyAt(curve, x, i), t, step);
        const dG = derivative((x) => gibbsAt(curve, x, i), t, step);
        const where = `${name} at ${t} K`;
        expect(Math.abs(dH - cp), where).toBeLessThan(1e-9 * scale + rounding(enthalpyAt(curve, t)));
        expect(Math.abs(t * dS - cp), where).toBeLessThan(1e-9 * scale + leftOut + t * rounding(entropyAt(curve, t)));
        const s = entropyAt(curve, t);
        expect(Math.abs(dG + s), where).toBeLessThan(
          1e-9 * Math.abs(s) + rounding(enthalpyAt(curve, t)) + rounding(t * s),
        );
        intervals++;
      }
    }
    expect(intervals).toBeGreaterThan(800);
  });

  it('are continuous in H, S and G at every knot, a stated jump inside a phase aside', () => {
    for (const { name, curve } of curves) {
      for (let k = 1; k + 1 < curve.knotK.length; k++) {
        const t = curve.knotK[k];
        const where = `${name} at ${t} K`;
        if (curve.knotK[k - 1] === t) continue;
        const h = enthalpyAt(curve, t, k - 1);
        const s = entropyAt(curve, t, k - 1);
        expect(Math.abs(h - curve.enthalpyJPerMol[k]), where).toBeLessThan(1e-6);
        expect(Math.abs(s - curve.entropyJPerMolK[k]), where).toBeLessThan(1e-9);
      }
    }
  });

  it('have covariances along them that are symmetric, agree with themselves and are never negative', () => {
    const size = [1, 1e-3];
    for (const { name, curve } of curves) {
      const low = curve.knotK[0];
      const high = curve.knotK[curve.knotK.length - 1];
      const places = [0, 0.013, 0.11, 0.27, 0.5, 0.63, 0.88, 0.97, 1].map((share) => low + share * (high - low));
      const m = zeros(2 * places.length, 2 * places.length);
      places.forEach((a, i) => {
        const { hh, hs, ss } = stateCovariance({ ...curve, uEnthalpyLevelJPerMol: 0, uEntropyLevelJPerMolK: 0 }, a);
        const own = crossCovariance(curve, a, a);
        [hh, hs, hs, ss].forEach((v, k) => {
          expect(Math.abs(own[k] - v), name).toBeLessThan(1e-9 * (size[k >> 1] * size[k & 1] + Math.abs(v)));
        });
        places.forEach((b, j) => {
          const one = crossCovariance(curve, a, b);
          const other = crossCovariance(curve, b, a);
          [other[0], other[2], other[1], other[3]].forEach((v, k) => {
            expect(Math.abs(one[k] - v)).toBeLessThanOrEqual(1e-12 * Math.abs(v));
          });
          one.forEach((v, k) => {
            m[2 * i + (k >> 1)][2 * j + (k & 1)] = v / (size[k >> 1] * size[k & 1]);
          });
        });
      });
      const values = eigenvalues(m);
      expect(values[0], name).toBeGreaterThan(-1e-6 * values[values.length - 1]);
    }
  });

  it('have a Cp that never falls below zero', () => {
    for (const { name, curve } of curves) {
      for (let i = 0; i + 1 < curve.knotK.length; i++) {
        for (const share of [0, 0.05, 0.2, 0.5, 0.8, 0.95, 1]) {
          const t = curve.knotK[i] + share * (curve.knotK[i + 1] - curve.knotK[i]);
          expect(heatCapacityAt(curve, t, i), `${name} at ${t} K`).toBeGreaterThanOrEqual(-1e-9);
        }
      }
    }
  });

  it('cross where two phases have one G, to a millijoule, each crossing once', () => {
    for (const one of cases) {
      const keys = one.crossings.map((c) =>
        [c.family.isobarPa, c.from, c.to, c.pressurePa, c.gas, c.temperatureK.toFixed(4)].join(' '),
      );
      expect(new Set(keys).size).toBe(keys.length);
      for (const c of one.crossings) {
        if (c.gas === 'real') continue;
        const [a, b] = [c.from, c.to].map((phase) =>
          one.curves.find((x) => x.phase === phase && x.family.isobarPa === c.family.isobarPa),
        );
        if (a === undefined || b === undefined) throw new Error('a crossing without its curves');
        const gas = c.gas === 'ideal' ? 8.31446261815324 * c.temperatureK * Math.log(c.pressurePa / 1e5) : 0;
        expect(Math.abs(gibbsAt(a, c.temperatureK) - gibbsAt(b, c.temperatureK) - gas)).toBeLessThan(1e-3);
      }
    }
  });
});
