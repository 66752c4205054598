/** Reads a source's corrections, and lays them over the cells of a row. */
import { type Correction, correctionSchema } from '../../schemas/corrections.js';
import type { Finding } from '../../schemas/finding.js';
import type { Address } from '../../schemas/harmonised.js';
import { readJson } from './json-place.js';
import { nearestWords } from './nearest.js';
import type { TablePlan } from './plan.js';
import { type ReadingNote, readingFinding } from './reading.js';
import { type JsonFile, jsonFinding, zodFindings } from './zod-findings.js';

export const CORRECTIONS_FILE = 'corrections.json';

export interface CorrectionsResult {
  readonly corrections: readonly Correction[];
  readonly findings: readonly Finding[];
}

/** An entry that cannot be read is reported and left out; so is one for a file that no table of the source reads. */
export function readCorrections(sourceId: string, jsonText: string, plans: readonly TablePlan[]): CorrectionsResult {
  const reading = readJson(jsonText);
  if (!reading.ok) {
    const { line, column } = reading.place;
    const address = { source: sourceId, file: CORRECTIONS_FILE, line, column: `character ${column}` };
    const remedy = `mend ${CORRECTIONS_FILE}; until then none of its entries is applied`;
    const { read, wanted } = reading;
    return {
      corrections: [],
      findings: [readingFinding({ problem: 'descriptor-unreadable', address, read, wanted, remedy })],
    };
  }
  const json: JsonFile = { source: sourceId, file: CORRECTIONS_FILE, value: reading.value, placeOf: reading.placeOf };
  if (!Array.isArray(reading.value))
    return {
      corrections: [],
      findings: [jsonFinding(json, 'descriptor-invalid', [], 'a list of entries in square brackets')],
    };
  const files = new Set(plans.map((plan) => plan.file));
  const corrections: Correction[] = [];
  const findings: Finding[] = [];
  for (const [index, entry] of reading.value.entries()) {
    const parsed = correctionSchema.safeParse(entry);
    if (!parsed.success)
      findings.push(
        ...zodFindings(json, 'descriptor-invalid', parsed.error.issues, [index], Object.keys(correctionSchema.shape)),
      );
    else if (!files.has(parsed.data.file))
      findings.push(
        jsonFinding(
          json,
          'correction-out-of-date',
          [index, 'file'],
          `a file that a table of the source reads${nearestWords(parsed.data.file, files)}`,
          undefined,
          'correct the entry in corrections.json; it is not applied',
          'doubt',
        ),
      );
    else corrections.push(parsed.data);
  }
  return { corrections, findings };
}

export function correctionOutOfDate(address: Address, read: string, printed: string): Finding {
  return readingFinding(outOfDateNote(address, read, printed));
}

/** The cell no longer says what the entry expects: the entry is not applied, the substance is flagged. */
export function outOfDateNote(address: Address, read: string, printed: string): ReadingNote {
  return {
    problem: 'correction-out-of-date',
    severity: 'doubt',
    subject: `${address.line} ${printed}`,
    address,
    read,
    wanted: printed,
    remedy: 'look at the cell again and bring the entry in corrections.json up to date; it is not applied',
  };
}
