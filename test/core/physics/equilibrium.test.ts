import { describe, expect, it } from 'vitest';
import { R_J_PER_MOL_K } from '../../../pipeline/core/constants.js';
import { stateCovariance } from '../../../pipeline/core/physics/curve-uncertainty.js';
import { crossingsOf } from '../../../pipeline/core/physics/diagram.js';
import { equilibrium } from '../../../pipeline/core/physics/equilibrium.js';
import { secondVirial } from '../../../pipeline/core/physics/gas-imperfection.js';
import { gapUncertainty, isGas, placePhase } from '../../../pipeline/core/physics/placed-phase.js';
import { condensedTermUncertainty, gasTerm } from '../../../pipeline/core/physics/pressure-terms.js';
import { curveOf, uncertainCurve } from './curves.js';

const BENZENE = {
  criticalTemperatureK: 562.05,
  criticalPressurePa: 4.895e6,
  acentricFactor: 0.2103,
  polarA: 0,
  polarB: 0,
  class: 'molecular' as const,
  vapourSpecies: null,
};
const STANDARD = { isobarPa: null };

/** A liquid and its vapour that meet at 353 K as ideal gas at 1 bar, dH = 30 850 J/mol, Cp equal. */
function boiling(pressurePa: number, kind: 'real' | 'ideal', vapourSpecies: { formulaUnits: number } | null = null) {
  const knots = [300, 420];
  const none = uncertainCurve(1, 2);
  const units = vapourSpecies?.formulaUnits ?? 1;
  const liquid = { ...none, ...curveOf(knots, [[100, 0, 0, 0]], 0, 170), phase: 'l', family: STANDARD };
  const vapour = {
    ...none,
    ...curveOf(knots, [[100 * units, 0, 0, 0]], 30850 * units, (170 + 30850 / 353) * units),
    phase: 'g',
    family: STANDARD,
  };
  const identity = { ...BENZENE, vapourSpecies };
  const setting = { pressurePa, gas: kind };
  return {
    l: placePhase(liquid, identity, setting, 353),
    g: placePhase(vapour, identity, setting, 353),
  };
}

