import { mkdirSync, mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { dirname, join } from 'node:path';
import { afterAll, expect, it } from 'vitest';
import { readArguments } from '../../pipeline/shell/arguments.js';
import { makeLog } from '../../pipeline/shell/log.js';
import { nightly } from '../../pipeline/shell/nightly.js';

const quiet = makeLog({ style: 'json', out: { write: () => true }, err: { write: () => true }, nowMs: () => 0 });
const folder = mkdtempSync(join(tmpdir(), 'cuspline-readme-'));
afterAll(() => rmSync(folder, { recursive: true, force: true }));

it('publishes the table of its own example on the zero that the example declares', async () => {
  const readme = readFileSync('README.md', 'utf8');
  const example = readme.slice(readme.indexOf('## Your own table'), readme.indexOf('3. `cuspline check'));
  const blocks = [...example.matchAll(/^ *```\w*\n([\s\S]*?)^ *```/gm)].map((m) => m[1].replace(/^ {3}/gm, ''));
  const files = ['zinc/zinc.csv', 'zinc/anchors.csv', 'substances.csv', 'zinc/source.json'];
  expect(blocks).toHaveLength(files.length);
  files.forEach((file, i) => {
    const path = join(folder, 'lab', file);
    mkdirSync(dirname(path), { recursive: true });
    writeFileSync(path, blocks[i]);
  });
  const request = readArguments(
    ['nightly', '--sources', join(folder, 'lab'), '--out', join(folder, 'out')],
    '2026-01-01',
  );
  expect(await nightly(request, quiet)).toBe(0);
  const published = (name: string) => readFileSync(join(folder, 'out/current', `${name}.csv`), 'utf8');
  expect(published('substances')).toContain('zinc,Zinc,Zn,65.38,cleared');
  expect(published('phases')).toContain('elements-298.15,absolute');
});
