/** Reads a folder of sources: every file once, into memory that workers share, and its tables indexed. */
import { createHash } from 'node:crypto';
import { closeSync, fstatSync, openSync, readdirSync, readSync } from 'node:fs';
import { join } from 'node:path';
import { gunzipSync } from 'node:zlib';
import { type Acceptance, acceptanceSchema } from '../../schemas/accepted.js';
import type { InputFile } from '../../schemas/contents.js';
import type { Correction } from '../../schemas/corrections.js';
import type { Finding } from '../../schemas/finding.js';
import type { Substance } from '../../schemas/substances.js';
import {
  CORRECTIONS_FILE,
  DESCRIPTOR_FILE,
  type IngestPart,
  indexRows,
  jsonFinding,
  readCorrections,
  readDescriptor,
  readingFinding,
  readJson,
  readSubstances,
  type SourceInfo,
  SUBSTANCES_FILE,
  SubstanceNames,
  type TablePlan,
  zodFindings,
} from '../ingest/ingest.js';
import { shared, toUtf8 } from './sources-encoding.js';

export const POLICY_FILE = 'policy.json';
export const ACCEPTED_FILE = 'accepted.json';

export interface Sources {
  readonly substances: readonly Substance[];
  readonly accepted: readonly Acceptance[];
  readonly sources: readonly SourceInfo[];
  /** One for each table of each file. */
  readonly parts: readonly IngestPart[];
  /** Every file that was read, substances.csv, policy.json and accepted.json (source '') among them. */
  readonly inputs: readonly InputFile[];
  /** Each id once. Those with a substance belong to it as much as what `ingest` finds. */
  readonly findings: readonly Finding[];
}

/** Reads `folder`. Throws only where the folder itself cannot be listed; all else becomes a finding. */
export function readSources(folder: string): Sources {
  const entries = readdirSync(folder, { withFileTypes: true });
  const reader = new Reader(folder);
  const top = new Set(entries.filter((entry) => !entry.isDirectory()).map(({ name }) => name));

  const table = top.has(SUBSTANCES_FILE) ? reader.text('', SUBSTANCES_FILE) : null;
  if (table === null && !top.has(SUBSTANCES_FILE))
    reader.missing('', SUBSTANCES_FILE, 'the list of substances, one row each');
  const { substances, findings } = readSubstances(table ?? new Uint8Array(0));
  if (table !== null) reader.findings.push(...findings);
  const accepted = top.has(ACCEPTED_FILE) ? readAccepted(reader) : [];
  if (top.has(POLICY_FILE)) reader.raw('', POLICY_FILE);

  const names = new SubstanceNames(substances);
  const sources: SourceInfo[] = [];
  const parts: IngestPart[] = [];
  const folders = entries.filter((entry) => entry.isDirectory() && !entry.name.startsWith('.')).map(({ name }) => name);
  for (const id of folders.sort()) {
    const read = readSource(reader, id, substances, names);
    if (read.source !== null) sources.push(read.source);
    parts.push(...read.parts);
  }
  const inputs = reader.inputs.map((input): InputFile => {
    const info = sources.find(({ id }) => id === input.source);
    return { ...input, citation: info?.citation ?? null, licence: info?.licence ?? null, basis: info?.basis ?? null };
  });
  const distinct = [...new Map(reader.findings.map((finding) => [finding.id, finding])).values()];
  return { substances, accepted, sources, parts, inputs, findings: distinct };
}

function readSource(
  reader: Reader,
  id: string,
  substances: readonly Substance[],
  names: SubstanceNames,
): { source: SourceInfo | null; parts: IngestPart[] } {
  const files = filesBelow(join(reader.folder, id));
  if (!files.includes(DESCRIPTOR_FILE)) {
    reader.missing(id, DESCRIPTOR_FILE, 'the descriptor of this folder; none of its tables is used');
    return { source: null, parts: [] };
  }
  const descriptor = reader.text(id, DESCRIPTOR_FILE);
  if (descriptor === null) return { source: null, parts: [] };
  const tables = files.filter((file) => file !== DESCRIPTOR_FILE && file !== CORRECTIONS_FILE);
  const result = readDescriptor(id, decode(descriptor), tables, (file) => {
    const bytes = files.includes(file) ? reader.text(id, file) : null;
    return bytes === null ? null : decode(bytes);
  });
  reader.findings.push(...result.findings);

  let corrections: readonly Correction[] = [];
  const entries = files.includes(CORRECTIONS_FILE) ? reader.text(id, CORRECTIONS_FILE) : null;
  if (entries !== null) {
    const read = readCorrections(id, decode(entries), result.plans);
    corrections = read.corrections;
    reader.findings.push(...read.findings);
  }
  const parts: IngestPart[] = [];
  for (const plan of result.plans) {
    const bytes = files.includes(plan.file) ? reader.text(id, plan.file) : new Uint8Array(0);
    const usable = bytes === null ? { ...plan, broken: plan.broken ?? reader.unreadable(id, plan.file) } : plan;
    const ours = corrections.filter(({ file }) => file === plan.file);
    const part = partOf(usable, bytes ?? new Uint8Array(0), substances, ours, names);
    reader.findings.push(...part.index.findings);
    parts.push(part);
  }
  return { source: result.source, parts };
}

