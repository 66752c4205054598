/**
 * The folder of releases: `out/releases/<release>/`, and `out/current`, a link to the one that stands. A release is made
 * in a draft beside the others, moved to its name whole, and only then does `current` move, by one rename. What is cut
 * short leaves a draft, whose name begins with a dot; the next run clears it away.
 */
import { randomBytes } from 'node:crypto';
import { lstat, mkdir, readdir, readFile, readlink, rename, rm, symlink, writeFile } from 'node:fs/promises';
import { basename, dirname, join } from 'node:path';
import pLimit from 'p-limit';
import type { ColumnTable } from '../../schemas/columns.js';
import type { Contents, FileRecord, InputFile } from '../../schemas/contents.js';
import { TABLE_NAMES, type TableName } from '../../schemas/release.js';
import { type Summary, summarySchema } from '../../schemas/summary.js';
import { type DatapackageInput, datapackage, summary } from '../publish/publish.js';
import { releaseName } from './content-id.js';
import { filesIn, recordOf, sync } from './file-records.js';
import { tableOfFile } from './release-tables.js';
import { verifyRelease } from './verify.js';

export interface ReleaseDraft {
  readonly outFolder: string;
  readonly contentId: string;
  readonly release: string;
  /** Where the files of the release are to be written. */
  readonly folder: string;
}

const liveDrafts = new Set<string>();

/** Clears away what earlier runs left unfinished and makes an empty draft. */
export async function openDraft(outFolder: string, contentId: string): Promise<ReleaseDraft> {
  const releases = join(outFolder, 'releases');
  await mkdir(releases, { recursive: true });
  await clearUnfinished(outFolder);
  const folder = join(releases, unfinishedName('draft'));
  await mkdir(folder);
  liveDrafts.add(folder);
  return { outFolder, contentId, release: releaseName(contentId), folder };
}

export interface FinishInput {
  readonly version: string;
  /** ISO 8601 day. */
  readonly date: string;
  readonly inputs: readonly InputFile[];
  /** What the writers recorded; files in the draft without a record are hashed here. */
  readonly records: readonly FileRecord[];
  readonly substances: ColumnTable;
  /** Summary of the release that stands. */
  readonly previous: Summary | null;
}

/** Writes `datapackage.json`, `summary.json` and `contents.json`, and waits until all is on the disk. */
export async function finishDraft(draft: ReleaseDraft, input: FinishInput): Promise<Summary> {
  const { folder, contentId, release } = draft;
  const { version, date, inputs, substances, previous } = input;
  const records = new Map(input.records.map((record) => [record.path, record]));
  const files = tableFiles(input.records);
  const made = summary({ release, contentId, version, date, substances, rows: rowsByTable(input.records), previous });
  await writeJson(folder, 'datapackage.json', datapackage({ contentId, version, files, inputs }));
  await writeJson(folder, 'summary.json', made);
  for (const path of await filesIn(folder)) {
    if (!records.has(path)) records.set(path, await recordOf(folder, path, null));
  }
  const contents: Contents = {
    release,
    contentId,
    version,
    files: [...records.values()].sort((a, b) => (a.path < b.path ? -1 : 1)),
    inputs: inputs.map(({ source, file, bytes, sha256 }) => ({ source, file, bytes, sha256 })),
  };
  await writeJson(folder, 'contents.json', contents);
  await syncTree(folder);
  return made;
}

export interface PlacedRelease {
  readonly folder: string;
  /** The release was there already, whole; the draft was dropped. */
  readonly reused: boolean;
}

/**
 * Moves a finished draft to its name. Where a whole release of that content stands there already, that one stays. A
 * damaged one is replaced file by file, so that a reader meets each file either as it was or as it should be.
 */
export async function placeDraft(draft: ReleaseDraft): Promise<PlacedRelease> {
  const folder = join(draft.outFolder, 'releases', draft.release);
  const existing = await lstat(folder).catch(() => null);
  if (existing?.isDirectory()) {
    const problems = await verifyRelease(folder);
    if (problems.length === 0) {
      await discardDraft(draft);
      return { folder, reused: true };
    }
    await replaceFiles(draft.folder, folder);
  } else {
    if (existing !== null) await rm(folder);
    await rename(draft.folder, folder);
  }
  liveDrafts.delete(draft.folder);
  await sync(dirname(folder));
  return { folder, reused: false };
}

/** Makes the release the one that stands: a link made beside `current` and renamed over it. */
export async function moveCurrent(outFolder: string, release: string): Promise<void> {
  const beside = join(outFolder, unfinishedName('current'));
  await symlink(join('releases', release), beside);
  try {
    await rename(beside, join(outFolder, 'current'));
  } catch (error) {
    await rm(beside, { force: true });
    throw error;
  }
  await sync(outFolder);
}

