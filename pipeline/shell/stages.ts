import type { Acceptance } from '../../schemas/accepted.js';
import type { CheckedCase, ExaminedCase, ReconciledCase } from '../../schemas/checked.js';
import type { AssembledCase } from '../../schemas/curves.js';
import type { Finding } from '../../schemas/finding.js';
import type { HarmonisedCase } from '../../schemas/harmonised.js';
import type { Policy } from '../../schemas/policy.js';
import type { RawCase } from '../../schemas/raw.js';
import { assemble } from '../assemble/assemble.js';
import { checkCurves, examine } from '../check/check.js';
import { harmonise } from '../harmonise/harmonise.js';
import { type IngestInput, ingest } from '../ingest/ingest.js';
import { reconcile } from '../reconcile/reconcile.js';
import { accountForAll } from './account-for-all.js';

export interface StageSettings {
  readonly policy: Policy;
  readonly accepted: readonly Acceptance[];
  /** YYYY-MM-DD. */
  readonly date: string;
  /** Findings about substances from before their tables are read: rows of substances.csv. */
  readonly listed: ReadonlyMap<string, readonly Finding[]>;
}

interface Result<Artefact> {
  readonly artefact: Artefact;
  readonly findings: readonly Finding[];
}

export interface Stage<Before, After> {
  readonly name: string;
  readonly run: (artefact: Before, settings: StageSettings) => Result<After>;
}

function stage<Before, After>(name: string, run: Stage<Before, After>['run']): Stage<Before, After> {
  return { name, run };
}

/** The stages in their order, from the bytes of tables to verdicts. Publishing follows, a batch at a time. */
export const STAGES = [
  stage('ingest', (input: IngestInput) => ingest(input)),
  stage('account for every substance', (cases: readonly RawCase[], settings) => accountForAll(cases, settings)),
  stage('harmonise', (cases: readonly RawCase[], { policy }) => harmonise(cases, { policy })),
  stage('examine the tables', (cases: readonly HarmonisedCase[], { policy }) => examine(cases, { policy })),
  stage('assemble', (cases: readonly ExaminedCase[], { policy }) => assemble(cases, { policy })),
  stage('check the curves', (cases: readonly AssembledCase[], { policy }) => checkCurves(cases, { policy })),
  stage('reconcile', (cases: readonly CheckedCase[], settings) => reconcile(cases, settings)),
] as const;

/** Each stage takes what the one before it hands on: a chain that does not fit does not compile. */
type Fits<Chain extends readonly unknown[]> = Chain extends readonly [
  Stage<never, infer After>,
  infer Next extends Stage<never, unknown>,
  ...infer Rest,
]
  ? After extends Parameters<Next['run']>[0]
    ? Fits<readonly [Next, ...Rest]>
    : false
  : true;
true satisfies Fits<typeof STAGES>;

/** All stages on one batch. Findings of the stages that belong to no substance come beside the cases. */
export function runStages(input: IngestInput, settings: StageSettings): Result<readonly ReconciledCase[]> {
  let artefact: unknown = input;
  const findings: Finding[] = [];
  for (const { run } of STAGES as readonly Stage<never, unknown>[]) {
    const result = run(artefact as never, settings);
    artefact = result.artefact;
    for (const finding of result.findings) if (finding.substance === '') findings.push(finding);
  }
  return { artefact: artefact as readonly ReconciledCase[], findings };
}
