/** One table of a descriptor, resolved for each file that it matches. */
import type { Finding } from '../../schemas/finding.js';
import { type NumberQuantity, QUANTITY_UNITS, TEXT_QUANTITIES, type TextQuantity } from '../../schemas/quantities.js';
import { type ColumnDescriptor, READ_KINDS, type TableDescriptor } from '../../schemas/source.js';
import type { ColumnMeaning, StatedUncertainty, TableMeaning } from '../../schemas/table-meaning.js';
import { conversionTo, ratioOf } from '../core/units/ucum.js';
import { matchFiles } from './glob.js';
import { namesFromCsv } from './names.js';
import { isObject } from './not-yet-read.js';
import { phaseWanted, resolvePhase } from './phase.js';
import type { ConstantNumber, Layout, TablePlan, WordFrom } from './plan.js';
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
  readonly named: ReadonlyMap<string, ReadonlyMap<number, readonly string[]>>;
}

interface PlanResult {
  readonly plans: readonly TablePlan[];
  readonly findings: readonly Finding[];
}

type Kind = (typeof READ_KINDS)[number];

const WORDS: Readonly<Record<Kind, readonly TextQuantity[]>> = {
  'thermal-functions': ['substance', 'phase', 'increments-from', 'series', 'note'],
  anchors: ['substance', 'phase', 'note'],
  transitions: ['substance', 'from-phase', 'to-phase', 'order', 'gas', 'note'],
};
const NUMBERS: Readonly<Record<Kind, readonly NumberQuantity[]>> = {
  'thermal-functions': [
    'temperature',
    'heat-capacity',
    'entropy',
    'enthalpy-increment',
    'gibbs-function',
    'enthalpy',
    'gibbs-energy',
  ],
  anchors: ['enthalpy-of-formation', 'entropy', 'gibbs-energy-of-formation', 'enthalpy-from-zero', 'heat-capacity'],
  transitions: ['transition-temperature', 'pressure', 'transition-enthalpy', 'transition-entropy'],
};
const REQUIRED: Readonly<Record<Kind, readonly (NumberQuantity | TextQuantity)[]>> = {
  'thermal-functions': ['substance', 'phase', 'temperature'],
  anchors: ['substance', 'phase'],
  transitions: ['substance', 'from-phase', 'to-phase', 'transition-temperature'],
};

/** Unit factors are asked for here only to see that the unit exists; the substance's own molar mass comes later. */
const ANY_SUBSTANCE = { molarMassGPerMol: 1, atomsPerFormula: 1 } as const;
/** Constants are exact as written. */
const EXACT_DECIMALS = 20;