export async function discardDraft(draft: ReleaseDraft): Promise<void> {
  liveDrafts.delete(draft.folder);
  await rm(draft.folder, { recursive: true, force: true });
}

export interface CurrentRelease {
  readonly release: string;
  readonly folder: string;
  /** `unreadable` where the release that stands is damaged. */
  readonly summary: Summary | 'unreadable';
}

/** The release that stands; null before the first. */
export async function currentRelease(outFolder: string): Promise<CurrentRelease | null> {
  const target = await readlink(join(outFolder, 'current')).catch(() => null);
  if (target === null) return null;
  const release = basename(target);
  const folder = join(outFolder, 'releases', release);
  const read = await readSummary(folder);
  return { release, folder, summary: read ?? 'unreadable' };
}

/** The whole release of this content, when it is there already; null where it is not or is damaged. */
export async function existingRelease(outFolder: string, contentId: string): Promise<CurrentRelease | null> {
  const release = releaseName(contentId);
  const folder = join(outFolder, 'releases', release);
  const read = await readSummary(folder);
  if (read === null || read.contentId !== contentId || (await verifyRelease(folder)).length > 0) return null;
  return { release, folder, summary: read };
}

async function readSummary(folder: string): Promise<Summary | null> {
  try {
    return summarySchema.parse(JSON.parse(await readFile(join(folder, 'summary.json'), 'utf8')));
  } catch {
    return null;
  }
}

function tableFiles(records: readonly FileRecord[]): DatapackageInput['files'] {
  const files = Object.fromEntries(TABLE_NAMES.map((name) => [name, { csv: [] as string[], parquet: [] as string[] }]));
  for (const { path } of [...records].sort((a, b) => (a.path < b.path ? -1 : 1))) {
    const of = tableOfFile(path);
    if (of !== null) files[of.table]![of.format].push(path);
  }
  for (const name of TABLE_NAMES) {
    if (files[name]!.csv.length === 0) throw new Error(`table ${name} was not written`);
  }
  return files as Record<TableName, { csv: string[]; parquet: string[] }>;
}

function rowsByTable(records: readonly FileRecord[]): Record<string, number> {
  const rows: Record<string, number> = Object.fromEntries(TABLE_NAMES.map((name) => [name, 0]));
  for (const record of records) {
    const of = tableOfFile(record.path);
    if (of?.format === 'csv') rows[of.table]! += record.rows ?? 0;
  }
  return rows;
}

async function writeJson(folder: string, name: string, value: object): Promise<void> {
  await writeFile(join(folder, name), `${JSON.stringify(value, null, 2)}\n`);
}

/** Files open at one time while the disk is waited for: a large release has hundreds. */
const MOST_OPEN = 16;

async function syncTree(folder: string): Promise<void> {
  const files = await filesIn(folder);
  const folders = new Set(['.', ...files.map((path) => dirname(path))]);
  const few = pLimit(MOST_OPEN);
  await Promise.all([...files, ...folders].map((path) => few(() => sync(join(folder, path)))));
}

/** `contents.json` last: until then the release does not verify. */
async function replaceFiles(from: string, to: string): Promise<void> {
  const fresh = (await filesIn(from)).sort((a, b) => Number(a === 'contents.json') - Number(b === 'contents.json'));
  const wanted = new Set(fresh);
  for (const path of await filesIn(to)) if (!wanted.has(path)) await rm(join(to, path), { force: true });
  for (const path of fresh) {
    await mkdir(dirname(join(to, path)), { recursive: true });
    await rename(join(from, path), join(to, path));
  }
  await rm(from, { recursive: true, force: true });
  await syncTree(to);
}

function unfinishedName(what: 'draft' | 'current'): string {
  return `.${what}-${process.pid}-${randomBytes(4).toString('hex')}`;
}

/** What a run that no longer lives has left: its process is gone, or it had this very process's number. */
async function clearUnfinished(outFolder: string): Promise<void> {
  for (const parent of [outFolder, join(outFolder, 'releases')]) {
    for (const name of await readdir(parent)) {
      const match = /^\.(?:draft|current)-(\d+)-[0-9a-f]{8}$/.exec(name);
      const path = join(parent, name);
      if (match === null || liveDrafts.has(path)) continue;
      const owner = Number(match[1]);
      if (owner === process.pid || !isAlive(owner)) await rm(path, { recursive: true, force: true });
    }
  }
}

function isAlive(processId: number): boolean {
  try {
    process.kill(processId, 0);
    return true;
  } catch (error) {
    return (error as NodeJS.ErrnoException).code === 'EPERM';
  }
}
