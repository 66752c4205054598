/** An older compilation: tab-separated sheets under comment lines, thermochemical calories, gas entropies at 1 atm. */
import { assertDense } from '../dense.js';
import { ATMOSPHERE_PA, R, REFERENCE_K, STANDARD_PRESSURE_PA } from '../laws.js';
import { BINDER, MEDIA } from '../media.js';
import { fixed } from '../print.js';
import { tabulated } from '../temperatures.js';

const CALORIE = 4.184;
const PHASES = { c: 'cr', 'c,I': 'cr-I', 'c,II': 'cr-II', liq: 'l', gas: 'g' };
const WORDS = Object.fromEntries(Object.entries(PHASES).map(([word, label]) => [label, word]));

const DESCRIPTOR = {
  title: 'The Grey Binder: thermal data of heat-storing media',
  citation: 'Invented for this demo: The Grey Binder, thermal data of heat-storing media, second printing',
  year: 1964,
  licence: 'invented figures, free to copy (CC0-1.0)',
  basis: 'evaluated',
  rank: 2,
  temperatureScale: 'not-stated',
  standardPressure: { value: 1, unit: 'atm' },
  referenceTemperature: REFERENCE_K,
  enthalpyZero: 'elements-298.15',
  entropyZero: 'absolute',
  phases: PHASES,
  delimiter: '\t',
  comment: '#',
};

const COLUMNS = {
  'T, K': { is: 'temperature', unit: 'K' },
  Cp: { is: 'heat-capacity', unit: 'cal_th/(mol.K)' },
  'H-H298': { is: 'enthalpy-increment', unit: 'cal_th/mol' },
  S: { is: 'entropy', unit: 'cal_th/(mol.K)' },
  '-(F-H298)/T': { is: 'gibbs-function', unit: 'cal_th/(mol.K)' },
};

export function greyBinder(closed) {
  const media = MEDIA.filter((medium) => medium.source === BINDER);
  const single = media.filter((medium) => !medium.running);
  const running = media.filter((medium) => medium.running);
  const substance = { column: 'medium' };
  const phase = { column: 'state' };
  const functions = { holds: 'thermal-functions', substance, phase };
  const descriptor = {
    ...DESCRIPTOR,
    names: Object.fromEntries(media.map((medium) => [medium.name, medium.id])),
    tables: [
      { file: 'sheets/*.tsv', ...functions, columns: COLUMNS },
      { file: 'through-the-melt/*.tsv', ...functions, incrementsFrom: 'cr', columns: COLUMNS },
      {
        file: 'heats-of-formation.tsv',
        holds: 'anchors',
        substance,
        phase,
        columns: {
          'DHf298, kcal': { is: 'enthalpy-of-formation', unit: 'kcal_th/mol' },
          S298: { is: 'entropy', unit: 'cal_th/(mol.K)' },
        },
      },
      {
        file: 'melting-and-boiling.tsv',
        holds: 'transitions',
        substance,
        columns: {
          from: { is: 'from-phase' },
          to: { is: 'to-phase' },
          'T, K': { is: 'transition-temperature', unit: 'K' },
          gas: { is: 'gas' },
          'DH, kcal': { is: 'transition-enthalpy', unit: 'kcal_th/mol' },
          '+-': { is: 'uncertainty', of: 'transition-enthalpy', unit: 'kcal_th/mol', coverage: 2 },
          DS: { is: 'transition-entropy', unit: 'cal_th/(mol.K)' },
        },
      },
    ],
  };
  const sheets = [
    ...single.map((medium) => sheet(medium, closed[medium.id], 'sheets')),
    ...running.map((medium) => sheet(medium, closed[medium.id], 'through-the-melt')),
    formation(media, closed),
    transitions(media, closed),
  ];
  return { source: BINDER, descriptor, sheets };
}

/** What a gas entropy at 1 atm is less than one at 1 bar. */
const atmosphereTerm = (label) => (label === 'g' ? R * Math.log(ATMOSPHERE_PA / STANDARD_PRESSURE_PA) : 0);

function sheet(medium, { phases, steps }, folder) {
  const rows = [];
  for (const [label, { rangeK }] of Object.entries(medium.phases)) {
    const here = steps.filter((step) => step.from === label || step.to === label);
    const temperatures = tabulated(rangeK, medium.running ? [] : here.map((step) => step.temperatureK));
    assertDense(medium, label, temperatures, 2, 0.002);
    const { Cp, S, H } = phases[label];
    const zero = phases[medium.running ? medium.origin.phase : label].enthalpyOfFormation;
    for (const T of temperatures) {
      const increment = H(T) - zero;
      const entropy = S(T) - atmosphereTerm(label);
      const figures = [
        fixed(Cp(T) / CALORIE, 3),
        fixed(increment / CALORIE, 0),
        fixed(entropy / CALORIE, 3),
        fixed((entropy - increment / T) / CALORIE, 3),
      ];
      rows.push([medium.name, WORDS[label], String(T), ...figures]);
    }
  }
  return {
    source: BINDER,
    file: `${folder}/${medium.id}.tsv`,
    delimiter: '\t',
    newline: '\n',
    before: [
      `# ${medium.name}, M = ${medium.molarMass}. Copied from the Grey Binder, second printing.`,
      '# Defined (thermochemical) calories, moles, deg K. Gases ideal at 1 atm.',
      ...(medium.running ? ['# One table through the melting point; H counts from the crystal at 298.15.'] : []),
    ],
    header: ['medium', 'state', ...Object.keys(COLUMNS)],
    rows,
  };
}

function formation(media, closed) {
  const rows = [];
  for (const medium of media) {
    for (const label of Object.keys(medium.phases)) {
      if (medium.running && label !== medium.origin.phase) continue;
      const { enthalpyOfFormation, entropy } = closed[medium.id].phases[label];
      const heat = fixed(enthalpyOfFormation / CALORIE / 1000, 3);
      rows.push([medium.name, WORDS[label], heat, fixed((entropy - atmosphereTerm(label)) / CALORIE, 3)]);
    }
  }
  return {
    source: BINDER,
    file: 'heats-of-formation.tsv',
    delimiter: '\t',
    newline: '\n',
    before: ['# Heats of formation and entropies at 298.15 K'],
    header: ['medium', 'state', 'DHf298, kcal', 'S298'],
    rows,
  };
}

function transitions(media, closed) {
  const rows = media.flatMap((medium) =>
    closed[medium.id].steps.map((step) => {
      // Heats of boiling are measured on the real vapour; those of melting belong to the tables.
      const boils = step.gas === 'real';
      const heats = [fixed(step.enthalpy / CALORIE / 1000, 3), boils ? '0.15' : ''];
      const entropy = boils ? '' : fixed(step.entropy / CALORIE, 3);
      return [
        medium.name,
        WORDS[step.from],
        WORDS[step.to],
        fixed(step.temperatureK, 2),
        step.gas ?? '',
        ...heats,
        entropy,
      ];
    }),
  );
  return {
    source: BINDER,
    file: 'melting-and-boiling.tsv',
    delimiter: '\t',
    newline: '\n',
    before: ['# Changes of state at 1 atm'],
    header: ['medium', 'from', 'to', 'T, K', 'gas', 'DH, kcal', '+-', 'DS'],
    rows,
  };
}