/** Checks what a schema cannot, and makes one plan a file. */
export function tablePlans(setting: TableSetting, table: TableDescriptor): PlanResult {
  const { json, index, sourceId } = setting;
  const kind = table.holds as Kind;
  const findings: Finding[] = [];
  const fault = (
    path: readonly PropertyKey[],
    wanted: string,
    problem: Finding['detail'] extends never
      ? never
      : 'descriptor-invalid' | 'required-missing' | 'unit-unknown' | 'unit-unfit' = 'descriptor-invalid',
    read?: string,
    remedy?: string,
  ): void => {
    const inTable = path[0] === undefined || hasOwnPath(setting, path[0]);
    findings.push(jsonFinding(json, problem, [...(inTable ? ['tables', index] : []), ...path], wanted, read, remedy));
  };

  const toSi = (
    quantity: NumberQuantity | 'pressure' | 'temperature',
    given: { value: number; unit: string },
    path: readonly PropertyKey[],
  ): number => {
    const conversion = conversionTo(QUANTITY_UNITS[quantity], given.unit, {
      molarMassGPerMol: Number.NaN,
      atomsPerFormula: null,
      per: null,
    });
    if (conversion.ok) return given.value * conversion.factor + conversion.offset;
    fault([...path, 'unit'], conversion.wanted, conversion.problem, given.unit, conversion.remedy);
    return 0;
  };

  if (table.basis === undefined)
    fault(
      ['basis'],
      'measured, evaluated, computed or estimated',
      'required-missing',
      'nothing',
      'add "basis" to the source or to the table',
    );

  // Columns, then what stands for a column.
  const columns: ColumnMeaning[] = [];
  const allowed: readonly string[] = [...NUMBERS[kind], ...WORDS[kind], 'uncertainty', 'ignored'];
  let fromZeroK = table.from === 0;
  for (const [header, column] of Object.entries(table.columns)) {
    const path = ['columns', header];
    if (!allowed.includes(column.is)) {
      fault([...path, 'is'], `for ${kind}: ${allowed.join(', ')}`);
      continue;
    }
    if (
      column.is !== 'ignored' &&
      column.is !== 'note' &&
      column.is !== 'uncertainty' &&
      columns.some((other) => other.is === column.is)
    )
      fault([...path, 'is'], `each quantity once in a table; "${column.is}" stands twice`);
    if ('from' in column && column.from === 0) fromZeroK = true;
    checkUnit(column, path, fault);
    columns.push(columnMeaning(header, column));
  }
  for (const [position, column] of columns.entries())
    if (column.is === 'uncertainty' && !columns.some((other) => other.is === column.of))
      fault(
        ['columns', columns[position]!.header, 'of'],
        `a quantity that a column of this table holds: ${columns
          .filter((c) => c.unit !== null && c.is !== 'uncertainty')
          .map((c) => c.is)
          .join(', ')}`,
      );

  const words: Partial<Record<TextQuantity, WordFrom>> = {};
  for (const [position, column] of columns.entries())
    if ((TEXT_QUANTITIES as readonly string[]).includes(column.is))
      words[column.is as TextQuantity] = { column: position };
  const numbers: Partial<Record<NumberQuantity, ConstantNumber>> = {};

  const setWord = (quantity: TextQuantity, from: WordFrom, path: readonly PropertyKey[]): void => {
    if (!WORDS[kind].includes(quantity)) fault(path, `no "${quantity}" in a table of ${kind}`);
    else if (words[quantity] !== undefined && !sameColumn(columns, words[quantity], from))
      fault(path, `"${quantity}" said once: a column holds it already`);
    else words[quantity] = from;
  };
  const columnCalled = (header: string, is: TextQuantity): WordFrom => {
    const position = columns.findIndex((column) => column.header === tidyHeader(header));
    if (position >= 0) {
      if (columns[position]!.is === 'ignored') columns[position] = wordMeaning(header, is);
      return { column: position };
    }
    columns.push(wordMeaning(header, is));
    return { column: columns.length - 1 };
  };
  for (const key of ['substance', 'phase'] as const) {
    const from = table[key];
    if (from === undefined) continue;
    if (typeof from === 'string') setWord(key, { constant: from }, [key]);
    else if ('column' in from) setWord(key, columnCalled(from.column, key), [key]);
    else if ('fileName' in from && key === 'substance') {
      if (!isExpression(from.fileName)) fault([key, 'fileName'], 'a regular expression with one group in brackets');
      else words.substance = { constant: '' };
    }
  }
  if (table.incrementsFrom !== undefined)
    setWord('increments-from', { constant: table.incrementsFrom }, ['incrementsFrom']);

  for (const [key, constant] of Object.entries(table.constants ?? {})) {
    const path = ['constants', key];
    if ((WORDS[kind] as readonly string[]).includes(key)) {
      if (typeof constant === 'string') setWord(key as TextQuantity, { constant }, path);
      else fault(path, 'a word in double quotes');
    } else if ((NUMBERS[kind] as readonly string[]).includes(key)) {
      const quantity = key as NumberQuantity;
      if (!isObject(constant)) fault(path, '{ "value": …, "unit": "…" }');
      else if (kind === 'thermal-functions')
        fault(path, 'a column for every quantity of a thermal-functions table (an isobar is the table\'s "pressure")');
      else if (columns.some((column) => column.is === quantity))
        fault(path, `"${key}" said once: a column holds it already`);
      else
        numbers[quantity] = {
          value: toSi(quantity, constant as { value: number; unit: string }, path),
          decimals: EXACT_DECIMALS,
          printed: `${constant.value} ${constant.unit}`,
        };
    } else fault(path, `for ${kind}: ${[...NUMBERS[kind], ...WORDS[kind]].join(', ')}`);
  }
  const isobarPa = table.pressure === undefined ? null : toSi('pressure', table.pressure, ['pressure']);
  if (
    isobarPa !== null &&
    kind === 'transitions' &&
    numbers.pressure === undefined &&
    !columns.some((column) => column.is === 'pressure')
  )
    numbers.pressure = {
      value: isobarPa,
      decimals: EXACT_DECIMALS,
      printed: `${table.pressure!.value} ${table.pressure!.unit}`,
    };

  for (const quantity of REQUIRED[kind])
    if (
      words[quantity as TextQuantity] === undefined &&
      numbers[quantity as NumberQuantity] === undefined &&
      !columns.some((column) => column.is === quantity)
    )
      fault(
        [],
        `"${quantity}" in a table of ${kind}`,
        'required-missing',
        'no column or constant of it',
        `give a column "is": "${quantity}"${(TEXT_QUANTITIES as readonly string[]).includes(quantity) ? `, or a constant` : ''}`,
      );
  if (
    kind !== 'transitions' &&
    !columns.some((column) => column.is !== 'temperature' && (NUMBERS[kind] as readonly string[]).includes(column.is))
  )
    fault(
      ['columns'],
      `a column of one of ${NUMBERS[kind].filter((q) => q !== 'temperature').join(', ')}`,
      'required-missing',
    );

  const phases = table.phases ?? {};
  const nested = Object.values(phases).some((value) => typeof value === 'object');
  for (const quantity of ['phase', 'from-phase', 'to-phase', 'increments-from'] as const) {
    const from = words[quantity];
    if (from !== undefined && 'constant' in from && !nested && resolvePhase(phases, '', from.constant) === null)
      fault(
        quantity === 'phase' && table.phase !== undefined
          ? ['phase']
          : quantity === 'increments-from' && table.incrementsFrom !== undefined
            ? ['incrementsFrom']
            : ['constants', quantity],
        phaseWanted(from.constant, phases),
      );
  }

  let names: Readonly<Record<string, string>> = {};
  if (typeof table.names === 'string') {
    const text = setting.textOf(table.names);
    if (text === null) fault(['names'], `a two-column CSV in the source's folder`, 'descriptor-invalid');
    else names = namesFromCsv(text);
  } else names = table.names ?? {};

  const reference = table.referenceTemperature;
  const meaning: Omit<TableMeaning, 'file'> = {
    source: sourceId,
    table: table.id ?? `#${index}`,
    holds: kind,
    basis: table.basis ?? 'measured',
    restsOn: table.restsOn ?? [],
    rank: table.rank ?? 1,
    temperatureScale: table.temperatureScale ?? (table.basis === 'computed' ? 'thermodynamic' : 'not-stated'),
    standardPressurePa:
      table.standardPressure === undefined ? 100000 : toSi('pressure', table.standardPressure, ['standardPressure']),
    referenceTemperatureK:
      typeof reference === 'object' ? toSi('temperature', reference, ['referenceTemperature']) : (reference ?? 298.15),
    enthalpyZero: table.enthalpyZero ?? null,
    entropyZero: table.entropyZero ?? null,
    isobarPa: kind === 'transitions' ? null : isobarPa,
    incrementsFromZeroK: fromZeroK,
    columns,
  };

  if (findings.length > 0) return { plans: brokenPlan(setting, findings[0]!), findings };
  const files = matchFiles(table.file, setting.fileNames);
  if (files.length === 0) {
    const missing = fileMissing(setting, table.file);
    return { plans: brokenPlan(setting, missing), findings: [missing] };
  }
  const plans: TablePlan[] = [];
  for (const file of files) {
    let substance = words.substance!;
    if (isObject(table.substance) && 'fileName' in table.substance) {
      const match = new RegExp(table.substance.fileName as string, 'u').exec(file);
      if (match?.[1] === undefined) {
        findings.push(
          jsonFinding(
            json,
            'descriptor-invalid',
            ['tables', index, 'substance', 'fileName'],
            `an expression whose group finds the substance in "${file}"`,
          ),
        );
        continue;
      }
      substance = { constant: match[1] };
    }
    plans.push({
      meaning: { ...meaning, file },
      file,
      layout: layoutOf(table, file),
      substance,
      words,
      numbers,
      where: Object.entries(table.where ?? {}).map(([header, clause]) => ({
        header: tidyHeader(header),
        from: clause.from ?? null,
        to: clause.to ?? null,
        is: listOf(clause.is),
        not: listOf(clause.not),
      })),
      names,
      phases,
      othersIgnored: table.others === 'ignored',
      namedElsewhere: namedElsewhere(setting, file),
      broken: null,
    });
  }
  return { plans, findings };
}

