/** `correct` on a suspect that is a whole column: what it says would put it right does so, and it writes nothing. */
import { cpSync, existsSync, mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { correct } from '../../pipeline/shell/correct-command.js';
import { EXIT, Stop } from '../../pipeline/shell/exit-status.js';
import { traceCommand } from '../../pipeline/shell/trace-command.js';
import { plus, type Rewrite, rewrite, times } from '../check/table/spoil-column.js';
import { asked, judged, recorder } from './demo-copy.js';

vi.setConfig({ testTimeout: 30_000 });

let sources: string;
beforeEach(() => {
  sources = join(mkdtempSync(join(tmpdir(), 'columns-')), 'sources');
  cpSync('test/published', sources, { recursive: true });
});
afterEach(() => rmSync(join(sources, '..'), { recursive: true, force: true }));

const spoil = (rewrites: Record<string, Rewrite>, file = 'pb-002.tsv') => {
  const columns = { T: 'T_K', Cp: 'Cp', S: 'S', F: '-[G-H(Tr)]/T', H: 'H-H(Tr)' };
  const table = { substance: 'lead', source: 'handbook-lead', file, phase: null, columns };
  rewrite(join(sources, 'handbook-lead', file), table, rewrites);
};
const columnFindings = () =>
  judged(sources, 'lead').findings.filter(({ detail, cause }) => detail.code === 'column' && cause === null);
const refusal = async (...words: string[]): Promise<Stop> => {
  const error = await correct(asked(sources, 'correct', ...words, '--only', 'lead'), recorder(), null).then(
    () => null,
    (thrown: unknown) => thrown,
  );
  if (error instanceof Stop) return error;
  throw error ?? new Error(`"${words.join(' ')}" was not refused`);
};
/** The file's own entry under "tables" with a declaration changed. */
const declare = (change: (table: { columns: Record<string, { unit?: string }>; [key: string]: unknown }) => void) => {
  const path = join(sources, 'handbook-lead', 'source.json');
  const descriptor = JSON.parse(readFileSync(path, 'utf8'));
  const [functions, ...rest] = descriptor.tables;
  const own = structuredClone(functions);
  own.file = 'pb-002.tsv';
  change(own);
  const others = ['pb-003.tsv', 'pb-005.tsv'].map((file) => ({ ...functions, file }));
  writeFileSync(path, JSON.stringify({ ...descriptor, tables: [own, ...others, ...rest] }));
};

const UNITS: readonly (readonly [string, string, Rewrite, string])[] = [
  ['S in calories', 'S', times(1 / 4.184, 4), 'cal_th/(mol.K)'],
  ['S in calories of the International Table', 'S', times(1 / 4.1868, 4), 'cal_IT/(mol.K)'],
  ['H in joules', 'H-H(Tr)', times(1000, 0), 'J/mol'],
  ['H in kilocalories', 'H-H(Tr)', times(1 / 4.184, 4), 'kcal_th/mol'],
  ['Cp per gram', 'Cp', times(1 / 207.2, 6), 'J/(g.K)'],
  ['the temperatures in degrees Celsius', 'T_K', plus(-273.15, 2), 'Cel'],
  ['the temperatures in degrees Fahrenheit', 'T_K', (value) => (1.8 * value - 459.67).toFixed(2), '[degF]'],
];

describe('a whole column', () => {
  it.each(UNITS)(
    '%s: the unit that is named clears the substance, and nothing is written',
    async (_, column, spoiling, unit) => {
      spoil({ [column]: spoiling });
      expect(judged(sources, 'lead').verdict).toBe('withheld');
      const [finding] = columnFindings();
      const stop = await refusal(finding!.id, '--yes', '--by', 'A. Curator');
      expect(stop.status).toBe(EXIT.nothing);
      expect(stop.message).toContain(`pb-002.tsv`);
      expect(stop.message).toContain('stands for a single cell, so none is written');
      expect(stop.next).toContain(`Give column "${column}" of pb-002.tsv "unit": "${unit}"`);
      expect(stop.next).toContain(join(sources, 'handbook-lead', 'source.json'));
      expect(existsSync(join(sources, 'handbook-lead', 'corrections.json'))).toBe(false);
      declare((table) => {
        table.columns[column]!.unit = unit;
      });
      expect(judged(sources, 'lead').verdict).toBe('cleared');
    },
  );

  it('names every column of one cause', async () => {
    spoil({ S: times(1 / 4.184), Cp: times(1 / 4.184), '-[G-H(Tr)]/T': times(1 / 4.184) });
    const [finding] = columnFindings();
    const { next } = await refusal(finding!.id);
    for (const column of ['S', 'Cp', '-[G-H(Tr)]/T'])
      expect(next).toContain(`column "${column}" of pb-002.tsv "unit": "cal_th/(mol.K)"`);
  });

  it('is mended by "from": 0 where H and -[G - H]/T count from 0 K', async () => {
    spoil({
      'H-H(Tr)': plus(6.878, 3),
      '-[G-H(Tr)]/T': (value, decimals, row) => (value - 6878 / row.get('T_K')!).toFixed(decimals),
    });
    const [finding] = columnFindings();
    const { next } = await refusal(finding!.id);
    expect(next).toContain('its table needs "from": 0');
    declare((table) => {
      table.from = 0;
    });
    expect(judged(sources, 'lead').verdict).toBe('cleared');
  });

  it('says so where no declaration helps', async () => {
    spoil({ S: times(1.3) });
    const [finding] = columnFindings();
    expect((await refusal(finding!.id)).next).toContain(
      'No unit that can be declared puts column "S" of pb-002.tsv right',
    );
  });

  it('needs "standardPressure" where it is at 1 atm', async () => {
    spoil({ S: (value, decimals) => (value === 0 ? value : value - 0.10944).toFixed(decimals) }, 'pb-005.tsv');
    const [finding] = columnFindings();
    expect((await refusal(finding!.id)).next).toContain('"standardPressure": { "value": 1, "unit": "atm" }');
  });

  it('cannot be corrected cell by cell with --value either', async () => {
    spoil({ S: times(1 / 4.184) });
    const [finding] = columnFindings();
    expect((await refusal(finding!.id, '--value', '36.829', '--yes')).message).toContain('stands for a single cell');
    expect(existsSync(join(sources, 'handbook-lead', 'corrections.json'))).toBe(false);
  });
});

describe('trace', () => {
  it('tells a column that is left out by its first cell', async () => {
    spoil({ S: times(1 / 4.184) });
    const log = recorder();
    await traceCommand(asked(sources, 'trace', 'lead', 'cr', '400'), log);
    expect(log.text().replace(/\s+/g, ' ')).toMatch(
      /Left out of the curve, .*pb-002\.tsv:3 S and 20 more \(finding [0-9a-f]+\)\./,
    );
  });
});
