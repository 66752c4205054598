import type { LevelError } from './error-sum.js';

const SIZE = 'gas imperfection';
const SLOPE = 'slope of the gas imperfection';

/** B falls about as 1/T^3 near boiling: the departure of H errs by four times that of G, the departure of S by three over T. */
const OF_ENTHALPY = 4;
const OF_ENTROPY = 3;
/** What that power may be off by: a standard uncertainty of the departure of H, in units of that of G; judgement. */
const OPEN = 1.5;

/**
 * What h H + s S of a gas owes to its imperfection, u being the standard uncertainty of its term in G [J/mol]: one error of
 * size, common to G, H and S, and one of how it changes with temperature, which G does not see. Every gas term of a substance
 * rests on one second virial coefficient, so that they go by two keys; `by` is signed, `u` 1.
 */
export function imperfection(u: number, h: number, s: number, temperatureK: number): LevelError[] {
  if (u === 0) return [];
  return [
    { key: SIZE, by: u * (OF_ENTHALPY * h + (OF_ENTROPY * s) / temperatureK), u: 1 },
    { key: SLOPE, by: u * OPEN * (h + s / temperatureK), u: 1 },
  ];
}
