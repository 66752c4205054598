/** Which of the suspects that the conditions cannot tell apart is the most probable, when some have an explanation. */
import { unknownScore } from './slips/unknown-error.js';

export interface GroupMember {
  /** Square of the normalised residual: what chi squared falls by with this datum set free. */
  readonly wSquared: number;
  /** `Explanation.score` of its best explanation; null where it has none. */
  readonly score: number | null;
}

/**
 * Places of the members in `members`, most probable first, by log prior - chi^2/2. Setting a member free leaves a chi
 * squared of w^2 less than the whole, so that w^2/2 counts for it; an explained one brings its slip's prior and how well
 * the slip meets the proposed value, an unexplained one the weight of an error of no known kind. That is worth more than
 * any one wrong digit meets by chance, and some units of chi squared less than a slip of unit, sign or exchange.
 * Equally probable members keep their order.
 */
export function orderedByExplanation(members: readonly GroupMember[]): number[] {
  const probability = members.map(logProbability);
  return members.map((_, place) => place).sort((a, b) => probability[b] - probability[a] || a - b);
}

/** Natural logarithm, up to what the members of one group have in common. */
export function logProbability({ wSquared, score }: GroupMember): number {
  return wSquared / 2 + (score ?? unknownScore(Math.sqrt(wSquared)));
}
