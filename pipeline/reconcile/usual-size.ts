/** How usual a stated number's size is: what tells two suspects apart that the conditions cannot. */
import type { HarmonisedCase } from '../../schemas/harmonised.js';
import type { NumberQuantity } from '../../schemas/quantities.js';
import { neighbouringTemperatures } from './possible-range.js';

interface Usual {
  readonly middle: number;
  /** Standard deviation of the logarithm. */
  readonly spread: number;
}

/** Trouton (1884) for vaporization; Richards (1897) and what organic crystals and solid-solid transitions do, very roughly. */
const VAPORIZATION: Usual = { middle: 90, spread: 0.35 };
const CONDENSED: Usual = { middle: 15, spread: 1.3 };
const TEMPERATURE: Usual = { middle: 700, spread: 1.2 };
/** Logarithm of the least share that a size is left with: rules of thumb decide nothing alone. */
const LEAST = -12;
/** Of a temperature beyond the transitions before and after: one of those may be the wrong one. */
const OUT_OF_ORDER = -5;

/**
 * Natural logarithm, 0 where the size is the most usual one.
 * @param temperatureK of the transition as stated
 * @param transition its index among the substance's, -1 where the number belongs to none
 */
export function usualSize(
  quantity: NumberQuantity,
  value: number,
  u: number,
  { temperatureK, gas, transition }: { temperatureK: number | null; gas: boolean; transition: number },
  substance: HarmonisedCase,
): number {
  const entropy = gas ? VAPORIZATION : CONDENSED;
  switch (quantity) {
    case 'transition-entropy':
      return against(entropy, value);
    case 'transition-enthalpy':
      return temperatureK !== null && temperatureK > 0 ? against(entropy, value / temperatureK) : 0;
    case 'transition-temperature': {
      const [low, high] = neighbouringTemperatures(substance.transitions, transition);
      const order = value + 3 * u < low || value - 3 * u > high ? OUT_OF_ORDER : 0;
      return Math.max(LEAST, against(TEMPERATURE, value) + order);
    }
    default:
      return 0;
  }
}

function against({ middle, spread }: Usual, value: number): number {
  return value > 0 ? Math.max(LEAST, -0.5 * (Math.log(value / middle) / spread) ** 2) : LEAST;
}
