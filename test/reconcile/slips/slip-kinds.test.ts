import { describe, expect, it } from 'vitest';
import { explain, SLIP_CODES } from '../../../pipeline/reconcile/explain.js';
import type { SuspectContext } from '../../../pipeline/reconcile/slips/slip.js';
import { type Random, seededRandom } from '../../slips/random.js';
import { disturbedCell, SPOILT_KINDS, type SpoiltCell, spoilCell } from './spoil-cell.js';

const CELLS = 2000;
const SEED = 20260;

interface Tally {
  readonly kind: string;
  readonly first: number;
  readonly valueRight: number;
  readonly none: number;
}

describe('2000 spoilt cells of each kind', { timeout: 60_000 }, () => {
  it('cover every kind that is explained', () => {
    expect([...SPOILT_KINDS].sort()).toEqual([...SLIP_CODES].sort());
  });

  it('are explained rightly first in 90 % where the proposal is as sharp as the printed digits', () => {
    const tallies = SPOILT_KINDS.map((kind) => study(kind, 1, SEED));
    print('u = printed digits', tallies);
    for (const tally of tallies) expect(tally.first, tally.kind).toBeGreaterThanOrEqual(0.9);
  });

  it('are explained rightly first in 75 % where the proposal is a thousand times less sharp', () => {
    // A tenth of a joule per kelvin is never seen then.
    const tallies = SPOILT_KINDS.filter((kind) => kind !== 'atmosphere-for-bar').map((kind) =>
      study(kind, 1000, SEED + 1),
    );
    print('u = 1000 printed digits', tallies);
    for (const tally of tallies) expect(tally.first, tally.kind).toBeGreaterThanOrEqual(0.75);
  });
});

describe('2000 cells that are wrong by an amount of no meaning', () => {
  // Whoever knows a number to its first two or three figures only cannot tell a wrong digit from any other error.
  it.each([
    [1, 0.15],
    [1000, 0.5],
  ])('find an explanation by chance at u = %i printed digits in a share below %d', (timesDigits, most) => {
    const random = seededRandom(SEED + 2);
    const found = new Map<string, number>();
    for (let i = 0; i < CELLS; ) {
      const cell = disturbedCell(random);
      const result = explained(cell, timesDigits, random);
      if (result === null) continue;
      i++;
      const code = result[0]?.slip ?? 'none';
      found.set(code, (found.get(code) ?? 0) + 1);
    }
    if (process.env.SHOW !== undefined) console.log(timesDigits, Object.fromEntries(found));
    expect(1 - (found.get('none') ?? 0) / CELLS).toBeLessThan(most);
  });
});

function study(kind: string, timesDigits: number, seed: number): Tally {
  const random = seededRandom(seed + SPOILT_KINDS.indexOf(kind));
  let [first, valueRight, none, draws] = [0, 0, 0, 0];
  for (let i = 0; i < CELLS; ) {
    if (draws++ > 1000 * CELLS) throw new Error(`no cell can hold ${kind}`);
    const cell = spoilCell(kind, random);
    const result = cell === null ? null : explained(cell, timesDigits, random);
    if (cell === null || result === null) continue;
    i++;
    const best = result[0];
    if (best === undefined) none++;
    else if (best.slip === kind) {
      first++;
      const near = Math.max(0.01 * Math.abs(cell.truth - numberOf(cell)), 3 * cell.lastPlace);
      if (Math.abs(best.corrected - cell.truth) <= near) valueRight++;
    }
  }
  return { kind, first: first / CELLS, valueRight: valueRight / CELLS, none: none / CELLS };
}

/** null where nobody would have suspected the cell: off by less than 6 u or five units of the last place. */
function explained(cell: SpoiltCell, timesDigits: number, random: Random) {
  const u = (timesDigits * cell.lastPlace) / Math.sqrt(12);
  const observed = numberOf(cell);
  const proposed = cell.truth + u * normal(random);
  if (Math.abs(observed - proposed) < Math.max(6 * u, 5 * cell.lastPlace)) return null;
  return explain(contextOf(cell, observed), proposed, u, materialOf(cell));
}

function contextOf(cell: SpoiltCell, observed: number): SuspectContext {
  const si = (text: string) => Number(text) * cell.factor + cell.offset;
  return {
    ...{ quantity: cell.quantity, printed: cell.printed, observed, factor: cell.factor, offset: cell.offset },
    ...{ unit: cell.unit, molarMassGPerMol: cell.molarMassGPerMol, temperatureK: null, gas: cell.gas },
    rowAbove: { printed: cell.above, observed: si(cell.above) },
    partner: cell.partner === null ? null : { printed: cell.partner, observed: Number.NaN },
  };
}

const numberOf = (cell: SpoiltCell): number => Number(cell.printed) * cell.factor + cell.offset;

/** What a user would notice, as the policy has it by default. */
function materialOf({ quantity, truth }: SpoiltCell): number {
  switch (quantity) {
    case 'entropy':
    case 'gibbs-function':
    case 'transition-entropy':
      return Math.max(0.05, 0.001 * Math.abs(truth));
    case 'heat-capacity':
    case 'pressure':
      return 0.01 * Math.abs(truth);
    case 'temperature':
    case 'transition-temperature':
      return 0.5;
    default:
      return 50;
  }
}

/** Box and Muller (1958). */
function normal(random: Random): number {
  return Math.sqrt(-2 * Math.log(1 - random.unit())) * Math.cos(2 * Math.PI * random.unit());
}

function print(title: string, tallies: readonly Tally[]): void {
  if (process.env.SHOW === undefined) return;
  const percent = (share: number) => (100 * share).toFixed(1).padStart(6);
  const lines = tallies.map((t) => `${t.kind.padEnd(32)}${percent(t.first)}${percent(t.valueRight)}${percent(t.none)}`);
  console.log([`${title}: first, first with the value, none [%]`, ...lines].join('\n'));
}
