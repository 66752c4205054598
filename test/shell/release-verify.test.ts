import { createHash } from 'node:crypto';
import { appendFileSync, cpSync, mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, afterEach, beforeAll, beforeEach, describe, expect, test, vi } from 'vitest';
import { inputsTable, publish } from '../../pipeline/publish/publish.js';
import { ParquetWriter } from '../../pipeline/shell/duckdb.js';
import { finishDraft, openDraft, placeDraft } from '../../pipeline/shell/release-folder.js';
import { writeWhole } from '../../pipeline/shell/release-tables.js';
import { type ReleaseProblem, verifyRelease } from '../../pipeline/shell/verify.js';
import type { Contents } from '../../schemas/contents.js';
import { finding, reconciled, sentence } from '../publish/hand-made.js';

const ID = 'a'.repeat(64);
/** Files are written through to the disk, which may be slow. */
vi.setConfig({ testTimeout: 60_000, hookTimeout: 60_000 });
let whole: string;
let folder: string;
let writer: ParquetWriter;

beforeAll(async () => {
  writer = await ParquetWriter.open();
  whole = mkdtempSync(join(tmpdir(), 'whole [a]*?{b}-'));
  const draft = await openDraft(whole, ID);
  const { artefact } = publish([reconciled('oil', { findings: [finding('f', 'oil')] })], { sentence });
  const records = await writeWhole(writer, { ...artefact, inputs: inputsTable([]) }, draft.folder, ID);
  const { substances } = artefact;
  await finishDraft(draft, { version: '1', date: '2026-01-31', inputs: [], records, substances, previous: null });
  whole = (await placeDraft(draft)).folder;
});
afterAll(() => {
  writer.close();
  rmSync(join(whole, '..', '..'), { recursive: true });
});
beforeEach(() => {
  folder = `${whole}-copy`;
  cpSync(whole, folder, { recursive: true });
});
afterEach(() => rmSync(folder, { recursive: true }));

const text = (file: string) => readFileSync(join(folder, file), 'utf8');
const write = (file: string, content: string) => writeFileSync(join(folder, file), content);

/** Makes contents.json agree with the file as it is now, so that only what it holds can be found wrong. */
function recordAnew(file: string): void {
  const contents = JSON.parse(text('contents.json')) as Contents;
  const bytes = readFileSync(join(folder, file));
  const record = contents.files.find(({ path }) => path === file)!;
  Object.assign(record, { bytes: bytes.length, sha256: createHash('sha256').update(bytes).digest('hex') });
  write('contents.json', JSON.stringify(contents));
}

const about = (problems: readonly ReleaseProblem[], file: string) =>
  problems.filter((one) => one.file === file).map(({ problem }) => problem);

