import { describe, expect, it } from 'vitest';
import { SLIP_CODES } from '../../../pipeline/reconcile/explain.js';
import { seededRandom } from '../../slips/random.js';
import { explained, study, studyMix, type Tally } from './slip-study.js';
import { disturbedCell, SPOILT_KINDS } from './spoil-cell.js';

const CELLS = Number(process.env.CELLS ?? 600);
/** Priors were chosen on seeds below 100 000; these are only reported. */
const SEED = Number(process.env.SEED ?? 700_000);

/** Slips that are smaller than six times a thousandfold u in every cell. */
const NEVER_SEEN_AT_1000 = ['atmosphere-for-bar', 'old-temperature-scale'];

/**
 * Held at a thousandfold u; three figures of a number leave room for another explanation. A hydrate's mass is one of some
 * forty factors, many of them near 1: such data do not tell it from a wrong digit.
 */
const REACHED: Readonly<Record<string, number>> = {
  'one-digit-wrong': 0.77,
  'calorie-per-mole-read-as-joule-per-gram': 0.77,
  'fahrenheit-not-converted': 0.77,
  'other-formula-molar-mass': 0.6,
};
const USUALLY_REACHED = 0.82;

/** How often each is met, of a hundred, as one expects of tables typed by hand; the rest are rare. */
const USUAL: readonly (readonly [string, number])[] = [
  ['one-digit-wrong', 30],
  ['digits-exchanged', 12],
  ['decimal-point-moved', 8],
  ['copied-from-row-above', 5],
  ['sign-lost', 5],
  ['calorie-read-as-joule', 5],
  ['joule-read-as-calorie', 3],
  ['kilo-dropped', 4],
  ['kilo-added', 4],
  ['celsius-read-as-kelvin', 5],
  ['kelvin-read-as-celsius', 3],
];

describe(`${CELLS} spoilt cells of each kind`, { timeout: 120_000 }, () => {
  it('cover every kind that is explained', () => {
    expect([...SPOILT_KINDS].sort()).toEqual([...SLIP_CODES].sort());
  });

  it('are explained rightly first in 96.5 % where the proposal is as sharp as the printed digits', () => {
    const tallies = SPOILT_KINDS.map((kind, i) => study(kind, 1, SEED + i, CELLS));
    print('u = printed digits', tallies);
    for (const tally of tallies) expect(tally.first, tally.kind).toBeGreaterThanOrEqual(0.965);
  });

  it('are explained rightly first in 82 %, a few kinds in less, where the proposal is a thousand times less sharp', () => {
    const seen = SPOILT_KINDS.filter((kind) => !NEVER_SEEN_AT_1000.includes(kind));
    const tallies = seen.map((kind, i) => study(kind, 1000, SEED + 1000 + i, CELLS));
    print('u = 1000 printed digits', tallies);
    for (const tally of tallies) {
      expect(tally.first, tally.kind).toBeGreaterThanOrEqual(REACHED[tally.kind] ?? USUALLY_REACHED);
    }
  });
});

describe('a mix of kinds as usual as they are met', { timeout: 120_000 }, () => {
  it.each([
    [1, 0.99],
    [1000, 0.86],
  ])('is explained rightly first at u = %i printed digits in a share of %d', (timesDigits, least) => {
    const kinds = SPOILT_KINDS.filter((kind) => timesDigits === 1 || !NEVER_SEEN_AT_1000.includes(kind));
    const usual = new Map(USUAL);
    const rest = kinds.filter((kind) => !usual.has(kind));
    const left = 100 - USUAL.reduce((sum, [, share]) => sum + share, 0);
    const weights = new Map(kinds.map((kind) => [kind, usual.get(kind) ?? left / rest.length]));
    const tally = studyMix(weights, timesDigits, SEED + 2000 + timesDigits, 5 * CELLS);
    print(`mix, u = ${timesDigits} printed digits`, [tally]);
    expect(tally.first).toBeGreaterThanOrEqual(least);
  });
});

describe('2000 cells that are wrong by an amount of no meaning', () => {
  // Whoever knows a number to its first two or three figures only cannot tell a wrong digit from any other error.
  it.each([
    [1, 0.15],
    [1000, 0.5],
  ])('find an explanation by chance at u = %i printed digits in a share below %d', (timesDigits, most) => {
    const random = seededRandom(SEED + 4000);
    const found = new Map<string, number>();
    for (let i = 0; i < 2000; ) {
      const cell = disturbedCell(random);
      const result = explained(cell, timesDigits, random);
      if (result === null) continue;
      i++;
      const code = result[0]?.slip ?? 'none';
      found.set(code, (found.get(code) ?? 0) + 1);
    }
    if (process.env.SHOW !== undefined) console.log(timesDigits, Object.fromEntries(found));
    expect(1 - (found.get('none') ?? 0) / 2000).toBeLessThan(most);
  });
});

function print(title: string, tallies: readonly Tally[]): void {
  if (process.env.SHOW === undefined) return;
  const percent = (share: number) => (100 * share).toFixed(1).padStart(6);
  const lines = tallies.map(
    (t) =>
      `${t.kind.padEnd(42)}${percent(t.first)}${percent(t.valueRight)}${percent(t.wrong)}${percent(t.none)}  ${t.takenFor}`,
  );
  console.log([`${title}: first, first with the value, another first, none [%], taken for`, ...lines].join('\n'));
}
