import type { CheckedCase } from '../../schemas/checked.js';
import type { Finding, Suspect } from '../../schemas/finding.js';
import type { HarmonisedCase } from '../../schemas/harmonised.js';
import type { Policy } from '../../schemas/policy.js';
import type { NumberQuantity } from '../../schemas/quantities.js';
import { DIGIT_CODES, type Explanation, explain, isNominal, outside, type SuspectContext } from './explain.js';
import { noticeablePressurePa } from './noticeable-pressure.js';
import { unknownScore } from './slips/unknown-error.js';
import { suspectContext } from './suspect-context.js';
import { usualSize } from './usual-size.js';

/** Suspects with the usual slip that leads to their proposed value, where one does. */
export function explained(checked: CheckedCase, suspects: readonly Suspect[], policy: Policy): Suspect[] {
  const substance = checked.assembled.examined.harmonised;
  return suspects.map((suspect) => {
    // A whole column has its law already.
    if (suspect.cells > 1) return suspect;
    const best = explanationOf(substance, suspect, policy);
    return best === null ? suspect : { ...suspect, explanation: best.slip, explainedPrinted: best.correctedPrinted };
  });
}

/** The best explanation of one cell, with the score that `orderedByExplanation` asks for; null where none is usual. */
export function explanationOf(
  substance: HarmonisedCase,
  suspect: Pick<Suspect, 'address' | 'proposed' | 'uProposed'>,
  policy: Policy,
): Explanation | null {
  const found = suspectContext(substance, suspect);
  return found === null ? null : (explanationsIn(found, suspect, policy)[0] ?? null);
}

function explanationsIn(
  found: SuspectContext,
  { proposed, uProposed }: Pick<Suspect, 'proposed' | 'uProposed'>,
  policy: Policy,
): readonly Explanation[] {
  return explain(found, proposed, uProposed, noticeableChange(found, proposed, policy));
}

/** Findings that name a cell take their first suspect's explanation. */
export function withExplanations(findings: readonly Finding[], suspects: readonly Suspect[]): Finding[] {
  return findings.map((finding) => {
    if (finding.detail.code !== 'cell') return finding;
    const first = suspects.find((s) => s.finding === finding.id && s.place === 1);
    if (first === undefined || first.explanation === null) return finding;
    return { ...finding, detail: { ...finding.detail, explanation: first.explanation } };
  });
}

/**
 * What `orderedByExplanation` weighs a suspect by: its best explanation's score, or an unknown error's, and how usual the
 * size of the proposed value is; far below all that where the value cannot be (a negative entropy). Null where the suspect
 * is no single printed number, and for a transition's nominal pressure that no usual slip explains: of its few digits one
 * meets whatever a temperature or an enthalpy does, so that a wrong one counts only where it stands `alone`.
 */
export function scoreInGroup(
  substance: HarmonisedCase,
  suspect: Pick<Suspect, 'address' | 'proposed' | 'uProposed'>,
  policy: Policy,
  alone = false,
): number | null {
  const found = suspectContext(substance, suspect);
  if (found === null) return null;
  const { proposed, uProposed } = suspect;
  const counts = ({ slip }: Explanation): boolean => alone || !isNominal(found) || !DIGIT_CODES.includes(slip);
  const explanation = explanationsIn(found, suspect, policy).find(counts);
  if (explanation === undefined && isNominal(found)) return null;
  if (outside(found, proposed, uProposed)) return IMPOSSIBLE_SCORE;
  const w = (proposed - found.observed) / uProposed;
  const score = explanation?.score ?? unknownScore(Number.isFinite(w) && w !== 0 ? w : 1);
  const { quantity, temperatureK, gas, transition = -1 } = found;
  const size = usualSize(quantity, proposed, uProposed, { temperatureK, gas, transition }, substance);
  // Zero is the definition of a reference state, and no number that somebody got wrong.
  const defined = found.observed === 0 && isFormation(quantity) ? Math.log(WRONG_ZERO_SHARE) : 0;
  return score + size + defined;
}

const IMPOSSIBLE_SCORE = -1e6;
/** Of formation quantities that are printed as 0, those that should not be. */
const WRONG_ZERO_SHARE = 0.02;

const isFormation = (quantity: NumberQuantity): boolean =>
  quantity === 'enthalpy-of-formation' || quantity === 'gibbs-energy-of-formation';

/** What a user of the proposed value would notice, by the cell's quantity [SI]. */
function noticeableChange(context: SuspectContext, proposed: number, policy: Policy): number {
  const { material } = policy;
  const t = context.temperatureK ?? 298.15;
  switch (context.quantity) {
    case 'temperature':
    case 'transition-temperature':
      return material.transitionTemperatureK;
    case 'transition-enthalpy':
      return (material.transitionTemperatureK * Math.abs(proposed)) / t;
    case 'heat-capacity':
      return material.heatCapacityRelative * Math.abs(proposed);
    case 'entropy':
    case 'transition-entropy':
    case 'gibbs-function':
      return material.entropyJPerMolK;
    case 'pressure':
      return noticeablePressurePa(proposed, t, policy);
    default:
      return material.enthalpyJPerMol;
  }
}
