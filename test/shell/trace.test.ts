import { readFileSync, rmSync, writeFileSync } from 'node:fs';
import { dirname, join } from 'node:path';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { Stop } from '../../pipeline/shell/exit-status.js';
import { readTemperature } from '../../pipeline/shell/temperature.js';
import { traceCommand } from '../../pipeline/shell/trace-command.js';
import { asked, demoCopy, recorder, rootOf } from './demo-copy.js';

vi.setConfig({ testTimeout: 60_000 });

let sources: string;
beforeEach(() => {
  sources = demoCopy();
});
afterEach(() => rmSync(dirname(sources), { recursive: true, force: true }));

interface TracedNumber {
  readonly source: string;
  readonly file: string;
  readonly line: number;
  readonly column: string;
  readonly printed: string;
  readonly corrected: string | null;
  readonly quantity: string;
  readonly place: string;
  readonly value: number;
  readonly u: number;
  readonly sensitivity: { readonly enthalpy: number; readonly entropy: number; readonly gibbs: number };
  readonly weightJPerMol: number;
  readonly share: number;
}

interface TracedCurve {
  readonly gibbsEnergyJPerMol: number;
  readonly enthalpyJPerMol: number;
  readonly entropyJPerMolK: number;
  readonly uGibbsEnergyJPerMol: number;
  readonly numbers: readonly TracedNumber[];
  readonly calibrations: readonly { readonly weightJPerMol: number; readonly cells: number }[];
}

const run = async (...words: string[]) => {
  const log = recorder();
  const status = await traceCommand(asked(sources, 'trace', ...words), log);
  const event = log.events[0] as unknown as { curves: TracedCurve[]; leftOut: unknown[]; verdict: string };
  return { status, text: log.text(), event, curve: event.curves[0]! };
};
const refusal = async (...words: string[]): Promise<Stop> => {
  const error = await run(...words).then(
    () => null,
    (thrown: unknown) => thrown,
  );
  if (error instanceof Stop) return error;
  throw error ?? new Error(`"${words.join(' ')}" was not refused`);
};
const at = (curve: TracedCurve, file: string, line: number, column: string): TracedNumber =>
  curve.numbers.find((one) => one.file === file && one.line === line && one.column === column)!;

/** Rewrites one cell of a raw file. */
function rewrite(path: string, line: number, from: string, to: string): void {
  const whole = join(sources, path);
  const lines = readFileSync(whole, 'utf8').split('\n');
  expect(lines[line - 1]).toContain(from);
  lines[line - 1] = lines[line - 1]!.replace(from, to);
  writeFileSync(whole, lines.join('\n'));
}

/**
 * Medium, phase, temperature; the cell and what is written there; how far prediction and outcome may differ. Printed H, S
 * and levels act linearly; heat capacities also tell how well the table can be interpolated, and their changes are small.
 */
const MOVES = [
  ['dunsalt', 'cr', '430', 'quay-tables', 'tables/dunsalt.csv', 11, 'S', '109.823', '109.824', 1e-4],
  ['dunsalt', 'cr', '430', 'quay-tables', 'tables/dunsalt.csv', 11, 'H-H(Tr)', '1.583', '1.584', 1e-4],
  ['dunsalt', 'cr', '430', 'quay-tables', 'tables/dunsalt.csv', 11, '-[G-H(Tr)]/T', '104.876', '104.877', 1e-4],
  ['dunsalt', 'cr', '330', 'quay-tables', 'tables/dunsalt.csv', 11, 'Cp', '73.103', '73.10301', 0.02],
  ['dunsalt', 'cr', '430', 'quay-tables', 'formation.csv', 4, 'DfH(298.15 K)', '-655.200', '-655.100', 1e-6],
  ['mossanol', 'l', '400', 'bench-two', 'formation.csv', 2, 'S/(J/(mol K))', '221,29', '221,39', 1e-6],
  ['mossanol', 'l', '400', 'bench-two', 'dsc.csv', 2, 'heat/(J/g)', '226,0', '226,2', 1e-6],
  ['mossanol', 'l', '400', 'bench-two', 'dsc.csv', 2, 'entropy/(J/(g K))', '0,5777', '0,5787', 1e-6],
  ['mossanol', 'l', '400', 'bench-two', 'dsc.csv', 2, 'onset t/°C', '118,0', '118,1', 0.02],
  ['mossanol', 'l', '400', 'bench-two', 'cp/mossanol.csv', 15, 'cp/(J/(g K))', '1,3669', '1,3670', 0.02],
  ['vessium', 'l', '450', 'bench-two', 'cp-1986/vessium.csv', 18, 'cp/(J/(g K))', '0,2307', '0,2308', 0.05],
] as const;

describe('a sensitivity foretells what a rewritten cell does to G, H and S:', () => {
  it.each(MOVES)(
    '%s %s at %s K, %s/%s:%i %s',
    async (medium, phase, temperature, source, file, line, column, from, to, within) => {
      const before = (await run(medium, phase, temperature)).curve;
      rewrite(`${source}/${file}`, line, from, to);
      const after = (await run(medium, phase, temperature)).curve;
      const was = at(before, file, line, column);
      const by = at(after, file, line, column).value - was.value;
      expect(by).not.toBe(0);
      const near = (foretold: number, found: number, floor: number) =>
        expect(Math.abs(found - foretold)).toBeLessThanOrEqual(within * Math.abs(foretold) + floor);
      const { gibbs, enthalpy, entropy } = was.sensitivity;
      expect(Math.abs(gibbs * by)).toBeGreaterThan(1e-6);
      near(gibbs * by, after.gibbsEnergyJPerMol - before.gibbsEnergyJPerMol, 1e-8);
      near(enthalpy * by, after.enthalpyJPerMol - before.enthalpyJPerMol, within * Math.abs(gibbs * by) + 1e-8);
      near(
        entropy * by,
        after.entropyJPerMolK - before.entropyJPerMolK,
        (within * Math.abs(gibbs * by)) / Number(temperature) + 1e-11,
      );
    },
  );
});

