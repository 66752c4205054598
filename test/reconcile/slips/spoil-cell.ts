/**
 * Invents cells of tables and spoils them as people do, with the value that was meant beside each. Knows numbers, units and
 * typing; shares nothing with the code that explains.
 */
import type { NumberQuantity } from '../../../schemas/quantities.js';
import type { Random } from '../../slips/random.js';
import {
  ANY,
  ATM,
  BAR,
  CAL,
  CELSIUS,
  type Column,
  DEG_F,
  ENTROPIES,
  FORMATION_KJ,
  INCREMENT_KJ,
  J,
  KCAL,
  KELVIN,
  KILOPASCAL,
  KJ,
  PASCAL,
  PER_GRAM,
  PER_GRAM_ENTHALPY,
  TORR,
  TRANSITION_KJ,
  TRANSITION_PAIR,
  WHOLE_CAL,
  WHOLE_J,
} from './columns.js';

/** What else is stated about the substance, SI: two transitions, another phase's formation enthalpy, H(Tr) - H(0). */
export interface Surroundings {
  readonly fromZero: number;
  readonly otherFormation: number;
  readonly transitions: readonly { readonly enthalpy: number; readonly entropy: number }[];
}

export interface SpoiltCell {
  readonly quantity: NumberQuantity;
  readonly unit: string;
  readonly factor: number;
  readonly offset: number;
  /** What should stand there, unrounded, in SI. */
  readonly truth: number;
  readonly clean: string;
  readonly printed: string;
  /** One unit of the column's last place in SI. */
  readonly lastPlace: number;
  readonly molarMassGPerMol: number;
  readonly above: string;
  readonly partner: string | null;
  /** From the partner's number to SI. */
  readonly partnerFactor: number;
  readonly meltingK: number;
  readonly gas: boolean;
  readonly around: Surroundings;
}

type Spoiler = (drawn: Drawn) => string | null;

interface Drawn {
  readonly column: Column;
  /** As printed, unrounded. */
  readonly truth: number;
  readonly decimals: number;
  readonly clean: string;
  readonly above: string;
  readonly partner: string;
  readonly meltingK: number;
  readonly molarMass: number;
  readonly around: Surroundings;
  readonly random: Random;
}

