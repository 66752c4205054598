/** Last stage: arranges what was found into the published tables. It computes no physics and judges nothing. */
import type { ReconciledCase } from '../../schemas/checked.js';
import type { Finding } from '../../schemas/finding.js';
import type { ReleaseTables } from '../../schemas/release.js';
import { RELEASE_TABLES } from '../../schemas/release-tables.js';
import { type AnyBuilders, buildersFor, finishTable, NumberBuilder, truncateTable } from './builders.js';
import { addFinding, addJudgement, judgementBuilders } from './judgement.js';
import { addTransitions } from './transitions.js';
import { addValues, type ValueBuilders, valueBuilders } from './values.js';

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
  const made = new Publication(settings);
  made.add(cases);
  return { artefact: made.tables(() => false), findings: [] };
}

/** The published tables as they fill, batch after batch; cleared, the same store takes the next partition. */
export class Publication {
  private readonly builders: Readonly<Record<keyof ReleaseTables, AnyBuilders>>;
  private readonly values: ValueBuilders;
  private readonly transitions = buildersFor(RELEASE_TABLES.transitions);
  private readonly judgement = judgementBuilders();

  constructor(private readonly settings: PublishSettings) {
    this.values = valueBuilders();
    const { functions, pieces, phases, provenance } = this.values;
    const { substances, findings, suspects, coverage, evidence } = this.judgement;
    const { transitions } = this;
    this.builders = {
      functions,
      pieces,
      phases,
      transitions,
      substances,
      findings,
      suspects,
      coverage,
      evidence,
      provenance,
    };
    for (const finding of settings.general ?? []) addFinding(this.judgement, finding, settings.sentence);
  }

  /** Throws where a number is none, and then holds what it held before. */
  add(cases: readonly ReconciledCase[]): void {
    const before = Object.values(this.builders).map(lengthOf);
    try {
      for (const reconciled of cases) {
        addJudgement(this.judgement, reconciled, this.settings.sentence);
        if (reconciled.verdict === 'withheld') continue;
        addValues(this.values, reconciled);
        addTransitions(this.transitions, reconciled);
      }
      Object.entries(this.builders).forEach(([name, table], k) => {
        refuseBroken(name, table, before[k]!);
      });
    } catch (error) {
      Object.values(this.builders).forEach((table, k) => {
        truncateTable(table, before[k]!);
      });
      throw error;
    }
  }

  /** The columns of tables that are `lent` are the store itself, good until the next `add` or `clear`. */
  tables(lent: (table: string) => boolean): ReleaseTables {
    return Object.fromEntries(
      Object.entries(this.builders).map(([name, table]) => [name, finishTable(table, lent(name))]),
    ) as unknown as ReleaseTables;
  }

  clear(): void {
    for (const table of Object.values(this.builders)) truncateTable(table, 0);
  }
}

function lengthOf(table: AnyBuilders): number {
  return Object.values(table)[0]?.length ?? 0;
}

function refuseBroken(name: string, table: AnyBuilders, from: number): void {
  for (const [column, made] of Object.entries(table)) {
    if (!(made instanceof NumberBuilder)) continue;
    const row = made.firstBroken(from);
    if (row >= 0) throw new Error(`broken calculation: table ${name}, column ${column} holds ${made.valueAt(row)}`);
  }
}

export { concatTable, concatTables } from './concat.js';
export { type DatapackageInput, datapackage } from './datapackage.js';
export { inputsTable } from './inputs.js';
export { type LossGuardResult, lossGuard } from './loss-guard.js';
export { type SummaryInput, summary } from './summary.js';