/** Plans that only tell which substances a table would have touched, as far as its entry can be understood. */
export function brokenPlan(setting: TableSetting, broken: Finding): TablePlan[] {
  const { raw, sourceId, index } = setting;
  if (typeof raw.file !== 'string') return [];
  const columns: ColumnMeaning[] = [];
  let substance: WordFrom | null = null;
  const columnOf = (header: string): WordFrom => {
    columns.push(wordMeaning(header, 'substance'));
    return { column: columns.length - 1 };
  };
  if (typeof raw.substance === 'string') substance = { constant: raw.substance };
  else if (isObject(raw.substance) && typeof raw.substance.column === 'string')
    substance = columnOf(raw.substance.column);
  else if (isObject(raw.columns)) {
    const found = Object.entries(raw.columns).find(([, column]) => isObject(column) && column.is === 'substance');
    if (found !== undefined) substance = columnOf(found[0]);
  }
  const names = isObject(raw.names)
    ? raw.names
    : typeof raw.names === 'string'
      ? namesFromCsv(setting.textOf(raw.names) ?? '')
      : {};
  const files = matchFiles(raw.file, setting.fileNames);
  return (files.length > 0 ? files : [raw.file]).map((file) => ({
    meaning: {
      source: sourceId,
      file,
      table: typeof raw.id === 'string' ? raw.id : `#${index}`,
      holds: (READ_KINDS as readonly unknown[]).includes(raw.holds) ? (raw.holds as Kind) : 'thermal-functions',
      basis: 'measured',
      restsOn: [],
      rank: 1,
      temperatureScale: 'not-stated',
      standardPressurePa: 100000,
      referenceTemperatureK: 298.15,
      enthalpyZero: null,
      entropyZero: null,
      isobarPa: null,
      incrementsFromZeroK: false,
      columns,
    },
    file,
    layout: layoutOf(raw as Partial<TableDescriptor>, file),
    substance,
    words: {},
    numbers: {},
    where: [],
    names: Object.fromEntries(
      Object.entries(names).filter((entry): entry is [string, string] => typeof entry[1] === 'string'),
    ),
    phases: {},
    othersIgnored: true,
    namedElsewhere: [],
    broken,
  }));
}

