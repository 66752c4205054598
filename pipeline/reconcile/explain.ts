/** What probably happened to a suspect cell: the usual slips that lead to the value proposed for it. */
import { printCandidate, readCell } from './slips/cell.js';
import type { Candidate, SuspectContext } from './slips/slip.js';
import { unknownDensity } from './slips/unknown-error.js';
import { USUAL_SLIPS } from './slips/usual-slips.js';

export type { PrintedCell, SuspectContext } from './slips/slip.js';

export interface Explanation {
  /** One of `SLIP_CODES`. */
  readonly slip: string;
  /** What the slip says was meant [SI]. */
  readonly corrected: number;
  /** As it would stand in the column. */
  readonly correctedPrinted: string;
  /** Natural logarithm of the prior less half of chi squared; differences count. */
  readonly score: number;
}

export const SLIP_CODES: readonly string[] = USUAL_SLIPS.map((slip) => slip.code);

/** Slips that only ever befall several cells at once. */
export const MANY_CELL_CODES: readonly string[] = ['from-and-to-exchanged'];

/**
 * The usual slips whose corrected value meets `proposed` within the larger of two standard uncertainties (the rounding of
 * the corrected value included) and `material`, best first; empty where none does. All in SI.
 *
 * score = ln(weight * share) - d^2 / (2 s^2) - ln(s / s0), with d = corrected - proposed, s^2 = uProposed^2 + the rounding
 * of the printed digits carried to the corrected value, s0 that of digits left as they are: a kind with many candidates
 * shares its prior among them, and a vague candidate (kilojoules of two digits) counts for less than a sharp one.
 *
 * A candidate that an error of no known kind would beat is left out: with nine values for each digit some of them lie
 * near any proposal.
 * @param uProposed standard uncertainty of `proposed`
 * @param material what a user of the value would notice
 */
export function explain(
  context: SuspectContext,
  proposed: number,
  uProposed: number,
  material: number,
): readonly Explanation[] {
  const cell = readCell(context);
  if (cell === null || !Number.isFinite(proposed) || !Number.isFinite(uProposed)) return [];
  const needed = Math.abs(proposed - cell.observed);
  if (needed <= 2 * uProposed) return [];
  const rounding = (step: number): number => (step * Math.abs(cell.factor)) / Math.sqrt(12);
  const usualSpread = Math.hypot(uProposed, rounding(cell.lastPlace));
  const best = new Map<string, Explanation>();
  for (const slip of USUAL_SLIPS) {
    for (const candidate of slip.propose(cell, proposed)) {
      const corrected = cell.toSi(candidate.value);
      const distance = Math.abs(corrected - proposed);
      const spread = Math.hypot(uProposed, rounding(candidate.step));
      const allowed = Math.max(2 * spread, material);
      if (!(distance <= allowed)) continue;
      const prior = slip.weight * candidate.share;
      if (!beatsChance(candidate, prior, distance, spread, material, needed)) continue;
      const score = Math.log(prior) - 0.5 * (distance / spread) ** 2 - Math.log(spread / usualSpread);
      const correctedPrinted = printCandidate(cell, candidate);
      const key = `${slip.code} ${correctedPrinted}`;
      const known = best.get(key);
      if (known !== undefined && known.score >= score) continue;
      best.set(key, { slip: slip.code, corrected, correctedPrinted, score });
    }
  }
  return [...best.values()].sort((a, b) => b.score - a.score);
}

/** Share of proposals that are wrong by more than they say, by up to the material limit. */
const LOOSE_SHARE = 0.05;

/**
 * Whether the slip makes the proposal likelier than an error of no known kind does: prior * p(proposed | slip) against
 * the density of such errors.
 */
function beatsChance(
  candidate: Candidate,
  prior: number,
  distance: number,
  spread: number,
  material: number,
  needed: number,
): boolean {
  if (candidate.told === true) return true;
  const sharp = Math.exp(-0.5 * (distance / spread) ** 2) / (spread * Math.sqrt(2 * Math.PI));
  const loose = distance <= material ? 1 / (2 * material) : 0;
  return prior * ((1 - LOOSE_SHARE) * sharp + LOOSE_SHARE * loose) > unknownDensity(needed);
}
