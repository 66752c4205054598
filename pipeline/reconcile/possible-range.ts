/** Between what a stated number has to lie, whatever stands there now. */
import type { StatedTransition } from '../../schemas/harmonised.js';
import type { NumberQuantity } from '../../schemas/quantities.js';
import type { TableMeaning } from '../../schemas/table-meaning.js';

/** SI; the ends may be infinite. */
export type PossibleRange = readonly [low: number, high: number];

/** No table of a condensed phase or of an ideal gas goes beyond [K]. */
const HIGHEST_K = 20_000;
/** Far above the critical pressure of any substance [Pa]. */
const HIGHEST_PA = 1e9;
const ANY: PossibleRange = [Number.NEGATIVE_INFINITY, Number.POSITIVE_INFINITY];
const POSITIVE: PossibleRange = [0, Number.POSITIVE_INFINITY];

/** A transition takes up heat; temperatures, pressures, heat capacities and entropies from the third law's zero are positive. */
export function possibleRange(quantity: NumberQuantity, table: TableMeaning): PossibleRange {
  switch (quantity) {
    case 'temperature':
    case 'transition-temperature':
      return [0, HIGHEST_K];
    case 'entropy':
      return table.entropyZero === 'absolute' && table.isobarPa === null ? POSITIVE : ANY;
    case 'transition-enthalpy':
    case 'transition-entropy':
    case 'heat-capacity':
    case 'enthalpy-from-zero':
      return POSITIVE;
    case 'pressure':
      return [0, HIGHEST_PA];
    default:
      return ANY;
  }
}

/**
 * A transition lies between those that lead to its lower phase and those that lead on from its upper one [K], where they
 * are right themselves. A phase that returns (iron's bcc) has the reverse transition, which bounds nothing.
 * @param index among the transitions, -1 for none
 */
export function neighbouringTemperatures(transitions: readonly StatedTransition[], index: number): PossibleRange {
  const own = transitions[index];
  if (own === undefined) return [0, HIGHEST_K];
  const others = transitions.filter((t) => t !== own && !(t.from === own.to && t.to === own.from));
  const kelvin = (t: StatedTransition): number => t.temperature.value;
  const below = others.filter((t) => t.to === own.from).map(kelvin);
  const above = others.filter((t) => t.from === own.to).map(kelvin);
  const low = below.length === 0 ? 0 : Math.min(...below);
  const high = above.length === 0 ? HIGHEST_K : Math.max(...above);
  return low < high ? [low, high] : [0, HIGHEST_K];
}