/** By the name of the slip: where it happens, and what is printed instead; null where this cell cannot hold it. */
const KINDS: Readonly<Record<string, readonly [readonly Column[], Spoiler]>> = {
  'one-digit-wrong': [ANY, ({ clean, random }) => retyped(clean, random)],
  'digits-exchanged': [ANY, ({ clean, random }) => swapped(clean, random)],
  'decimal-point-moved': [ANY, ({ clean, random }) => pointMoved(clean, random)],
  'copied-from-row-above': [ANY, ({ above, clean }) => (above === clean ? null : above)],
  'sign-lost': [[...KJ, ...CELSIUS], ({ clean }) => (clean.startsWith('-') ? clean.slice(1) : `-${clean}`)],
  'calorie-read-as-joule': [[...J, ...KJ, ...WHOLE_J], (d) => figures(d, d.truth / calorie(d.random))],
  'joule-read-as-calorie': [CAL, (d) => figures(d, d.truth * calorie(d.random))],
  'kilocalorie-read-as-joule': [WHOLE_J, (d) => figures(d, d.truth / (1000 * calorie(d.random)), 3)],
  'calorie-read-as-kilojoule': [KJ, (d) => figures(d, (1000 * d.truth) / calorie(d.random), -2)],
  'kilojoule-read-as-calorie': [WHOLE_CAL, (d) => figures(d, (d.truth * calorie(d.random)) / 1000, 3)],
  'joule-read-as-kilocalorie': [KCAL, (d) => figures(d, 1000 * d.truth * calorie(d.random), -2)],
  'kilo-dropped': [[...WHOLE_J, ...PASCAL], (d) => (d.truth / 1000).toFixed(d.decimals + 3)],
  'kilo-added': [[...KJ, ...KILOPASCAL], (d) => (d.truth * 1000).toFixed(Math.max(0, d.decimals - 3))],
  'per-gram-read-as-per-mole': [[...J, ...WHOLE_J], (d) => figures(d, d.truth / d.molarMass, 1)],
  'per-mole-read-as-per-gram': [PER_GRAM, (d) => figures(d, d.truth * d.molarMass)],
  'kilo-per-mole-read-as-per-gram': [PER_GRAM_ENTHALPY, (d) => figures(d, (d.truth * d.molarMass) / 1000, 1)],
  'per-gram-read-as-kilo-per-mole': [[...KJ, ...KCAL], (d) => figures(d, (1000 * d.truth) / d.molarMass)],
  'calorie-per-gram-read-as-joule-per-mole': [
    [...J, ...KJ, ...WHOLE_J],
    (d) => figures(d, (d.truth * d.column.factor) / d.molarMass / calorie(d.random), d.column.factor > 1 ? 0 : 2),
  ],
  'calorie-per-mole-read-as-joule-per-gram': [
    PER_GRAM,
    (d) => {
      const calories = (d.truth * d.molarMass) / calorie(d.random);
      return d.column.quantity !== 'entropy' && d.random.unit() < 0.5
        ? figures(d, calories / 1000, 2)
        : figures(d, calories);
    },
  ],
  'other-formula-molar-mass': [[...PER_GRAM, ...J, ...KJ], (d) => figures(d, d.truth * otherFormula(d))],
  'celsius-read-as-kelvin': [KELVIN, (d) => figures(d, d.truth - 273.15)],
  'kelvin-read-as-celsius': [CELSIUS, (d) => figures(d, d.truth + 273.15)],
  'fahrenheit-not-converted': [KELVIN, (d) => figures(d, d.truth * 1.8 - 459.67)],
  'read-as-fahrenheit': [DEG_F, (d) => figures(d, ((d.truth + 459.67) * 5) / 9 - (d.random.unit() < 0.5 ? 273.15 : 0))],
  'old-temperature-scale': [
    [...KELVIN, ...CELSIUS],
    (d) => {
      const difference = scaleDifference(d.truth + d.column.offset);
      return difference === null ? null : figures(d, d.truth - difference);
    },
  ],
  'atmosphere-for-bar': [ENTROPIES, (d) => figures(d, d.truth - 8.314462618 * Math.log(1.01325))],
  'enthalpy-and-entropy-exchanged': [TRANSITION_PAIR, ({ partner }) => partner],
  'counted-from-zero-kelvin': [
    [...INCREMENT_KJ, ...FORMATION_KJ],
    (d) => {
      const down = d.column.sign === -1 && d.random.unit() < 0.5;
      return figures(d, d.truth + ((down ? -1 : 1) * d.around.fromZero) / d.column.factor);
    },
  ],
  'different-enthalpy-scales': [FORMATION_KJ, (d) => figures(d, d.truth - d.around.otherFormation / d.column.factor)],
  'transition-left-out': [
    [...ENTROPIES, ...INCREMENT_KJ, ...TRANSITION_KJ],
    (d) => {
      const left = d.random.pick(d.around.transitions);
      const rest = d.truth - (d.column.unit.includes('K') ? left.entropy : left.enthalpy) / d.column.factor;
      return rest > 0 ? figures(d, rest) : null;
    },
  ],
  'in-units-of-r': [J, (d) => figures(d, d.truth / 8.314462618, 1)],
  'log10-taken-for-ln': [[...ENTROPIES, ...TRANSITION_KJ], (d) => figures(d, d.truth / Math.LN10)],
  'torr-read-as-pascal': [
    [...PASCAL, ...KILOPASCAL],
    (d) => figures(d, (d.truth * d.column.factor) / 133.322387415, 1),
  ],
  'pascal-read-as-torr': [TORR, (d) => pascal(d)],
  'bar-or-atmosphere-read-as-pascal': [
    [...PASCAL, ...KILOPASCAL],
    (d) => figures(d, (d.truth * d.column.factor) / (d.random.unit() < 0.5 ? 1e5 : 101325), 4),
  ],
  'pascal-read-as-bar-or-atmosphere': [[...BAR, ...ATM], (d) => pascal(d)],
};

export const SPOILT_KINDS: readonly string[] = Object.keys(KINDS);

/** One cell with the slip, or null where the drawn cell cannot hold it; draw again. */
export function spoilCell(kind: string, random: Random): SpoiltCell | null {
  const [columns, spoil] = KINDS[kind]!;
  const drawn = drawCell(random.pick(columns), random);
  const printed = spoil(drawn);
  if (printed === null || printed === drawn.clean) return null;
  const cell = finish(drawn, printed, kind === 'atmosphere-for-bar');
  return kind === 'enthalpy-and-entropy-exchanged' ? { ...cell, partner: drawn.clean } : cell;
}

/** One cell that is wrong by an amount of no meaning, log-uniform from 5 units of the last place to half of the number. */
export function disturbedCell(random: Random): SpoiltCell {
  const drawn = drawCell(random.pick(ANY), random);
  const place = 10 ** -drawn.decimals;
  const size = random.logBetween(5 * place, Math.max(10 * place, Math.abs(drawn.truth) / 2));
  const printed = (drawn.truth + (random.unit() < 0.5 ? -size : size)).toFixed(drawn.decimals);
  return finish(drawn, printed, random.unit() < 0.3);
}

function drawCell(column: Column, random: Random): Drawn {
  const decimals = random.pick(column.decimals);
  const truth = (column.sign ?? 1) * random.logBetween(column.low, column.high);
  const clean = truth.toFixed(decimals);
  const above = (truth * (1 - 0.002 - 0.1 * random.unit())).toFixed(decimals);
  const molarMass = random.logBetween(4, 400);
  const meltingK = random.logBetween(150, 2500);
  const kilo = /^k(J|cal_th)\/mol/.test(column.unit) ? 1000 : 1;
  const other = column.quantity === 'transition-entropy' ? (truth * meltingK) / 1000 : (truth * kilo) / meltingK;
  const partner = other.toFixed(kilo === 1000 || /K/.test(column.unit) ? random.pick([2, 3]) : 3);
  return { column, truth, decimals, clean, above, partner, meltingK, molarMass, around: surroundings(random), random };
}

