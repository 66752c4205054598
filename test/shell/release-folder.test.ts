import { spawnSync } from 'node:child_process';
import {
  cpSync,
  existsSync,
  mkdirSync,
  mkdtempSync,
  readdirSync,
  readFileSync,
  readlinkSync,
  renameSync,
  rmSync,
  symlinkSync,
  truncateSync,
  writeFileSync,
} from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, afterEach, beforeAll, beforeEach, describe, expect, test, vi } from 'vitest';
import { inputsTable, publish } from '../../pipeline/publish/publish.js';
import { contentId, releaseName } from '../../pipeline/shell/content-id.js';
import { ParquetWriter } from '../../pipeline/shell/duckdb.js';
import {
  currentRelease,
  discardDraft,
  existingRelease,
  finishDraft,
  moveCurrent,
  openDraft,
  placeDraft,
  type ReleaseDraft,
} from '../../pipeline/shell/release-folder.js';
import { writePart, writeWhole } from '../../pipeline/shell/release-tables.js';
import { verifyRelease } from '../../pipeline/shell/verify.js';
import { contentsSchema, type InputFile } from '../../schemas/contents.js';
import type { Summary } from '../../schemas/summary.js';
import { finding, reconciled, sentence } from '../publish/hand-made.js';

const FIRST = 'a'.repeat(64);
const SECOND = 'b'.repeat(64);
const INPUTS: InputFile[] = [
  {
    source: 'desk',
    file: 'points.csv',
    bytes: 12,
    sha256: 'c'.repeat(64),
    citation: 'A desk, 1998',
    licence: 'CC0-1.0',
    basis: 'evaluated',
  },
];

/** Files are written through to the disk, which may be slow. */
vi.setConfig({ testTimeout: 60_000, hookTimeout: 60_000 });
let writer: ParquetWriter;
let out: string;
beforeAll(async () => {
  writer = await ParquetWriter.open();
});
afterAll(() => writer.close());
beforeEach(() => {
  out = mkdtempSync(join(tmpdir(), 'releases-'));
});
afterEach(() => rmSync(out, { recursive: true }));

/** A draft with all its files: three substances, the functions in `parts` parts. */
async function fullDraft(id: string, previous: Summary | null = null, parts = 1): Promise<ReleaseDraft> {
  const draft = await openDraft(out, id);
  const cases = ['oil', 'salt', 'wax'].map((one) => reconciled(one, { findings: [finding(`f-${one}`, one)] }));
  const { functions, ...others } = publish(cases, { sentence }).artefact;
  const records = await writeWhole(writer, { ...others, inputs: inputsTable(INPUTS) }, draft.folder, id);
  for (let part = 0; part < parts; part++) {
    const tables =
      parts === 1 ? { functions } : { functions: publish([cases[part]!], { sentence }).artefact.functions };
    records.push(...(await writePart(writer, tables, draft.folder, part, parts, id)));
  }
  mkdirSync(join(draft.folder, 'report'));
  writeFileSync(join(draft.folder, 'report', 'index.html'), '<title>Report</title>');
  const { substances } = others;
  await finishDraft(draft, { version: '0.1.0', date: '2026-01-31', inputs: INPUTS, records, substances, previous });
  return draft;
}

async function release(id: string, previous: Summary | null = null, parts = 1): Promise<string> {
  const { folder } = await placeDraft(await fullDraft(id, previous, parts));
  await moveCurrent(out, releaseName(id));
  return folder;
}

const releases = () => readdirSync(join(out, 'releases')).sort();

