import elements from 'chemical-elements';
import { describe, expect, it } from 'vitest';
import { ATOMIC_WEIGHTS } from '../../pipeline/ingest/atomic-weights.js';
import { readFormula } from '../../pipeline/ingest/formula.js';

describe('a formula', () => {
  it('gives its molar mass and its atoms', () => {
    expect(readFormula('H2O')).toEqual({ molarMassGPerMol: 18.015, atoms: 3 });
    expect(readFormula('Pb')).toEqual({ molarMassGPerMol: 207.2, atoms: 1 });
    expect(readFormula('NaCl')).toEqual({ molarMassGPerMol: 58.44, atoms: 2 });
    expect(readFormula('ClNa')).toEqual({ molarMassGPerMol: 58.44, atoms: 2 });
    expect(readFormula('C2H6O')).toEqual(readFormula('CH3CH2OH'));
  });

  it('may have brackets, water of hydration and fractional amounts', () => {
    expect(readFormula('Ca(NO3)2')).toEqual(readFormula('CaN2O6'));
    expect(readFormula('K4[Fe(CN)6]')).toEqual(readFormula('C6FeK4N6'));
    expect(readFormula('CuSO4·5H2O')).toEqual(readFormula('CuH10O9S'));
    expect(readFormula('CuSO4.5H2O')).toEqual(readFormula('CuH10O9S'));
    expect(readFormula('Fe0.947O')).toMatchObject({ atoms: 1.947 });
  });

  it('says which part of it cannot be read', () => {
    expect(readFormula('NaXx2')).toContain('Xx');
    expect(readFormula('Ca(OH')).toContain('not closed');
    expect(readFormula('CaOH)2')).toContain('closes nothing');
    expect(readFormula('water')).toContain('water');
    expect(readFormula('Tc2O7')).toContain('Tc');
  });
});

describe('the table of standard atomic weights', () => {
  it('agrees with the isotopic means of an independent list', () => {
    // The list weighs isotopes of one composition; the Commission's abridged values stand for the usual materials.
    const means = new Map(elements.elements.map(({ symbol, mass }) => [symbol, mass]));
    const far = Object.entries(ATOMIC_WEIGHTS).filter(([symbol, weight]) => {
      const mean = means.get(symbol);
      return mean == null || Math.abs(weight / mean - 1) > 4e-4;
    });
    expect(far).toEqual([]);
  });

  it('has the eighty-four elements that have one', () => {
    expect(Object.keys(ATOMIC_WEIGHTS)).toHaveLength(84);
  });
});
