import type { Outcome } from '../../schemas/finding.js';

const GRAVER = { disagrees: 2, agrees: 1, untestable: 0 } as const;

/**
 * One outcome for each rule and place, in the order in which they were first judged: where several series or sources give one,
 * the gravest, with the largest of their smallest detectable errors.
 */
export function oneOutcomeAPlace(outcomes: readonly Outcome[]): readonly Outcome[] {
  const kept = new Map<string, Outcome>();
  for (const one of outcomes) {
    const key = `${one.rule} ${one.place}`;
    const before = kept.get(key);
    kept.set(key, before === undefined ? one : merged(before, one));
  }
  return kept.size === outcomes.length ? outcomes : [...kept.values()];
}

function merged(a: Outcome, b: Outcome): Outcome {
  const [graver, other] = GRAVER[b.outcome] > GRAVER[a.outcome] ? [b, a] : [a, b];
  const sizes = [graver.smallestDetectable, other.smallestDetectable].filter((v) => v !== null);
  return { ...graver, smallestDetectable: sizes.length === 0 ? null : Math.max(...sizes) };
}