describe('a release', () => {
  test('lies whole under its name, current points to it, and it verifies', async () => {
    const folder = await release(FIRST);
    expect(releases()).toEqual([releaseName(FIRST)]);
    expect(readlinkSync(join(out, 'current'))).toBe(join('releases', releaseName(FIRST)));
    expect(readFileSync(join(out, 'current', 'summary.json'), 'utf8')).toContain('"date": "2026-01-31"');
    expect(await verifyRelease(folder)).toEqual([]);
    expect(await verifyRelease(join(out, 'current'))).toEqual([]);
    expect(readdirSync(out).sort()).toEqual(['current', 'releases']);
  });

  test('lists every file but contents.json, the report included, and every input', async () => {
    const folder = await release(FIRST);
    const contents = contentsSchema.parse(JSON.parse(readFileSync(join(folder, 'contents.json'), 'utf8')));
    const paths = contents.files.map(({ path }) => path);
    expect(paths).toHaveLength(25);
    expect(paths).toEqual(
      expect.arrayContaining(['report/index.html', 'datapackage.json', 'summary.json', 'inputs.csv']),
    );
    expect(contents.inputs).toEqual([{ source: 'desk', file: 'points.csv', bytes: 12, sha256: 'c'.repeat(64) }]);
  });

  test('made twice from the same has the same bytes, and its date stands in summary.json only', async () => {
    const folder = await release(FIRST);
    const again = await fullDraft(FIRST);
    const names = readdirSync(folder).filter((name) => name !== 'report');
    expect(readdirSync(again.folder).filter((name) => name !== 'report')).toEqual(names);
    for (const name of names) {
      const bytes = readFileSync(join(folder, name));
      expect(bytes.equals(readFileSync(join(again.folder, name))), name).toBe(true);
      expect(bytes.includes('2026-01-31'), name).toBe(name === 'summary.json');
    }
  });

  test('in parts verifies too, and counts the rows of all parts', async () => {
    const folder = await release(FIRST, null, 3);
    expect(await verifyRelease(folder)).toEqual([]);
    const summary = JSON.parse(readFileSync(join(folder, 'summary.json'), 'utf8')) as Summary;
    expect(summary.counts.rows).toMatchObject({ functions: 18, substances: 3, inputs: 1 });
    const descriptor = readFileSync(join(folder, 'datapackage.json'), 'utf8');
    expect(descriptor).toContain('functions-003-of-003.parquet');
  });

  test('after another says since which one it changed', async () => {
    await release(FIRST);
    const current = await currentRelease(out);
    expect(current?.release).toBe(releaseName(FIRST));
    await release(SECOND, current!.summary as Summary);
    const next = (await currentRelease(out))!.summary as Summary;
    expect(next.changes).toEqual({ since: releaseName(FIRST), verdicts: [], added: [], removed: [] });
    expect(releases()).toEqual([releaseName(FIRST), releaseName(SECOND)]);
  });
});

describe('the same content again', () => {
  test('leaves the release that is there, when it is whole', async () => {
    const folder = await release(FIRST);
    expect(await existingRelease(out, FIRST)).toMatchObject({ release: releaseName(FIRST) });
    expect(await existingRelease(out, SECOND)).toBeNull();
    const draft = await fullDraft(FIRST);
    expect(await placeDraft(draft)).toEqual({ folder, reused: true });
    expect(releases()).toEqual([releaseName(FIRST)]);
  });

  test('replaces the release that is there, when it is damaged', async () => {
    const folder = await release(FIRST);
    truncateSync(join(folder, 'functions.csv'), 10);
    writeFileSync(join(folder, 'stranger.txt'), 'x');
    rmSync(join(folder, 'report'), { recursive: true });
    expect(await existingRelease(out, FIRST)).toBeNull();
    expect(await placeDraft(await fullDraft(FIRST))).toEqual({ folder, reused: false });
    expect(await verifyRelease(folder)).toEqual([]);
    expect(releases()).toEqual([releaseName(FIRST)]);
  });
});

