import { relative } from 'node:path';
import type { ReleaseTables } from '../../schemas/release.js';
import type { Summary } from '../../schemas/summary.js';
import { concatTables, inputsTable, lossGuard, publish } from '../publish/publish.js';
import { sayFinding } from '../report/words.js';
import type { Request } from './arguments.js';
import { contentId } from './content-id.js';
import { ParquetWriter } from './duckdb.js';
import { EXIT, type ExitStatus } from './exit-status.js';
import { type Library, openLibrary } from './library.js';
import type { Log } from './log.js';
import { workThrough } from './night.js';
import type { PartitionResult } from './night-work.js';
import {
  currentRelease,
  discardDraft,
  finishDraft,
  moveCurrent,
  openDraft,
  placeDraft,
  type ReleaseDraft,
} from './release-folder.js';
import { writeWhole } from './release-tables.js';
import { CAUTION, cautionLines, generalLines, tally, verdictLines } from './summary-lines.js';
import { programVersion } from './version.js';

export interface NightSettings {
  /** Raw bytes of a partition; tests make it small. */
  readonly partitionBytes?: number;
}

/** The nightly build: read, calculate, check, publish. Ends with the status for the scheduler. */
export async function nightly(request: Request, log: Log, settings: NightSettings = {}): Promise<ExitStatus> {
  const library = await openLibrary(request, log, settings.partitionBytes);
  const version = programVersion();
  const id = contentId({
    inputs: library.inputs,
    policy: { policy: library.settings.policy, only: library.only },
    acceptances: library.acceptedOn(request.date),
    version,
  });
  const draft = await openDraft(request.out, id);
  let writer: Promise<ParquetWriter> | null = null;
  const openWriter = (): Promise<ParquetWriter> => {
    writer ??= ParquetWriter.open();
    return writer;
  };
  try {
    const work = library.work({ release: { folder: draft.folder, contentId: id }, findings: false });
    const results = await workThrough(work, request.jobs, log, openWriter);
    const made = await writeRelease(draft, library, results, await openWriter(), version, request.date);
    return await decide(request, log, draft, library, results, made);
  } finally {
    await discardDraft(draft);
    if (writer !== null) ((await writer) as ParquetWriter).close();
  }
}

interface MadeRelease {
  readonly summary: Summary;
  readonly previous: { readonly release: string; readonly summary: Summary | null } | null;
}

async function writeRelease(
  draft: ReleaseDraft,
  library: Library,
  results: readonly PartitionResult[],
  writer: ParquetWriter,
  version: string,
  date: string,
): Promise<MadeRelease> {
  const current = await currentRelease(draft.outFolder);
  const previous = current?.summary === 'unreadable' ? null : (current?.summary ?? null);
  const general = library.general(results);
  const tables = concatTables([
    smallTables(publish([], { sentence: sayFinding, general }).artefact),
    ...results.map(({ tables }) => tables!),
  ]);
  const records = await writeWhole(
    writer,
    { ...tables, inputs: inputsTable(library.inputs) },
    draft.folder,
    draft.contentId,
  );
  const summary = await finishDraft(draft, {
    version,
    date,
    inputs: library.inputs,
    records: [...results.flatMap((result) => result.records), ...records],
    substances: tables.substances!,
    previous,
  });
  return { summary, previous: current === null ? null : { release: current.release, summary: previous } };
}

/** Places the release and moves `current`, or says why not. */
async function decide(
  request: Request,
  log: Log,
  draft: ReleaseDraft,
  library: Library,
  results: readonly PartitionResult[],
  { summary, previous }: MadeRelease,
): Promise<ExitStatus> {
  const lines = results.flatMap((result) => result.lines);
  const counts = tally(lines);
  const guard = lossGuard(previous?.summary ?? null, summary, library.settings.policy.lossGuard);
  const nothing = counts.cleared + counts.flagged === 0;
  const held = !nothing && guard.held && !request.acceptLosses;
  const { folder } = await placeDraft(draft);
  if (!nothing && !held) await moveCurrent(request.out, draft.release);
  const path = relative('.', folder) || folder;
  const status = nothing
    ? EXIT.nothing
    : held
      ? EXIT.heldBack
      : request.strict && counts.withheld > 0
        ? EXIT.withheld
        : EXIT.done;
  const outcome = nothing ? 'nothing-to-publish' : held ? 'held-back' : 'published';
  const stands = previous === null ? 'There is no older release.' : `Release ${previous.release} still stands.`;
  const where = nothing
    ? [`Nothing could be published: every substance is withheld. ${stands}`, `What was found is kept in ${path}.`]
    : held
      ? [
          `Held back: ${guard.lost.length} of ${guard.clearedBefore} substances that are cleared now would be withheld. ${stands}`,
          `The new release is kept in ${path}. Mend the tables, or publish it with --accept-losses.`,
        ]
      : [`Release ${draft.release} is in ${path}, and ${relative('.', request.out) || '.'}/current leads to it.`];
  log.tell(
    {
      event: 'summary',
      outcome,
      status,
      release: draft.release,
      contentId: draft.contentId,
      folder,
      substances: lines.length,
      ...counts,
      withheldSubstances: lines.filter(({ verdict }) => verdict === 'withheld'),
      lost: held ? guard.lost : [],
      caution: CAUTION,
    },
    [...generalLines(library.general(results)), ...verdictLines(lines), '', ...where, ...cautionLines()],
  );
  return status;
}

const LARGE = ['functions', 'pieces', 'coverage'];

function smallTables(tables: ReleaseTables): Partial<ReleaseTables> {
  return Object.fromEntries(Object.entries(tables).filter(([name]) => !LARGE.includes(name)));
}