describe('the weights', () => {
  it('of levels are as they must be: ΔfH one to one, S −T, ΔH and ΔS of a carrying transition alike', async () => {
    const { curve } = await run('mossanol', 'l', '400');
    const weights = (quantity: string) => curve.numbers.filter((one) => one.quantity === quantity);
    expect(weights('enthalpy-of-formation').map(({ sensitivity }) => sensitivity.gibbs)).toEqual([
      expect.closeTo(1, 6),
    ]);
    expect(weights('entropy').map(({ sensitivity }) => sensitivity.gibbs)).toEqual([expect.closeTo(-400, 4)]);
    expect(weights('transition-enthalpy')[0]!.sensitivity.gibbs).toBeCloseTo(1, 6);
    expect(weights('transition-entropy')[0]!.sensitivity.gibbs).toBeCloseTo(-400, 4);
  });

  it.each([
    ['dunsalt', 'cr', '500'],
    ['grendite', 'l', '1000'],
    ['mossanol', 'l', '400'],
  ])(
    'and the calibration of %s %s make up u(G)² but for the way between the rows',
    async (medium, phase, temperature) => {
      const { curve } = await run(medium, phase, temperature);
      const shares = curve.numbers.reduce((sum, { share }) => sum + share, 0);
      const common = curve.calibrations.reduce(
        (sum, one) => sum + (one.weightJPerMol / curve.uGibbsEnergyJPerMol) ** 2,
        0,
      );
      expect(shares + common).toBeGreaterThan(0.99);
      expect(shares + common).toBeLessThan(1.005);
    },
  );

  it('of one constant added to all heat capacities of a phase are its integrals', async () => {
    // From the anchor at 298.15 K: G falls by ∫Cp dT − T ∫Cp/T dT for the liquid-free crystal.
    const { curve } = await run('mossanol', 'cr', '340');
    const sum = curve.numbers
      .filter(({ quantity }) => quantity === 'heat-capacity')
      .reduce((total, { sensitivity }) => total + sensitivity.gibbs, 0);
    const T = 340;
    expect(sum).toBeCloseTo(T - 298.15 - T * Math.log(T / 298.15), 2);
  });
});

describe('what is printed', () => {
  it('are the 20 largest and what the rest has; with --all every one', async () => {
    const { text, curve } = await run('grendite', 'l', '600', 'K');
    expect(text).toContain('withheld, so that none of this is published');
    const cells = (of: string) => of.split('\n').filter((line) => / = /.test(line)).length;
    expect(cells(text)).toBe(20);
    expect(text).toMatch(new RegExp(`The other ${curve.numbers.length - 20} cells have [\\d.<]+ % together; --all`));
    expect(text).toContain('98.9 %');
    expect(text).toContain('quay-tables/formation.csv:11 DfH(298.15 K) = -711.737');
    for (const line of text.split('\n')) expect(line.length).toBeLessThanOrEqual(96);
    const all = await run('grendite', 'l', '600', '--all');
    expect(cells(all.text)).toBe(curve.numbers.length);
    const weights = curve.numbers.map(({ weightJPerMol }) => weightJPerMol);
    expect(weights).toEqual([...weights].sort((a, b) => b - a));
  });

  it('says what a correction in force has made of a cell, and which cells the checks leave out', async () => {
    const corrected = (await run('brevorite', 'l', '610', '--all')).text;
    expect(corrected).toContain('sheets/brevorite.tsv:38 Cp = 26.772, corrected to 27.672');
    const { text, curve } = await run('grendite', 'cr', '750');
    expect(at(curve, 'tables/grendite.csv', 22, 'S')).toBeUndefined();
    expect(text.replace(/\s+/g, ' ')).toContain(
      `Left out of the curve, since the checks name it: quay-tables/tables/grendite.csv:22 S = 182.027 (finding ${rootOf(sources, 'grendite')})`,
    );
  });
});

describe('what cannot be traced is refused with status 2 and what to write instead:', () => {
  it.each([
    [['grendite', 'liquid', '600'], /no curve of a phase "liquid"/, /It has cr, l\./],
    [['grendite', 'l', '6000'], /does not reach 6000 K/, /from 268\.335 to 1650 K/],
    [['grendit', 'l', '600'], /no substance "grendit"/, /Did you mean grendite\?/],
    [['grendite', 'l', 'hot'], /The temperature is "hot"/, /25 Cel/],
    [['grendite', 'l', '600 J'], /in "J", which is no temperature/, /Cel for degrees Celsius/],
    [['grendite', 'l', '-300 Cel'], /below 0 K/, /600/],
    [['grendite'], /needs a PHASE after "grendite"/, /cuspline trace lead l 700/],
    [['grendite', 'l'], /needs a TEMPERATURE after "grendite l"/, /cuspline trace lead l 700/],
  ])('%j', async (words, message, next) => {
    const stop = await refusal(...words);
    expect(stop.status).toBe(2);
    expect(stop.message).toMatch(message);
    expect(stop.next).toMatch(next);
  });
});

it('temperatures are read in kelvin, or in the unit that is written', () => {
  expect(readTemperature('600')).toBe(600);
  expect(readTemperature('600 K')).toBe(600);
  expect(readTemperature('25 Cel')).toBe(298.15);
  expect(readTemperature('−78.5 °C')).toBe(194.65);
  expect(readTemperature('-78.5 Cel')).toBe(194.65);
  expect(readTemperature('77 [degF]')).toBeCloseTo(298.15, 9);
});
