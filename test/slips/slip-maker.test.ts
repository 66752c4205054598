import { cpSync, mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { readDelimited } from './delimited.js';
import { seededRandom } from './random.js';
import { materialLimit, plantSlip, SLIP_KINDS } from './slip-maker.js';
import { listCells } from './source-cells.js';

const PUBLISHED = 'test/published';
let copy = '';
beforeEach(() => {
  copy = mkdtempSync(join(tmpdir(), 'slip-'));
});
afterEach(() => rmSync(copy, { recursive: true }));

const readAll = (dir: string, source: string, file: string) => readFileSync(join(dir, source, file), 'utf8');

describe('the slip maker', () => {
  it('reads every numeric cell of the published sets with its printed place', () => {
    const cells = listCells(PUBLISHED);
    expect(cells.length).toBeGreaterThan(4000);
    for (const cell of cells) {
      const line = readAll(PUBLISHED, cell.source, cell.file).split('\n')[cell.line - 1];
      expect(line).toContain(cell.text);
    }
    const lead = cells.find((c) => c.source === 'handbook-lead' && c.holds === 'transitions' && c.text === '600.600');
    expect(lead).toMatchObject({ substance: 'lead', place: 'cr>l', quantity: 'transition-temperature', decimals: 3 });
    const nacl = cells.find((c) => c.source === 'handbook-sodium-chloride' && c.temperatureK === 100);
    expect(nacl).toMatchObject({ place: 'cr', quantity: 'temperature', text: '100', depth: 1 });
  });

  it.each(SLIP_KINDS)('changes one cell and no other byte: %s', (kind) => {
    for (let seed = 1; seed <= 3; seed++) {
      cpSync(PUBLISHED, copy, { recursive: true });
      const slip = plantSlip(copy, { kind, random: seededRandom(seed) })!;
      expect(slip.timesLeast).toBeGreaterThanOrEqual(1);
      const before = readAll(PUBLISHED, slip.source, slip.file);
      const after = readAll(copy, slip.source, slip.file);
      expect(after.length - before.length).toBe(slip.printed.length - slip.clean.length);
      const lines = after.split('\n');
      const changed = before.split('\n').flatMap((line, i) => (line === lines[i] ? [] : [i + 1]));
      expect(changed).toEqual([slip.line]);
      const cell = listCells(copy).find(
        (c) => c.source === slip.source && c.file === slip.file && c.line === slip.line && c.column === slip.column,
      )!;
      expect(cell.text).toBe(slip.printed);
    }
  });

  it('plants the same slip for the same seed', () => {
    cpSync(PUBLISHED, copy, { recursive: true });
    const once = plantSlip(copy, { kind: 'entropy', random: seededRandom(7) });
    cpSync(PUBLISHED, copy, { recursive: true });
    expect(plantSlip(copy, { kind: 'entropy', random: seededRandom(7) })).toEqual(once);
  });

  it('says so when no cell can hold a slip that large', () => {
    cpSync(PUBLISHED, copy, { recursive: true });
    const wish = { kind: 'transition-in-celsius', random: seededRandom(1), least: () => 274 } as const;
    expect(plantSlip(copy, wish)).toBeNull();
  });

  it('takes the larger of the last place and what a user would notice as the least change', () => {
    const cell = listCells(PUBLISHED).find((c) => c.source === 'handbook-lead' && c.quantity === 'entropy')!;
    expect(materialLimit({ ...cell, value: 200, decimals: 3 })).toBeCloseTo(0.2, 12);
    expect(materialLimit({ ...cell, value: 20, decimals: 3 })).toBeCloseTo(0.05, 12);
    expect(materialLimit({ ...cell, value: 20, decimals: 1 })).toBeCloseTo(0.5, 12);
  });

  it('reads quoted cells, comments, title lines, CRLF and a byte-order mark', () => {
    const path = join(copy, 'a.csv');
    writeFileSync(path, '\uFEFFtitle\r\n# note\r\n"a, b";c\r\n"1.5";2\r\n');
    const file = readDelimited(path, { delimiter: ';', skipLines: 1, comment: '#' });
    expect(file.header).toEqual(['a, b', 'c']);
    expect(file.rows.map((row) => [row.line, ...row.cells.map((cell) => cell.text)])).toEqual([[4, '1.5', '2']]);
  });
});
