/** What probably happened to a suspect cell: the usual slips that lead to the value proposed for it. */
import { printCandidate, readCell } from './slips/cell.js';
import type { Candidate, SuspectContext } from './slips/slip.js';
import { unknownDensity } from './slips/unknown-error.js';
import { NOMINAL_PRESSURE_SLIPS, USUAL_SLIPS } from './slips/usual-slips.js';

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

export const DIGIT_CODES: readonly string[] = USUAL_SLIPS.filter((slip) => slip.ofDigits).map((slip) => slip.code);

/**
 * The usual slips whose corrected value meets `proposed` within the larger of two standard uncertainties (the rounding of
 * the corrected value included) and `material`, best first; empty where none does. All in SI.
 *
 * score = ln(prior * density * s0 * sqrt(2 pi)): the prior is weight * share, so that a kind with many candidates shares
 * its own among them; the density is normal with s^2 = uProposed^2 + the rounding of the printed digits carried to the
 * corrected value, so that a vague candidate (kilojoules of two digits) counts for less than a sharp one; s0 is that of
 * digits left as they are. Near its middle that is log prior - chi^2/2. A small share of the density lies flat over the
 * material limit, or over `FAR_SHARE` of a large correction or value: a second error in the substance, or a condition that is not
 * quite linear, puts the proposal off by more than its u says.
 *
 * A candidate that an error of no known kind would beat is left out: with nine values for each digit some of them lie
 * near any proposal. Of a transition's pressure, which is nominal, the digits bound nothing and few slips are tried.
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
  const nominal = isNominal(context);
  for (const slip of nominal ? NOMINAL_PRESSURE_SLIPS : USUAL_SLIPS) {
    const loose = Math.max(material, slip.ofDigits === true ? 0 : FAR_SHARE * Math.min(needed, Math.abs(proposed)));
    for (const proposal of slip.propose(cell, proposed)) {
      const candidate = nominal ? exact(proposal) : proposal;
      const corrected = cell.toSi(candidate.value);
      if (nominal && Math.abs(Math.log(corrected / cell.observed)) < LEAST_NOMINAL_STEP) continue;
      const distance = Math.abs(corrected - proposed);
      const spread = Math.hypot(uProposed, rounding(candidate.step));
      // It has to explain more of the correction than it leaves.
      const allowed = Math.min(Math.max(2 * spread, loose), needed / 2);
      if (!(distance <= allowed) || outside(context, corrected, spread)) continue;
      const least = Math.min(Math.max(2 * spread, material), 0.1 * Math.abs(cell.observed));
      const nothingLeft = Math.abs(corrected) <= least && corrected !== 0;
      const weight = slip.weight * candidate.share * (nothingLeft ? NOTHING_LEFT_SHARE : 1);
      const likely = weight * density(distance, spread, loose);
      if (candidate.told !== true && likely <= unknownDensity(needed)) continue;
      const score = Math.log(likely * usualSpread * Math.sqrt(2 * Math.PI));
      const correctedPrinted = printCandidate(cell, candidate);
      const key = `${slip.code} ${correctedPrinted}`;
      const known = best.get(key);
      if (known !== undefined && known.score >= score) continue;
      best.set(key, { slip: slip.code, corrected, correctedPrinted, score });
    }
  }
  return [...best.values()].sort((a, b) => b.score - a.score);
}

/** A pressure that a transition is stated at, not a measured one. */
export function isNominal({ quantity, transition = -1 }: SuspectContext): boolean {
  return quantity === 'pressure' && transition >= 0;
}

/** Of ln p: an atmosphere for a bar, 0.013, is within what else may be wrong. */
const LEAST_NOMINAL_STEP = 0.1;

/** 1 bar is 100 000 Pa to the last digit. */
function exact(candidate: Candidate): Candidate {
  return { ...candidate, step: 1e-6 * Math.abs(candidate.value) };
}

/** Whether a value lies where none can, by more than three of its standard uncertainties. */
export function outside({ possible, quantity }: SuspectContext, value: number, u: number): boolean {
  if (possible === undefined) return false;
  const [low, high] = possible;
  // A pressure is known by its logarithm, and its u is that times the pressure.
  if (quantity === 'pressure' && value > 0) return Math.log(value) - (3 * u) / value > Math.log(high);
  return value + 3 * u < low || value - 3 * u > high;
}

/** Share of proposals that are wrong by more than they say, and how far: this share of the correction. */
const LOOSE_SHARE = 0.05;
const FAR_SHARE = 0.02;
/** A value that cannot be told from 0 is met by every factor that is small enough. */
const NOTHING_LEFT_SHARE = 0.05;

/** Of the proposal at `distance` from what the slip says was meant. */
function density(distance: number, spread: number, loose: number): number {
  const sharp = Math.exp(-0.5 * (distance / spread) ** 2) / (spread * Math.sqrt(2 * Math.PI));
  return (1 - LOOSE_SHARE) * sharp + (distance <= loose ? LOOSE_SHARE / (2 * loose) : 0);
}
