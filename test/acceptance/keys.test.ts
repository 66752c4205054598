import { mkdtempSync, readFileSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { readArguments } from '../../pipeline/shell/arguments.js';
import { makeLog } from '../../pipeline/shell/log.js';
import { nightly } from '../../pipeline/shell/nightly.js';
import { TABLE_NAMES } from '../../schemas/release.js';
import { RELEASE_TABLES } from '../../schemas/release-tables.js';

const quiet = makeLog({ style: 'json', out: { write: () => true }, err: { write: () => true }, nowMs: () => 0 });
const folder = mkdtempSync(join(tmpdir(), 'cuspline-keys-'));
afterAll(() => rmSync(folder, { recursive: true, force: true }));

/** Cells of a line; quoted cells keep their commas, which is all that a key needs. */
function cellsOf(line: string): string[] {
  return (line.match(/("([^"]|"")*"|[^,]*)(,|$)/g) ?? []).map((cell) => cell.replace(/,$/, ''));
}

describe.each(['sources', 'test/published', 'test/held-out'])('the release of %s', (sources) => {
  const out = join(folder, sources.replaceAll('/', '-'));
  beforeAll(async () => {
    await nightly(readArguments(['nightly', '--sources', sources, '--out', out], '2026-01-01'), quiet);
  }, 60_000);

  it.each(TABLE_NAMES)('has no two rows of %s with one key', (name) => {
    const [head, ...lines] = readFileSync(join(out, 'current', `${name}.csv`), 'utf8')
      .trimEnd()
      .split('\n');
    const header = cellsOf(head);
    const at = RELEASE_TABLES[name].key.map((field) => header.indexOf(field));
    expect(at.every((place) => place >= 0)).toBe(true);
    const seen = new Set<string>();
    const twice: string[] = [];
    for (const line of lines) {
      const cells = cellsOf(line);
      const key = at.map((place) => cells[place]).join(' | ');
      if (seen.has(key)) twice.push(key);
      seen.add(key);
    }
    expect(twice).toEqual([]);
  });
});