describe('two phases in equilibrium', () => {
  it('knows gases by their phase word', () => {
    expect(['g', 'g-2', 'l', 'cr', 'glass'].map(isGas)).toEqual([true, true, false, false, false]);
  });

  it('meets at the ideal boiling point at 1 bar, and moves with pressure as Clausius and Clapeyron say', () => {
    const at = (p: number): number => crossingsOf(boiling(p, 'ideal').l, boiling(p, 'ideal').g)[0];
    expect(at(1e5)).toBeCloseTo(353, 6);
    // With dH constant, 1/T = 1/353 - R ln(p/p0)/dH exactly.
    for (const p of [5e4, 101325, 2e5])
      expect(at(p)).toBeCloseTo(1 / (1 / 353 - (R_J_PER_MOL_K * Math.log(p / 1e5)) / 30850), 6);
  });

  it('boils lower as a real gas, by B p/dS, some 1.1 K for benzene (published correlation, worked out by hand)', () => {
    const real = boiling(1e5, 'real');
    const t = crossingsOf(real.l, real.g)[0];
    // Vapour held back less: G of the real gas is lower by |B| p, 99.6 J/mol, and dS is 87.4 J/(mol K).
    expect(353 - t).toBeGreaterThan(1.0);
    expect(353 - t).toBeLessThan(1.25);
  });

  it('has dG, dH and dS that belong together, the real gas departure by analytic derivatives of the correlation', () => {
    const { l, g } = boiling(1.5e5, 'real');
    const t = 350;
    const e = equilibrium(l, g, t);
    expect(e.gapJPerMol).toBeCloseTo(-(e.enthalpyJPerMol - t * e.entropyJPerMolK), 6);
    const tr = t / 562.05;
    const scale = (R_J_PER_MOL_K * 562.05) / 4.895e6;
    // dB/dT of Tsonopoulos 1974, eqs. 5 and 6, term by term.
    const dF0 = 0.33 / tr ** 2 + (2 * 0.1385) / tr ** 3 + (3 * 0.0121) / tr ** 4 + (8 * 0.000607) / tr ** 9;
    const dF1 = (-2 * 0.331) / tr ** 3 + (3 * 0.423) / tr ** 4 + (8 * 0.008) / tr ** 9;
    const slope = (scale * (dF0 + 0.2103 * dF1)) / 562.05;
    const b = secondVirial(BENZENE, t, 353).value;
    expect(e.enthalpyJPerMol - 30850).toBeCloseTo(1.5e5 * (b - t * slope), 2);
    // The slope of the pressure term is a central difference over 0.1 % of T: some 1e-5 of itself.
    expect(e.entropyJPerMolK - 30850 / 353).toBeCloseTo(-1.5e5 * slope - R_J_PER_MOL_K * Math.log(1.5), 4);
    expect(e.heatCapacityJPerMolK).toBeCloseTo(0, 10);
  });

  it('counts a vapour of two formula units by the half', () => {
    const one = boiling(1e5, 'ideal');
    const two = boiling(1e5, 'ideal', { formulaUnits: 2 });
    const a = equilibrium(one.l, one.g, 340);
    const b = equilibrium(two.l, two.g, 340);
    expect(b.gapJPerMol).toBeCloseTo(a.gapJPerMol, 8);
    expect(b.entropyJPerMolK).toBeCloseTo(a.entropyJPerMolK, 10);
    expect(b.heatCapacityJPerMolK).toBeCloseTo(a.heatCapacityJPerMolK, 10);
  });

  it('adds no pressure term to a condensed phase, nor to a gas on its own isobar', () => {
    const { l } = boiling(2e5, 'real');
    expect(l.shift).toBeNull();
    const isobaric = { ...l.source, phase: 'g', family: { isobarPa: 2e5 } };
    expect(placePhase(isobaric, BENZENE, { pressurePa: 2e5, gas: 'real' }, 353).shift).toBeNull();
  });

  it('has u(dG) of both curves, the gas term, and V (p - p0) of unknown volumes over root three', () => {
    const { l, g } = boiling(2e5, 'real');
    const t = 330;
    const variance = (p: typeof l): number => {
      const { hh, hs, ss } = stateCovariance(p.source, t);
      return hh - 2 * t * hs + t * t * ss;
    };
    const gas = secondVirial(BENZENE, t, 353).u * 2e5;
    const volume = 10 / Math.sqrt(3);
    const whole = Math.sqrt(variance(l) + variance(g) + gas ** 2 + volume ** 2);
    expect(gapUncertainty(l, g, t, 2e5)).toBeCloseTo(whole, 9);
    expect(condensedTermUncertainty(1e5)).toBe(0);
    expect(condensedTermUncertainty(101325)).toBeCloseTo(0.0765, 4);
    expect(gasTerm(BENZENE, 'ideal', 2e5, 353).u(t)).toBe(0);
  });

  it('bounds a real gas at high pressure by its critical point: RT ln phi from -0.41 RT to 0', () => {
    const [t, rt] = [353, 8.31446261815324 * 353];
    const unknown = { ...BENZENE, criticalTemperatureK: null, criticalPressurePa: null };
    for (const pressurePa of [2e6, 7.5e7, 1e10]) {
      const { shift, u } = gasTerm(BENZENE, 'real', pressurePa, 353);
      expect(shift!(t)).toBeCloseTo(rt * (Math.log(pressurePa / 1e5) - 0.41), 6);
      expect(u(t)).toBeLessThanOrEqual(0.25 * rt);
      expect(gasTerm(unknown, 'real', pressurePa, 353).u(t)).toBeCloseTo(0.25 * rt, 9);
    }
    // Below, the virial equation stands as it is.
    const low = gasTerm(BENZENE, 'real', 1e6, 353);
    const { value, u } = secondVirial(BENZENE, t, 353);
    expect(low.shift!(t)).toBeCloseTo(rt * Math.log(10) + value * 1e6, 6);
    expect(low.u(t)).toBeCloseTo(u * 1e6, 9);
  });
});
