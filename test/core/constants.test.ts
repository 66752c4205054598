import { describe, expect, it } from 'vitest';
import * as constants from '../../pipeline/core/constants.js';

describe('constants', () => {
  it('has the gas constant as the product of the Avogadro and Boltzmann constants, to the last digit', () => {
    expect(constants.AVOGADRO_CONSTANT.value * constants.BOLTZMANN_CONSTANT.value).toBeCloseTo(8.31446261815324, 14);
    expect(constants.GAS_CONSTANT.value).toBe(8.31446261815324);
  });

  it('gives each constant a unit, a reference and no negative uncertainty', () => {
    const entries = Object.values(constants).filter((entry) => typeof entry === 'object');
    expect(entries.length).toBeGreaterThanOrEqual(9);
    for (const entry of entries) {
      expect(entry.unit).not.toBe('');
      expect(entry.reference).toMatch(/\d{4}/);
      expect(entry.uncertainty).toBeGreaterThanOrEqual(0);
    }
  });

  it('keeps the two calories, the atmosphere and the bar apart', () => {
    expect(constants.THERMOCHEMICAL_CALORIE.value).toBe(4.184);
    expect(constants.INTERNATIONAL_TABLE_CALORIE.value).toBe(4.1868);
    expect(constants.STANDARD_ATMOSPHERE_PA).toBe(101325);
    expect(constants.STANDARD_PRESSURE_PA).toBe(100000);
  });
});
