/** Boiling points of the published sets with their pressure in another unit, and nothing else wrong. */
import { cpSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { correct } from '../../pipeline/shell/correct-command.js';
import { traceCommand } from '../../pipeline/shell/trace-command.js';
import { asked, judged, recorder } from '../shell/demo-copy.js';
import { ROOT, temporaryFolder } from './release.js';

vi.setConfig({ testTimeout: 60_000 });

let sources: string;
beforeEach(() => {
  sources = join(temporaryFolder(), 'sources');
  cpSync(join(ROOT, 'test/published'), sources, { recursive: true });
});
afterEach(() => rmSync(join(sources, '..'), { recursive: true, force: true }));

const rootsOf = (substance: string) =>
  judged(sources, substance).findings.filter(({ severity, cause }) => severity !== 'note' && cause === null);

/** The 1 bar of the boiling point printed as something else. */
function spoil(substance: string, line: number, printed: string): void {
  const path = join(sources, `handbook-${substance}`, 'transitions.csv');
  const lines = readFileSync(path, 'utf8').split('\n');
  const before = lines[line - 1]!;
  lines[line - 1] = before.replace(/ideal([,;])1\1/, `ideal$1${printed}$1`);
  expect(lines[line - 1]).not.toBe(before);
  writeFileSync(path, lines.join('\n'));
}

describe('a boiling point', () => {
  it.each([
    ['lead', 3, 'p_bar', '750.062', 'torr-read-as-pascal'],
    ['copper', 3, 'p/bar', '750.062', 'torr-read-as-pascal'],
    ['aluminium', 3, 'p_bar', '100', 'pascal-read-as-bar-or-atmosphere'],
    ['titanium', 4, 'p_bar', '0.1', 'decimal-point-moved'],
    ['iron', 6, 'p/bar', '0.001', 'kilo-dropped'],
    ['copper', 3, 'p/bar', '4', 'one-digit-wrong'],
  ])(
    'of %s at 1 bar, line %d, whose %s says %s is found by its one suspect: %s',
    (substance, line, column, printed, code) => {
      spoil(substance, line, printed);
      const { suspects, verdict } = judged(sources, substance);
      expect(verdict).toBe('withheld');
      expect(rootsOf(substance)).toHaveLength(1);
      expect(suspects).toHaveLength(1);
      const [first] = suspects;
      expect(first).toMatchObject({ cells: 1, printed, explanation: code, address: { line, column } });
      expect(Number(first!.explainedPrinted)).toBeCloseTo(1, 6);
      expect(Math.abs(first!.proposed / 1e5 - 1)).toBeLessThan(2e-3);
    },
  );

  it.each([
    [3, '101325', '760', 'torr-read-as-pascal'],
    [3, '101325', '1.01325', 'bar-or-atmosphere-read-as-pascal'],
    [3, '101325', '101.325', 'kilo-dropped'],
    [5, '100000', '750.062', 'torr-read-as-pascal'],
    [5, '100000', '10000', 'decimal-point-moved'],
  ])('of the real fluid (line %d, %s Pa printed as %s) belongs to its isobar: %s', (line, clean, printed, code) => {
    const path = join(sources, 'iapws-water', 'transitions.csv');
    const lines = readFileSync(path, 'utf8').split('\n');
    lines[line - 1] = lines[line - 1]!.replace(clean, printed);
    writeFileSync(path, lines.join('\n'));
    const { suspects, verdict } = judged(sources, 'water');
    expect(verdict).toBe('withheld');
    expect(rootsOf('water')).toHaveLength(1);
    expect(suspects).toHaveLength(1);
    expect(suspects[0]).toMatchObject({ cells: 1, printed, explanation: code, address: { line, column: 'p_Pa' } });
    expect(Number(suspects[0]!.explainedPrinted)).toBeCloseTo(Number(clean), 6);
  });

  it('in torr is put right by `correct`, and what it says clears the substance', async () => {
    spoil('lead', 3, '750.062');
    const { id } = rootsOf('lead')[0]!;
    const log = recorder();
    const request = asked(sources, 'correct', id.slice(0, 8), '--only', 'lead', '--yes', '--by', 'A. Curator');
    expect(await correct(request, log, null)).toBe(0);
    expect(log.text()).toMatch(/verdict +withheld +cleared/);
    const entries = JSON.parse(readFileSync(join(sources, 'handbook-lead', 'corrections.json'), 'utf8'));
    expect(entries).toEqual([
      expect.objectContaining({
        file: 'transitions.csv',
        line: 3,
        column: 'p_bar',
        printed: '750.062',
        corrected: '1',
      }),
    ]);
    expect(judged(sources, 'lead').verdict).toBe('cleared');
  });

  it('has no weight in the trace of a gas that its own anchors place', async () => {
    const log = recorder();
    expect(await traceCommand(asked(sources, 'trace', 'lead', 'g', '1000'), log)).toBe(0);
    expect(log.text()).not.toContain('p_bar');
  });
});
