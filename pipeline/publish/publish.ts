/** Last stage: arranges what was found into the published tables. It computes no physics and judges nothing. */
import type { ReconciledCase } from '../../schemas/checked.js';
import type { Finding } from '../../schemas/finding.js';
import type { ReleaseTables } from '../../schemas/release.js';
import { RELEASE_TABLES } from '../../schemas/release-tables.js';
import { buildersFor, finishTable } from './builders.js';
import { addFinding, addJudgement, judgementBuilders } from './judgement.js';
import { addTransitions } from './transitions.js';
import { addValues, valueBuilders } from './values.js';

export interface PublishSettings {
  /** Words for the `message` column. */
  readonly sentence: (finding: Finding) => string;
  /** Findings that belong to no substance; they come first. */
  readonly general?: readonly Finding[];
}

/** Substances in the order given, phases in the order of their curves; withheld ones without values. */
export function publish(
  cases: readonly ReconciledCase[],
  settings: PublishSettings,
): { artefact: ReleaseTables; findings: readonly Finding[] } {
  const values = valueBuilders(cases.filter(({ verdict }) => verdict !== 'withheld'));
  const transitions = buildersFor(RELEASE_TABLES.transitions);
  const judgement = judgementBuilders();
  for (const finding of settings.general ?? []) addFinding(judgement, finding, settings.sentence);
  for (const reconciled of cases) {
    addJudgement(judgement, reconciled, settings.sentence);
    if (reconciled.verdict === 'withheld') continue;
    addValues(values, reconciled);
    addTransitions(transitions, reconciled);
  }
  const artefact = {
    functions: finishTable(values.functions),
    pieces: finishTable(values.pieces),
    phases: finishTable(values.phases),
    transitions: finishTable(transitions),
    substances: finishTable(judgement.substances),
    findings: finishTable(judgement.findings),
    suspects: finishTable(judgement.suspects),
    coverage: finishTable(judgement.coverage),
    evidence: finishTable(judgement.evidence),
    provenance: finishTable(values.provenance),
  };
  return { artefact, findings: [] };
}

export { concatTable, concatTables } from './concat.js';
export { type DatapackageInput, datapackage } from './datapackage.js';
export { inputsTable } from './inputs.js';
export { type LossGuardResult, lossGuard } from './loss-guard.js';
export { type SummaryInput, summary } from './summary.js';
