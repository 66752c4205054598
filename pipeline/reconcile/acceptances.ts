import type { Acceptance } from '../../schemas/accepted.js';
import type { Finding } from '../../schemas/finding.js';
import { makeFinding } from '../../schemas/make-finding.js';

/**
 * Marks accepted findings. An entry lapses when the evidence behind its finding changed or its last day is over; that is
 * said in a note. What follows from an accepted finding is accepted with it.
 */
export function acceptedOf(
  findings: readonly Finding[],
  settings: { readonly accepted: readonly Acceptance[]; readonly date: string },
): { findings: readonly Finding[]; lapsed: readonly Finding[] } {
  if (settings.accepted.length === 0) return { findings, lapsed: [] };
  const lapsed: Finding[] = [];
  const taken = new Set<string>();
  for (const f of findings) {
    for (const entry of settings.accepted) {
      if (entry.finding !== f.id || settings.date < entry.date) continue;
      const changed = entry.evidenceHash !== f.evidenceHash;
      const over = settings.date > entry.until;
      if (!changed && !over) {
        taken.add(f.id);
        continue;
      }
      lapsed.push(
        makeFinding({
          rule: f.rule,
          severity: 'note',
          substance: f.substance,
          fromPhase: f.fromPhase,
          toPhase: f.toPhase,
          address: f.address,
          quantity: `acceptance ${entry.finding}`,
          detail: {
            code: 'reading',
            problem: 'acceptance-lapsed',
            read: changed ? `evidence ${f.evidenceHash}` : `the date ${settings.date}`,
            wanted: changed ? `evidence ${entry.evidenceHash}, as accepted` : `a date up to ${entry.until}`,
            remedy: 'look at the finding again and accept it anew, or correct the cell',
          },
        }),
      );
    }
  }
  if (taken.size === 0 && lapsed.length === 0) return { findings, lapsed };
  return {
    findings: [
      ...findings.map((f) =>
        taken.has(f.id) || (f.cause !== null && taken.has(f.cause)) ? { ...f, accepted: true } : f,
      ),
      ...lapsed,
    ],
    lapsed: [],
  };
}