/** Headers are compared without blanks around them, each run of blanks inside being one. */
export const tidyHeader = (header: string): string => header.replace(/\s+/gu, ' ').trim();

type Fault = (
  path: readonly PropertyKey[],
  wanted: string,
  problem?: 'unit-unknown' | 'unit-unfit',
  read?: string,
  remedy?: string,
) => void;

function checkUnit(column: ColumnDescriptor, path: readonly PropertyKey[], fault: Fault): void {
  if (!('unit' in column)) return;
  if (column.is === 'uncertainty' && ratioOf(column.unit) !== null) return;
  const quantity = column.is === 'uncertainty' ? column.of : column.is;
  const conversion = conversionTo(QUANTITY_UNITS[quantity], column.unit, { ...ANY_SUBSTANCE, per: column.per ?? null });
  if (!conversion.ok) fault([...path, 'unit'], conversion.wanted, conversion.problem, column.unit, conversion.remedy);
}

function columnMeaning(header: string, column: ColumnDescriptor): ColumnMeaning {
  const stated = 'uncertainty' in column ? column.uncertainty : undefined;
  const parts = stated === undefined ? [] : Array.isArray(stated) ? stated : [stated];
  return {
    header: tidyHeader(header),
    is: column.is,
    of: column.is === 'uncertainty' ? column.of : null,
    unit: 'unit' in column ? column.unit : null,
    per: ('per' in column ? column.per : undefined) ?? null,
    uncertainty: parts.map(
      (part): StatedUncertainty => ({
        relative: part.relative ?? null,
        absolute: part.absolute ?? null,
        coverage: part.coverage,
        shared: part.shared,
      }),
    ),
    rank: ('rank' in column ? column.rank : undefined) ?? null,
    coverage: column.is === 'uncertainty' ? column.coverage : 1,
    shared: column.is === 'uncertainty' ? column.shared : false,
  };
}

