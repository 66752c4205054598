import { readdirSync, readFileSync, rmSync } from 'node:fs';
import { join } from 'node:path';
import { DuckDBInstance } from '@duckdb/node-api';
import { asyncBufferFromFile, parquetReadObjects } from 'hyparquet';
import { compressors } from 'hyparquet-compressors';
import { afterAll, beforeAll, describe, expect, it, vi } from 'vitest';
import { TABLE_NAMES } from '../../schemas/release.js';
import { makeRelease, type Release, ROOT, type Row, temporaryFolder } from './release.js';

vi.setConfig({ testTimeout: 30_000, hookTimeout: 60_000 });

let folder: string;
let published: Release;
let again: Release;
let heldOut: Release;
beforeAll(async () => {
  folder = temporaryFolder();
  const sources = join(ROOT, 'test/published');
  published = await makeRelease(sources, join(folder, 'one'));
  again = await makeRelease(sources, join(folder, 'two'), '--date', '2027-03-04');
  heldOut = await makeRelease(join(ROOT, 'test/held-out'), join(folder, 'held-out'));
});
afterAll(() => rmSync(folder, { recursive: true, force: true }));

/** The published row of a stated transition. */
function transition(substance: string, from: string, to: string, also: Row = {}): Row {
  const rows = published
    .table('transitions')
    .filter((row) => row.substance === substance && row.from_phase === from && row.to_phase === to)
    .filter((row) => row.stated_temperature_K !== null)
    .filter((row) => Object.entries(also).every(([field, value]) => row[field] === value));
  expect(rows, `${substance} ${from} > ${to}`).toHaveLength(1);
  return rows[0]!;
}

const number = (row: Row, field: string): number => row[field] as number;
const graver = (release: Release, severity: string): string[] =>
  release
    .table('findings')
    .filter((row) => row.severity === severity)
    .map((row) => `${row.substance} ${row.rule}`);

describe('the published sets', () => {
  it('are all published, without a fault', () => {
    expect(published.status).toBe(0);
    expect(published.table('substances').map((row) => row.substance)).toHaveLength(9);
    expect(graver(published, 'fault')).toEqual([]);
    expect(published.table('substances').filter((row) => row.verdict === 'withheld')).toEqual([]);
  });

  it('stand beside sixteen held out, with no fault and with no doubt on at least fifteen', () => {
    expect(heldOut.status).toBe(0);
    const substances = heldOut.table('substances');
    expect(substances).toHaveLength(16);
    expect(graver(heldOut, 'fault')).toEqual([]);
    expect(substances.filter((row) => row.verdict === 'cleared').length).toBeGreaterThanOrEqual(15);
  });
});

describe('the computed temperatures', () => {
  it.each([
    ['lead', 'cr', 'l', 600.6, 0.09],
    ['aluminium', 'cr', 'l', 933.45, 0.09],
    ['copper', 'cr', 'l', 1358, 0.09],
    ['titanium', 'cr-beta', 'l', 1939, 0.09],
    ['iron', 'cr-alpha', 'l', 1809, 0.09],
    ['sodium-chloride', 'cr', 'l', 1073.8, 0.09],
    ['magnesium-oxide', 'cr', 'l', 3105, 0.09],
    ['lead', 'l', 'g', 2019.022, 0.005],
    ['aluminium', 'l', 'g', 2790.812, 0.005],
    ['copper', 'l', 'g', 2843.261, 0.005],
    ['titanium', 'l', 'g', 3630.956, 0.005],
    ['iron', 'l', 'g', 3133.345, 0.005],
    ['titanium', 'cr-alpha', 'cr-beta', 1166, 0.15],
    ['iron', 'cr-alpha', 'cr-gamma', 1184, 1],
    ['iron', 'cr-gamma', 'cr-alpha', 1665, 1.6],
  ])('of %s %s > %s meets %d K within %d K', (substance, from, to, statedK, within) => {
    const row = transition(substance, from, to);
    expect(row.stated_temperature_K).toBe(statedK);
    expect(row.gas).toBe(to === 'g' ? 'ideal' : null);
    expect(Math.abs(number(row, 'computed_temperature_K') - statedK)).toBeLessThanOrEqual(within);
    expect(number(row, 'difference_K')).toBeCloseTo(number(row, 'computed_temperature_K') - statedK, 9);
  });

  it('of iron in the solid differ by nothing that is significant', () => {
    const rules = ['gibbs-continuous', 'crossing-agrees', 'transition-entropy-closes', 'stated-transition-jumps'];
    for (const [from, to] of [
      ['cr-alpha', 'cr-gamma'],
      ['cr-gamma', 'cr-alpha'],
    ] as const) {
      const row = transition('iron', from, to);
      expect(row.outcome).toBe('agrees');
      expect(Math.abs(number(row, 'transition_entropy_J_per_mol_K'))).toBeLessThan(1);
      const found = published
        .table('findings')
        .filter((one) => one.substance === 'iron' && one.from_phase === from && rules.includes(one.rule as string));
      expect(found.map((one) => one.severity).filter((severity) => severity !== 'note')).toEqual([]);
    }
  });

  // Each row standing alone gives these; the curve may only make them smaller.
  it.each([
    ['lead', 'cr', 'l', 0.08],
    ['aluminium', 'cr', 'l', 0.06],
    ['copper', 'cr', 'l', 0.08],
    ['titanium', 'cr-alpha', 'cr-beta', 0.21],
    ['titanium', 'cr-beta', 'l', 0.13],
    ['iron', 'cr-alpha', 'cr-gamma', 1.0],
    ['iron', 'cr-gamma', 'cr-alpha', 1.8],
    ['iron', 'cr-alpha', 'l', 0.12],
    ['sodium-chloride', 'cr', 'l', 0.03],
    ['magnesium-oxide', 'cr', 'l', 0.06],
  ])('of %s %s > %s are known to %d K or better', (substance, from, to, atMostK) => {
    const u = number(transition(substance, from, to), 'u_computed_temperature_K');
    expect(u).toBeGreaterThan(0);
    expect(u).toBeLessThanOrEqual(atMostK);
  });

  it('spread about the stated ones as their uncertainties say', () => {
    const stated = published
      .table('transitions')
      .filter((row) => row.order === 'first' && row.difference_K !== null)
      .map((row) => {
        const u = Math.hypot(number(row, 'u_computed_temperature_K'), number(row, 'u_stated_temperature_K'));
        return { place: `${row.substance} ${row.from_phase} > ${row.to_phase}`, w: number(row, 'difference_K') / u };
      });
    expect(stated.length).toBeGreaterThanOrEqual(22);
    // n w² is chi squared of n degrees of freedom: its central 95 %, by the cube-root law of Wilson and Hilferty (1931).
    const n = stated.length;
    const rms = Math.sqrt(stated.reduce((sum, { w }) => sum + w * w, 0) / n);
    const bound = (z: number): number => Math.sqrt((1 - 2 / (9 * n) + z * Math.sqrt(2 / (9 * n))) ** 3);
    const values = stated.map(({ place, w }) => `${place}: ${w.toFixed(2)}`).join('\n');
    expect(rms, values).toBeGreaterThan(bound(-1.96));
    expect(rms, values).toBeLessThan(bound(1.96));
    for (const { place, w } of stated) expect(Math.abs(w), place).toBeLessThan(3.5);
  });
});

