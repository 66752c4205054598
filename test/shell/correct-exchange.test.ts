/** `correct` on two cells of one row that are exchanged: the entries that it shows clear the substance, and it writes nothing. */
import { existsSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { dirname, join } from 'node:path';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { correct } from '../../pipeline/shell/correct-command.js';
import { Stop } from '../../pipeline/shell/exit-status.js';
import type { Correction } from '../../schemas/corrections.js';
import { asked, demoCopy, judged, recorder, rootOf, TODAY } from './demo-copy.js';

vi.setConfig({ testTimeout: 30_000 });

let sources: string;
beforeEach(() => {
  sources = demoCopy();
});
afterEach(() => rmSync(dirname(sources), { recursive: true, force: true }));

const edit = (file: string, from: string, to: string) => {
  const path = join(sources, 'quay-tables', file);
  const text = readFileSync(path, 'utf8');
  expect(text).toContain(from);
  writeFileSync(path, text.replace(from, to));
};
const refusal = async (finding: string, ...words: string[]): Promise<Stop> => {
  const log = recorder();
  const request = asked(sources, 'correct', finding, '--by', 'A. Curator', '--yes', ...words);
  const error = await correct(request, log, null).then(
    () => null,
    (thrown: unknown) => thrown,
  );
  if (error instanceof Stop) return error;
  throw error ?? new Error(`${finding} was not refused`);
};
const entriesIn = ({ next }: Stop): Correction[] => JSON.parse(`[${next.slice(next.indexOf('\n'))}]`);
const suspectOf = (substance: string) => {
  const finding = rootOf(sources, substance);
  return { finding, suspect: judged(sources, substance).suspects.find((s) => s.finding === finding && s.place === 1)! };
};

const PAIRS = [
  [
    'from and to',
    'Calmorite,crystal,liquid,861.40,1,,21.793,25.300',
    'Calmorite,liquid,crystal,861.40,1,,21.793,25.300',
    'the two phases',
    ['From', 'liquid', 'crystal'],
    ['To', 'crystal', 'liquid'],
  ],
  [
    'ΔH and ΔS',
    'Calmorite,crystal,liquid,861.40,1,,21.793,25.300',
    'Calmorite,crystal,liquid,861.40,1,,25.300,21.793',
    'ΔH and ΔS',
    ['DH', '25.300', '21.793'],
    ['DS', '21.793', '25.300'],
  ],
] as const;

describe('two cells exchanged', () => {
  it.each(PAIRS)(
    '%s: both entries are shown, and clear the substance',
    async (_, clean, spoilt, what, first, second) => {
      edit('transitions.csv', clean, spoilt);
      expect(judged(sources, 'calmorite').verdict).toBe('withheld');
      const { finding, suspect } = suspectOf('calmorite');
      expect([suspect.cells, suspect.address.column, suspect.printed, suspect.proposedPrinted]).toEqual([2, ...first]);
      const stop = await refusal(finding);
      expect(stop.message).toContain('none is written');
      expect(stop.next).toContain(
        `Exchange ${what} of line 2 of transitions.csv, columns "${first[0]}" and "${second[0]}"`,
      );
      const path = join(sources, 'quay-tables', 'corrections.json');
      expect(stop.next).toContain(path);
      expect(existsSync(path)).toBe(false);
      const entries = entriesIn(stop);
      expect(entries).toMatchObject(
        [first, second].map(([column, printed, corrected]) => ({
          file: 'transitions.csv',
          line: 2,
          column,
          printed,
          corrected,
          who: 'A. Curator',
          date: TODAY,
        })),
      );
      writeFileSync(path, JSON.stringify(entries));
      expect(judged(sources, 'calmorite').verdict).toBe('cleared');
    },
  );

  it('names the descriptor where that gives the phases', async () => {
    edit('transitions.csv', 'Medium,From,To,', 'Medium,,,');
    const lines = readFileSync(join(sources, 'quay-tables', 'transitions.csv'), 'utf8').split('\n');
    const kept = lines.filter((line, i) => i === 0 || /^Calmorite,crystal/.test(line));
    writeFileSync(join(sources, 'quay-tables', 'transitions.csv'), `${kept.join('\n')}\n`);
    const path = join(sources, 'quay-tables', 'source.json');
    const descriptor = JSON.parse(readFileSync(path, 'utf8'));
    const table = descriptor.tables.find(({ holds }: { holds: string }) => holds === 'transitions');
    delete table.columns.From;
    delete table.columns.To;
    table.constants = { ...table.constants, 'from-phase': 'liquid', 'to-phase': 'crystal' };
    writeFileSync(path, JSON.stringify(descriptor));
    const { finding } = suspectOf('calmorite');
    const stop = await refusal(finding);
    expect(stop.message).toContain('the descriptor gives them');
    expect(stop.next).toContain('Exchange "from-phase" and "to-phase"');
  });
});
