/**
 * One printed number written wrongly, as people do it: from what a cell says to what it would say. Each gives null where the
 * slip cannot befall the cell.
 */
import { onScaleOf1948, onScaleOf1968 } from './old-scales.js';
import type { Random } from './random.js';
import { type SlipSubstance, unitOf } from './slip-library.js';
import type { SourceCell } from './source-cells.js';
import { CALORIE_J, R_J_PER_MOL_K, TORR_PA } from './units.js';

/** @param least the smallest error in the cell that is said to show [SI]; Infinity where none would */
export type Rewrite = (cell: SourceCell, substance: SlipSubstance, random: Random, least: number) => string | null;

const PER_KELVIN = ['entropy', 'gibbs-function', 'heat-capacity', 'transition-entropy'];
const ONE_ATM_J_PER_MOL_K = 0.10944;
const WATER_G_PER_MOL = 18.015;

/** The number in other units of energy: J where the column is in calories, calories where it is in J. */
const calories = (joules: number): Rewrite => {
  return (cell, substance) => {
    const { energy } = unitOf(cell, substance);
    if (energy === null) return null;
    return like(cell, energy === 'J' ? cell.value / joules : cell.value * joules);
  };
};
export const inThermochemicalCalories = calories(CALORIE_J.thermochemical);
export const inTableCalories = calories(CALORIE_J.internationalTable);

/** kJ in a column of J or J in one of kJ; all figures stay. */
export const otherKilo: Rewrite = (cell, substance) => {
  const { energy, kilo } = unitOf(cell, substance);
  if (energy === null) return null;
  return kilo
    ? (cell.value * 1000).toFixed(Math.max(0, cell.decimals - 3))
    : (cell.value / 1000).toFixed(cell.decimals + 3);
};

export const perOtherAmount: Rewrite = (cell, substance) => {
  const { energy, perGram } = unitOf(cell, substance);
  if (energy === null) return null;
  return like(cell, perGram ? cell.value * substance.molarMassGPerMol : cell.value / substance.molarMassGPerMol);
};

/** Reckoned with the molar mass of two formula units, of half of one, or in a column per gram of a hydrate. */
export function withMassOfOther(times: 2 | 0.5, waters: number): Rewrite {
  return (cell, substance) => {
    const { energy, perGram } = unitOf(cell, substance);
    if (energy === null) return null;
    const hydrate = substance.molarMassGPerMol / (substance.molarMassGPerMol + waters * WATER_G_PER_MOL);
    return like(cell, cell.value * (perGram ? hydrate : times));
  };
}

export const withMassOfSomeOther: Rewrite = (cell, substance, random, least) =>
  withMassOfOther(random.pick([2, 0.5]), random.pick([1, 2, 5, 6]))(cell, substance, random, least);

export const inUnitsOfR: Rewrite = (cell, substance) => {
  if (!PER_KELVIN.includes(cell.quantity)) return null;
  return like(cell, (cell.value * unitOf(cell, substance).factor) / R_J_PER_MOL_K);
};

export const atOneAtmosphere: Rewrite = (cell, substance) => {
  if (cell.place !== 'g' || !['entropy', 'gibbs-function'].includes(cell.quantity)) return null;
  return like(cell, cell.value - ONE_ATM_J_PER_MOL_K / unitOf(cell, substance).factor);
};

export const withoutSign: Rewrite = (cell) => (cell.value < 0 ? cell.text.replace(/^-/, '') : null);

export const pointMoved: Rewrite = (cell, _, random) => {
  const [whole = '', decimals = ''] = cell.text.replace('-', '').split('.');
  const sign = cell.text.startsWith('-') ? '-' : '';
  const right = decimals.length > 0 && (whole.length < 2 || random.unit() < 0.5);
  const digits = whole + decimals;
  const at = whole.length + (right ? 1 : -1);
  if (at < 0) return null;
  const left = digits.slice(0, at).replace(/^0+(?=\d)/, '') || '0';
  return sign + left + (digits.length > at ? `.${digits.slice(at)}` : '');
};

