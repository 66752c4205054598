import { mkdirSync, rmSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { writeSmallLibrary } from '../shell/small-library.js';
import { makeRelease, type Release, temporaryFolder } from './release.js';

vi.setConfig({ testTimeout: 30_000 });

let folder: string;
beforeEach(() => {
  folder = temporaryFolder();
});
afterEach(() => rmSync(folder, { recursive: true, force: true }));

/** Vapour pressures of `amber` and of `mist`, of which nothing else is known, over the liquid. */
const ROWS = ['amber,l,600.0,1.250', 'amber,l,650.0,4.310', 'mist,l,300.0,3.54', 'mist,l,320.0,10.5'];

async function release(rows: readonly string[], corrections: readonly object[] = []): Promise<Release> {
  const sources = join(folder, 'sources');
  writeSmallLibrary(sources, ['amber', 'birch'], { empty: ['mist'] });
  const vapours = join(sources, 'vapours');
  mkdirSync(vapours);
  const columns = {
    name: { is: 'substance' },
    over: { is: 'phase' },
    'T/K': { is: 'temperature', unit: 'K' },
    'p/kPa': { is: 'pressure', unit: 'kPa' },
  };
  const descriptor = {
    title: 'Vapours',
    citation: 'Made up for a test, too',
    licence: 'CC0-1.0',
    basis: 'measured',
    temperatureScale: 'ITS-90',
    tables: [
      {
        file: 'vapours.csv',
        holds: 'vapour-pressures',
        substance: { column: 'name' },
        phase: { column: 'over' },
        columns,
      },
    ],
  };
  writeFileSync(join(vapours, 'source.json'), JSON.stringify(descriptor, null, 2));
  writeFileSync(join(vapours, 'vapours.csv'), `name,over,T/K,p/kPa\n${rows.join('\n')}\n`);
  writeFileSync(join(vapours, 'corrections.json'), JSON.stringify(corrections, null, 2));
  return makeRelease(sources, join(folder, 'out'));
}

const verdicts = (made: Release) =>
  Object.fromEntries(made.table('substances').map(({ substance, verdict }) => [substance, verdict]));
const about = (made: Release, substance: string) =>
  made.table('findings').filter((finding) => finding.substance === substance);

describe('a library with vapour pressures', () => {
  it('is published as without them, and their files count among the inputs', async () => {
    const made = await release(ROWS);
    expect(made.status).toBe(0);
    expect(verdicts(made)).toMatchObject({ amber: 'cleared', birch: 'cleared' });
    expect(about(made, 'amber')).toEqual([]);
    const input = made.table('inputs').find(({ file }) => file === 'vapours.csv');
    expect(input).toMatchObject({ source: 'vapours', basis: 'measured', citation: 'Made up for a test, too' });
    expect(input!.bytes).toBe(`name,over,T/K,p/kPa\n${ROWS.join('\n')}\n`.length);
  });

  it('has room for a substance that has nothing else: no curve, and no breakdown either', async () => {
    const made = await release(ROWS);
    expect(about(made, 'mist')).toEqual([]);
    expect(made.table('functions').filter(({ substance }) => substance === 'mist')).toEqual([]);
    const row = made.table('coverage').filter(({ substance, rule }) => substance === 'mist' && rule === 'row-readable');
    expect(row.map(({ outcome }) => outcome)).toEqual(['agrees']);
  });

  it('withholds the substance of a cell that cannot be read or cannot be, and no other', async () => {
    const made = await release(['amber,l,600.0,1.25o', ...ROWS.slice(1, 3), 'mist,l,320.0,-10.5']);
    expect(verdicts(made)).toMatchObject({ amber: 'withheld', birch: 'cleared', mist: 'withheld' });
    expect(about(made, 'amber')).toEqual([
      expect.objectContaining({
        rule: 'row-readable',
        source: 'vapours',
        file: 'vapours.csv',
        line: 2,
        column: 'p/kPa',
      }),
    ]);
    expect(about(made, 'amber')[0]!.message).toContain('1.25o');
    expect(about(made, 'mist')).toEqual([
      expect.objectContaining({ rule: 'value-possible', line: 5, column: 'p/kPa', observed: -10_500, unit: 'Pa' }),
    ]);
    expect(about(made, 'mist')[0]!.message).toContain(
      ' of l is -10.5, which cannot be; expected was a pressure above 0',
    );
  });

  it('takes a correction of such a cell', async () => {
    const entry = {
      file: 'vapours.csv',
      line: 5,
      column: 'p/kPa',
      printed: '-10.5',
      corrected: '10.5',
      reason: 'a stroke of the printer',
      who: 'A. Nobody',
      date: '2025-05-06',
    };
    const made = await release([...ROWS.slice(0, 3), 'mist,l,320.0,-10.5'], [entry]);
    expect(about(made, 'mist')).toEqual([]);
    expect(made.status).toBe(0);
  });
});