describe('a run that fails', () => {
  test('while it writes leaves the old release, and its draft is no release', async () => {
    await release(FIRST);
    const draft = await openDraft(out, SECOND);
    writeFileSync(join(draft.folder, 'functions.csv'), 'half a');
    await discardDraft(draft);
    expect(releases()).toEqual([releaseName(FIRST)]);
    expect((await currentRelease(out))!.release).toBe(releaseName(FIRST));
  });

  test('is cleared away by the next run when its process is gone, and left alone while it lives', async () => {
    const folder = await release(FIRST);
    const gone = spawnSync(process.execPath, ['-e', '']).pid;
    const alive = process.ppid;
    cpSync(folder, join(out, 'releases', `.draft-${gone}-0123abcd`), { recursive: true });
    symlinkSync('releases/nowhere', join(out, `.current-${gone}-0123abcd`));
    mkdirSync(join(out, 'releases', `.draft-${alive}-0123abcd`));
    const mine = await openDraft(out, SECOND);
    const other = await openDraft(out, SECOND);
    const left = [`.draft-${alive}-0123abcd`, mine.folder, other.folder].map((path) => path.split('/').at(-1)!);
    expect(releases()).toEqual([...left, releaseName(FIRST)].sort());
    expect(readdirSync(out).sort()).toEqual(['current', 'releases']);
  });

  test('when the draft cannot be moved leaves current where it was', async () => {
    await release(FIRST);
    const draft = await fullDraft(SECOND);
    renameSync(draft.folder, `${draft.folder}-lost`);
    await expect(placeDraft(draft)).rejects.toThrow('ENOENT');
    expect((await currentRelease(out))!.release).toBe(releaseName(FIRST));
    expect(await verifyRelease(join(out, 'current'))).toEqual([]);
  });

  test('when current cannot be moved leaves it, and no link beside it', async () => {
    await release(FIRST);
    rmSync(join(out, 'current'));
    mkdirSync(join(out, 'current', 'kept'), { recursive: true });
    await expect(moveCurrent(out, releaseName(FIRST))).rejects.toThrow();
    expect(readdirSync(out).sort()).toEqual(['current', 'releases']);
    expect(existsSync(join(out, 'current', 'kept'))).toBe(true);
  });

  test('before all tables are written cannot finish', async () => {
    const draft = await openDraft(out, FIRST);
    const { substances } = publish([], { sentence }).artefact;
    const records = await writeWhole(writer, { substances }, draft.folder, FIRST);
    const input = { version: '0.1.0', date: '2026-01-31', inputs: [], records, substances, previous: null };
    await expect(finishDraft(draft, input)).rejects.toThrow('table functions was not written');
  });
});

describe('currentRelease', () => {
  test('is null before the first release, and says when the one that stands cannot be read', async () => {
    expect(await currentRelease(out)).toBeNull();
    const folder = await release(FIRST);
    writeFileSync(join(folder, 'summary.json'), '{');
    expect(await currentRelease(out)).toEqual({ release: releaseName(FIRST), folder, summary: 'unreadable' });
  });
});

describe('contentId', () => {
  const facts = {
    inputs: INPUTS,
    policy: { a: 1, b: { c: 2, d: [1, 2] } },
    acceptances: [{ id: 'x' }, { id: 'y' }],
    version: '1',
  };

  test('is the same whatever the order of inputs, keys and acceptances', () => {
    const other = { ...INPUTS[0]!, file: 'other.csv' };
    const shuffled = { policy: { b: { d: [1, 2], c: 2 }, a: 1 }, acceptances: [{ id: 'y' }, { id: 'x' }] };
    expect(contentId({ ...facts, ...shuffled, inputs: [other, INPUTS[0]!] })).toBe(
      contentId({ ...facts, inputs: [INPUTS[0]!, other] }),
    );
    expect(contentId(facts)).toMatch(/^[0-9a-f]{64}$/);
  });

  test('is another one when an input, the policy, an acceptance or the version differs', () => {
    const others = [
      facts,
      { ...facts, inputs: [{ ...INPUTS[0]!, sha256: 'd'.repeat(64) }] },
      { ...facts, inputs: [{ ...INPUTS[0]!, file: 'other.csv' }] },
      { ...facts, policy: { a: 1, b: { c: 2, d: [2, 1] } } },
      { ...facts, acceptances: [{ id: 'x' }] },
      { ...facts, version: '2' },
    ];
    expect(new Set(others.map(contentId)).size).toBe(others.length);
  });
});