/** Known to the joule, as three decimals of a kilojoule are. */
function surroundings(random: Random): Surroundings {
  const transition = () => {
    const enthalpy = Math.round(random.logBetween(500, 40000));
    return { enthalpy, entropy: Math.round((1000 * enthalpy) / random.logBetween(150, 2500)) / 1000 };
  };
  return {
    fromZero: Math.round(random.logBetween(2000, 25000)),
    otherFormation: -Math.round(random.logBetween(40000, 1600000)),
    transitions: [transition(), transition()],
  };
}

function finish(drawn: Drawn, printed: string, gas: boolean): SpoiltCell {
  const { quantity, unit, factor, offset } = drawn.column;
  // A table per gram has the molar mass in its factor.
  const scale = /\/\(?k?g/.test(unit) ? factor * drawn.molarMass : factor;
  return {
    ...{ quantity, unit, factor: scale, offset, clean: drawn.clean, printed, gas, above: drawn.above },
    truth: drawn.truth * scale + offset,
    lastPlace: 10 ** -drawn.decimals * scale,
    molarMassGPerMol: drawn.molarMass,
    partner: quantity.startsWith('transition-e') ? drawn.partner : null,
    partnerFactor:
      quantity === 'transition-entropy' ? 1000 * scale : scale / (scale >= 1000 && /^k/.test(unit) ? 1000 : 1),
    meltingK: drawn.meltingK,
    around: drawn.around,
  };
}

/** Printed with the column's decimals (and `more`); nobody prints a number of fewer than three figures so. */
function figures({ decimals }: Drawn, value: number, more = 0): string | null {
  const text = value.toFixed(Math.max(0, decimals + more));
  return text.replace(/\D/g, '').replace(/^0+/, '').length < 3 ? null : text;
}

/** In pascal as whole numbers, or in kilopascal with three decimals. */
function pascal({ truth, column, random }: Drawn): string {
  const pa = truth * column.factor;
  return random.unit() < 0.6 ? pa.toFixed(0) : (pa / 1000).toFixed(3);
}

function calorie(random: Random): number {
  return random.unit() < 0.85 ? 4.184 : 4.1868;
}

/** What the wrong molar mass multiplies by: in a column per mass M/(M + n H2O), in one per mole the reverse; or 2 or 1/2. */
function otherFormula({ column, molarMass, random }: Drawn): number {
  if (random.unit() < 0.3) return random.unit() < 0.5 ? 2 : 0.5;
  const hydrate = molarMass + random.pick([0.5, 1, 1, 1, 2, 2, 3, 4, 5, 6, 6, 7, 10]) * 18.0153;
  return /\/\(?k?g/.test(column.unit) === random.unit() < 0.7 ? molarMass / hydrate : hydrate / molarMass;
}

/**
 * t90 - t68 [K]: at the fixed points as the two scales print them, and above gold -0.25 (T/1337.33)^2; null where the
 * temperature lies more than 3 K from all of them.
 */
function scaleDifference(temperatureK: number): number | null {
  if (temperatureK > 1337.33) return -0.25 * (temperatureK / 1337.33) ** 2;
  const FIXED = [
    [505.078, 505.1181],
    [692.677, 692.73],
    [1234.93, 1235.08],
  ] as const;
  const near = FIXED.find(([now]) => Math.abs(now - temperatureK) < 3);
  return near === undefined ? null : near[0] - near[1];
}

function placesOfDigits(text: string): number[] {
  return Array.from(text, (c, i) => (/\d/.test(c) ? i : -1)).filter((i) => i >= 0);
}

function retyped(text: string, random: Random): string | null {
  const place = random.pick(placesOfDigits(text));
  const digit = String(Math.floor(10 * random.unit()));
  const other = text.slice(0, place) + digit + text.slice(place + 1);
  return Number(other) === 0 ? null : other;
}

function swapped(text: string, random: Random): string | null {
  const places = placesOfDigits(text);
  const first = Math.floor(random.unit() * (places.length - 1));
  const [a, b] = [places[first]!, places[first + 1]!];
  const characters = [...text];
  [characters[a], characters[b]] = [characters[b]!, characters[a]!];
  return characters.join('');
}

function pointMoved(text: string, random: Random): string | null {
  const sign = text.startsWith('-') ? '-' : '';
  const point = text.includes('.') ? text.replace('-', '').indexOf('.') : text.replace('-', '').length;
  const digits = text.replace(/\D/g, '');
  const to = point + random.pick([-2, -1, 1, 2]);
  if (to < 1 || to > digits.length) return null;
  const moved = digits.slice(0, to) + (to < digits.length ? `.${digits.slice(to)}` : '');
  return sign + moved;
}
