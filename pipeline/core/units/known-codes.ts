/** UCUM codes that tables of thermochemistry use, and the nearest of them to a code that is none. */
const MOLAR_ENTROPY = [
  'J/(mol.K)',
  'kJ/(mol.K)',
  'cal_th/(mol.K)',
  'cal_IT/(mol.K)',
  'kcal_th/(mol.K)',
  'J/(g.K)',
  'J/(kg.K)',
  'kJ/(kg.K)',
  'cal_th/(g.K)',
  'cal_IT/(g.K)',
  'J/(mol.Cel)',
  '[Btu_IT]/([lb_av].[degF])',
  '[Btu_th]/([lb_av].[degF])',
  '[k]',
];
const MOLAR_ENERGY = [
  'kJ/mol',
  'J/mol',
  'kcal_th/mol',
  'cal_th/mol',
  'kcal_IT/mol',
  'cal_IT/mol',
  'MJ/mol',
  'J/g',
  'kJ/kg',
  'cal_th/g',
  'cal_IT/g',
  'kcal_th/kg',
  '[Btu_IT]/[lb_av]',
  '[Btu_th]/[lb_av]',
  'eV',
  'meV',
];
const TEMPERATURE = ['K', 'Cel', '[degF]', '[degR]', 'mK', '[degRe]'];
const PRESSURE = ['Pa', 'kPa', 'MPa', 'bar', 'mbar', 'atm', 'mm[Hg]', '[psi]', "[in_i'Hg]", 'dyn/cm2', 'att'];
const MOLAR_VOLUME = ['cm3/mol', 'm3/mol', 'L/mol', 'dm3/mol', 'cm3/g', 'm3/kg', 'mL/mol'];
const DENSITY = ['kg/m3', 'g/cm3', 'g/mL', 'kg/L', '[lb_av]/[cft_i]'];

/** By the SI code of the quantity. */
const KNOWN: Readonly<Record<string, readonly string[]>> = {
  K: TEMPERATURE,
  'J/(mol.K)': MOLAR_ENTROPY,
  'J/mol': MOLAR_ENERGY,
  Pa: PRESSURE,
  'm3/mol': MOLAR_VOLUME,
  'kg/m3': DENSITY,
};

/** What people write, reduced as `plainly` does, where the spelling alone does not lead to the code. */
const MEANT: Readonly<Record<string, string>> = {
  torr: 'mm[Hg]',
  mmhg: 'mm[Hg]',
  psi: '[psi]',
  psia: '[psi]',
  atmosphere: 'atm',
  inhg: "[in_i'Hg]",
  c: 'Cel',
  degc: 'Cel',
  celsius: 'Cel',
  f: '[degF]',
  degf: '[degF]',
  fahrenheit: '[degF]',
  r: '[degR]',
  degr: '[degR]',
  rankine: '[degR]',
  kelvin: 'K',
  degk: 'K',
};

/** Every known code for the SI code `target`, the usual ones first. */
export function knownCodes(target: string): readonly string[] {
  return KNOWN[target] ?? [target];
}

/** Up to three known codes for the SI code `target`, nearest in spelling first (one that continues the code before others); signs and case count for little. */
export function nearestCodes(target: string, code: string): readonly string[] {
  const known = KNOWN[target] ?? [target];
  if (code === '') return known.slice(0, 3);
  const wanted = plainly(code);
  const meant = Object.hasOwn(MEANT, wanted) ? MEANT[wanted] : undefined;
  const ranked = known
    .map((candidate, place) => {
      const spelling = distance(wanted, plainly(candidate)) + distance(code, candidate) / 100;
      return { candidate, place, score: candidate === meant ? -1 : candidate.startsWith(code) ? 0.5 : spelling };
    })
    .sort((a, b) => a.score - b.score || a.place - b.place);
  return ranked.slice(0, 3).map((entry) => entry.candidate);
}

/** Letters only, without case, calorie kinds or negative exponents. */
function plainly(code: string): string {
  return code
    .toLowerCase()
    .replace(/_th|_it|_i|_av/g, '')
    .replace(/[^a-z]/g, '');
}

/** Levenshtein's distance (1966) between two short words. */
function distance(a: string, b: string): number {
  let previous = Array.from({ length: b.length + 1 }, (_, j) => j);
  for (let i = 1; i <= a.length; i++) {
    const row = [i];
    for (let j = 1; j <= b.length; j++) {
      const change = previous[j - 1] + (a[i - 1] === b[j - 1] ? 0 : 1);
      row[j] = Math.min(change, previous[j] + 1, row[j - 1] + 1);
    }
    previous = row;
  }
  return previous[b.length];
}