export const digitsExchanged: Rewrite = (cell, _, random) => {
  const places = digitPlaces(cell.text).filter(
    (i, n, all) => all[n + 1] !== undefined && cell.text[i] !== cell.text[all[n + 1]!],
  );
  if (places.length === 0) return null;
  const first = random.pick(places);
  const second = cell.text[first + 1] === '.' ? first + 2 : first + 1;
  const letters = [...cell.text];
  [letters[first], letters[second]] = [letters[second]!, letters[first]!];
  return unlessPadded(letters.join(''));
};

export const oneDigitWrong: Rewrite = (cell, _, random) => {
  const place = random.pick(digitPlaces(cell.text));
  const digit = random.pick([...'0123456789'].filter((other) => other !== cell.text[place]));
  return unlessPadded(cell.text.slice(0, place) + digit + cell.text.slice(place + 1));
};

export const asInRowAbove: Rewrite = (cell, { cells }) => {
  const above = cells.find(
    (other) =>
      other.line === cell.line - 1 &&
      other.file === cell.file &&
      other.column === cell.column &&
      other.source === cell.source &&
      other.place === cell.place,
  );
  return above === undefined || above.text === cell.text ? null : above.text;
};

const ofTemperature = (to: (kelvin: number) => number): Rewrite => {
  return (cell, substance) => {
    if (!['temperature', 'transition-temperature'].includes(cell.quantity)) return null;
    const { factor, offset } = unitOf(cell, substance);
    const number = to(cell.value * factor + offset);
    return Number.isNaN(number) ? null : like(cell, number);
  };
};
/** Celsius in a column of kelvin, or the reverse. */
export const celsiusForKelvin: Rewrite = (cell, ...rest) => {
  const inKelvin = cell.unit === 'K';
  return ofTemperature((kelvin) => (inKelvin ? kelvin - 273.15 : kelvin))(cell, ...rest);
};
export const inFahrenheit = ofTemperature((kelvin) => (kelvin - 273.15) * 1.8 + 32);
const onOldScale = (convert: (kelvin: number) => number): Rewrite => {
  return (cell, substance, ...rest) => {
    const offset = cell.unit === 'K' ? 0 : 273.15;
    return ofTemperature((kelvin) => convert(kelvin) - offset)(cell, substance, ...rest);
  };
};
export const onScale68 = onOldScale(onScaleOf1968);
export const onScale48 = onOldScale(onScaleOf1948);

const ofPressure = (to: (number: number, pascal: number) => number): Rewrite => {
  return (cell, substance) => {
    if (cell.quantity !== 'pressure') return null;
    return String(Number(to(cell.value, cell.value * unitOf(cell, substance).factor).toPrecision(6)));
  };
};
export const inTorr = ofPressure((_, pascal) => pascal / TORR_PA);
/** ln p was read as log10 p. */
export const naturalReadAsDecimal = ofPressure((number) => number ** Math.LN10);

const LEAST_UNITS = 5;
const LEAST_SHARE_OF_HEAT_CAPACITY = 0.01;
const LARGEST_TIMES_LEAST = 30;

/**
 * Off by five units of the last place (a heat capacity: by 1 %) or by what is said to show, whichever is more, up to thirty
 * times that; at most by half of the figure.
 */
export const off: Rewrite = (cell, substance, random, least) => {
  const unit = 10 ** -cell.decimals;
  const shows = Number.isFinite(least) ? least / Math.abs(unitOf(cell, substance).factor) : 0;
  const share = cell.quantity === 'heat-capacity' ? LEAST_SHARE_OF_HEAT_CAPACITY * Math.abs(cell.value) : 0;
  const from = Math.ceil(Math.max(LEAST_UNITS, shows / unit, share / unit));
  const to = Math.min(from * LARGEST_TIMES_LEAST, (0.5 * Math.abs(cell.value)) / unit);
  if (to < from) return null;
  const change = Math.round(random.logBetween(from, to)) * unit;
  return like(cell, cell.value + (random.unit() < 0.5 ? change : -change));
};

/** In the column's usual number of decimals. */
export function like(cell: SourceCell, value: number): string {
  return value.toFixed(cell.decimals);
}

/** Nobody prints a zero before other digits. */
function unlessPadded(text: string): string | null {
  return /^-?0\d/.test(text) ? null : text;
}

function digitPlaces(text: string): number[] {
  return [...text].flatMap((letter, i) => (/\d/.test(letter) ? [i] : []));
}
