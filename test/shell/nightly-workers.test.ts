import { mkdtempSync, readdirSync, readFileSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { pathToFileURL } from 'node:url';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { readArguments } from '../../pipeline/shell/arguments.js';
import { openLibrary } from '../../pipeline/shell/library.js';
import { makeLog } from '../../pipeline/shell/log.js';
import { judge } from '../../pipeline/shell/night-work.js';
import type { Substance } from '../../schemas/substances.js';
import { ROOT } from './run-cli.js';
import { writeSmallLibrary } from './small-library.js';

vi.setConfig({ testTimeout: 60_000 });

const TWENTY = Array.from({ length: 20 }, (_, i) => `medium-${String(i).padStart(2, '0')}`);
const quiet = makeLog({ style: 'json', out: { write: () => true }, err: { write: () => true }, nowMs: () => 0 });

let folder: string;
beforeEach(() => {
  folder = mkdtempSync(join(tmpdir(), 'cuspline-night-'));
});
afterEach(() => rmSync(folder, { recursive: true, force: true }));

function request(...words: string[]) {
  return readArguments(['nightly', '--sources', join(folder, 'sources'), ...words], '2026-01-01');
}

describe('the night on several workers', () => {
  it('writes the same bytes with one worker and with two, whichever is faster', async () => {
    writeSmallLibrary(join(folder, 'sources'), TWENTY, { entropy: ['medium-07'], empty: ['medium-99'] });
    // Worker threads need the compiled program.
    const url = pathToFileURL(join(ROOT, '.build/pipeline/shell/nightly.js')).href;
    const { nightly } = (await import(/* @vite-ignore */ url)) as typeof import('../../pipeline/shell/nightly.js');
    const releases = [];
    for (const jobs of ['1', '2']) {
      const out = join(folder, `out-${jobs}`);
      expect(await nightly(request('--out', out, '--jobs', jobs), quiet, { partitionBytes: 3000 })).toBe(0);
      releases.push(bytesOf(join(out, 'current')));
    }
    const [one, two] = releases;
    expect([...one!.keys()].filter((name) => /^functions-\d+-of-\d+\.parquet$/.test(name)).length).toBeGreaterThan(3);
    expect([...two!.keys()]).toEqual([...one!.keys()]);
    for (const [name, bytes] of one!) expect(bytes.equals(two!.get(name)!), name).toBe(true);
  });
});

describe('a calculation that breaks down', () => {
  it('withholds that substance alone, and says that the program is at fault', () => {
    writeSmallLibrary(join(folder, 'sources'), TWENTY.slice(0, 4));
    const { substances, parts, settings } = openLibrary(request(), quiet);
    const trap = (one: Substance): Substance =>
      Object.defineProperty({ ...one }, 'molarMassGPerMol', {
        get: () => {
          throw new Error('sprung');
        },
      });
    const trapped = substances.map((one, i) => (i === 2 ? trap(one) : one));
    const { cases } = judge({ substances: trapped, settings }, parts, 0, 4);
    expect(cases.map(({ verdict }) => verdict)).toEqual(['cleared', 'cleared', 'withheld', 'cleared']);
    expect(cases[2]!.findings.map(({ detail }) => detail)).toEqual([{ code: 'calculation-failed', message: 'sprung' }]);
  });
});

function bytesOf(release: string): Map<string, Buffer> {
  return new Map(
    readdirSync(release)
      .sort()
      .map((name) => [name, readFileSync(join(release, name))]),
  );
}
