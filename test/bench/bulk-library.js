/**
 * Writes a seeded bulk library as sources: N substances, three phases, a hundred rows a substance, one source folder.
 * Half of the substances have heat capacities alone, the others S and H - H(298.15 K) too. Streams to disk.
 *
 *     node test/bench/bulk-library.js DIR --substances 10000 --seed 1
 */
import { closeSync, mkdirSync, openSync, writeFileSync, writeSync } from 'node:fs';
import { join } from 'node:path';
import { pathToFileURL } from 'node:url';
import { parseArgs } from 'node:util';
import { bulkSlip } from './bulk-slips.js';
import { PHASES, bulkSubstance } from './bulk-substance.js';

export const SOURCE = 'bulk';
export const ROWS_A_SUBSTANCE = 100;

/**
 * @typedef {object} Planted
 * @property {string} kind
 * @property {string} substance
 * @property {string} source
 * @property {string} file
 * @property {number} line 1-based, header included
 * @property {string} column
 * @property {string} printed what the file says
 * @property {string} clean what it should say
 */

/**
 * Writes `DIR/sources/…` and `DIR/planted.json`.
 * @param {string} dir
 * @param {{ substances: number, seed?: number, slipEvery?: number }} options `slipEvery` 0 plants none
 * @returns {{ sources: string, tables: string[], rows: number, planted: Planted[] }} `tables`: paths of all raw CSV files
 */
export function writeBulkLibrary(dir, { substances, seed = 1, slipEvery = 100 }) {
  const sources = join(dir, 'sources');
  const folder = join(sources, SOURCE);
  mkdirSync(folder, { recursive: true });
  const heatCapacities = lineWriter(join(folder, 'heat-capacities.csv'), 'substance,phase,T,Cp');
  const functions = lineWriter(join(folder, 'functions.csv'), 'substance,phase,T,Cp,S,H-H298');
  const anchors = lineWriter(join(folder, 'anchors.csv'), 'substance,phase,dfH298,S298');
  const transitions = lineWriter(join(folder, 'transitions.csv'), 'substance,from,to,T,dH,dS,gas');
  const names = lineWriter(join(sources, 'substances.csv'), 'substance,name,formula,molar_mass,class');
  /** @type {Planted[]} */
  const planted = [];

  for (let index = 0; index < substances; index++) {
    const substance = bulkSubstance(seed, index);
    const slip = slipEvery > 0 ? bulkSlip(seed, index, substance, slipEvery) : null;
    const { id, heatCapacityOnly } = substance;
    const spoilt = (file, line, column, clean) => {
      const printed = slip.spoil(clean);
      planted.push({ kind: slip.kind, substance: id, source: SOURCE, file, line, column, printed, clean });
      return printed;
    };
    names.line(`${id},bulk medium ${index + 1},,${substance.molarMass},${substance.class}`);

    substance.phases.forEach((phase, p) => {
      const writer = heatCapacityOnly ? heatCapacities : functions;
      const file = heatCapacityOnly ? 'heat-capacities.csv' : 'functions.csv';
      for (let i = 0; i < phase.temperatureK.length; i++) {
        let cp = phase.heatCapacity[i].toFixed(3);
        let s = heatCapacityOnly ? '' : phase.entropy[i].toFixed(3);
        let h = heatCapacityOnly ? '' : (phase.increment[i] / 1000).toFixed(3);
        if (slip !== null && slip.phase === p && slip.row === i) {
          const line = writer.lines + 1;
          if (slip.kind === 'heat-capacity') cp = spoilt(file, line, 'Cp', cp);
          else if (slip.kind === 'entropy') s = spoilt(file, line, 'S', s);
          else h = spoilt(file, line, 'H-H298', h);
        }
        const key = `${id},${PHASES[p]},${phase.temperatureK[i]},${cp}`;
        writer.line(heatCapacityOnly ? key : `${key},${s},${h}`);
      }
      let formation = (phase.formationEnthalpy / 1000).toFixed(3);
      if (slip?.kind === 'formation-kcal' && slip.phase === p) {
        formation = spoilt('anchors.csv', anchors.lines + 1, 'dfH298', formation);
      }
      anchors.line(`${id},${PHASES[p]},${formation},${phase.referenceEntropy.toFixed(3)}`);
    });

    substance.transitions.forEach((t, i) => {
      let temperature = t.temperatureK.toFixed(2);
      if (slip?.phase === i && (slip.kind === 'melting-celsius' || slip.kind === 'boiling-celsius')) {
        temperature = spoilt('transitions.csv', transitions.lines + 1, 'T', temperature);
      }
      const heat = (t.enthalpy / 1000).toFixed(3);
      transitions.line(`${id},${t.from},${t.to},${temperature},${heat},${t.entropy.toFixed(3)},${i === 1 ? 'ideal' : ''}`);
    });
  }

  const rows = heatCapacities.lines + functions.lines - 2;
  for (const writer of [heatCapacities, functions, anchors, transitions, names]) writer.close();
  writeFileSync(join(folder, 'source.json'), `${JSON.stringify(DESCRIPTOR, null, 2)}\n`);
  writeFileSync(join(dir, 'planted.json'), `${JSON.stringify(planted, null, 1)}\n`);
  const tables = ['heat-capacities', 'functions', 'anchors', 'transitions'].map((n) => join(folder, `${n}.csv`));
  return { sources, tables, rows, planted };
}

