import { createHash } from 'node:crypto';
import { basename } from 'node:path';
import type { Acceptance } from '../../schemas/accepted.js';
import type { InputFile } from '../../schemas/contents.js';
import type { Finding } from '../../schemas/finding.js';
import type { Substance } from '../../schemas/substances.js';
import { addRunBytes, type IngestPart } from '../ingest/ingest.js';
import { sayFinding } from '../report/report.js';
import type { Request } from './arguments.js';
import { EXIT, Stop } from './exit-status.js';
import type { Log } from './log.js';
import { didYouMean } from './nearest.js';
import type { NightWork, PartitionResult } from './night-work.js';
import { partition } from './partition.js';
import { type PolicyFile, readPolicy } from './policy-file.js';
import { readSources, type Sources } from './sources.js';
import type { StageSettings } from './stages.js';

const SUBSTANCES_FILE = 'substances.csv';

/** Everything that was read for the night, before anything is calculated. */
export interface Library {
  readonly substances: readonly Substance[];
  readonly parts: readonly IngestPart[];
  readonly inputs: readonly InputFile[];
  readonly settings: StageSettings;
  /** The substances asked for by `--only`; null: all. */
  readonly only: readonly string[] | null;
  /** The acceptances in force on the release date. */
  readonly inForce: readonly Acceptance[];
  readonly work: (what: Pick<NightWork, 'release' | 'findings'>) => NightWork;
  /** Findings that belong to no substance: those of reading, then the partitions', each once. */
  readonly general: (results: readonly PartitionResult[]) => Finding[];
}

/** Reads the sources folder and the policy. Throws a `Stop` where there is nothing to work on, or an id is unknown. */
export function openLibrary(
  request: Pick<Request, 'sources' | 'policy' | 'date' | 'only'>,
  log: Log,
  partitionBytes?: number,
): Library {
  const policy = readPolicy(request.policy, request.sources);
  log.begin('read', 0, 'file');
  const sources = listSources(request.sources);
  log.end(sources.inputs.length);
  const { substances, parts } = sources;
  if (substances.length === 0) throw nothingToRead(request.sources, sources.findings);
  const wanted = request.only === null ? null : wantedOf(substances, request.only);
  const listed = new Map<string, Finding[]>();
  for (const finding of sources.findings) {
    if (finding.substance !== '') listed.set(finding.substance, [...(listed.get(finding.substance) ?? []), finding]);
  }
  const settings = { policy: policy.policy, accepted: sources.accepted, date: request.date, listed };
  const bytesOf = new Float64Array(substances.length);
  for (const { index } of parts) addRunBytes(index, bytesOf);
  if (wanted !== null)
    bytesOf.forEach((bytes, i) => {
      bytesOf[i] = wanted[i] === 1 ? bytes : 0;
    });
  return {
    substances,
    parts,
    inputs: [...sources.inputs, ...policyInput(request.policy, policy)],
    settings,
    only: request.only,
    inForce: sources.accepted.filter(({ date, until }) => date <= request.date && request.date <= until),
    work: (what) => ({ substances, parts, settings, wanted, partitions: partition(bytesOf, partitionBytes), ...what }),
    general: (results) => {
      const all = [...sources.findings, ...results.flatMap(({ general }) => general)];
      return [...new Map(all.filter(({ substance }) => substance === '').map((one) => [one.id, one])).values()];
    },
  };
}

function listSources(folder: string): Sources {
  try {
    return readSources(folder);
  } catch (error) {
    const { code } = error as NodeJS.ErrnoException;
    if (code !== 'ENOENT' && code !== 'ENOTDIR' && code !== 'EACCES') throw error;
    throw new Stop(
      `The sources folder ${folder} cannot be read (${code}).`,
      `Name the folder that holds ${SUBSTANCES_FILE} with --sources.`,
    );
  }
}

function nothingToRead(folder: string, findings: readonly Finding[]): Stop {
  const why = findings.find(({ address }) => address?.file === SUBSTANCES_FILE);
  return new Stop(
    `No substance could be read from ${folder}. ${why === undefined ? '' : sayFinding(why)}`.trim(),
    `List the substances in ${folder}/${SUBSTANCES_FILE}, one a row, with the columns substance, name and formula.`,
  );
}

function wantedOf(substances: readonly Substance[], only: readonly string[]): Uint8Array {
  const places = new Map(substances.map(({ id }, i) => [id, i]));
  const wanted = new Uint8Array(substances.length);
  for (const id of only) {
    const place = places.get(id);
    if (place === undefined) {
      throw new Stop(
        `There is no substance "${id}" in ${SUBSTANCES_FILE}.`,
        didYouMean(id, places.keys()) || `It lists ${places.size}; use an id from its first column.`,
        EXIT.usage,
      );
    }
    wanted[place] = 1;
  }
  return wanted;
}

/** A policy named on the command line is an input like every other; the one in the sources is listed with them. */
function policyInput(named: string | null, { path, bytes }: PolicyFile): InputFile[] {
  if (named === null || path === null || bytes === null) return [];
  const sha256 = createHash('sha256').update(bytes).digest('hex');
  return [
    { source: '', file: basename(path), bytes: bytes.length, sha256, citation: null, licence: null, basis: null },
  ];
}
