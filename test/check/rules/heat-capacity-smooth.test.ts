import { describe, expect, it } from 'vitest';
import {
  against,
  CP,
  examined,
  F,
  findingsOf,
  H,
  type Law,
  laws,
  medium,
  outcomeOf,
  rowsOf,
  S,
  silent,
  T,
  TR,
  verdictOf,
} from '../medium.js';

const RULE = 'heat-capacity-smooth';
const alone = (basis: 'evaluated' | 'measured' = 'evaluated', without: number[] = []) => {
  const printed = medium(basis);
  printed.tables = { cr: printed.tables.cr! };
  printed.without = without;
  return printed;
};
/** Cp of the row at 440 K is off by this share. */
function spoilt(share: number, basis: 'evaluated' | 'measured' = 'evaluated', without: number[] = []) {
  const printed = alone(basis, without);
  const row = printed.tables.cr!.find((one) => one[T] === '440')!;
  row[CP] = (Number(row[CP]) * (1 + share)).toFixed(3);
  return examined(printed);
}

describe(RULE, () => {
  it.each([
    ['evaluated', 'arithmetic'],
    ['measured', 'independent'],
  ] as const)('is silent on a clean table with all columns and on Cp alone (%s)', (basis, evidence) => {
    expect(verdictOf(examined(alone(basis)), RULE, 'cr')).toEqual(silent(evidence));
    expect(verdictOf(examined(alone(basis, [S, F, H])), RULE, 'cr')).toEqual(silent(evidence));
  });

  it.each([0.03, -0.03, 0.3])('finds an inner Cp that is off by the share %d, and no other cell', (share) => {
    const found = spoilt(share);
    expect(verdictOf(found, RULE, 'cr')).toEqual(against('fault', 'arithmetic'));
    const [finding] = findingsOf(found, RULE);
    expect(finding!.temperatureK).toBe(440);
    expect(finding!.address).toMatchObject({ file: 'cr.csv', line: 10, column: 'Cp' });
    expect(Math.abs(finding!.expected! * (1 + share) - finding!.observed!)).toBeLessThan(0.2);
    expect(found.named.map(({ row, quantity }) => [row, quantity])).toEqual([[8, 'heat-capacity']]);
    expect(found.findings.map(({ rule }) => rule)).toEqual([RULE]);
  });

  it('finds it among heat capacities alone, too', () => {
    expect(verdictOf(spoilt(0.05, 'evaluated', [S, F, H]), RULE, 'cr')).toEqual(against('fault', 'arithmetic'));
  });

  it('is silent on less than one per cent', () => {
    expect(verdictOf(spoilt(0.004), RULE, 'cr')).toEqual(silent('arithmetic'));
  });

  it('finds in a measured series what stands out of its scatter, and not what does not', () => {
    expect(verdictOf(spoilt(0.4, 'measured', [S, F, H]), RULE, 'cr')).toEqual(against('fault', 'independent'));
    expect(verdictOf(spoilt(0.02, 'measured', [S, F, H]), RULE, 'cr')).toEqual(silent('independent'));
  });

  it('is silent at the peak of a lambda transition, printed from both sides', () => {
    const { cr } = laws();
    const lambda: Law = {
      ...cr,
      parts: [
        { fromK: 1, cp: (t) => 40 + 30 * Math.exp((t - 400) / 25) },
        { fromK: 400, cp: (t) => 44 + 20 * Math.exp((400 - t) / 15) },
      ],
    };
    const printed = alone();
    const rows = [TR, 300, 320, 340, 350, 360, 370, 380, 390, 395, 400, 400, 405, 410, 420, 430, 440, 460, 480, 500];
    printed.tables = { cr: rowsOf(lambda, rows) };
    expect(examined(printed).findings).toEqual([]);
  });

  it('is untestable on fewer than five rows, and without Cp', () => {
    const short = alone();
    short.tables.cr!.splice(4);
    expect(outcomeOf(examined(short), RULE, 'cr')).toMatchObject({
      outcome: 'untestable',
      missing: 'at least five rows',
    });
    expect(outcomeOf(examined(alone('evaluated', [CP])), RULE, 'cr')).toMatchObject({
      outcome: 'untestable',
      missing: 'a column of heat capacities',
    });
  });
});
