import { readFileSync, rmSync } from 'node:fs';
import { join } from 'node:path';
import { afterAll, beforeAll, describe, expect, it, vi } from 'vitest';
import { makeRelease, type Release, ROOT, type Row, temporaryFolder } from './release.js';

vi.setConfig({ hookTimeout: 60_000 });

interface PlantedSlip {
  readonly medium: string;
  readonly source: string;
  readonly file: string;
  readonly line: number;
  readonly column: string;
  readonly printed: string;
  readonly clean: string;
  readonly about: string;
}

const slips: PlantedSlip[] = JSON.parse(readFileSync(join(ROOT, 'test/demo/planted-slips.json'), 'utf8'));
const spoilt = new Set(slips.map(({ medium }) => medium));

let folder: string;
let demo: Release;
beforeAll(async () => {
  folder = temporaryFolder();
  demo = await makeRelease(join(ROOT, 'sources'), join(folder, 'out'));
});
afterAll(() => rmSync(folder, { recursive: true, force: true }));

const isAt = (row: Row, slip: PlantedSlip): boolean =>
  row.source === slip.source && row.file === slip.file && row.line === slip.line && row.column === slip.column;
const findingsOf = (medium: string): readonly Row[] =>
  demo.table('findings').filter((row) => row.substance === medium && row.severity !== 'note');

describe('the demo', () => {
  it('has eight planted slips, each in a medium of its own', () => {
    expect(slips).toHaveLength(8);
    expect(spoilt.size).toBe(8);
  });

  it('clears its sixteen clean media and withholds the eight others', () => {
    expect(demo.status).toBe(0);
    const verdicts = Object.fromEntries(demo.table('substances').map((row) => [row.substance, row.verdict]));
    expect(Object.keys(verdicts)).toHaveLength(24);
    for (const [medium, verdict] of Object.entries(verdicts)) {
      expect(verdict, medium).toBe(spoilt.has(medium) ? 'withheld' : 'cleared');
    }
  });

  it('finds nothing graver than a note in a clean medium, and nothing at all in a source', () => {
    const others = demo.table('findings').filter((row) => !spoilt.has(row.substance as string));
    expect(others.filter((row) => row.severity !== 'note')).toEqual([]);
    expect(others.filter((row) => row.substance === null)).toEqual([]);
  });

  it('publishes values of the clean media alone', () => {
    for (const name of ['functions', 'pieces', 'phases', 'transitions'] as const) {
      const media = new Set(demo.table(name).map((row) => row.substance));
      expect(media.size, name).toBe(16);
      for (const medium of spoilt) expect(media.has(medium), `${name} ${medium}`).toBe(false);
    }
  });

  it.each(slips.map((slip) => [slip.about, slip.medium, slip] as const))(
    'finds %s (%s) in the first group of suspects, with one cause for all',
    (_about, _medium, slip) => {
      const findings = findingsOf(slip.medium);
      const roots = findings.filter((row) => row.cause === null);
      expect(roots.map((row) => row.rule)).toHaveLength(1);
      const root = roots[0]!;
      expect(root.severity).toBe('fault');
      for (const row of findings) if (row !== root) expect(row.cause).toBe(root.finding);
      const suspects = demo
        .table('suspects')
        .filter((row) => row.substance === slip.medium && row.finding === root.finding);
      const first = suspects.filter((row) => row.group === 1);
      const cell = first.find((row) => isAt(row, slip));
      expect(cell, first.map((row) => `${row.file}:${row.line} ${row.column}`).join(', ')).toBeDefined();
      expect(cell!.printed).toBe(slip.printed);
      // The proposal meets the clean figure within its own uncertainty, in the printed unit.
      const plain = (text: unknown): number => Number(String(text).replace(',', '.'));
      const scale = (cell!.observed as number) / plain(slip.printed);
      const doubt =
        (4 * (cell!.u_proposed as number)) / Math.abs(scale) + 10 ** -(slip.clean.split(/[.,]/)[1]?.length ?? 0);
      expect(Math.abs(plain(cell!.proposed_printed) - plain(slip.clean))).toBeLessThanOrEqual(doubt);
    },
  );

  it('puts every planted cell first among its suspects', () => {
    const places = slips.map((slip) => {
      const rows = demo.table('suspects').filter((row) => row.substance === slip.medium && isAt(row, slip));
      return [slip.medium, Math.min(...rows.map((row) => row.place as number))];
    });
    expect(places).toEqual(slips.map(({ medium }) => [medium, 1]));
  });
});
