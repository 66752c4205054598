import type { ReconciledCase } from '../../schemas/checked.js';
import type { ColumnTable } from '../../schemas/columns.js';
import type { FileRecord } from '../../schemas/contents.js';
import type { Finding, Suspect } from '../../schemas/finding.js';
import type { ReleaseTables, TableName } from '../../schemas/release.js';
import type { Substance } from '../../schemas/substances.js';
import { emptyRoom } from '../core/numeric/room.js';
import { type IngestPart, selectRuns } from '../ingest/ingest.js';
import { Publication } from '../publish/publish.js';
import { sayFinding } from '../report/report.js';
import type { ParquetWriter } from './duckdb.js';
import { failedCase } from './failed-case.js';
import { PART_TABLES, writePart } from './release-tables.js';
import { runStages, type StageSettings } from './stages.js';
import { type VerdictLine, verdictLine } from './verdict-line.js';

/** Substances that go through the stages together: enough to be quick, few enough to bound memory. */
const BATCH = 64;

/** The whole night's work as plain data, so that a worker can be given it; bytes of files are shared, not copied. */
export interface NightWork {
  readonly substances: readonly Substance[];
  readonly parts: readonly IngestPart[];
  readonly settings: StageSettings;
  readonly partitions: readonly { readonly from: number; readonly to: number }[];
  /** 1 where the substance is wanted; null: all are. */
  readonly wanted: Uint8Array | null;
  /** Where the parts of the large tables go; null: nothing is written. */
  readonly release: { readonly folder: string; readonly contentId: string } | null;
  /** Hand back every finding, for people to read. */
  readonly findings: boolean;
}

export interface PartitionResult {
  readonly lines: readonly VerdictLine[];
  /** Findings that belong to no substance. */
  readonly general: readonly Finding[];
  readonly said: readonly FoundOut[];
  /** The tables that are not written in parts; null where nothing is published. */
  readonly tables: Partial<ReleaseTables> | null;
  readonly records: readonly FileRecord[];
}

/** What was found about one substance. */
export interface FoundOut {
  readonly substance: string;
  readonly findings: readonly Finding[];
  readonly suspects: readonly Suspect[];
}

/** One partition from bytes to parts. The writer is asked for only when there is something to write. */
export async function workPartition(
  work: NightWork,
  index: number,
  openWriter: () => Promise<ParquetWriter>,
  onProgress: (done: number) => void,
): Promise<PartitionResult> {
  const { from, to } = work.partitions[index]!;
  const parts = narrow(work.parts, from, to);
  const lines: VerdictLine[] = [];
  const said: FoundOut[] = [];
  const general = new Map<string, Finding>();
  publication.clear();
  for (const batch of batches(from, to, work.wanted)) {
    const judged = judge(work, parts, batch.from, batch.to);
    for (const finding of judged.findings) general.set(finding.id, finding);
    for (const one of work.release === null ? judged.cases : publishSafely(judged.cases)) {
      lines.push(verdictLine(one));
      if (work.findings) said.push(foundOut(one));
    }
    onProgress(batch.to - batch.from);
    // What is kept of a batch are findings, lines and published columns: none of its own arrays.
    emptyRoom();
  }
  const { large, small } = split(work.release === null ? null : publication);
  const records =
    work.release === null
      ? []
      : await writePart(
          await openWriter(),
          large,
          work.release.folder,
          index,
          work.partitions.length,
          work.release.contentId,
        );
  return { lines, said, general: [...general.values()], tables: small, records };
}

/** Verdicts of the substances `from` up to `to`; one that breaks the calculation is withheld alone. */
export function judge(
  work: Pick<NightWork, 'substances' | 'settings'>,
  parts: readonly IngestPart[],
  from: number,
  to: number,
): { readonly cases: readonly ReconciledCase[]; readonly findings: readonly Finding[] } {
  try {
    const { artefact, findings } = runStages(
      { substances: work.substances.slice(from, to), first: from, parts: narrow(parts, from, to) },
      work.settings,
    );
    return { cases: artefact, findings };
  } catch (error) {
    if (to - from === 1) return { cases: [failedCase(work.substances[from]!, error)], findings: [] };
    const alone = Array.from({ length: to - from }, (_, i) => judge(work, parts, from + i, from + i + 1));
    return { cases: alone.flatMap(({ cases }) => cases), findings: alone.flatMap(({ findings }) => findings) };
  }
}

/** One store for all partitions of this thread: used memory is cheaper than fresh. */
const publication = new Publication({ sentence: sayFinding });

/** Adds a batch to the published tables; a substance whose numbers are none is withheld before it reaches a file. */
function publishSafely(cases: readonly ReconciledCase[]): readonly ReconciledCase[] {
  try {
    publication.add(cases);
    return cases;
  } catch (error) {
    if (cases.length > 1) return cases.flatMap((one) => publishSafely([one]));
    const failed = [failedCase(cases[0]!.checked.assembled.examined.harmonised.substance, error)];
    publication.add(failed);
    return failed;
  }
}

function foundOut({ checked, findings, suspects }: ReconciledCase): FoundOut {
  return { substance: checked.assembled.examined.harmonised.substance.id, findings, suspects };
}

function narrow(parts: readonly IngestPart[], from: number, to: number): IngestPart[] {
  return parts.map((part) => ({ ...part, index: selectRuns(part.index, from, to) }));
}

/** Stretches of wanted substances, at most `BATCH` long. */
function* batches(from: number, to: number, wanted: Uint8Array | null): Generator<{ from: number; to: number }> {
  let start = from;
  while (start < to) {
    if (wanted !== null && wanted[start] === 0) {
      start++;
      continue;
    }
    let end = start + 1;
    while (end < to && end - start < BATCH && (wanted === null || wanted[end] === 1)) end++;
    yield { from: start, to: end };
    start = end;
  }
}

/** The large tables go into this partition's parts, the small ones back to where all are joined. */
function split(filled: Publication | null): {
  readonly large: Partial<Record<TableName, ColumnTable>>;
  readonly small: Partial<ReleaseTables> | null;
} {
  if (filled === null) return { large: {}, small: null };
  const isLarge = (name: string): boolean => (PART_TABLES as readonly string[]).includes(name);
  const tables = Object.entries(filled.tables(isLarge));
  const pick = (keep: (name: string) => boolean) => Object.fromEntries(tables.filter(([name]) => keep(name)));
  return { large: pick(isLarge), small: pick((name) => !isLarge(name)) };
}
