/** SI values of printed numbers, and molar masses, by the slip maker's own short lists. */
import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { readDelimited } from './delimited.js';

export const CALORIE_J = { thermochemical: 4.184, internationalTable: 4.1868 } as const;
export const R_J_PER_MOL_K = 8.31446;
export const TORR_PA = 133.322368;
const ENERGIES_J: Readonly<Record<string, number>> = {
  J: 1,
  kJ: 1000,
  cal_th: CALORIE_J.thermochemical,
  kcal_th: 1000 * CALORIE_J.thermochemical,
  cal_IT: CALORIE_J.internationalTable,
  kcal_IT: 1000 * CALORIE_J.internationalTable,
};
const PRESSURES_PA: Readonly<Record<string, number>> = {
  Pa: 1,
  hPa: 100,
  kPa: 1000,
  MPa: 1e6,
  bar: 1e5,
  atm: 101325,
  'mm[Hg]': TORR_PA,
};

export interface Unit {
  /** SI value = number * factor + offset. */
  readonly factor: number;
  readonly offset: number;
  readonly energy: 'J' | 'cal' | null;
  readonly kilo: boolean;
  readonly perGram: boolean;
}

/** @param code UCUM code of a column, of those that the sets use */
export function readUnit(code: string, molarMassGPerMol: number): Unit | null {
  const plain = { offset: 0, energy: null, kilo: false, perGram: false } as const;
  if (code === 'K') return { ...plain, factor: 1 };
  if (code === 'Cel') return { ...plain, factor: 1, offset: 273.15 };
  if (code === '[degF]') return { ...plain, factor: 5 / 9, offset: 459.67 * (5 / 9) };
  const pressure = PRESSURES_PA[code];
  if (pressure !== undefined) return { ...plain, factor: pressure };
  const parts = /^(\w+)\/\(?(mol|g|kg)(\.(K|Cel))?\)?$/.exec(code);
  const joules = ENERGIES_J[parts?.[1] ?? ''];
  if (parts === null || joules === undefined) return null;
  const amount = parts[2] === 'mol' ? 1 : parts[2] === 'g' ? molarMassGPerMol : molarMassGPerMol / 1000;
  return {
    factor: joules * amount,
    offset: 0,
    energy: parts[1]!.includes('cal') ? 'cal' : 'J',
    kilo: parts[1]!.startsWith('k'),
    perGram: parts[2] !== 'mol',
  };
}

const ATOMIC_MASSES: Readonly<Record<string, number>> = {
  H: 1.008,
  Li: 6.94,
  C: 12.011,
  N: 14.007,
  O: 15.999,
  F: 18.998,
  Na: 22.99,
  Mg: 24.305,
  Al: 26.982,
  Si: 28.085,
  S: 32.06,
  Cl: 35.45,
  K: 39.098,
  Ca: 40.078,
  Ti: 47.867,
  Fe: 55.845,
  Cu: 63.546,
  Zn: 65.38,
  Br: 79.904,
  Zr: 91.224,
  I: 126.904,
  Hg: 200.592,
  Pb: 207.2,
}; // prettier-ignore

/** Molar masses [g/mol] by substance, from `substances.csv`; NaN where neither the mass nor the formula tells. */
export function molarMasses(sourcesDir: string): ReadonlyMap<string, number> {
  const path = join(sourcesDir, 'substances.csv');
  const { header, rows } = readDelimited(path, {
    delimiter: readFileSync(path, 'utf8').split('\n')[0]!.includes(';') ? ';' : ',',
    skipLines: 0,
    comment: null,
  });
  const [id, formula, mass] = ['substance', 'formula', 'molar_mass'].map((name) => header.indexOf(name));
  return new Map(
    rows.map(({ cells }) => {
      const printed = cells[mass!]?.text ?? '';
      return [cells[id!]!.text, printed === '' ? massOf(cells[formula!]?.text ?? '') : Number(printed)];
    }),
  );
}

function massOf(formula: string): number {
  let sum = 0;
  for (const [, element, count] of formula.matchAll(/([A-Z][a-z]?)(\d*)/g)) {
    sum += (ATOMIC_MASSES[element!] ?? Number.NaN) * Number(count || 1);
  }
  return sum > 0 ? sum : Number.NaN;
}
