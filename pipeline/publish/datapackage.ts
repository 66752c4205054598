/**
 * `datapackage.json`: the release described by the open Data Package standard (specifications 1, Data Package, Data
 * Resource and Table Schema), so that other people's tools can read it. Units are UCUM codes in each field's `unit`.
 */
import type { InputFile } from '../../schemas/contents.js';
import { TABLE_NAMES, type TableName } from '../../schemas/release.js';
import { type PublishedField, type PublishedTable, RELEASE_TABLES } from '../../schemas/release-tables.js';

export interface DatapackageInput {
  readonly contentId: string;
  readonly version: string;
  /** Paths of each table's files, in the order of the parts. */
  readonly files: Readonly<Record<TableName, { readonly csv: readonly string[]; readonly parquet: readonly string[] }>>;
  readonly inputs: readonly InputFile[];
}

export function datapackage({ contentId, version, files, inputs }: DatapackageInput): object {
  const licences = unique(inputs.map((input) => input.licence));
  const sources = unique(inputs.map((input) => input.citation));
  return {
    profile: 'data-package',
    name: 'thermal-properties',
    id: contentId,
    title: 'Checked thermal properties of pure substances',
    description:
      'Heat capacities, entropies, enthalpies, Gibbs energies and transitions of pure substances with everything that was found when they were checked against each other. Numbers are SI, molar; temperatures in kelvin; uncertainties are standard uncertainties (k = 1).',
    version,
    ...(sources.length > 0 && { sources: sources.map((title) => ({ title })) }),
    ...(licences.length > 0 && { licenses: licences.map((title) => ({ name: licenceName(title), title })) }),
    resources: TABLE_NAMES.flatMap((name) => {
      const table: PublishedTable = RELEASE_TABLES[name];
      return [csvResource(name, table, files[name].csv), parquetResource(name, table, files[name].parquet)];
    }),
  };
}

function csvResource(name: TableName, table: PublishedTable, paths: readonly string[]): object {
  return {
    profile: 'tabular-data-resource',
    name,
    title: table.title,
    description: table.description,
    path: paths.length === 1 ? paths[0] : paths,
    format: 'csv',
    mediatype: 'text/csv',
    encoding: 'utf-8',
    dialect: {
      delimiter: ',',
      lineTerminator: '\n',
      quoteChar: '"',
      doubleQuote: true,
      skipInitialSpace: false,
      header: true,
    },
    schema: tableSchema(table),
  };
}

function parquetResource(name: TableName, table: PublishedTable, paths: readonly string[]): object {
  return {
    profile: 'data-resource',
    name: `${name}-parquet`,
    title: `${table.title} (Parquet)`,
    description: table.description,
    path: paths.length === 1 ? paths[0] : paths,
    format: 'parquet',
    mediatype: 'application/vnd.apache.parquet',
    schema: tableSchema(table),
  };
}

function tableSchema(table: PublishedTable): object {
  return {
    fields: table.fields.map(schemaField),
    primaryKey: [...table.key],
    missingValues: [''],
  };
}

function schemaField(field: PublishedField): object {
  const constraints = {
    ...(field.required && { required: true }),
    ...(field.allowed && { enum: [...field.allowed] }),
  };
  return {
    name: field.name,
    type: field.kind === 'text' ? 'string' : field.kind,
    description: field.description,
    ...(field.unit !== null && { unit: field.unit }),
    ...(Object.keys(constraints).length > 0 && { constraints }),
  };
}

function unique(words: readonly (string | null)[]): string[] {
  return [...new Set(words.filter((word): word is string => word !== null && word !== ''))].sort();
}

/** The standard's licence names hold letters, digits, `-`, `.` and `_` only. */
function licenceName(title: string): string {
  return (
    title
      .normalize('NFKD')
      .replaceAll(/[^-A-Za-z0-9._]+/g, '-')
      .replaceAll(/^-+|-+$/g, '') || 'other'
  );
}
