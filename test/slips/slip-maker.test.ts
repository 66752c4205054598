import { cpSync, mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { EXPLANATIONS } from '../../pipeline/report/explanations.js';
import { writeSyntheticLibrary } from '../synthetic/write-library.js';
import { readDelimited } from './delimited.js';
import { expectedCodes } from './expected-codes.js';
import { onScaleOf1948, onScaleOf1968 } from './old-scales.js';
import { seededRandom } from './random.js';
import { readLibrary } from './slip-library.js';
import { draftSlip, plantSlips, SLIP_KINDS, type Slip } from './slip-maker.js';
import { listCells } from './source-cells.js';

const PUBLISHED = 'test/published';
const published = readLibrary(PUBLISHED);
let copy = '';
beforeEach(() => {
  copy = mkdtempSync(join(tmpdir(), 'slip-'));
});
afterEach(() => rmSync(copy, { recursive: true }));

const readAll = (dir: string, source: string, file: string) => readFileSync(join(dir, source, file), 'utf8');

/** A slip of each kind, in the first substance that can hold it. */
function slipOf(name: string, family: string, seed = 1): Slip {
  const kind = SLIP_KINDS.find((one) => one.name === name && one.family === family)!;
  const drafts = published.substances.map((substance) => draftSlip(kind, substance, seededRandom(seed)));
  const slip = drafts.find((draft) => draft !== null);
  if (slip == null) throw new Error(`no substance holds ${family} ${name}`);
  return slip;
}

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

  it.each(
    SLIP_KINDS.map(({ name, family }) => [family, name]).filter(
      ([, name]) => name !== 'scale of 1948' && !name!.startsWith('vapour pressures'),
    ),
  )('changes the cells that it says and no other line: %s, %s', (family, name) => {
    const slip = slipOf(name!, family!);
    cpSync(PUBLISHED, copy, { recursive: true });
    plantSlips(copy, [slip]);
    for (const cell of slip.cells) expect(cell.printed).not.toBe(cell.clean);
    const files = new Set(slip.cells.map(({ source, file }) => `${source}/${file}`));
    for (const path of files) {
      const before = readAll(PUBLISHED, '', path).split('\n');
      const after = readAll(copy, '', path).split('\n');
      const changed = before.flatMap((line, i) => (line === after[i] ? [] : [i + 1]));
      const planted = slip.cells.filter(({ source, file }) => `${source}/${file}` === path);
      expect(after).toHaveLength(before.length);
      expect(changed).toEqual([...new Set(planted.map(({ line }) => line))].sort((a, b) => a - b));
    }
    const cells = listCells(copy);
    for (const { source, file, line, column, printed, cell } of slip.cells.filter((one) => one.cell !== null)) {
      const now = cells.find((c) => c.source === source && c.file === file && c.line === line && c.column === column);
      expect(now?.text ?? cell!.text).toBe(printed);
    }
  });

  it('plants the same slip for the same seed', () => {
    const kind = SLIP_KINDS.find(({ name }) => name === 'S off')!;
    const lead = published.substances.find(({ id }) => id === 'lead')!;
    const draft = () => draftSlip(kind, lead, seededRandom(7))!.cells;
    expect(draft()).toEqual(draft());
    expect(draft()).not.toEqual(draftSlip(kind, lead, seededRandom(8))!.cells);
  });

  it('says so when no cell can hold a slip that large', () => {
    const kind = SLIP_KINDS.find(({ name }) => name === 'S off')!;
    const lead = published.substances.find(({ id }) => id === 'lead')!;
    expect(draftSlip(kind, lead, seededRandom(1), () => 500)).toBeNull();
  });

  it('makes slips of five units of the last place or more, of 1 % or more in a heat capacity', () => {
    for (const kind of SLIP_KINDS.filter(({ family }) => family === 'table' || family === 'heat-capacity')) {
      for (let seed = 1; seed <= 5; seed++) {
        for (const substance of published.substances) {
          const [planted] = draftSlip(kind, substance, seededRandom(seed))?.cells ?? [];
          if (planted === undefined) continue;
          const { cell, printed } = planted;
          const change = Math.abs(Number(printed) - cell!.value);
          expect(change / 10 ** -cell!.decimals).toBeGreaterThan(4.999);
          if (kind.family === 'heat-capacity') expect(change / cell!.value).toBeGreaterThanOrEqual(0.01);
        }
      }
    }
  });

  it('writes what people write', () => {
    const said = (name: string, family: string, seed = 1) => {
      const [{ clean, printed, cell }] = slipOf(name, family, seed).cells as [Slip['cells'][number]];
      return { was: Number(clean), is: Number(printed), printed, clean, cell: cell! };
    };
    const calories = said('in calories', 'table');
    expect(calories.is).toBeCloseTo(calories.was / 4.184, 3);
    const celsius = said('Celsius and kelvin', 'datum');
    expect(celsius.is).toBeCloseTo(celsius.was - 273.15, 3);
    const fahrenheit = said('Fahrenheit', 'datum');
    expect(fahrenheit.is).toBeCloseTo((celsius.was - 273.15) * 1.8 + 32, 3);
    const units = said('in units of R', 'heat-capacity');
    expect(units.is).toBeCloseTo(units.was / 8.31446, 3);
    const gas = said('1 atm for 1 bar', 'datum');
    expect(gas.was - gas.is).toBeCloseTo(0.1094, 3);
    const point = said('decimal point moved', 'table');
    expect(point.printed.replace('.', '').replace(/^0+/, '')).toBe(point.clean.replace('.', '').replace(/^0+/, ''));
    const exchanged = said('two digits exchanged', 'table');
    expect([...exchanged.printed].sort()).toEqual([...exchanged.clean].sort());
    const digit = said('one digit wrong', 'table');
    expect([...digit.printed].filter((letter, i) => letter !== digit.clean[i])).toHaveLength(1);
  });

  it('knows the old scales to their published differences', () => {
    for (const [celsius, difference] of [
      [-180, 0.008],
      [-100, 0.013],
      [100, -0.026],
      [200, -0.04],
      [1064.18, -0.25],
    ] as const)
      expect(celsius + 273.15 - onScaleOf1968(celsius + 273.15)).toBeCloseTo(difference, 2);
    expect(373.15 - onScaleOf1948(373.15)).toBeCloseTo(-0.026, 3);
    expect(onScaleOf1948(900)).toBeNaN();
  });

  it('has a published code for everything that an explanation should say', () => {
    for (const { meant } of SLIP_KINDS) {
      if (meant === null) continue;
      const known = expectedCodes(meant).filter((code) => EXPLANATIONS[code] !== undefined);
      expect(known, meant).not.toEqual([]);
    }
  });

  it('finds a place in synthetic substances for every kind', () => {
    writeSyntheticLibrary(copy, { seed: 3, substances: 21, vapourPressures: true });
    const { substances } = readLibrary(copy);
    const without = SLIP_KINDS.filter((kind) =>
      substances.every((substance) => draftSlip(kind, substance, seededRandom(1)) === null),
    );
    expect(without.map(({ name }) => name)).toEqual([]);
  });

  it('reads quoted cells, comments, title lines, CRLF and a byte-order mark', () => {
    const path = join(copy, 'a.csv');
    writeFileSync(path, '\uFEFFtitle\r\n# note\r\n"a, b";c\r\n"1.5";2\r\n');
    const file = readDelimited(path, { delimiter: ';', skipLines: 1, comment: '#' });
    expect(file.header).toEqual(['a, b', 'c']);
    expect(file.rows.map((row) => [row.line, ...row.cells.map((cell) => cell.text)])).toEqual([[4, '1.5', '2']]);
  });
});
