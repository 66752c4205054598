/** An error of no known kind: what every explanation has to beat. Judgement; on the scale of the slips' weights. */

const WEIGHT = 0.2;
/** It is equally likely at every order of magnitude, over this many factors of e. */
const RANGE = 15;

/** Prior density of an error of this size, either sign, per unit of it. */
export function unknownDensity(size: number): number {
  return WEIGHT / (2 * size * RANGE);
}

/**
 * Natural logarithm of the prior that an error of no known kind brings to a normalised residual w, on the scale of
 * `Explanation.score`: its density at the estimated error times the estimate's whole width.
 */
export function unknownScore(w: number): number {
  return Math.log(unknownDensity(Math.abs(w)) * Math.sqrt(2 * Math.PI));
}
