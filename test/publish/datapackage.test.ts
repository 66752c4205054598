import { readFileSync } from 'node:fs';
import AjvDraft4 from 'ajv-draft-04';
import { describe, expect, test } from 'vitest';
import { type DatapackageInput, datapackage } from '../../pipeline/publish/publish.js';
import { TABLE_NAMES } from '../../schemas/release.js';

const Ajv = AjvDraft4.default;
const profile = (name: string) =>
  new Ajv({ strict: false, formats: { uri: true, email: true } }).compile(
    JSON.parse(readFileSync(new URL(`./profiles/${name}.json`, import.meta.url), 'utf8')) as object,
  );
const isDataPackage = profile('data-package');
const isTabularResource = profile('tabular-data-resource');

interface Resource {
  name: string;
  profile: string;
  path?: string | string[];
  format: string;
  schema: { fields: { name: string; type: string; unit?: string; description: string }[]; primaryKey: string[] };
}
type Descriptor = { resources: Resource[]; sources?: { title: string }[]; licenses?: object[]; name: string };

function describeLibrary(changes: Partial<DatapackageInput> = {}): Descriptor {
  const files = Object.fromEntries(
    TABLE_NAMES.map((name) => [name, { csv: [`${name}.csv`], parquet: [`${name}.parquet`] }]),
  ) as unknown as DatapackageInput['files'];
  const input = (citation: string | null, licence: string | null) => ({
    source: 'desk',
    file: 'points.csv',
    bytes: 10,
    sha256: 'b'.repeat(64),
    citation,
    licence,
    basis: 'evaluated' as const,
  });
  return datapackage({
    contentId: 'a'.repeat(64),
    version: '0.1.0',
    files,
    inputs: [input('A desk, 1998', 'CC-BY-4.0'), input('A desk, 1998', 'Own use; ask first'), input(null, null)],
    ...changes,
  }) as Descriptor;
}

describe('datapackage', () => {
  test('fits the open profile of a data package', () => {
    isDataPackage(describeLibrary());
    expect(isDataPackage.errors).toBeNull();
  });

  test('every CSV resource fits the open profile of a tabular data resource', () => {
    const tables = describeLibrary().resources.filter((resource) => resource.format === 'csv');
    expect(tables.map((resource) => resource.name)).toEqual([...TABLE_NAMES]);
    for (const resource of tables) {
      isTabularResource(resource);
      expect(isTabularResource.errors, resource.name).toBeNull();
    }
  });

  test('a table in parts has a list of paths, and a library without citations no sources; both fit', () => {
    const files = {
      ...(Object.fromEntries(
        TABLE_NAMES.map((name) => [name, { csv: [`${name}.csv`], parquet: [`${name}.parquet`] }]),
      ) as unknown as DatapackageInput['files']),
      functions: { csv: ['functions-001-of-002.csv', 'functions-002-of-002.csv'], parquet: ['a.parquet', 'b.parquet'] },
    };
    const descriptor = describeLibrary({ files, inputs: [] });
    expect(descriptor.resources[0]!.path).toEqual(files.functions.csv);
    expect(descriptor).not.toHaveProperty('sources');
    expect(descriptor).not.toHaveProperty('licenses');
    isDataPackage(descriptor);
    expect(isDataPackage.errors).toBeNull();
    isTabularResource(descriptor.resources[0]);
    expect(isTabularResource.errors).toBeNull();
  });

  test('the profiles are awake: what breaks the standard is refused', () => {
    const broken = [
      (one: Descriptor) => delete one.resources[0]!.path,
      (one: Descriptor) => (one.resources[0]!.name = 'Upper Case'),
      (one: Descriptor) => (one.licenses = []),
      (one: Descriptor) => (one.sources = [{} as { title: string }]),
    ];
    for (const breakIt of broken) {
      const descriptor = describeLibrary();
      breakIt(descriptor);
      expect(isDataPackage(descriptor), String(breakIt)).toBe(false);
    }
    const resource = describeLibrary().resources[0]!;
    resource.schema.fields[0]!.type = 'float';
    expect(isTabularResource(resource)).toBe(false);
  });

  test('fields have type, unit and description, and the key is the published one', () => {
    const [functions] = describeLibrary().resources;
    expect(functions!.schema.primaryKey).toEqual(['substance', 'phase', 'isobar_Pa', 'temperature_K', 'side']);
    expect(functions!.schema.fields.find((field) => field.name === 'heat_capacity_J_per_mol_K')).toEqual({
      name: 'heat_capacity_J_per_mol_K',
      type: 'number',
      unit: 'J/(mol.K)',
      description: 'Molar heat capacity at constant pressure',
      constraints: { required: true },
    });
    expect(functions!.schema.fields.find((field) => field.name === 'basis')).toMatchObject({
      type: 'string',
      constraints: { required: true, enum: ['measured', 'interpolated', 'extrapolated'] },
    });
  });

  test('sources and licences stand once each', () => {
    const descriptor = describeLibrary();
    expect(descriptor.sources).toEqual([{ title: 'A desk, 1998' }]);
    expect(descriptor.licenses).toEqual([
      { name: 'CC-BY-4.0', title: 'CC-BY-4.0' },
      { name: 'Own-use-ask-first', title: 'Own use; ask first' },
    ]);
  });
});
