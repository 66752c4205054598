/**
 * Invents cells of tables and spoils them as people do, with the value that was meant beside each. Knows numbers, units and
 * typing; shares nothing with the code that explains.
 */
import type { NumberQuantity } from '../../../schemas/quantities.js';
import type { Random } from '../../slips/random.js';

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
  readonly gas: boolean;
}

interface Column {
  readonly quantity: NumberQuantity;
  readonly unit: string;
  readonly factor: number;
  readonly offset: number;
  /** Range of the numbers as printed; drawn log-uniform. */
  readonly low: number;
  readonly high: number;
  readonly decimals: readonly number[];
  readonly sign?: -1;
}

type Spoiler = (drawn: Drawn) => string | null;

interface Drawn {
  readonly column: Column;
  readonly truth: number;
  readonly decimals: number;
  readonly clean: string;
  readonly above: string;
  readonly partner: string;
  readonly molarMass: number;
  readonly random: Random;
}

const column = (
  quantity: NumberQuantity,
  unit: string,
  factor: number,
  low: number,
  high: number,
  decimals: readonly number[],
  more: { offset?: number; sign?: -1 } = {},
): Column => ({ quantity, unit, factor, offset: 0, low, high, decimals, ...more });

const J = [
  column('entropy', 'J/(mol.K)', 1, 15, 400, [2, 3]),
  column('gibbs-function', 'J/(mol.K)', 1, 15, 300, [2, 3]),
  column('heat-capacity', 'J/(mol.K)', 1, 12, 150, [2, 3]),
];
const KJ = [
  column('enthalpy-increment', 'kJ/mol', 1000, 1, 150, [3]),
  column('enthalpy-of-formation', 'kJ/mol', 1000, 40, 1600, [2, 3], { sign: -1 }),
  column('transition-enthalpy', 'kJ/mol', 1000, 0.8, 300, [3]),
];
const WHOLE_J = [column('enthalpy-increment', 'J/mol', 1, 900, 150000, [0, 1])];
const CAL = [
  column('entropy', 'cal_th/(mol.K)', 4.184, 4, 90, [2, 3]),
  column('enthalpy-of-formation', 'kcal_th/mol', 4184, 10, 400, [2, 3], { sign: -1 }),
];
const PER_GRAM = [
  column('entropy', 'J/(g.K)', 1, 0.3, 6, [4]),
  column('enthalpy-increment', 'kJ/kg', 1, 5, 900, [2, 3]),
];
const KELVIN = [
  column('transition-temperature', 'K', 1, 60, 3000, [1, 2]),
  column('temperature', 'K', 1, 60, 3000, [1, 2]),
];
const CELSIUS = [column('transition-temperature', 'Cel', 1, 30, 2700, [1, 2], { offset: 273.15 })];
const DEG_F = [column('transition-temperature', '[degF]', 5 / 9, 90, 4000, [1], { offset: (459.67 * 5) / 9 })];
const PASCAL = [column('pressure', 'Pa', 1, 500, 100000, [0, 1]), column('pressure', 'kPa', 1000, 1, 200, [3])];
const TORR = [column('pressure', 'mm[Hg]', 133.322387415, 5, 760, [2])];
const TRANSITION_PAIR = [
  column('transition-enthalpy', 'kJ/mol', 1000, 0.8, 300, [2, 3]),
  column('transition-entropy', 'J/(mol.K)', 1, 0.9, 140, [2, 3]),
];
const ENTROPIES = J.slice(0, 2);
const ANY = [...J, ...KJ, ...WHOLE_J, ...CAL, ...KELVIN, ...CELSIUS, ...PASCAL];

/** By the name of the slip: where it happens, and what is printed instead; null where this cell cannot hold it. */
const KINDS: Readonly<Record<string, readonly [readonly Column[], Spoiler]>> = {
  'one-digit-wrong': [ANY, ({ clean, random }) => retyped(clean, random)],
  'digits-exchanged': [ANY, ({ clean, random }) => swapped(clean, random)],
  'decimal-point-moved': [ANY, ({ clean, random }) => pointMoved(clean, random)],
  'copied-from-row-above': [ANY, ({ above, clean }) => (above === clean ? null : above)],
  'sign-lost': [[...KJ, ...CELSIUS], ({ clean }) => (clean.startsWith('-') ? clean.slice(1) : `-${clean}`)],
  'calorie-read-as-joule': [[...J, ...KJ, ...WHOLE_J], (d) => figures(d, d.truth / calorie(d.random))],
  'joule-read-as-calorie': [CAL, (d) => figures(d, d.truth * calorie(d.random))],
  'kilo-dropped': [[...WHOLE_J, ...PASCAL.slice(0, 1)], (d) => (d.truth / 1000).toFixed(d.decimals + 3)],
  'kilo-added': [[...KJ, ...PASCAL.slice(1)], (d) => (d.truth * 1000).toFixed(Math.max(0, d.decimals - 3))],
  'per-gram-read-as-per-mole': [[...J, ...KJ], (d) => figures(d, d.truth / d.molarMass, 1)],
  'per-mole-read-as-per-gram': [PER_GRAM, (d) => figures(d, d.truth * d.molarMass)],
  'celsius-read-as-kelvin': [KELVIN, (d) => figures(d, d.truth - 273.15)],
  'kelvin-read-as-celsius': [CELSIUS, (d) => figures(d, d.truth + 273.15)],
  'fahrenheit-not-converted': [KELVIN, (d) => figures(d, d.truth * 1.8 - 459.67)],
  'read-as-fahrenheit': [DEG_F, (d) => figures(d, ((d.truth + 459.67) * 5) / 9 - (d.random.unit() < 0.5 ? 273.15 : 0))],
  'atmosphere-for-bar': [ENTROPIES, (d) => figures(d, d.truth - 8.314462618 * Math.log(1.01325))],
  'enthalpy-and-entropy-exchanged': [TRANSITION_PAIR, ({ partner }) => partner],
  'in-units-of-r': [J, (d) => figures(d, d.truth / 8.314462618, 1)],
  'log10-taken-for-ln': [[...ENTROPIES, ...KJ.slice(2)], (d) => figures(d, d.truth / Math.LN10)],
  'torr-read-as-pascal': [PASCAL.slice(0, 1), (d) => figures(d, d.truth / 133.322387415, 1)],
  'pascal-read-as-torr': [TORR, (d) => figures(d, d.truth * 133.322387415)],
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
  const other = column.quantity === 'transition-entropy' ? (truth * meltingK) / 1000 : (truth * 1000) / meltingK;
  return { column, truth, decimals, clean, above, partner: other.toFixed(random.pick([2, 3])), molarMass, random };
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
  };
}

/** Printed with the column's decimals (and `more`); nobody prints a number of fewer than three figures so. */
function figures({ decimals }: Drawn, value: number, more = 0): string | null {
  const text = value.toFixed(decimals + more);
  return text.replace(/\D/g, '').replace(/^0+/, '').length < 3 ? null : text;
}

function calorie(random: Random): number {
  return random.unit() < 0.85 ? 4.184 : 4.1868;
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
