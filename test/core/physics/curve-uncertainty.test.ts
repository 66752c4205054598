import { describe, expect, it } from 'vitest';
import { enthalpyAt, entropyAt } from '../../../pipeline/core/physics/curve.js';
import {
  crossCovariance,
  gibbsUncertainty,
  stateCovariance,
} from '../../../pipeline/core/physics/curve-uncertainty.js';
import { eigenvalues, zeros } from '../numeric/dense.js';
import { integral } from '../numeric/quadrature.js';
import { seeded } from '../numeric/random.js';
import { uncertainCurve } from './curves.js';

const SIZE = [1, 1e-2];

/** Equal as correlations are: differences against sizes of 1 J/mol and 0.01 J/(mol K). */
function expectSame(a: readonly number[], b: readonly number[], within = 1e-9): void {
  a.forEach((v, k) => {
    expect(Math.abs(v - b[k]) / (SIZE[k >> 1] * SIZE[k & 1])).toBeLessThan(within);
  });
}

describe('uncertainty along a curve', () => {
  it('is, at a knot, what the chain says there; levels are added, H and S apart', () => {
    const curve = uncertainCurve(1, 9);
    for (let k = 0; k < 9; k++) {
      const { hh, hs, ss } = stateCovariance(curve, curve.knotK[k]);
      expectSame([hh, hs, hs, ss], [curve.varH[k], curve.covHS[k], curve.covHS[k], curve.varS[k]]);
    }
    const raised = stateCovariance({ ...curve, uEnthalpyLevelJPerMol: 30, uEntropyLevelJPerMolK: 0.04 }, 300);
    const bare = stateCovariance(curve, 300);
    expect(raised.hh - bare.hh).toBeCloseTo(900, 8);
    expect(raised.ss - bare.ss).toBeCloseTo(0.0016, 12);
    expect(raised.hs).toBe(bare.hs);
  });

  it('has u(G) of H - TS', () => {
    const curve = uncertainCurve(2, 7);
    const t = 260;
    const { hh, hs, ss } = stateCovariance(curve, t);
    expect(gibbsUncertainty(curve, t) ** 2).toBeCloseTo(hh - 2 * t * hs + t * t * ss, 10);
  });

  it.each([
    ['bare', {}],
    ['with a calibration', { uCalibrationRelative: 0.004 }],
    ['continued at both ends', { measuredFromK: 230, measuredToK: 330 }],
  ])('covaries with itself as its own variance, and the same way round both ways: %s', (_, rest) => {
    const curve = uncertainCurve(3, 9, rest);
    const last = curve.knotK[8];
    const places = [...curve.knotK, 200.5, 237, 300, 301, last - 1];
    for (const t of places) {
      const { hh, hs, ss } = stateCovariance(curve, t);
      expectSame(crossCovariance(curve, t, t), [hh, hs, hs, ss]);
      for (const other of places) {
        const [a, b, c, d] = crossCovariance(curve, t, other);
        expectSame(crossCovariance(curve, other, t), [a, c, b, d]);
      }
    }
  });

  it('never gives a combination of H and S at many temperatures a negative variance', () => {
    for (const seed of [4, 5, 6]) {
      const curve = uncertainCurve(seed, 10, {
        uCalibrationRelative: 0.001,
        measuredFromK: 215,
        measuredToK: 400,
      });
      const { unit } = seeded(seed);
      const last = curve.knotK[9];
      const places = [...curve.knotK, ...Array.from({ length: 10 }, () => 200 + (last - 200) * unit())];
      const m = zeros(2 * places.length, 2 * places.length);
      for (let i = 0; i < places.length; i++) {
        for (let j = 0; j < places.length; j++) {
          const c = crossCovariance(curve, places[i], places[j]);
          for (let k = 0; k < 4; k++) m[2 * i + (k >> 1)][2 * j + (k & 1)] = c[k] / (SIZE[k >> 1] * SIZE[k & 1]);
        }
      }
      const values = eigenvalues(m);
      expect(values[0]).toBeGreaterThan(-1e-10 * values[values.length - 1]);
    }
  });

  it('lets a calibration act on the increments from the reference temperature, on H and S alike', () => {
    const curve = uncertainCurve(7, 6, { uCalibrationRelative: 0.01 });
    const bare = { ...curve, uCalibrationRelative: 0 };
    const t = curve.knotK[4] + 3;
    const dh = enthalpyAt(curve, t) - enthalpyAt(curve, curve.referenceK);
    const ds = entropyAt(curve, t) - entropyAt(curve, curve.referenceK);
    const { hh, hs, ss } = stateCovariance(curve, t);
    const without = stateCovariance(bare, t);
    expectSame(
      [hh, hs, hs, ss],
      [
        without.hh + 1e-4 * dh * dh,
        without.hs + 1e-4 * dh * ds,
        without.hs + 1e-4 * dh * ds,
        without.ss + 1e-4 * ds * ds,
      ],
    );
    expectSame(
      [stateCovariance(curve, curve.referenceK).hh, 0, 0, 0],
      [stateCovariance(bare, curve.referenceK).hh, 0, 0, 0],
    );
  });

  it.each([
    ['above', 400, 20],
    ['below', 250, -20],
  ])(
    'grows %s the data as an error of Cp that rises with the distance, integrated over T and over ln T',
    (_, edge, x) => {
      const curve = uncertainCurve(8, 12, x > 0 ? { measuredToK: edge } : { measuredFromK: edge });
      const whole = { ...curve, measuredFromK: curve.knotK[0], measuredToK: curve.knotK[11] };
      const t = edge + x;
      const rate = 0.001 * (x > 0 ? curve.c0[curve.c0.length - 1] : curve.c0[0]);
      // dCp = rate |T' - edge|; the sign of the whole cancels in squares.
      const h = rate * integral((y) => y, 0, Math.abs(x));
      const s = rate * integral((y) => y / (edge + Math.sign(x) * y), 0, Math.abs(x));
      const a = stateCovariance(curve, t);
      const b = stateCovariance(whole, t);
      expectSame([a.hh - b.hh, a.hs - b.hs, a.hs - b.hs, a.ss - b.ss], [h * h, h * s, h * s, s * s]);
      // What is left in G is of third order in the distance: rate |x|^3/(6 T) to first order (expansion of the two integrals).
      const g = Math.sqrt(gibbsUncertainty(curve, t) ** 2 - gibbsUncertainty(whole, t) ** 2);
      expect(g / ((rate * Math.abs(x) ** 3) / (6 * edge))).toBeGreaterThan(0.85);
      expect(g / ((rate * Math.abs(x) ** 3) / (6 * edge))).toBeLessThan(1.15);
    },
  );
});
