/** Seeded uniform and normal numbers for the synthetic substances. */
import { type Random, seededRandom } from '../slips/random.js';

export interface Chance extends Random {
  /** Mean 0, variance 1 (G. E. P. Box and M. E. Muller, Ann. Math. Stat. 29 (1958) 610). */
  normal(): number;
  /** Uniform between two numbers. */
  between(low: number, high: number): number;
  /** A whole number from `low` to `high`, both included. */
  whole(low: number, high: number): number;
}

export function chance(seed: number): Chance {
  const random = seededRandom(seed);
  return {
    ...random,
    normal: () => Math.sqrt(-2 * Math.log(1 - random.unit())) * Math.cos(2 * Math.PI * random.unit()),
    between: (low, high) => low + (high - low) * random.unit(),
    whole: (low, high) => low + Math.floor((high - low + 1) * random.unit()),
  };
}

/** A seed of its own for each pair of numbers. */
export function mixedSeed(seed: number, index: number): number {
  return (Math.imul(seed, 0x85ebca6b) ^ Math.imul(index + 1, 0xc2b2ae35)) >>> 0;
}
