/** A computed (theory) source: ideal gases in one gzipped comma-separated file, plain SI. */
import { assertDense } from '../dense.js';
import { MEDIA, MODELS } from '../media.js';
import { fixed } from '../print.js';
import { seeded } from '../seeded.js';
import { tabulated } from '../temperatures.js';

const FORMATION_KJ = 0.1;

const DESCRIPTOR = {
  title: 'Vapour models: ideal-gas functions from computed molecular constants',
  citation: "Invented for this demo: vapour models, run 4, the cooperative's computing group",
  year: 2025,
  licence: 'invented figures, free to copy (CC0-1.0)',
  basis: 'computed',
  rank: 2,
  temperatureScale: 'thermodynamic',
  standardPressure: { value: 1, unit: 'bar' },
  referenceTemperature: 298.15,
  enthalpyZero: 'elements-298.15',
  entropyZero: 'absolute',
  comment: '#',
};

const code = (medium) => `${medium.id.slice(0, 4).toUpperCase()}_v`;

export function vapourModels(closed) {
  const media = MEDIA.filter((medium) => medium.phases.g?.source === MODELS);
  const substance = { column: 'species' };
  const descriptor = {
    ...DESCRIPTOR,
    names: Object.fromEntries(media.map((medium) => [code(medium), medium.id])),
    tables: [
      {
        file: 'ideal-gases.csv.gz',
        holds: 'thermal-functions',
        substance,
        phase: 'g',
        columns: {
          T_K: { is: 'temperature', unit: 'K' },
          Cp_J_molK: { is: 'heat-capacity', unit: 'J/(mol.K)' },
          S_J_molK: { is: 'entropy', unit: 'J/(mol.K)' },
          H_minus_H298_kJ_mol: { is: 'enthalpy-increment', unit: 'kJ/mol' },
        },
      },
      {
        file: 'formation.csv',
        holds: 'anchors',
        substance,
        phase: 'g',
        columns: {
          DfH298_kJ_mol: { is: 'enthalpy-of-formation', unit: 'kJ/mol' },
          U_DfH298: { is: 'uncertainty', of: 'enthalpy-of-formation', unit: 'kJ/mol', coverage: 2 },
          S298_J_molK: { is: 'entropy', unit: 'J/(mol.K)' },
        },
      },
    ],
  };
  return { source: MODELS, descriptor, sheets: [functions(media, closed), formation(media, closed)] };
}

function functions(media, closed) {
  const rows = [];
  for (const medium of media) {
    const { Cp, S, H, enthalpyOfFormation } = closed[medium.id].phases.g;
    const temperatures = tabulated(medium.phases.g.rangeK, []);
    assertDense(medium, 'g', temperatures, 0.5, 0.0005);
    for (const T of temperatures) {
      const figures = [Cp(T), S(T), (H(T) - enthalpyOfFormation) / 1000].map((value) => fixed(value, 3));
      rows.push([code(medium), fixed(T, 2), ...figures]);
    }
  }
  return {
    source: MODELS,
    file: 'ideal-gases.csv.gz',
    delimiter: ',',
    newline: '\n',
    before: ['# vapour models, run 4: rigid rotor, hindered internal rotation; p = 1 bar', '# Cp and S in J/(mol K)'],
    header: ['species', 'T_K', 'Cp_J_molK', 'S_J_molK', 'H_minus_H298_kJ_mol'],
    rows,
  };
}

function formation(media, closed) {
  const rows = media.map((medium) => {
    const { enthalpyOfFormation, entropy } = closed[medium.id].phases.g;
    const heat = enthalpyOfFormation / 1000 + seeded(`${medium.id} vapour`).within(FORMATION_KJ / 5);
    return [code(medium), fixed(heat, 3), fixed(FORMATION_KJ, 2), fixed(entropy, 3)];
  });
  const header = ['species', 'DfH298_kJ_mol', 'U_DfH298', 'S298_J_molK'];
  return { source: MODELS, file: 'formation.csv', delimiter: ',', newline: '\n', before: [], header, rows };
}