const wordMeaning = (header: string, is: TextQuantity): ColumnMeaning => ({
  header: tidyHeader(header),
  is,
  of: null,
  unit: null,
  per: null,
  uncertainty: [],
  rank: null,
  coverage: 1,
  shared: false,
});

function layoutOf(table: Partial<TableDescriptor>, file: string): Layout {
  const decimal = table.decimal === ',' ? ',' : '.';
  const tabs = /\.(?:tsv|tab)(?:\.gz)?$/i.test(file);
  const spaces = table.delimiter === 'spaces';
  const usual = tabs ? '\t' : decimal === ',' ? ';' : ',';
  const given = typeof table.delimiter === 'string' && table.delimiter.length === 1 ? table.delimiter : usual;
  return {
    delimiter: spaces ? ' ' : given,
    spaces,
    skipLines: typeof table.skipLines === 'number' ? table.skipLines : 0,
    headerless: table.headerless === true,
    comment: typeof table.comment === 'string' ? table.comment : null,
    decimal,
    missing: Array.isArray(table.missing)
      ? table.missing.filter((mark) => typeof mark === 'string').map((mark) => mark.trim())
      : [],
  };
}

function namedElsewhere(setting: TableSetting, file: string): string[] {
  const tables = setting.named.get(file);
  if (tables === undefined) return [];
  return [...tables].filter(([index]) => index !== setting.index).flatMap(([, headers]) => headers.map(tidyHeader));
}

function fileMissing(setting: TableSetting, pattern: string): Finding {
  return jsonFinding(
    setting.json,
    'file-missing',
    ['tables', setting.index, 'file'],
    `a file of the folder ${setting.sourceId}: ${setting.fileNames.slice(0, 20).join(', ')}`,
    pattern,
    'put the file there or correct the name; * stands for any letters, ? for one',
  );
}

/** True where the key stands on the table itself rather than on the source. */
function hasOwnPath(setting: TableSetting, key: PropertyKey): boolean {
  const { value } = setting.json;
  const tables = isObject(value) && Array.isArray(value.tables) ? value.tables : [];
  const table: unknown = tables[setting.index];
  return (isObject(table) && key in table) || !(isObject(value) && key in value);
}

const sameColumn = (columns: readonly ColumnMeaning[], a: WordFrom, b: WordFrom): boolean =>
  'column' in a && 'column' in b && columns[a.column]!.header === columns[b.column]!.header;

const listOf = (words: string | readonly string[] | undefined): readonly string[] | null =>
  words === undefined ? null : typeof words === 'string' ? [words] : words;

function isExpression(text: string): boolean {
  try {
    return new RegExp(`${text}|`, 'u').exec('')!.length === 2;
  } catch {
    return false;
  }
}
