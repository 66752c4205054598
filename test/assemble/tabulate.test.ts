import { describe, expect, it } from 'vitest';
import { enthalpyAt, entropyAt, gibbsAt, heatCapacityAt } from '../../pipeline/core/physics/curve.js';
import { stateCovariance } from '../../pipeline/core/physics/curve-uncertainty.js';
import { anchorOf, assembled, curveOfPhase, datum, POLICY, rowsOfPhase, seriesOf, transitionOf } from './cases.js';
import { steps, TR } from './model.js';

const bare = (phase: string, temperatureK: number[], cp: number) =>
  seriesOf({ phase, temperatureK, cp: { values: temperatureK.map((t) => cp + t / 100), decimals: 3 } });

const RESULT = assembled({
  series: [bare('cr', steps(250, 430, 20), 50), bare('l', steps(405, 645, 30), 70)],
  anchors: [anchorOf('cr', { h: datum(-200000, 100), s: datum(90, 0.1) }, { source: 'other' })],
  transitions: [transitionOf('cr', 'l', datum(421.7, 0.1), { h: datum(15000, 100) })],
});

describe('published temperatures', () => {
  const rows = rowsOfPhase(RESULT, 'cr');
  const t = Array.from(rows.temperatureK);

  it('are the printed ones, 298.15 K, the hundreds, the crossing and the ends of the continuation, rising and once each', () => {
    const wanted = [...steps(250, 430, 20), TR, 300, 400, 421.7, 225, 473].sort((a, b) => a - b);
    expect(t.length).toBe(wanted.length);
    wanted.forEach((value, k) => {
      expect(t[k]).toBeCloseTo(value, 6);
    });
  });

  it('say what is measured, interpolated and extrapolated', () => {
    const basis = (at: number): number => rows.basis[t.findIndex((x) => Math.abs(x - at) < 1e-6)];
    expect([250, 330, 430].map(basis)).toEqual([0, 0, 0]);
    expect([TR, 300, 421.7].map(basis)).toEqual([1, 1, 1]);
    expect([225, 473].map(basis)).toEqual([2, 2]);
  });

  it('carry the very values of the curve, G = H - TS, and uncertainties to four digits', () => {
    const curve = curveOfPhase(RESULT, 'cr');
    t.forEach((x, k) => {
      // Nine decimals after J/(mol K), six after J/mol.
      expect(Math.abs(rows.heatCapacityJPerMolK[k] - heatCapacityAt(curve, x))).toBeLessThan(1e-9);
      expect(Math.abs(rows.enthalpyJPerMol[k] - enthalpyAt(curve, x))).toBeLessThan(1e-6);
      expect(Math.abs(rows.entropyJPerMolK[k] - entropyAt(curve, x))).toBeLessThan(1e-9);
      expect(Math.abs(rows.gibbsEnergyJPerMol[k] - gibbsAt(curve, x))).toBeLessThan(1e-6);
      const { hh, hs, ss } = stateCovariance(curve, x);
      expect(rows.uEnthalpyJPerMol[k] / Math.sqrt(hh)).toBeCloseTo(1, 3);
      expect(rows.uEntropyJPerMolK[k] / Math.sqrt(ss)).toBeCloseTo(1, 3);
      expect(rows.uGibbsEnergyJPerMol[k] / Math.sqrt(hh - 2 * x * hs + x * x * ss)).toBeCloseTo(1, 3);
    });
  });

  it('tell the stable phase from the metastable one, both stable at their crossing', () => {
    const liquid = rowsOfPhase(RESULT, 'l');
    t.forEach((x, k) => {
      expect(rows.stable[k]).toBe(x <= 421.7000001 ? 1 : 0);
    });
    liquid.temperatureK.forEach((x, k) => {
      expect(liquid.stable[k]).toBe(x >= 421.6999999 ? 1 : 0);
    });
  });

  it('follow the grid of the policy', () => {
    const fine = rowsOfPhase(
      assembled({ series: [bare('cr', steps(250, 430, 20), 50)] }, { ...POLICY, grid: { stepK: 25 } }),
      'cr',
    );
    for (const x of [225, 275, 300, 325, 425, 450]) expect(Array.from(fine.temperatureK)).toContain(x);
  });
});
