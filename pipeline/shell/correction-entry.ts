import { userInfo } from 'node:os';
import { join } from 'node:path';
import { type Correction, correctionSchema } from '../../schemas/corrections.js';
import type { Finding, Suspect } from '../../schemas/finding.js';
import type { Address } from '../../schemas/harmonised.js';
import { CORRECTIONS_FILE, type IngestPart, indexRows, SubstanceNames } from '../ingest/ingest.js';
import { sayPlace, saySuspect } from '../report/report.js';
import type { Request } from './arguments.js';
import { EXIT, Stop } from './exit-status.js';
import type { FoundFinding } from './find-finding.js';
import { type JsonList, readJsonList } from './json-list.js';
import type { Library } from './library.js';

/** The entry that would be written, and the file that it goes to. */
export interface PlannedCorrection {
  readonly source: string;
  readonly list: JsonList;
  readonly entry: Correction;
}

/** The suspects of the finding in their order. Throws a `Stop` where it has none, or where it follows from another. */
export function suspectsToCorrect({ finding, before }: FoundFinding): Suspect[] {
  const own = before.suspects.filter((one) => one.finding === finding.id).sort((a, b) => a.place - b.place);
  if (own.length > 0) return own;
  const cause = before.findings.find(({ id }) => id === finding.cause);
  if (cause !== undefined) {
    throw new Stop(
      `Finding ${finding.id} follows from ${cause.id} (${cause.rule}), and is mended with it.`,
      `Run cuspline correct ${cause.id}.`,
    );
  }
  const place = finding.address === null ? '' : ` Look at ${sayPlace(finding.address)}.`;
  throw new Stop(
    `Finding ${finding.id} names no suspect cell, so there is no value to propose.${place}`,
    `Write the entry into ${CORRECTIONS_FILE} by hand, or see cuspline show ${finding.substance}.`,
  );
}

/** The suspect asked for, by its number. */
export function chosenSuspect(suspects: readonly Suspect[], request: Request): Suspect {
  const chosen = suspects[request.suspect - 1];
  if (chosen !== undefined) return chosen;
  throw new Stop(
    `There is no suspect ${request.suspect}; the finding has ${suspects.length}.`,
    `Name one from 1 to ${suspects.length} with --suspect.`,
    EXIT.usage,
  );
}

/** What the cell should say: the value given, or the one that explains it, then the one that closes the system. */
export function valuesToTry({ value }: Request, suspect: Suspect): string[] {
  if (value !== null) return [value];
  const { printed, explainedPrinted, proposedPrinted } = suspect;
  const values = new Set([explainedPrinted ?? proposedPrinted, proposedPrinted]);
  const changes = [...values].filter((one) => one.trim() !== printed.trim());
  return changes.length > 0 ? changes : [printed];
}

/** Throws a `Stop` where the cell cannot be corrected by an entry, has one, or would not change. */
export function plannedCorrection(
  request: Request,
  finding: Finding,
  suspect: Suspect,
  corrected: string,
): PlannedCorrection {
  const { address, printed, explainedPrinted } = suspect;
  const { source, file, line, column } = address;
  if (line < 1 || column === '') {
    throw new Stop(
      `${sayPlace(address)} says ${printed}, and that stands in the descriptor, not in a table.`,
      `Edit ${join(request.sources, source, 'source.json')} itself.`,
    );
  }
  const list = readJsonList(join(request.sources, source, CORRECTIONS_FILE));
  refuseSecond(list, address);
  if (corrected.trim() === printed.trim()) {
    throw new Stop(
      `${sayPlace(address)} says ${printed} already.`,
      'A change below its last digit would close the system: write the further digits with --value.',
    );
  }
  const closes =
    explainedPrinted === null || explainedPrinted === corrected ? '' : `; the system closes at ${corrected}`;
  const why =
    request.value === null
      ? `${saySuspect(suspect).replace(`${sayPlace(address)} `, '')}${closes}; finding ${finding.id}`
      : `set by hand after finding ${finding.id} (${finding.rule})`;
  const entry = correctionSchema.parse({
    file,
    line,
    column,
    printed,
    corrected,
    reason: request.reason ?? why,
    who: request.by ?? loginName(),
    date: request.date,
  });
  return { source, list, entry };
}

function refuseSecond({ path, entries }: JsonList, { file, line, column }: Address): void {
  const at = entries.findIndex((one) => {
    const entry = one as Partial<Correction> | null;
    return entry?.file === file && entry.line === line && (entry.column === column || entry.column === null);
  });
  if (at < 0) return;
  const { printed, corrected, who, date } = entries[at] as Correction;
  throw new Stop(
    `That cell has a correction already, by ${who} on ${date}: ${printed} became ${corrected ?? 'nothing'}.`,
    `Edit entry ${at + 1} of ${path}, or remove it and run this again.`,
  );
}

function loginName(): string {
  let name = '';
  try {
    name = userInfo().username;
  } catch {
    // A process may run under a number that has no name.
  }
  if (name !== '') return name;
  throw new Stop('Nobody knows who corrects this.', 'Write --by "YOUR NAME".', EXIT.usage);
}

/** The parts with the entry in force, rows sought anew where it may move them. */
export function withCorrection(library: Library, { source, entry }: PlannedCorrection): IngestPart[] {
  const names = new SubstanceNames(library.substances);
  return library.parts.map((part) => {
    const { plan, bytes } = part;
    if (plan.meaning.source !== source || plan.file !== entry.file) return part;
    const corrections = [...part.corrections, entry];
    return { plan, bytes, corrections, index: indexRows(plan, bytes, library.substances, corrections, names) };
  });
}
