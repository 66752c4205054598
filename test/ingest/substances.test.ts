import { describe, expect, it } from 'vitest';
import { readSubstances } from '../../pipeline/ingest/ingest.js';
import { brief, encode, reading } from './small-source.js';

const readText = (text: string) => readSubstances(encode(text));

describe('the list of substances', () => {
  it('gives each row its molar mass, from the formula where none is stated', () => {
    const { substances, findings } = readText(
      'substance,name,formula,molar_mass,class\nlead,Lead,Pb,,metal\nmedium-1,"Medium, first",,120.5,\n',
    );
    expect(findings).toEqual([]);
    expect(
      substances.map(({ id, name, molarMassGPerMol, atomsPerFormula, class: kind }) => ({
        id,
        name,
        molarMassGPerMol,
        atomsPerFormula,
        kind,
      })),
    ).toEqual([
      { id: 'lead', name: 'Lead', molarMassGPerMol: 207.2, atomsPerFormula: 1, kind: 'metal' },
      { id: 'medium-1', name: 'Medium, first', molarMassGPerMol: 120.5, atomsPerFormula: null, kind: null },
    ]);
  });

  it('reads what the gas and the crystal need', () => {
    const [water] = readText(
      'substance;formula;critical_temperature;critical_pressure;acentric_factor;polar_a;polar_b;residual_entropy\nwater;H2O;647.096;2.2064e7;0.344;-0.0109;0;3.41\n',
    ).substances;
    expect(water).toMatchObject({
      criticalTemperatureK: 647.096,
      criticalPressurePa: 2.2064e7,
      acentricFactor: 0.344,
      polarA: -0.0109,
      polarB: 0,
      residualEntropyJPerMolK: 3.41,
    });
  });

  it('counts the formula units of a vapour that is not the formula unit', () => {
    const { substances } = readText('substance,formula,vapour_species\nsulfur,S,S8\nphosphorus,P,P4\nodd,,\n');
    expect(substances[0]!.vapourSpecies).toEqual({ formula: 'S8', formulaUnits: 8 });
    expect(substances[1]!.vapourSpecies).toEqual({ formula: 'P4', formulaUnits: 4 });
    expect(substances[2]!.vapourSpecies).toBeNull();
  });

  it('keeps a substance with a bad cell, and says where the cell is', () => {
    const { substances, findings } = readText(
      'substance,formula,molar_mass,class\nlead,Pb,heavy,metal\ntin,Sn,,metl\n',
    );
    expect(substances.map(({ id }) => id)).toEqual(['lead', 'tin']);
    expect(brief(findings)).toEqual([
      'fault lead cell-not-a-number substances.csv:2 molar_mass',
      'fault tin substance-unknown substances.csv:3 class',
    ]);
    expect(reading(findings[0])).toMatchObject({ read: 'heavy', wanted: 'a number above 0, or nothing' });
  });

  it('withholds a substance whose molar mass nobody tells', () => {
    const { findings } = readText('substance,name,formula\nghost,Ghost,\nbad,Bad,Qq2\n');
    expect(brief(findings)).toEqual([
      'fault ghost molar-mass-unknown substances.csv:2 molar_mass',
      'fault bad molar-mass-unknown substances.csv:3 formula',
    ]);
  });

  it('reports an id twice, an id with capitals, and a header that nobody knows', () => {
    const { substances, findings } = readText('substance,formula,moler_mass\nlead,Pb,\nlead,Pb,\nLead,Pb,\n');
    expect(substances).toHaveLength(1);
    expect(brief(findings)).toEqual([
      'doubt - column-unknown substances.csv:1 moler_mass',
      'fault lead substance-twice substances.csv:3 substance',
      'fault - substance-unknown substances.csv:4 substance',
    ]);
    expect(reading(findings[0]).wanted).toContain('nearest: molar_mass');
    expect(reading(findings[1]).wanted).toContain('line 2');
  });

  it('counts lines through quoted line breaks', () => {
    const { findings } = readText('substance,name,formula\nlead,"two\nlines",Pb\nghost,,\n');
    expect(brief(findings)).toEqual(['fault ghost molar-mass-unknown substances.csv:4 molar_mass']);
  });

  it('without its id column is a fault of the whole list', () => {
    expect(brief(readText('name,formula\nLead,Pb\n').findings)).toEqual([
      'fault - column-missing substances.csv:1 substance',
    ]);
  });
});
