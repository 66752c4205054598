import { describe, expect, it } from 'vitest';
import {
  conversionTo,
  differenceTo,
  type LinearConversion,
  ratioOf,
  type UnitContext,
  type UnitRefusal,
} from '../../../pipeline/core/units/ucum.js';

const WATER: UnitContext = { molarMassGPerMol: 18.015, atomsPerFormula: 3, per: null };
const PER_ATOM: UnitContext = { ...WATER, per: 'atom' };

function accepted(target: string, unit: string, context = WATER): LinearConversion {
  const conversion = conversionTo(target, unit, context);
  if (!conversion.ok) throw new Error(`${unit}: ${conversion.remedy}`);
  return conversion;
}

function refused(target: string, unit: string, context = WATER): UnitRefusal {
  const conversion = conversionTo(target, unit, context);
  if (conversion.ok) throw new Error(`${unit} was taken, factor ${conversion.factor}`);
  return conversion;
}

describe('conversionTo', () => {
  // NIST Special Publication 811 (2008), appendix B.8, and the SI Brochure, 9th ed. (BIPM 2019), tables 6 and 8.
  it.each([
    ['J/(mol.K)', 'J/(mol.K)', 1],
    ['J/(mol.K)', 'J/mol/K', 1],
    ['J/(mol.K)', 'J.mol-1.K-1', 1],
    ['J/(mol.K)', 'cal_th/(mol.K)', 4.184],
    ['J/(mol.K)', 'cal_IT/(mol.K)', 4.1868],
    ['J/mol', 'kJ/mol', 1000],
    ['J/mol', 'kcal_th/mol', 4184],
    ['J/mol', 'kcal_IT/mol', 4186.8],
    ['J/mol', 'kJ/kmol', 1],
    ['Pa', 'atm', 101325],
    ['Pa', 'bar', 100000],
    ['Pa', 'mbar', 100],
    ['Pa', 'dyn/cm2', 0.1],
    ['m3/mol', 'cm3/mol', 1e-6],
    ['m3/mol', 'L/mol', 1e-3],
    ['kg/m3', 'g/cm3', 1000],
    ['K', 'K', 1],
  ])('has in %s for 1 %s exactly %d', (target, unit, factor) => {
    expect(accepted(target, unit)).toEqual({ ok: true, factor, offset: 0 });
  });

  it.each([
    ['Pa', 'mm[Hg]', 133.3224, 4e-6],
    ['Pa', '[psi]', 6894.757, 1e-6],
    ['Pa', 'att', 98066.5, 1e-12],
    ['K', '[degR]', 5 / 9, 1e-12],
  ])('has in %s for 1 %s the published %d', (target, unit, factor, relative) => {
    expect(Math.abs(accepted(target, unit).factor / factor - 1)).toBeLessThan(relative);
  });

  it('goes from mass to mole with the molar mass', () => {
    expect(accepted('J/(mol.K)', 'J/(g.K)').factor).toBe(18.015);
    expect(accepted('J/mol', 'cal_IT/g').factor).toBeCloseTo(4.1868 * 18.015, 12);
    expect(accepted('J/mol', 'kJ/kg').factor).toBeCloseTo(18.015, 12);
    expect(accepted('m3/mol', 'cm3/g').factor).toBeCloseTo(18.015e-6, 18);
    // NIST SP 811, B.8: 1 Btu_IT/(lb degF) = 4186.8 J/(kg K), 1 Btu_th/(lb degF) = 4184 J/(kg K), 1 Btu_IT/lb = 2326 J/kg.
    expect(accepted('J/(mol.K)', '[Btu_IT]/([lb_av].[degF])').factor / 0.018015).toBeCloseTo(4186.8, 6);
    expect(accepted('J/(mol.K)', '[Btu_th]/([lb_av].[degF])').factor / 0.018015).toBeCloseTo(4184, 2);
    expect(accepted('J/mol', '[Btu_IT]/[lb_av]').factor / 0.018015).toBeCloseTo(2326, 6);
  });

  it('refuses a mass basis where the molar mass is not known', () => {
    const refusal = refused('J/mol', 'J/g', { ...WATER, molarMassGPerMol: Number.NaN });
    expect(refusal.problem).toBe('unit-unfit');
    expect(refusal.remedy).toContain('molar_mass');
  });

  it('takes eV and [k] by the atom, 96.485 kJ/mol and R for each (CODATA 2018)', () => {
    expect(accepted('J/mol', 'eV', PER_ATOM).factor / 3).toBeCloseTo(96485.33212, 5);
    expect(accepted('J/mol', 'meV', PER_ATOM).factor / 3).toBeCloseTo(96.48533212, 8);
    expect(accepted('J/(mol.K)', '[k]', PER_ATOM).factor / 3).toBeCloseTo(8.31446261815324, 12);
    expect(accepted('J/(mol.K)', 'J/(mol.K)', PER_ATOM).factor).toBe(3);
  });

  it('refuses eV and [k] where the column does not say by what, or the atoms are not counted', () => {
    expect(refused('J/mol', 'eV').remedy).toContain('"per": "atom"');
    expect(refused('J/(mol.K)', '[k]').remedy).toContain('"per": "atom"');
    expect(refused('J/mol', 'eV/mol').problem).toBe('unit-unfit');
    expect(refused('J/mol', 'eV', { ...PER_ATOM, atomsPerFormula: null }).remedy).toContain('formula');
  });

  it('refuses an energy without mole or mass, which the package multiplies by 6.02e23', () => {
    for (const [target, unit] of [
      ['J/mol', 'kJ'],
      ['J/(mol.K)', 'J/K'],
      ['J/(mol.K)', 'J/(osm.K)'],
      ['J/(mol.K)', 'J/([iU].K)'],
    ]) {
      refused(target, unit);
      refused(target, unit, PER_ATOM);
    }
    expect(refused('J/(mol.K)', 'J/([iU].mol.K)').remedy).toContain('arbitrary');
    expect(refused('J/mol', 'kJ').problem).toBe('unit-unfit');
    expect(refused('J/mol', 'kJ').suggestions[0]).toBe('kJ/mol');
  });

  it('refuses words in braces that would have said by the atom, and a mass by the atom', () => {
    expect(refused('J/(mol.K)', 'J/(mol{atom}.K)').remedy).toContain('"per": "atom"');
    refused('J/(mol.K)', 'J/(g.K)', PER_ATOM);
    refused('Pa', 'bar', PER_ATOM);
    expect(accepted('J/(mol.K)', 'J/(mol{water}.K)').factor).toBe(1);
  });

  it('gives temperatures the zero of their scale', () => {
    const at = (unit: string, value: number) => value * accepted('K', unit).factor + accepted('K', unit).offset;
    expect(at('Cel', 0)).toBe(273.15);
    expect(at('Cel', 25)).toBe(298.15);
    expect(at('[degF]', 32)).toBeCloseTo(273.15, 10);
    expect(at('[degF]', 212)).toBeCloseTo(373.15, 10);
    expect(at('[degR]', 671.67)).toBeCloseTo(373.15, 10);
    expect(at('[degRe]', 80)).toBeCloseTo(373.15, 10);
    expect(at('mK', 1500)).toBeCloseTo(1.5, 12);
  });

  it('takes degrees in a denominator as differences', () => {
    expect(accepted('J/(mol.K)', 'J/(mol.Cel)')).toEqual({ ok: true, factor: 1, offset: 0 });
    expect(accepted('J/(mol.K)', 'cal_th/(mol.[degF])').factor).toBeCloseTo(4.184 * 1.8, 12);
    expect(accepted('J/(mol.K)', 'J/(g.Cel)').factor).toBe(18.015);
  });

  it('refuses degrees with a zero of their own inside a temperature that is no plain one', () => {
    refused('K', 'mCel');
    refused('K', 'Cel.K/K');
  });

  it('refuses a dimension that does not fit, and says why J/mol.K is none', () => {
    expect(refused('J/(mol.K)', 'kJ/mol').problem).toBe('unit-unfit');
    expect(refused('K', 'Pa').problem).toBe('unit-unfit');
    expect(refused('Pa', 'K').problem).toBe('unit-unfit');
    expect(refused('J/(mol.K)', 'J/mol.K').remedy).toContain('brackets');
    expect(refused('J/(mol.K)', 'J/mol.K').suggestions[0]).toBe('J/(mol.K)');
  });

  it.each([
    ['K', 'degC', 'Cel'],
    ['K', '°C', 'Cel'],
    ['K', 'C', 'Cel'],
    ['K', 'F', '[degF]'],
    ['K', 'Kelvin', 'K'],
    ['Pa', 'Torr', 'mm[Hg]'],
    ['Pa', 'mmHg', 'mm[Hg]'],
    ['Pa', 'psi', '[psi]'],
    ['Pa', 'katm', 'atm'],
    ['J/(mol.K)', 'J mol-1 K-1', 'J/(mol.K)'],
    ['J/(mol.K)', 'cal/mol-K', 'cal_th/(mol.K)'],
    ['J/mol', 'Kcal/mol', 'kcal_th/mol'],
    ['J/mol', 'KJ/mol', 'kJ/mol'],
    ['J/mol', '', 'kJ/mol'],
  ])('for %s refuses "%s" and names %s', (target, unit, nearest) => {
    expect(refused(target, unit).suggestions[0]).toBe(nearest);
  });

  it('refuses what only JavaScript knows, decimal numbers, and exponents of zero', () => {
    expect(refused('J/mol', 'constructor').problem).toBe('unit-unknown');
    expect(refused('J/mol', 'toString/mol').problem).toBe('unit-unknown');
    expect(refused('J/mol', '4.184.J/mol').problem).toBe('unit-unknown');
    expect(refused('J/mol', 'J/mol.K0').problem).toBe('unit-unknown');
    expect(refused('J/mol', 'J/(mol').problem).toBe('unit-unknown');
  });
});

describe('differenceTo', () => {
  it('leaves the zero of a scale out', () => {
    expect(differenceTo('K', 'Cel', WATER)).toEqual({ ok: true, factor: 1, offset: 0 });
    expect(differenceTo('K', '[degF]', WATER)).toEqual({ ok: true, factor: 5 / 9, offset: 0 });
    expect(differenceTo('J/mol', 'kJ/mol', WATER)).toEqual({ ok: true, factor: 1000, offset: 0 });
    expect(differenceTo('K', 'degC', WATER).ok).toBe(false);
  });
});

describe('ratioOf', () => {
  it('knows the numbers among the codes', () => {
    expect(ratioOf('%')).toBe(0.01);
    expect(ratioOf('1')).toBe(1);
    expect(ratioOf('10*-3')).toBeCloseTo(1e-3, 18);
    expect(ratioOf('K')).toBeNull();
    expect(ratioOf('mol')).toBeNull();
    expect(ratioOf('nonsense')).toBeNull();
  });
});
