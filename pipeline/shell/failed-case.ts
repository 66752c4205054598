import type { ReconciledCase } from '../../schemas/checked.js';
import type { Finding } from '../../schemas/finding.js';
import { makeFinding } from '../../schemas/make-finding.js';
import type { Substance } from '../../schemas/substances.js';

/**
 * A substance whose calculation broke down: withheld, with a finding that says so. The program is at fault, not the data,
 * but what was never checked is never published.
 */
export function failedCase(substance: Substance, error: unknown): ReconciledCase {
  const message = error instanceof Error ? error.message : String(error);
  const finding = makeFinding({
    rule: 'row-readable',
    severity: 'fault',
    substance: substance.id,
    quantity: 'calculation',
    detail: { code: 'calculation-failed', message },
  });
  return withheldCase(substance, [finding]);
}

function withheldCase(substance: Substance, findings: readonly Finding[]): ReconciledCase {
  const harmonised = { substance, series: [], anchors: [], transitions: [], vapourPressures: [], findings };
  const examined = { harmonised, named: [], outcomes: [], findings, suspects: [] };
  const assembled = { examined, curves: [], crossings: [], functions: [] };
  const checked = { assembled, judged: [], outcomes: [], findings };
  return { checked, findings, outcomes: [], suspects: [], verdict: 'withheld' };
}
