/** One table of a descriptor, checked for what a schema cannot see, and resolved for each file that it matches. */
import type { Finding } from '../../schemas/finding.js';
import { type NumberQuantity, QUANTITY_UNITS, TEXT_QUANTITIES } from '../../schemas/quantities.js';
import type { ColumnDescriptor, TableDescriptor } from '../../schemas/source.js';
import type { ColumnMeaning, TableMeaning } from '../../schemas/table-meaning.js';
import { conversionTo, ratioOf } from '../core/units/ucum.js';
import { brokenPlans } from './broken-plan.js';
import { columnMeaning, tidyHeader } from './column-meaning.js';
import { matchFiles } from './glob.js';
import { layoutOf } from './layout.js';
import { namesFromCsv } from './names.js';
import { isObject } from './not-yet-read.js';
import type { ConstantNumber, TablePlan, WhereClause, WordFrom } from './plan.js';
import { type Kind, NUMBERS, REQUIRED, WORDS } from './table-quantities.js';
import { tableWords } from './table-words.js';
import { type JsonFile, jsonFinding } from './zod-findings.js';

export interface TableSetting {
  readonly json: JsonFile;
  readonly sourceId: string;
  /** Position under `tables`. */
  readonly index: number;
  /** The table as written, the source's keys merged in. */
  readonly raw: Readonly<Record<string, unknown>>;
  readonly fileNames: readonly string[];
  readonly textOf: (file: string) => string | null;
  /** Headers that each table, by its position, names in a file. */
  readonly named: ReadonlyMap<string, ReadonlyMap<number, readonly string[]>>;
}

type DescriptorProblem = 'descriptor-invalid' | 'required-missing' | 'unit-unknown' | 'unit-unfit';

/** Reports what stands at `path` inside the table. */
export type Fault = (
  path: readonly PropertyKey[],
  wanted: string,
  problem?: DescriptorProblem,
  read?: string,
  remedy?: string,
) => void;

interface PlanResult {
  readonly plans: readonly TablePlan[];
  readonly findings: readonly Finding[];
}

/** Unit factors are asked for here only to see that the unit exists; the substance's own molar mass comes later. */
const ANY_SUBSTANCE = { molarMassGPerMol: 1, atomsPerFormula: 1 } as const;
/** A constant's unit must stand for itself. */
const NO_SUBSTANCE = { molarMassGPerMol: Number.NaN, atomsPerFormula: null, per: null } as const;
/** Kinds whose rows have a pressure each, which the table's own "pressure" may give; for the others that is an isobar. */
const OWN_PRESSURE: ReadonlySet<Kind> = new Set(['transitions', 'vapour-pressures']);
/** Constants are exact as written. */
const EXACT_DECIMALS = 20;

export function tablePlans(setting: TableSetting, table: TableDescriptor): PlanResult {
  const { json, index } = setting;
  const kind = table.holds as Kind;
  const findings: Finding[] = [];
  const fault: Fault = (path, wanted, problem = 'descriptor-invalid', read, remedy) => {
    const before = path[0] !== undefined && onSourceOnly(setting, path[0]) ? [] : ['tables', index];
    findings.push(jsonFinding(json, problem, [...before, ...path], wanted, read, remedy));
  };
  const columns = tableColumns(table, kind, fault);
  const words = tableWords(table, kind, columns, fault);
  const numbers = tableNumbers(table, kind, columns, fault);
  checkRequired(kind, columns, [...Object.keys(words), ...Object.keys(numbers)], fault);
  const names = tableNames(setting, table, fault);
  const meaning = tableMeaning(setting, table, columns, fault);
  if (findings.length > 0) return { plans: brokenPlans(setting, findings[0]!), findings };

  const files = matchFiles(table.file, setting.fileNames);
  if (files.length === 0) {
    const missing = fileMissing(setting, table.file);
    return { plans: brokenPlans(setting, missing), findings: [missing] };
  }
  const plans: TablePlan[] = [];
  for (const file of files) {
    const substance = substanceOf(table, words.substance!, file);
    if (substance === null) {
      fault(['substance', 'fileName'], `an expression whose group finds the substance in "${file}"`);
      continue;
    }
    plans.push({
      meaning: { ...meaning, file },
      file,
      layout: layoutOf(table, file),
      substance,
      words,
      numbers,
      where: whereClauses(table),
      names,
      phases: table.phases ?? {},
      othersIgnored: table.others === 'ignored',
      namedElsewhere: namedElsewhere(setting, file),
      broken: null,
    });
  }
  return { plans, findings };
}

