/** An evaluated compilation: a comma-separated file a medium, its phases one below the other, three decimals, J and kJ. */
import { assertDense } from '../dense.js';
import { REFERENCE_K } from '../laws.js';
import { MEDIA, QUAY } from '../media.js';
import { fixed } from '../print.js';
import { tabulated } from '../temperatures.js';

const PHASES = { crystal: 'cr', 'crystal I': 'cr-I', 'crystal II': 'cr-II', liquid: 'l', 'ideal gas': 'g' };
const WORDS = Object.fromEntries(Object.entries(PHASES).map(([word, label]) => [label, word]));
const ATMOSPHERES = { 100000: '1', 101325: '1.01325' };

const DESCRIPTOR = {
  title: 'Quay Tables of Storage Media, third collection',
  citation: "Invented for this demo: Quay Tables of Storage Media, third collection, the cooperative's reading room",
  year: 2016,
  licence: 'invented figures, free to copy (CC0-1.0)',
  basis: 'evaluated',
  rank: 1,
  temperatureScale: 'ITS-90',
  standardPressure: { value: 1, unit: 'bar' },
  referenceTemperature: REFERENCE_K,
  enthalpyZero: 'elements-298.15',
  entropyZero: 'absolute',
  phases: PHASES,
  delimiter: ',',
};

const COLUMNS = {
  'T/K': { is: 'temperature', unit: 'K' },
  Cp: { is: 'heat-capacity', unit: 'J/(mol.K)' },
  S: { is: 'entropy', unit: 'J/(mol.K)' },
  '-[G-H(Tr)]/T': { is: 'gibbs-function', unit: 'J/(mol.K)' },
  'H-H(Tr)': { is: 'enthalpy-increment', unit: 'kJ/mol' },
  Note: { is: 'note' },
};

/** @param {Record<string, ReturnType<import('../close.js').close>>} closed by medium */
export function quayTables(closed) {
  const media = MEDIA.filter((medium) => medium.source === QUAY);
  const tables = media.map((medium) => table(medium, closed[medium.id]));
  const substance = { column: 'Medium' };
  const phase = { column: 'Phase' };
  const descriptor = {
    ...DESCRIPTOR,
    names: Object.fromEntries(media.map((medium) => [medium.name, medium.id])),
    tables: [
      { file: 'tables/*.csv', holds: 'thermal-functions', skipLines: 2, substance, phase, columns: COLUMNS },
      {
        file: 'formation.csv',
        holds: 'anchors',
        substance,
        phase,
        columns: {
          'DfH(298.15 K)': { is: 'enthalpy-of-formation', unit: 'kJ/mol' },
          'S(298.15 K)': { is: 'entropy', unit: 'J/(mol.K)' },
        },
      },
      {
        file: 'transitions.csv',
        holds: 'transitions',
        substance,
        columns: {
          From: { is: 'from-phase' },
          To: { is: 'to-phase' },
          'T/K': { is: 'transition-temperature', unit: 'K' },
          'p/bar': { is: 'pressure', unit: 'bar' },
          Gas: { is: 'gas' },
          DH: { is: 'transition-enthalpy', unit: 'kJ/mol' },
          DS: { is: 'transition-entropy', unit: 'J/(mol.K)' },
        },
      },
    ],
  };
  return { source: QUAY, descriptor, sheets: [...tables, formation(media, closed), transitions(media, closed)] };
}

function table(medium, { phases, steps }) {
  const rows = [];
  for (const [label, { rangeK, source }] of Object.entries(medium.phases)) {
    if (source !== QUAY) continue;
    const here = steps.filter((step) => step.from === label || step.to === label);
    const temperatures = tabulated(
      rangeK,
      here.map((step) => step.temperatureK),
    );
    assertDense(medium, label, temperatures, 0.5, 0.0005);
    const { Cp, S, H, enthalpyOfFormation } = phases[label];
    for (const T of temperatures) {
      const increment = H(T) - enthalpyOfFormation;
      const step = here.find(({ temperatureK }) => temperatureK === T);
      const note = step ? `${WORDS[step.from]} <--> ${WORDS[step.to]}` : '';
      const figures = [Cp(T), S(T), S(T) - increment / T, increment / 1000].map((value) => fixed(value, 3));
      rows.push([medium.name, WORDS[label], String(T), ...figures, note]);
    }
  }
  return {
    source: QUAY,
    file: `tables/${medium.id}.csv`,
    delimiter: ',',
    newline: '\n',
    before: [
      `Quay Tables of Storage Media -- ${medium.name.toUpperCase()}`,
      'Tr = 298.15 K; standard state pressure 0.1 MPa; Cp, S, -[G-H(Tr)]/T in J/(K mol), H-H(Tr) in kJ/mol',
    ],
    header: ['Medium', 'Phase', ...Object.keys(COLUMNS)],
    rows,
  };
}

function formation(media, closed) {
  const rows = [];
  for (const medium of media) {
    for (const [label, { source }] of Object.entries(medium.phases)) {
      if (source !== QUAY) continue;
      const { enthalpyOfFormation, entropy } = closed[medium.id].phases[label];
      rows.push([medium.name, WORDS[label], fixed(enthalpyOfFormation / 1000, 3), fixed(entropy, 3)]);
    }
  }
  const header = ['Medium', 'Phase', 'DfH(298.15 K)', 'S(298.15 K)'];
  return { source: QUAY, file: 'formation.csv', delimiter: ',', newline: '\n', before: [], header, rows };
}

function transitions(media, closed) {
  const rows = media.flatMap((medium) =>
    closed[medium.id].steps.map((step) => {
      // A measured boiling point comes without its heat: the handbook's own figures are of the ideal gas.
      const heats = step.gas === 'real' ? ['', ''] : [fixed(step.enthalpy / 1000, 3), fixed(step.entropy, 3)];
      const pressure = ATMOSPHERES[step.pressurePa ?? 100000];
      const place = [medium.name, WORDS[step.from], WORDS[step.to], fixed(step.temperatureK, 2), pressure];
      return [...place, step.gas ?? '', ...heats];
    }),
  );
  const header = ['Medium', 'From', 'To', 'T/K', 'p/bar', 'Gas', 'DH', 'DS'];
  return { source: QUAY, file: 'transitions.csv', delimiter: ',', newline: '\n', before: [], header, rows };
}