describe('water', () => {
  it('freezes and boils on the 101325 Pa isobars where IAPWS says, to 0.1 mK', () => {
    const also = { isobar_Pa: 101325, pressure_Pa: 101325 };
    const ice = transition('water', 'cr-Ih', 'l', also);
    const steam = transition('water', 'l', 'g', also);
    expect(Math.abs(number(ice, 'computed_temperature_K') - 273.1525)).toBeLessThan(0.0001);
    expect(Math.abs(number(steam, 'computed_temperature_K') - 373.1243)).toBeLessThan(0.0001);
  });

  it('boils at 372.78 K and 1 bar by the ideal-gas tables with the gas term', () => {
    const row = transition('water', 'l', 'g', { isobar_Pa: null, gas: 'real', pressure_Pa: 100000 });
    expect(Math.abs(number(row, 'computed_temperature_K') - 372.78)).toBeLessThan(0.02);
  });
});

describe('the files of a release', () => {
  it('have the same bytes when they are made again; the date stands in summary.json alone', () => {
    const names = readdirSync(published.folder).sort();
    expect(readdirSync(again.folder).sort()).toEqual(names);
    expect(names.length).toBeGreaterThanOrEqual(2 * TABLE_NAMES.length + 3);
    for (const name of names) {
      if (name === 'summary.json' || name === 'contents.json') continue;
      const one = readFileSync(join(published.folder, name));
      expect(one.equals(readFileSync(join(again.folder, name))), name).toBe(true);
    }
    const json = (release: Release, name: string) => JSON.parse(readFileSync(join(release.folder, name), 'utf8'));
    const summary = json(published, 'summary.json');
    expect(summary.date).toBe('2026-01-01');
    expect(json(again, 'summary.json')).toEqual({ ...summary, date: '2027-03-04' });
    // The list of contents has the hash of summary.json, and nothing else that could differ.
    const contents = (release: Release) => {
      const { files, ...rest } = json(release, 'contents.json');
      return { ...rest, files: files.filter((file: { path: string }) => file.path !== 'summary.json') };
    };
    expect(contents(again)).toEqual(contents(published));
    expect(contents(published).files).toHaveLength(names.length - 2);
  });

  it.each(TABLE_NAMES)('hold the same %s as Parquet, read by DuckDB and by hyparquet, and as CSV', async (name) => {
    const path = join(published.folder, `${name}.parquet`);
    const file = await asyncBufferFromFile(path);
    const byHyparquet = (await parquetReadObjects({ file, compressors })) as Record<string, unknown>[];
    const byDuckdb = await withDuckdb(path);
    const byCsv = published.table(name);
    expect(byDuckdb.length).toBe(byCsv.length);
    expect(byHyparquet.length).toBe(byCsv.length);
    byCsv.forEach((row, i) => {
      expect(plain(byDuckdb[i]!), `${name} row ${i}`).toEqual(row);
      expect(plain(byHyparquet[i]!), `${name} row ${i}`).toEqual(row);
    });
  });
});

async function withDuckdb(path: string): Promise<Record<string, unknown>[]> {
  const instance = await DuckDBInstance.create(':memory:');
  const connection = await instance.connect();
  try {
    const result = await connection.runAndReadAll(`SELECT * FROM read_parquet('${path.replaceAll("'", "''")}')`);
    return result.getRowObjects();
  } finally {
    connection.closeSync();
    instance.closeSync();
  }
}

/** Whole numbers as numbers, absent cells as null. */
function plain(row: Record<string, unknown>): Record<string, unknown> {
  return Object.fromEntries(
    Object.entries(row).map(([field, value]) => [field, typeof value === 'bigint' ? Number(value) : (value ?? null)]),
  );
}