function tableColumns(table: TableDescriptor, kind: Kind, fault: Fault): ColumnMeaning[] {
  const allowed: readonly string[] = [...NUMBERS[kind], ...WORDS[kind], 'uncertainty', 'ignored'];
  const repeatable: readonly string[] = ['ignored', 'note', 'uncertainty'];
  const columns: ColumnMeaning[] = [];
  for (const [header, column] of Object.entries(table.columns)) {
    const path = ['columns', header];
    if (!allowed.includes(column.is)) {
      fault([...path, 'is'], `for ${kind}: ${allowed.join(', ')}`);
      continue;
    }
    if (!repeatable.includes(column.is) && columns.some(({ is }) => is === column.is))
      fault([...path, 'is'], `each quantity once in a table; "${column.is}" stands twice`);
    checkUnit(column, path, fault);
    columns.push(columnMeaning(header, column));
  }
  const held = columns.filter(({ is }) => (NUMBERS[kind] as readonly string[]).includes(is)).map(({ is }) => is);
  for (const [header, column] of Object.entries(table.columns))
    if (column.is === 'uncertainty' && !held.includes(column.of))
      fault(['columns', header, 'of'], `a quantity that a column of this table holds: ${held.join(', ')}`);
  return columns;
}

function checkUnit(column: ColumnDescriptor, path: readonly PropertyKey[], fault: Fault): void {
  if (!('unit' in column)) return;
  if (column.is === 'uncertainty' && ratioOf(column.unit) !== null) return;
  const quantity = column.is === 'uncertainty' ? column.of : column.is;
  const conversion = conversionTo(QUANTITY_UNITS[quantity], column.unit, { ...ANY_SUBSTANCE, per: column.per ?? null });
  if (!conversion.ok) fault([...path, 'unit'], conversion.wanted, conversion.problem, column.unit, conversion.remedy);
}

interface Given {
  readonly value: number;
  readonly unit: string;
}

function toSi(quantity: NumberQuantity, given: Given, path: readonly PropertyKey[], fault: Fault): number {
  const conversion = conversionTo(QUANTITY_UNITS[quantity], given.unit, NO_SUBSTANCE);
  if (conversion.ok) return given.value * conversion.factor + conversion.offset;
  fault([...path, 'unit'], conversion.wanted, conversion.problem, given.unit, conversion.remedy);
  return 0;
}

/** Numbers among the constants; words are `tableWords`' business. */
function tableNumbers(
  table: TableDescriptor,
  kind: Kind,
  columns: readonly ColumnMeaning[],
  fault: Fault,
): Partial<Record<NumberQuantity, ConstantNumber>> {
  const numbers: Partial<Record<NumberQuantity, ConstantNumber>> = {};
  const constant = (quantity: NumberQuantity, given: Given, path: readonly PropertyKey[]): ConstantNumber => ({
    value: toSi(quantity, given, path, fault),
    decimals: EXACT_DECIMALS,
    printed: `${given.value} ${given.unit}`,
  });
  for (const [key, given] of Object.entries(table.constants ?? {})) {
    const path = ['constants', key];
    if ((WORDS[kind] as readonly string[]).includes(key)) continue;
    const quantity = NUMBERS[kind].find((known) => known === key);
    if (quantity === undefined) fault(path, `for ${kind}: ${[...NUMBERS[kind], ...WORDS[kind]].join(', ')}`);
    else if (typeof given !== 'object') fault(path, '{ "value": …, "unit": "…" }');
    else if (kind === 'thermal-functions')
      fault(path, 'a column for each number of such a table (an isobar is the table\'s own "pressure")');
    else if (columns.some(({ is }) => is === quantity)) fault(path, `"${key}" said once: a column holds it already`);
    else numbers[quantity] = constant(quantity, given, path);
  }
  const { pressure } = table;
  if (OWN_PRESSURE.has(kind) && pressure !== undefined && !columns.some(({ is }) => is === 'pressure'))
    numbers.pressure ??= constant('pressure', pressure, ['pressure']);
  return numbers;
}

