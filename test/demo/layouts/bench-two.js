/**
 * A laboratory: measured Cp per gram in semicolon files with decimal commas (byte-order mark, CRLF), temperatures in
 * deg C, each run with its own calibration; transitions from its scanning calorimeter; boiling points; formation data.
 */
import { onScale68 } from '../laws.js';
import { BENCH, EXTRA_SERIES, MEDIA } from '../media.js';
import { continental, fixed } from '../print.js';
import { seeded } from '../seeded.js';

const PHASES = { solid: 'cr', 'solid I': 'cr-I', 'solid II': 'cr-II', melt: 'l' };
const WORDS = Object.fromEntries(Object.entries(PHASES).map(([word, label]) => [label, word]));
/** Measured before the laboratory changed its thermometers. */
const OLD_SCALE = new Set(['vessium']);
/** Its melt was also dissolved: anchors for both phases. */
const MELT_ANCHORED = new Set(['pellanol']);
const STEP_K = 8;

// Stated, relative to the value, with coverage factor 2.
const OWN = 0.005;
const SHARED = 0.004;
const HEAT = 0.006;
const ONSET_K = 0.2;
const BOILING_K = 0.3;
const FORMATION_KJ = 0.2;
const ENTROPY = 0.4;

const DESCRIPTOR = {
  title: 'Bench Two: calorimetry of storage media',
  citation: "Invented for this demo: notebooks of the cooperative's second calorimetry bench",
  year: 2023,
  licence: 'invented figures, free to copy (CC0-1.0)',
  basis: 'measured',
  rank: 3,
  temperatureScale: 'ITS-90',
  standardPressure: { value: 1, unit: 'bar' },
  referenceTemperature: 298.15,
  enthalpyZero: 'elements-298.15',
  entropyZero: 'absolute',
  phases: PHASES,
  delimiter: ';',
  decimal: ',',
};

const COLUMNS = {
  run: { is: 'series' },
  't/°C': { is: 'temperature', unit: 'Cel' },
  'cp/(J/(g K))': {
    is: 'heat-capacity',
    unit: 'J/(g.K)',
    uncertainty: [
      { relative: OWN, coverage: 2 },
      { relative: SHARED, coverage: 2, shared: true },
    ],
  },
};

export function benchTwo(closed) {
  const media = MEDIA.filter((medium) => medium.source === BENCH);
  const others = EXTRA_SERIES.map(({ medium }) => MEDIA.find(({ id }) => id === medium));
  const substance = { column: 'sample' };
  const phase = { column: 'state' };
  const descriptor = {
    ...DESCRIPTOR,
    names: Object.fromEntries([...media, ...others].map((medium) => [medium.name, medium.id])),
    tables: [
      { file: 'cp/*.csv', holds: 'thermal-functions', substance, phase, columns: COLUMNS },
      {
        file: 'cp-1986/*.csv',
        holds: 'thermal-functions',
        temperatureScale: 'IPTS-68',
        substance,
        phase,
        columns: COLUMNS,
      },
      {
        file: 'dsc.csv',
        holds: 'transitions',
        substance,
        columns: {
          from: { is: 'from-phase' },
          to: { is: 'to-phase' },
          'onset t/°C': {
            is: 'transition-temperature',
            unit: 'Cel',
            uncertainty: { absolute: ONSET_K, coverage: 2 },
          },
          'heat/(J/g)': { is: 'transition-enthalpy', unit: 'J/g', uncertainty: { relative: HEAT, coverage: 2 } },
          'entropy/(J/(g K))': {
            is: 'transition-entropy',
            unit: 'J/(g.K)',
            uncertainty: { relative: HEAT, coverage: 2 },
          },
        },
      },
      {
        file: 'boiling.csv',
        holds: 'transitions',
        substance,
        constants: { 'from-phase': 'l', 'to-phase': 'g', gas: 'real' },
        columns: {
          't/°C': { is: 'transition-temperature', unit: 'Cel', uncertainty: { absolute: BOILING_K, coverage: 2 } },
          'p/kPa': { is: 'pressure', unit: 'kPa' },
        },
      },
      {
        file: 'formation.csv',
        holds: 'anchors',
        substance,
        phase,
        columns: {
          'ΔfH/(kJ/mol)': { is: 'enthalpy-of-formation', unit: 'kJ/mol' },
          'U(ΔfH)': { is: 'uncertainty', of: 'enthalpy-of-formation', unit: 'kJ/mol', coverage: 2 },
          'S/(J/(mol K))': { is: 'entropy', unit: 'J/(mol.K)' },
          'U(S)': { is: 'uncertainty', of: 'entropy', unit: 'J/(mol.K)', coverage: 2 },
        },
      },
    ],
  };
  const sheets = [
    ...media.map((medium) => series(medium, closed[medium.id], measuredHere(medium))),
    ...EXTRA_SERIES.map(({ phase: label, rangeK }, i) => series(others[i], closed[others[i].id], [[label, rangeK]])),
    transitions(media, closed),
    boiling(media, closed),
    formation(media, closed),
  ];
  return { source: BENCH, descriptor, sheets };
}

