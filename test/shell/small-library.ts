import { mkdirSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';

/** What is to be wrong in a made library. */
export interface Slips {
  /** Substances whose S at 400 K is 10 J/(mol K) too large. */
  readonly entropy?: readonly string[];
  /** Ids that stand in substances.csv and in no table. */
  readonly empty?: readonly string[];
}

const MELTING_K = 500;
const FUSION_J_PER_MOL = 9000;

/**
 * Writes invented substances of two phases from closed laws: Cp(cr) = a + 0.02 T, Cp(l) = a + 25, melting at 500 K. One
 * evaluated source prints T, Cp, S and H − H(298.15 K) of both phases, counted from the crystal.
 */
export function writeSmallLibrary(folder: string, ids: readonly string[], slips: Slips = {}): void {
  const source = join(folder, 'made-tables');
  mkdirSync(source, { recursive: true });
  const all = [...ids, ...(slips.empty ?? [])];
  writeFileSync(
    join(folder, 'substances.csv'),
    `substance,name,formula,molar_mass\n${all.map((id) => `${id},${id} made up,,100\n`).join('')}`,
  );
  writeFileSync(join(source, 'source.json'), `${JSON.stringify(descriptor(), null, 2)}\n`);
  const points = ids.flatMap((id, i) => rowsOf(id, 40 + i, slips.entropy?.includes(id) ?? false));
  writeFileSync(join(source, 'points.csv'), `name,state,T/K,Cp,S,H\n${points.join('')}`);
  const transitions = ids.map((id) => `${id},cr,l,${MELTING_K}.00,${FUSION_J_PER_MOL}.0\n`);
  writeFileSync(join(source, 'transitions.csv'), `name,from,to,T/K,dH\n${transitions.join('')}`);
}

export function descriptor() {
  const text = (is: string) => ({ is });
  const number = (is: string, unit: string) => ({ is, unit });
  return {
    title: 'Made tables',
    citation: 'Made up for a test',
    licence: 'CC0-1.0',
    year: 2020,
    basis: 'evaluated',
    temperatureScale: 'ITS-90',
    enthalpyZero: 'crystal at 298.15 K',
    entropyZero: 'absolute',
    tables: [
      {
        file: 'points.csv',
        holds: 'thermal-functions',
        incrementsFrom: 'cr',
        substance: { column: 'name' },
        phase: { column: 'state' },
        columns: {
          name: text('substance'),
          state: text('phase'),
          'T/K': number('temperature', 'K'),
          Cp: number('heat-capacity', 'J/(mol.K)'),
          S: number('entropy', 'J/(mol.K)'),
          H: number('enthalpy-increment', 'J/mol'),
        },
      },
      {
        file: 'transitions.csv',
        holds: 'transitions',
        substance: { column: 'name' },
        columns: {
          name: text('substance'),
          from: text('from-phase'),
          to: text('to-phase'),
          'T/K': number('transition-temperature', 'K'),
          dH: number('transition-enthalpy', 'J/mol'),
        },
      },
    ],
  };
}

function rowsOf(id: string, a: number, slipped: boolean): string[] {
  const b = 0.02;
  const crystalS = (T: number) => 60 + a * Math.log(T / 298.15) + b * (T - 298.15);
  const crystalH = (T: number) => a * (T - 298.15) + (b / 2) * (T * T - 298.15 * 298.15);
  const meltS = crystalS(MELTING_K) + FUSION_J_PER_MOL / MELTING_K;
  const meltH = crystalH(MELTING_K) + FUSION_J_PER_MOL;
  const liquidCp = a + 25;
  const row = (state: string, T: number, cp: number, s: number, h: number) =>
    `${id},${state},${T.toFixed(2)},${cp.toFixed(3)},${s.toFixed(3)},${h.toFixed(1)}\n`;
  const crystal = [298.15, 300, 320, 340, 360, 380, 400, 420, 440, 460, 480, 500].map((T) =>
    row('cr', T, a + b * T, crystalS(T) + (slipped && T === 400 ? 10 : 0), crystalH(T)),
  );
  const liquid = [500, 520, 540, 560, 580, 600, 650, 700].map((T) =>
    row('l', T, liquidCp, meltS + liquidCp * Math.log(T / MELTING_K), meltH + liquidCp * (T - MELTING_K)),
  );
  return [...crystal, ...liquid];
}
