import { cpSync, existsSync, readdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { afterAll, beforeAll, describe, expect, it, vi } from 'vitest';
import { makeRelease, type Release, ROOT, type Row, temporaryFolder } from './release.js';

vi.setConfig({ testTimeout: 30_000, hookTimeout: 60_000 });

const SLIPPED = new Set(
  (JSON.parse(readFileSync(join(ROOT, 'test/demo/planted-slips.json'), 'utf8')) as { medium: string }[]).map(
    ({ medium }) => medium,
  ),
);

let folder: string;
let whole: Release;
beforeAll(async () => {
  folder = temporaryFolder();
  whole = await makeRelease(join(ROOT, 'sources'), join(folder, 'whole'));
});
afterAll(() => rmSync(folder, { recursive: true, force: true }));

interface Breakage {
  readonly what: string;
  /** Below the sources folder. */
  readonly file: string;
  readonly change: (text: string) => string;
  /** Where the message must point: file of the source, line, column. */
  readonly at: readonly [string, number | ((text: string) => number), string];
  readonly says: readonly string[];
  /** Clean media that lose what the broken place provides; every other one is published as before. */
  readonly touched: readonly string[];
}

const line = (text: string, number: number, change: (line: string) => string): string =>
  text
    .split('\n')
    .map((one, i) => (i === number - 1 ? change(one) : one))
    .join('\n');
const lineOf =
  (words: string) =>
  (text: string): number =>
    text.slice(0, text.indexOf(words)).split('\n').length;
const binder = ['brevorite', 'kestrane', 'orblesalt', 'ulmerium', 'yarrolite'];
const sheets = ['brevorite', 'kestrane', 'yarrolite'];

const breakages: Breakage[] = [
  {
    what: 'an unreadable row',
    file: 'quay-tables/tables/dunsalt.csv',
    change: (text) => line(text, 10, (row) => row.split(',').with(3, 'fifty').join(',')),
    at: ['tables/dunsalt.csv', 10, 'Cp'],
    says: ['fifty', 'a number', 'corrections.json'],
    touched: ['dunsalt'],
  },
  {
    what: 'a row that is cut short',
    file: 'quay-tables/tables/sarnium.csv',
    change: (text) => line(text, 12, (row) => row.split(',').slice(0, 4).join(',')),
    at: ['tables/sarnium.csv', 12, ''],
    says: [],
    touched: ['sarnium'],
  },
  {
    what: 'an infinity where no limit row allows one',
    file: 'quay-tables/tables/fennarite.csv',
    change: (text) => line(text, 9, (row) => row.split(',').with(4, 'inf').join(',')),
    at: ['tables/fennarite.csv', 9, 'S'],
    says: ['inf'],
    touched: ['fennarite'],
  },
  {
    what: 'an unknown unit',
    file: 'grey-binder/source.json',
    change: (text) => text.replace('"is": "entropy", "unit": "cal_th/', '"is": "entropy", "unit": "calory/'),
    at: ['source.json', lineOf('calory/'), 'tables[0].columns.S.unit'],
    says: ['calory/(mol.K)', 'UCUM', 'cal_th/(mol.K)'],
    touched: sheets,
  },
  {
    what: 'a missing column',
    file: 'quay-tables/tables/torvium.csv',
    change: (text) =>
      text
        .split('\n')
        .map((row, i) => (i < 2 ? row : row.split(',').toSpliced(4, 1).join(',')))
        .join('\n'),
    at: ['tables/torvium.csv', 3, 'S'],
    says: ['column "S"', 'header'],
    touched: ['torvium'],
  },
  {
    what: 'a descriptor that is no JSON',
    file: 'grey-binder/source.json',
    change: (text) => text.replace('"rank": 2,', '"rank": 2'),
    at: ['source.json', lineOf('"temperatureScale"'), 'character 3'],
    says: ['JSON', '","'],
    touched: binder,
  },
  {
    what: 'a descriptor that says something unknown',
    file: 'grey-binder/source.json',
    change: (text) => text.replace('"holds": "anchors"', '"holds": "anchor"'),
    at: ['source.json', lineOf('"holds": "anchor"'), 'tables[2].holds'],
    says: ['"anchor"', 'nearest: anchors'],
    touched: binder,
  },
  {
    what: 'an unmapped name',
    file: 'quay-tables/tables/wexide.csv',
    change: (text) => text.replaceAll('Wexide,', 'Wexite,'),
    at: ['tables/wexide.csv', 4, 'Medium'],
    says: ['Wexite', 'nearest: Wexide', 'source.json'],
    touched: ['wexide'],
  },
];

describe('input that cannot be used', () => {
  it.each(breakages)(
    '$what: is named by file, line and column, and the other media are published',
    async (breakage) => {
      const { release, text } = await broken(breakage);
      expect(release.status).toBe(0);
      const [file, where, column] = breakage.at;
      const number = typeof where === 'number' ? where : where(text);
      const found = release
        .table('findings')
        .filter((row) => row.rule === 'row-readable' && row.file === file && row.line === number)
        .filter((row) => (row.column ?? '') === column);
      expect(
        found.length,
        JSON.stringify(release.table('findings').filter((row) => row.rule === 'row-readable')),
      ).toBeGreaterThan(0);
      const [source] = breakage.file.split('/');
      for (const { severity, message } of found) {
        expect(severity).toBe('fault');
        expect(message).toContain(`${source}/${file} line ${number}`);
        if (column !== '') expect(message).toContain(column);
        for (const words of breakage.says) expect(message).toContain(words);
      }
      // People are told the same.
      const told = release.lines.join(' ').replace(/\s+/g, ' ');
      expect(told).toContain(`${source}/${file} line ${number}`);
      const before = publishedMedia(whole);
      const after = publishedMedia(release);
      expect([...before].filter((medium) => !after.has(medium)).sort()).toEqual([...breakage.touched].sort());
      expect([...after].filter((medium) => !before.has(medium))).toEqual([]);
      for (const medium of before) {
        if (breakage.touched.includes(medium)) continue;
        expect(rowsOf(release, medium), medium).toEqual(rowsOf(whole, medium));
      }
    },
  );

  it('ends with status 3 where --strict asks for it, the release being published all the same', async () => {
    const { release } = await broken(breakages[0]!, '--strict');
    expect(release.status).toBe(3);
    expect(publishedMedia(release).size).toBe(15);
  });

  it('leaves no release and status 1 where nothing is left to publish', async () => {
    const sources = join(folder, 'all-broken');
    cpSync(join(ROOT, 'sources'), sources, { recursive: true });
    for (const entry of readdirSync(sources, { withFileTypes: true })) {
      if (entry.isDirectory()) writeFileSync(join(sources, entry.name, 'source.json'), '{ "title": ');
    }
    const out = join(folder, 'all-broken-out');
    const { status, lines } = await makeRelease(sources, out);
    expect(status).toBe(1);
    expect(existsSync(join(out, 'current'))).toBe(false);
    expect(lines.join(' ')).toContain('source.json line 1');
  });
});

let made = 0;
async function broken(breakage: Breakage, ...words: string[]): Promise<{ release: Release; text: string }> {
  const sources = join(folder, `sources-${++made}`);
  cpSync(join(ROOT, 'sources'), sources, { recursive: true });
  const path = join(sources, breakage.file);
  const before = readFileSync(path, 'utf8');
  const text = breakage.change(before);
  expect(text).not.toBe(before);
  writeFileSync(path, text);
  return { release: await makeRelease(sources, join(folder, `out-${made}`), ...words), text };
}

function publishedMedia(release: Release): Set<string> {
  const media = new Set(release.table('functions').map((row) => row.substance as string));
  for (const slipped of SLIPPED) expect(media.has(slipped)).toBe(false);
  return media;
}

function rowsOf(release: Release, medium: string): readonly Row[] {
  return release.table('functions').filter((row) => row.substance === medium);
}
