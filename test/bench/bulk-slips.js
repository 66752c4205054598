/**
 * Slips for the bulk library: one substance in a hundred gets one wrong cell of the kinds that people make. Each is well
 * above what a user would notice; how small a slip may be and still be found is the slip study's question.
 */
import { seededRandom } from './random.js';

/**
 * @typedef {object} BulkSlip
 * @property {'heat-capacity' | 'entropy' | 'enthalpy-increment' | 'formation-kcal' | 'melting-celsius' | 'boiling-celsius'} kind
 * @property {number} phase index into the phases (or of the transition)
 * @property {number} row index into the phase's rows; -1 for anchors and transitions
 * @property {(clean: string) => string} spoil printed text from clean text
 */

/** Least change of a printed cell: `share` of the value and `floor` in the printed unit. */
const LEAST = {
  'heat-capacity': { share: 0.02, floor: 0.5 },
  entropy: { share: 0.004, floor: 0.3 },
  'enthalpy-increment': { share: 0.004, floor: 0.3 },
};
const LARGEST_SHARE = 0.5;

/**
 * @param {number} seed
 * @param {number} index of the substance
 * @param {import('./bulk-substance.js').BulkSubstance} substance
 * @param {number} everyNth one substance in so many is spoilt
 * @returns {BulkSlip | null}
 */
export function bulkSlip(seed, index, substance, everyNth) {
  const block = Math.floor(index / everyNth);
  if (index !== block * everyNth + seededRandom(seed, 0x5000000 + block).integer(0, everyNth - 1)) return null;
  const random = seededRandom(seed, 0x6000000 + index);
  const kinds = substance.heatCapacityOnly
    ? ['heat-capacity', 'formation-kcal', 'melting-celsius', 'boiling-celsius']
    : ['heat-capacity', 'entropy', 'enthalpy-increment', 'formation-kcal', 'melting-celsius', 'boiling-celsius'];
  const kind = /** @type {BulkSlip['kind']} */ (random.pick(kinds));
  if (kind === 'melting-celsius' || kind === 'boiling-celsius') {
    const spoil = (clean) => (Number(clean) - 273.15).toFixed(2);
    return { kind, phase: kind === 'melting-celsius' ? 0 : 1, row: -1, spoil };
  }
  if (kind === 'formation-kcal') {
    const phases = [0, 1, 2].filter((i) => Math.abs(substance.phases[i].formationEnthalpy) > 5000);
    return { kind, phase: random.pick(phases), row: -1, spoil: (clean) => (Number(clean) / 4.184).toFixed(3) };
  }
  const phase = random.integer(0, 2);
  const row = sizeableRow(random, kind, substance.phases[phase]);
  return { kind, phase, row, spoil: (clean) => oneDigitWrong(random, clean, LEAST[kind]) };
}

/** Cp slips lie inside the table, two rows from its ends; an increment must be large enough to hold a wrong digit. */
function sizeableRow(random, kind, phase) {
  const rows = phase.temperatureK.length;
  if (kind === 'heat-capacity') return random.integer(2, rows - 3);
  for (;;) {
    const row = random.integer(0, rows - 1);
    if (kind !== 'enthalpy-increment' || Math.abs(phase.increment[row]) > 1500) return row;
  }
}

/** Changes one printed digit so that the value moves by a sizeable amount, keeping its sign and length. */
function oneDigitWrong(random, clean, least) {
  const value = Number(clean);
  const needed = Math.max(least.share * Math.abs(value), least.floor);
  const places = [...clean].flatMap((letter, place) => (letter >= '0' && letter <= '9' ? [place] : []));
  for (let attempt = 0; attempt < 1000; attempt++) {
    const place = random.pick(places);
    const spoilt = clean.slice(0, place) + random.integer(0, 9) + clean.slice(place + 1);
    const change = Math.abs(Number(spoilt) - value);
    const leadingZero = /^-?0\d/.test(spoilt);
    if (!leadingZero && change >= needed && change <= LARGEST_SHARE * Math.abs(value)) return spoilt;
  }
  return (value + Math.sign(value) * needed * 1.5).toFixed(3);
}
