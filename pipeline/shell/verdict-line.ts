import type { ReconciledCase } from '../../schemas/checked.js';
import type { Verdict } from '../../schemas/summary.js';
import { sayReason } from '../report/report.js';

/** What the night's summary says about one substance; plain data, as a worker hands it back. */
export interface VerdictLine {
  readonly substance: string;
  readonly verdict: Verdict;
  /** '' for a cleared one. */
  readonly reason: string;
}

export function verdictLine({ checked, findings, suspects, verdict }: ReconciledCase): VerdictLine {
  return {
    substance: checked.assembled.examined.harmonised.substance.id,
    verdict,
    reason: verdict === 'cleared' ? '' : sayReason(findings, suspects),
  };
}
