import { join, relative } from 'node:path';
import type { ReleaseTables } from '../../schemas/release.js';
import type { Summary } from '../../schemas/summary.js';
import { concatTables, inputsTable, lossGuard, publish } from '../publish/publish.js';
import { sayFinding } from '../report/report.js';
import type { Request } from './arguments.js';
import { contentId } from './content-id.js';
import { ParquetWriter } from './duckdb.js';
import type { ExitStatus } from './exit-status.js';
import { type Library, openLibrary } from './library.js';
import type { Log } from './log.js';
import { withCrew, workThrough } from './night.js';
import type { PartitionResult } from './night-work.js';
import { outcomeOf } from './outcome.js';
import type { Crew } from './pool.js';
import {
  type CurrentRelease,
  currentRelease,
  discardDraft,
  finishDraft,
  moveCurrent,
  openDraft,
  placeDraft,
  type ReleaseDraft,
} from './release-folder.js';
import { PART_TABLES, writeWhole } from './release-tables.js';
import { CAUTION, cautionLines, generalLines, tally, verdictLines } from './summary-lines.js';
import { programIdentity } from './version.js';

export interface NightSettings {
  /** Raw bytes of a partition; tests make it small. */
  readonly partitionBytes?: number;
}

/** The nightly build: read, calculate, check, publish. Ends with the status for the scheduler. */
export function nightly(request: Request, log: Log, settings: NightSettings = {}): Promise<ExitStatus> {
  return withCrew(request, (crew) => build(request, log, settings, crew), settings.partitionBytes);
}

async function build(request: Request, log: Log, settings: NightSettings, crew: Crew | null): Promise<ExitStatus> {
  const library = openLibrary(request, log, settings.partitionBytes);
  const version = programIdentity();
  const id = contentId({
    inputs: library.inputs,
    policy: { policy: library.settings.policy, only: library.only },
    acceptances: library.inForce,
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
    const results = await workThrough(work, crew, log, openWriter);
    const made = await writeRelease(draft, library, results, await openWriter(), version, request.date);
    return await conclude(request, log, draft, library, results, made);
  } finally {
    await discardDraft(draft);
    if (writer !== null) ((await writer) as ParquetWriter).close();
  }
}

interface MadeRelease {
  readonly summary: Summary;
  readonly standing: CurrentRelease | null;
}

async function writeRelease(
  draft: ReleaseDraft,
  library: Library,
  results: readonly PartitionResult[],
  writer: ParquetWriter,
  version: string,
  date: string,
): Promise<MadeRelease> {
  const standing = await currentRelease(draft.outFolder);
  const previous = standing === null || standing.summary === 'unreadable' ? null : standing.summary;
  const general = library.general(results);
  const tables = concatTables([
    smallTables(publish([], { sentence: sayFinding, general }).artefact),
    ...results.map((result) => result.tables!),
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
  return { summary, standing };
}

/** Places the release, moves `current` or leaves it, and says which and why. */
async function conclude(
  request: Request,
  log: Log,
  draft: ReleaseDraft,
  library: Library,
  results: readonly PartitionResult[],
  { summary, standing }: MadeRelease,
): Promise<ExitStatus> {
  const lines = results.flatMap((result) => result.lines);
  const counts = tally(lines);
  const previous = standing === null || standing.summary === 'unreadable' ? null : standing.summary;
  const { folder } = await placeDraft(draft);
  const {
    kind,
    status,
    lost,
    lines: words,
  } = outcomeOf({
    ...counts,
    standing,
    substances: lines.map(({ substance }) => substance),
    limited: library.only !== null,
    guard: lossGuard(previous, summary, library.settings.policy.lossGuard),
    acceptLosses: request.acceptLosses,
    strict: request.strict,
    release: draft.release,
    path: forPeople(folder),
    current: forPeople(join(request.out, 'current')),
  });
  if (kind === 'published') await moveCurrent(request.out, draft.release);
  log.tell(
    {
      event: 'summary',
      outcome: kind,
      status,
      release: draft.release,
      contentId: draft.contentId,
      folder,
      substances: lines.length,
      ...counts,
      withheldSubstances: lines.filter(({ verdict }) => verdict === 'withheld'),
      lost,
      caution: CAUTION,
    },
    [...generalLines(library.general(results)), ...verdictLines(lines), '', ...words, ...cautionLines()],
  );
  return status;
}

/** A path as short as it can be said from here. */
function forPeople(path: string): string {
  const near = relative('.', path);
  return near === '' || near.startsWith('..') ? path : near;
}

function smallTables(tables: ReleaseTables): Partial<ReleaseTables> {
  return Object.fromEntries(
    Object.entries(tables).filter(([name]) => !(PART_TABLES as readonly string[]).includes(name)),
  );
}