const KEYS = { substance: { is: 'substance' }, phase: { is: 'phase' } };
const STATE = { T: { is: 'temperature', unit: 'K' }, Cp: { is: 'heat-capacity', unit: 'J/(mol.K)' } };
const DESCRIPTOR = {
  title: 'Bulk library of invented media',
  citation: 'Seeded figures from stated curves; no measurement behind them.',
  year: 2024,
  licence: 'CC0-1.0',
  basis: 'evaluated',
  rank: 1,
  temperatureScale: 'ITS-90',
  standardPressure: { value: 1, unit: 'bar' },
  referenceTemperature: 298.15,
  enthalpyZero: 'elements-298.15',
  entropyZero: 'absolute',
  tables: [
    {
      file: 'heat-capacities.csv',
      holds: 'thermal-functions',
      substance: { column: 'substance' },
      phase: { column: 'phase' },
      columns: { ...KEYS, ...STATE },
    },
    {
      file: 'functions.csv',
      holds: 'thermal-functions',
      substance: { column: 'substance' },
      phase: { column: 'phase' },
      columns: {
        ...KEYS,
        ...STATE,
        S: { is: 'entropy', unit: 'J/(mol.K)' },
        'H-H298': { is: 'enthalpy-increment', unit: 'kJ/mol' },
      },
    },
    {
      file: 'anchors.csv',
      holds: 'anchors',
      substance: { column: 'substance' },
      phase: { column: 'phase' },
      columns: {
        ...KEYS,
        dfH298: { is: 'enthalpy-of-formation', unit: 'kJ/mol' },
        S298: { is: 'entropy', unit: 'J/(mol.K)' },
      },
    },
    {
      file: 'transitions.csv',
      holds: 'transitions',
      substance: { column: 'substance' },
      columns: {
        substance: { is: 'substance' },
        from: { is: 'from-phase' },
        to: { is: 'to-phase' },
        T: { is: 'transition-temperature', unit: 'K' },
        dH: { is: 'transition-enthalpy', unit: 'kJ/mol' },
        dS: { is: 'transition-entropy', unit: 'J/(mol.K)' },
        gas: { is: 'gas' },
      },
    },
  ],
};

/** Gathers lines and writes them in blocks of about half a megabyte. */
function lineWriter(path, header) {
  const handle = openSync(path, 'w');
  let text = `${header}\n`;
  return {
    /** Lines so far, header included. */
    lines: 1,
    line(content) {
      text += content;
      text += '\n';
      this.lines++;
      if (text.length > 524288) {
        writeSync(handle, text);
        text = '';
      }
    },
    close() {
      writeSync(handle, text);
      closeSync(handle);
    },
  };
}

if (process.argv[1] !== undefined && import.meta.url === pathToFileURL(process.argv[1]).href) {
  const { values, positionals } = parseArgs({
    allowPositionals: true,
    options: {
      substances: { type: 'string', default: '10000' },
      seed: { type: 'string', default: '1' },
      'slip-every': { type: 'string', default: '100' },
    },
  });
  const started = performance.now();
  const { rows, planted } = writeBulkLibrary(positionals[0] ?? 'bulk-library', {
    substances: Number(values.substances),
    seed: Number(values.seed),
    slipEvery: Number(values['slip-every']),
  });
  const seconds = ((performance.now() - started) / 1000).toFixed(1);
  console.log(`${rows} rows, ${planted.length} slips planted, ${seconds} s`);
}