function checkRequired(
  kind: Kind,
  columns: readonly ColumnMeaning[],
  constants: readonly string[],
  fault: Fault,
): void {
  const has = (quantity: string): boolean =>
    constants.includes(quantity) || columns.some((column) => column.is === quantity);
  for (const quantity of REQUIRED[kind]) {
    if (has(quantity)) continue;
    const word = (TEXT_QUANTITIES as readonly string[]).includes(quantity);
    const remedy = `give a column "is": "${quantity}"${word ? ', or a constant' : ''}`;
    fault([], `"${quantity}" in a table of ${kind}`, 'required-missing', 'no column or constant of it', remedy);
  }
  const values = NUMBERS[kind].filter((quantity) => quantity !== 'temperature');
  if (!OWN_PRESSURE.has(kind) && !values.some(has))
    fault(['columns'], `a column of one of ${values.join(', ')}`, 'required-missing');
}

function tableNames(setting: TableSetting, table: TableDescriptor, fault: Fault): Readonly<Record<string, string>> {
  if (typeof table.names !== 'string') return table.names ?? {};
  const text = setting.textOf(table.names);
  if (text === null) fault(['names'], "a two-column CSV in the source's folder");
  return namesFromCsv(text ?? '');
}

function tableMeaning(
  { sourceId, index }: TableSetting,
  table: TableDescriptor,
  columns: readonly ColumnMeaning[],
  fault: Fault,
): Omit<TableMeaning, 'file'> {
  if (table.basis === undefined) {
    const remedy = 'add "basis" to the source or to the table';
    fault(['basis'], 'measured, evaluated, computed or estimated', 'required-missing', 'nothing', remedy);
  }
  const { standardPressure, referenceTemperature, pressure } = table;
  const kind = table.holds as Kind;
  return {
    source: sourceId,
    table: table.id ?? `#${index}`,
    holds: kind,
    basis: table.basis ?? 'measured',
    restsOn: table.restsOn ?? [],
    rank: table.rank ?? 1,
    temperatureScale: table.temperatureScale ?? (table.basis === 'computed' ? 'thermodynamic' : 'not-stated'),
    standardPressurePa:
      standardPressure === undefined ? 100000 : toSi('pressure', standardPressure, ['standardPressure'], fault),
    referenceTemperatureK:
      typeof referenceTemperature === 'object'
        ? toSi('temperature', referenceTemperature, ['referenceTemperature'], fault)
        : (referenceTemperature ?? 298.15),
    enthalpyZero: table.enthalpyZero ?? null,
    entropyZero: table.entropyZero ?? null,
    isobarPa: OWN_PRESSURE.has(kind) || pressure === undefined ? null : toSi('pressure', pressure, ['pressure'], fault),
    incrementsFromZeroK:
      table.from === 0 || Object.values(table.columns).some((column) => 'from' in column && column.from === 0),
    columns,
  };
}

function whereClauses(table: TableDescriptor): WhereClause[] {
  const listOf = (words: string | readonly string[] | undefined): readonly string[] | null =>
    words === undefined ? null : typeof words === 'string' ? [words] : words;
  return Object.entries(table.where ?? {}).map(([header, clause]) => ({
    header: tidyHeader(header),
    from: clause.from ?? null,
    to: clause.to ?? null,
    is: listOf(clause.is),
    not: listOf(clause.not),
  }));
}

/** null where the expression finds no substance in the file's name. */
function substanceOf({ substance }: TableDescriptor, from: WordFrom, file: string): WordFrom | null {
  if (typeof substance !== 'object' || !('fileName' in substance)) return from;
  const word = new RegExp(substance.fileName, 'u').exec(file)?.[1];
  return word === undefined ? null : { constant: word };
}

function namedElsewhere({ named, index }: TableSetting, file: string): string[] {
  const others = [...(named.get(file) ?? [])].filter(([position]) => position !== index);
  return others.flatMap(([, headers]) => headers.map(tidyHeader));
}

function fileMissing({ json, index, sourceId, fileNames }: TableSetting, pattern: string): Finding {
  const there = fileNames.length === 0 ? 'which holds none' : fileNames.slice(0, 20).join(', ');
  const wanted = `a file of the folder ${sourceId}: ${there}`;
  const remedy = 'put the file there or correct the name; * stands for any letters, ? for one';
  return jsonFinding(json, 'file-missing', ['tables', index, 'file'], wanted, pattern, remedy);
}

/** True where the key stands on the source and not on the table itself. */
function onSourceOnly({ json, index }: TableSetting, key: PropertyKey): boolean {
  const source = json.value;
  if (!isObject(source) || !(key in source)) return false;
  const table: unknown = Array.isArray(source.tables) ? source.tables[index] : undefined;
  return !(isObject(table) && key in table);
}