const measuredHere = (medium) =>
  Object.entries(medium.phases)
    .filter(([, { source }]) => source === BENCH)
    .map(([label, { rangeK }]) => [label, rangeK]);

const file = (name, header, rows) => ({
  source: BENCH,
  file: name,
  delimiter: ';',
  newline: '\r\n',
  mark: true,
  before: [],
  header,
  rows,
});

/** Each phase is a run of its own; a phase that spans more than 200 K was measured in two. */
function series(medium, { phases }, parts) {
  const rows = [];
  let run = 0;
  for (const [label, [low, high]] of parts) {
    const count = Math.ceil((high - low) / STEP_K);
    const halves =
      high - low > 200
        ? [
            [0, Math.floor(count / 2)],
            [Math.floor(count / 2) + 1, count],
          ]
        : [[0, count]];
    for (const [first, last] of halves) {
      run += 1;
      const random = seeded(`${medium.id} ${label} run ${run}`);
      const calibration = 1 + random.within(SHARED / 4);
      for (let i = first; i <= last; i++) {
        const nominal = low + ((high - low) * i) / count;
        const wobble = i === 0 || i === count ? 0 : random.within(0.6);
        const old = OLD_SCALE.has(medium.id);
        const celsius = Number(fixed(nominal + wobble - 273.15, 2));
        const T = old ? from68(celsius + 273.15) : celsius + 273.15;
        const scatter = 1 + random.scatter(OWN / 2, OWN * 0.9);
        const perDegree = old ? onScale68(T).dT90dT68 : 1;
        const cp = (phases[label].Cp(T) * perDegree * calibration * scatter) / medium.molarMass;
        rows.push([medium.name, WORDS[label], String(run), fixed(celsius, 2), fixed(cp, 4)].map(continentalNumber));
      }
    }
  }
  const folder = OLD_SCALE.has(medium.id) ? 'cp-1986' : 'cp';
  return file(`${folder}/${medium.id}.csv`, ['sample', 'state', 'run', 't/°C', 'cp/(J/(g K))'], rows);
}

const continentalNumber = (text) => (/^-?\d+\.\d+$/.test(text) ? continental(text) : text);

/** T on ITS-90 of a reading on IPTS-68, by repeated substitution. */
function from68(T68) {
  let T90 = T68;
  for (let i = 0; i < 20; i++) T90 += T68 - onScale68(T90).T68;
  return T90;
}

function transitions(media, closed) {
  const rows = [];
  for (const medium of media) {
    for (const step of closed[medium.id].steps) {
      if (step.gas) continue;
      const random = seeded(`${medium.id} ${step.from} dsc`);
      const onset = step.temperatureK - 273.15 + random.within(ONSET_K / 8);
      const heat = (step.enthalpy / medium.molarMass) * (1 + random.within(HEAT / 6));
      const figures = [fixed(onset, 1), fixed(heat, heat < 100 ? 2 : 1), fixed(heat / (onset + 273.15), 4)];
      rows.push([medium.name, WORDS[step.from], WORDS[step.to], ...figures.map(continental)]);
    }
  }
  return file('dsc.csv', ['sample', 'from', 'to', 'onset t/°C', 'heat/(J/g)', 'entropy/(J/(g K))'], rows);
}

function boiling(media, closed) {
  const rows = [];
  for (const medium of media) {
    for (const step of closed[medium.id].steps) {
      if (!step.gas) continue;
      const t = step.temperatureK - 273.15 + seeded(`${medium.id} boiling`).within(BOILING_K / 8);
      rows.push([medium.name, fixed(t, 2), fixed(step.pressurePa / 1000, 3)].map(continentalNumber));
    }
  }
  return file('boiling.csv', ['sample', 't/°C', 'p/kPa'], rows);
}

function formation(media, closed) {
  const rows = [];
  for (const medium of media) {
    const labels = [medium.origin.phase, ...(MELT_ANCHORED.has(medium.id) ? ['l'] : [])];
    for (const label of labels) {
      const { enthalpyOfFormation, entropy } = closed[medium.id].phases[label];
      const random = seeded(`${medium.id} ${label} formation`);
      // An element-like metal has no heat of formation to measure.
      const heat = enthalpyOfFormation === 0 ? 0 : enthalpyOfFormation / 1000 + random.within(FORMATION_KJ / 10);
      const spread = enthalpyOfFormation === 0 ? '' : fixed(FORMATION_KJ, 2);
      const figures = [fixed(heat, 2), spread, fixed(entropy + random.within(ENTROPY / 16), 2), fixed(ENTROPY, 2)];
      rows.push([medium.name, WORDS[label], ...figures.map(continental)]);
    }
  }
  return file('formation.csv', ['sample', 'state', 'ΔfH/(kJ/mol)', 'U(ΔfH)', 'S/(J/(mol K))', 'U(S)'], rows);
}