describe('verifyRelease', () => {
  test('finds nothing in a whole release, even in a folder whose name looks like a pattern', async () => {
    expect(await verifyRelease(folder)).toEqual([]);
  });

  test('finds a file that is missing and one that is not listed', async () => {
    rmSync(join(folder, 'evidence.csv'));
    write('notes.txt', 'hello');
    const problems = await verifyRelease(folder);
    expect(about(problems, 'evidence.csv')).toContain('the file is missing');
    expect(about(problems, 'notes.txt')).toEqual(['the file is not listed in contents.json']);
  });

  test('finds another size, and another content of the same size', async () => {
    appendFileSync(join(folder, 'phases.csv'), '\n');
    write('pieces.csv', text('pieces.csv').replace('20.1', '20.2'));
    const problems = await verifyRelease(folder);
    expect(about(problems, 'phases.csv')[0]).toMatch(/^the file has \d+ bytes, contents.json says \d+$/);
    expect(about(problems, 'pieces.csv')[0]).toMatch(/^the SHA-256 is /);
  });

  test('finds a CSV whose values or rows are not those of the Parquet file', async () => {
    write('pieces.csv', text('pieces.csv').replace('20.1', '20.100000000000004'));
    recordAnew('pieces.csv');
    write('phases.csv', text('phases.csv').split('\n').slice(0, 2).join('\n').concat('\n'));
    recordAnew('phases.csv');
    expect(await verifyRelease(folder)).toEqual([
      { file: 'phases.csv', problem: 'it has 1 rows, contents.json says 2' },
      { file: 'phases.csv', problem: 'it has 1 rows, phases.parquet has 2' },
      { file: 'pieces.csv', problem: 'its values are not those of pieces.parquet' },
    ]);
  });

  test('finds a number that is none', async () => {
    write('pieces.csv', text('pieces.csv').replaceAll('20.1', 'nan'));
    recordAnew('pieces.csv');
    expect(about(await verifyRelease(folder), 'pieces.csv')).toContain('2 rows hold numbers that are not finite');
  });

  test('finds tables that cannot be read', async () => {
    write('pieces.csv', text('pieces.csv').replace('20.1', 'twenty'));
    recordAnew('pieces.csv');
    write('phases.parquet', 'PAR1 and nothing more');
    recordAnew('phases.parquet');
    const problems = await verifyRelease(folder);
    expect(about(problems, 'pieces.csv')[0]).toMatch(/^the table cannot be read: /);
    expect(about(problems, 'phases.parquet')[0]).toMatch(/^the table cannot be read: /);
    expect(problems).toHaveLength(2);
  });

  test('finds another content id in a Parquet file, in the summary, and none at all', async () => {
    const { artefact } = publish([reconciled('oil', { findings: [finding('f', 'oil')] })], { sentence });
    rmSync(join(folder, 'pieces.parquet'));
    await writer.write(join(folder, 'pieces.parquet'), 'pieces', artefact.pieces, { content_id: 'other' });
    rmSync(join(folder, 'phases.parquet'));
    await writer.write(join(folder, 'phases.parquet'), 'phases', artefact.phases, {});
    write('summary.json', text('summary.json').replace(ID, 'b'.repeat(64)));
    for (const file of ['pieces.parquet', 'phases.parquet', 'summary.json']) recordAnew(file);
    expect(await verifyRelease(folder)).toEqual([
      { file: 'summary.json', problem: `the content id is ${'b'.repeat(64)}, contents.json says ${ID}` },
      { file: 'phases.parquet', problem: `its content id is null, contents.json says ${ID}` },
      { file: 'pieces.parquet', problem: `its content id is other, contents.json says ${ID}` },
    ]);
  });

  test('finds a table that no resource describes, and a resource without its file', async () => {
    write('datapackage.json', text('datapackage.json').replaceAll('"pieces.csv"', '"bits.csv"'));
    recordAnew('datapackage.json');
    expect(await verifyRelease(folder)).toEqual([
      { file: 'datapackage.json', problem: 'no resource describes pieces.csv' },
      { file: 'datapackage.json', problem: 'a resource describes bits.csv, which is not there' },
    ]);
  });

  test('finds a table that is left out altogether', async () => {
    const contents = JSON.parse(text('contents.json')) as Contents;
    contents.files = contents.files.filter(({ path }) => !path.startsWith('suspects.'));
    write('contents.json', JSON.stringify(contents));
    const problems = await verifyRelease(folder);
    expect(about(problems, 'contents.json')).toEqual(['no file holds the table suspects']);
  });

  test('finds one format without the other', async () => {
    const contents = JSON.parse(text('contents.json')) as Contents;
    contents.files = contents.files.filter(({ path }) => path !== 'suspects.parquet');
    write('contents.json', JSON.stringify(contents));
    expect(about(await verifyRelease(folder), 'suspects.parquet')).toContain(
      'the table has no such file, only the other format',
    );
  });

  test('says when contents.json, summary.json or datapackage.json cannot be read', async () => {
    write('summary.json', '[]');
    write('datapackage.json', '{"resources": 3}');
    let problems = await verifyRelease(folder);
    expect(about(problems, 'summary.json').join()).toContain('it cannot be read');
    expect(about(problems, 'datapackage.json')).toContain('it lists no resources');
    write('contents.json', 'nothing');
    problems = await verifyRelease(folder);
    expect(problems).toHaveLength(1);
    expect(problems[0]).toMatchObject({ file: 'contents.json' });
  });
});