function partOf(
  plan: TablePlan,
  bytes: Uint8Array,
  substances: readonly Substance[],
  corrections: readonly Correction[],
  names: SubstanceNames,
): IngestPart {
  return { plan, bytes, corrections, index: indexRows(plan, bytes, substances, corrections, names) };
}

function readAccepted(reader: Reader): Acceptance[] {
  const bytes = reader.text('', ACCEPTED_FILE);
  if (bytes === null) return [];
  const reading = readJson(decode(bytes));
  if (!reading.ok) {
    const { read, wanted, place } = reading;
    const address = { source: '', file: ACCEPTED_FILE, line: place.line, column: `character ${place.column}` };
    const remedy = `mend ${ACCEPTED_FILE}; until then nothing is accepted`;
    reader.findings.push(readingFinding({ problem: 'descriptor-unreadable', address, read, wanted, remedy }));
    return [];
  }
  const json = { source: '', file: ACCEPTED_FILE, value: reading.value, placeOf: reading.placeOf };
  if (!Array.isArray(reading.value)) {
    reader.findings.push(jsonFinding(json, 'descriptor-invalid', [], 'a list of entries in square brackets'));
    return [];
  }
  const accepted: Acceptance[] = [];
  for (const [index, entry] of reading.value.entries()) {
    const parsed = acceptanceSchema.safeParse(entry);
    if (parsed.success) accepted.push(parsed.data);
    else
      reader.findings.push(
        ...zodFindings(json, 'descriptor-invalid', parsed.error.issues, [index], Object.keys(acceptanceSchema.shape)),
      );
  }
  return accepted;
}

/** Paths of the files in a folder and below, with forward slashes, in order; names that begin with a dot are left out. */
function filesBelow(folder: string, inside = ''): string[] {
  const files: string[] = [];
  for (const entry of readdirSync(join(folder, inside), { withFileTypes: true })) {
    if (entry.name.startsWith('.')) continue;
    const path = inside === '' ? entry.name : `${inside}/${entry.name}`;
    if (entry.isDirectory()) files.push(...filesBelow(folder, path));
    else files.push(path);
  }
  return files.sort();
}

/** Reads each file once and keeps its size, its SHA-256 and what was odd about it. */
class Reader {
  readonly inputs: { source: string; file: string; bytes: number; sha256: string }[] = [];
  readonly findings: Finding[] = [];
  private readonly texts = new Map<string, Uint8Array | null>();

  constructor(readonly folder: string) {}

  /** The file's text as UTF-8, unpacked; null where it cannot be read (reported). */
  text(source: string, file: string): Uint8Array | null {
    const key = `${source}/${file}`;
    const known = this.texts.get(key);
    if (known !== undefined) return known;
    const text = this.fresh(source, file);
    this.texts.set(key, text);
    return text;
  }

  private fresh(source: string, file: string): Uint8Array | null {
    const raw = this.raw(source, file);
    if (raw === null) return null;
    let unpacked = raw;
    if (/\.gz$/i.test(file)) {
      try {
        unpacked = shared(gunzipSync(raw));
      } catch (error) {
        this.report(source, file, (error as Error).message, 'a file packed by gzip');
        return null;
      }
    }
    const { bytes, encoding } = toUtf8(unpacked);
    if (encoding === 'UTF-16 (little-endian)' || encoding === 'UTF-16 (big-endian)' || encoding === 'Latin-1')
      this.findings.push(
        readingFinding({
          problem: 'encoding-converted',
          severity: 'note',
          address: { source, file, line: 0, column: '' },
          read: encoding,
          wanted: 'UTF-8',
          remedy: 'nothing to do: the text was converted; save the file as UTF-8 to be rid of this note',
          evidence: [],
        }),
      );
    return bytes;
  }

  raw(source: string, file: string): Uint8Array | null {
    let bytes: Uint8Array;
    try {
      bytes = readShared(join(this.folder, source, file));
    } catch (error) {
      this.report(source, file, (error as Error).message, 'a file that can be read');
      return null;
    }
    const sha256 = createHash('sha256').update(bytes).digest('hex');
    this.inputs.push({ source, file, bytes: bytes.length, sha256 });
    return bytes;
  }

  missing(source: string, file: string, wanted: string): void {
    this.findings.push(
      readingFinding({
        problem: 'file-missing',
        address: { source, file, line: 0, column: '' },
        read: 'no such file',
        wanted,
        remedy: `put ${file} into ${source === '' ? 'the sources folder' : source}`,
        evidence: [],
      }),
    );
  }

  unreadable(source: string, file: string): Finding {
    return this.findings.find((one) => one.address?.source === source && one.address.file === file)!;
  }

  private report(source: string, file: string, read: string, wanted: string): void {
    this.findings.push(
      readingFinding({
        problem: 'file-unreadable',
        address: { source, file, line: 0, column: '' },
        read,
        wanted,
        remedy: 'look at the file and its permissions; its tables are not used',
        evidence: [],
      }),
    );
  }
}

function readShared(path: string): Uint8Array {
  const handle = openSync(path, 'r');
  try {
    const bytes = new Uint8Array(new SharedArrayBuffer(fstatSync(handle).size));
    let at = 0;
    while (at < bytes.length) {
      const read = readSync(handle, bytes, at, bytes.length - at, at);
      if (read === 0) break;
      at += read;
    }
    return bytes.subarray(0, at);
  } finally {
    closeSync(handle);
  }
}

const decode = (bytes: Uint8Array): string => new TextDecoder().decode(bytes);
