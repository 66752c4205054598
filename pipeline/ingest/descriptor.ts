/** Reads a source's descriptor into one plan for each table of each file. */
import type { Finding } from '../../schemas/finding.js';
import { PLANNED_KINDS, READ_KINDS, type SourceHead, sourceHeadSchema, tableSchema } from '../../schemas/source.js';
import { brokenPlans } from './broken-plan.js';
import { matchFiles } from './glob.js';
import { readJson } from './json-place.js';
import { isObject, notYetRead } from './not-yet-read.js';
import type { DescriptorResult, SourceInfo, TablePlan } from './plan.js';
import { readingFinding } from './reading.js';
import { type TableSetting, tablePlans } from './table-plan.js';
import { type JsonFile, jsonFinding, zodFindings } from './zod-findings.js';

export const DESCRIPTOR_FILE = 'source.json';

const HEAD_KEYS = Object.keys(sourceHeadSchema.shape);
const TABLE_KEYS = Object.keys(tableSchema.shape);
const BASES = ['measured', 'evaluated', 'computed', 'estimated'] as const;
const SOURCE_ONLY = new Set(['title', 'citation', 'doi', 'year', 'licence', 'tables']);

/**
 * `fileNames`: the paths in the source's folder, with forward slashes. `textOf` gives the text of one of them (a map of
 * names kept as CSV), or null. Nothing throws: what cannot be read becomes a finding, and where it is known which
 * substances a table touches, a plan with `broken` set, so that they are withheld.
 */
export function readDescriptor(
  sourceId: string,
  jsonText: string,
  fileNames: readonly string[],
  textOf: (file: string) => string | null = () => null,
): DescriptorResult {
  const reading = readJson(jsonText);
  if (!reading.ok) {
    const { line, column } = reading.place;
    const finding = readingFinding({
      problem: 'descriptor-unreadable',
      address: { source: sourceId, file: DESCRIPTOR_FILE, line, column: `character ${column}` },
      read: reading.read,
      wanted: reading.wanted,
      remedy: `mend ${DESCRIPTOR_FILE} at line ${line}, character ${column}; until then nothing of this source is used`,
    });
    return { source: null, plans: [], findings: [finding] };
  }
  const json: JsonFile = { source: sourceId, file: DESCRIPTOR_FILE, value: reading.value, placeOf: reading.placeOf };
  const head = sourceHeadSchema.safeParse(reading.value);
  const findings: Finding[] = head.success
    ? []
    : zodFindings(json, 'descriptor-invalid', head.error.issues, [], HEAD_KEYS);
  const headFault = findings[0] ?? null;
  const raw = isObject(reading.value) ? reading.value : {};
  const rawShared = Object.fromEntries(Object.entries(raw).filter(([key]) => !SOURCE_ONLY.has(key)));
  const tables = Array.isArray(raw.tables) ? raw.tables : [];
  const named = headersNamed(tables, fileNames);

  const plans: TablePlan[] = [];
  for (const [index, table] of tables.entries()) {
    const path = ['tables', index];
    if (!isObject(table)) {
      if (headFault === null || !findings.some((f) => f.address?.column.startsWith(`tables[${index}]`)))
        findings.push(jsonFinding(json, 'descriptor-invalid', path, 'an object in braces'));
      continue;
    }
    if ((PLANNED_KINDS as readonly unknown[]).includes(table.holds)) {
      findings.push(
        jsonFinding(
          json,
          'kind-not-yet-read',
          [...path, 'holds'],
          READ_KINDS.join(', '),
          undefined,
          'nothing to do: the table is kept for a later version and not used yet',
          'note',
        ),
      );
      continue;
    }
    const faults: Finding[] = notYetRead({ ...rawShared, ...table }).map(({ path: inside, remedy }) =>
      jsonFinding(
        json,
        'kind-not-yet-read',
        [...(inside[0]! in table ? path : []), ...inside],
        'a layout that is read',
        undefined,
        remedy,
      ),
    );
    const parsed = tableSchema.safeParse(table);
    if (!parsed.success && faults.length === 0)
      faults.push(...zodFindings(json, 'descriptor-invalid', parsed.error.issues, path, TABLE_KEYS));
    const setting: TableSetting = { json, sourceId, index, raw: { ...rawShared, ...table }, fileNames, textOf, named };
    if (headFault !== null || faults.length > 0 || !parsed.success || !head.success) {
      findings.push(...faults);
      plans.push(...brokenPlans(setting, faults[0] ?? headFault!));
      continue;
    }
    const resolved = tablePlans(setting, { ...sharedOf(head.data), ...parsed.data });
    findings.push(...resolved.findings);
    plans.push(...resolved.plans);
  }
  return { source: sourceInfo(sourceId, raw), plans, findings };
}

function sharedOf(head: SourceHead): Omit<SourceHead, 'title' | 'citation' | 'doi' | 'year' | 'licence' | 'tables'> {
  const { title: _t, citation: _c, doi: _d, year: _y, licence: _l, tables: _s, ...shared } = head;
  return shared;
}

function sourceInfo(id: string, raw: Readonly<Record<string, unknown>>): SourceInfo {
  const text = (key: string): string | null => (typeof raw[key] === 'string' ? raw[key] : null);
  return {
    id,
    title: text('title') ?? id,
    citation: text('citation') ?? text('title') ?? id,
    doi: text('doi'),
    year: typeof raw.year === 'number' ? raw.year : null,
    licence: text('licence'),
    basis: BASES.find((basis) => basis === raw.basis) ?? null,
  };
}

/** For each file, the headers that each table (by its position) names in it. */
function headersNamed(tables: readonly unknown[], fileNames: readonly string[]): Map<string, Map<number, string[]>> {
  const named = new Map<string, Map<number, string[]>>();
  for (const [index, table] of tables.entries()) {
    if (!isObject(table) || typeof table.file !== 'string') continue;
    const headers = isObject(table.columns) ? Object.keys(table.columns) : [];
    for (const key of ['substance', 'phase'] as const) {
      const from = table[key];
      if (isObject(from) && typeof from.column === 'string') headers.push(from.column);
    }
    if (isObject(table.where)) headers.push(...Object.keys(table.where));
    for (const file of matchFiles(table.file, fileNames)) {
      const tablesOfFile = named.get(file) ?? new Map<number, string[]>();
      tablesOfFile.set(index, headers);
      named.set(file, tablesOfFile);
    }
  }
  return named;
}
