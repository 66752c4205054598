import { describe, expect, it } from 'vitest';
import {
  against,
  CP,
  examined,
  findingsOf,
  type Law,
  laws,
  medium,
  moved,
  outcomeOf,
  rowsOf,
  S,
  silent,
  T,
  TR,
  verdictOf,
} from '../medium.js';

const RULE = 'entropy-follows-heat-capacity';
const alone = (basis: 'evaluated' | 'measured' = 'evaluated') => {
  const printed = medium(basis);
  printed.tables = { cr: printed.tables.cr! };
  printed.without = [3];
  return printed;
};
/** S of the row at 440 K is off by so much; S, Cp and H stand in the table. */
function spoilt(by: number) {
  const printed = alone();
  const row = printed.tables.cr!.find((one) => one[T] === '440')!;
  row[S] = moved(row[S]!, by);
  return examined(printed);
}

describe(RULE, () => {
  it('is silent on a clean table, evaluated or measured', () => {
    expect(verdictOf(examined(alone()), RULE, 'cr')).toEqual(silent('arithmetic'));
    expect(verdictOf(examined(alone('measured')), RULE, 'cr')).toEqual(silent('independent'));
    expect(outcomeOf(examined(alone()), RULE, 'cr').smallestDetectable).toBeGreaterThan(0);
  });

  it.each([0.5, -0.5, 20])('finds an S that is off by %d J/(mol K), a fault', (by) => {
    const found = spoilt(by);
    expect(verdictOf(found, RULE, 'cr')).toEqual(against('fault', 'arithmetic'));
    const [finding] = findingsOf(found, RULE);
    expect(finding!.address).toMatchObject({ file: 'cr.csv', column: 'S' });
    expect(finding!.temperatureK).toBe(440);
    expect(finding!.difference).toBeCloseTo(by, 2);
    expect(found.named.map(({ row, quantity }) => [row, quantity])).toEqual([[8, 'entropy']]);
    const [suspect] = found.suspects;
    expect(suspect).toMatchObject({ place: 1, group: 1, address: { line: 10, column: 'S' } });
    expect(Math.abs(suspect!.proposed - (suspect!.observed - by))).toBeLessThan(4 * suspect!.uProposed);
  });

  it('takes an S that is off by less than anyone would notice for a doubt', () => {
    expect(verdictOf(spoilt(0.03), RULE, 'cr')).toEqual(against('doubt', 'arithmetic'));
  });

  it('is silent on one unit of the last place, and makes no more than a note of three', () => {
    expect(verdictOf(spoilt(0.001), RULE, 'cr')).toEqual(silent('arithmetic'));
    expect(verdictOf(spoilt(0.003), RULE, 'cr')).toEqual({ ...silent('arithmetic'), severities: ['note'] });
  });

  it('finds nothing else wrong in a table with one wrong S', () => {
    const found = spoilt(0.5);
    expect(found.findings.map(({ rule }) => rule)).toEqual([RULE]);
  });

  it('finds a wrong S in a measured table, where it is more than the uncertainty of the heat capacities', () => {
    const printed = alone('measured');
    const row = printed.tables.cr!.find((one) => one[T] === '440')!;
    row[S] = moved(row[S]!, 30);
    const found = examined(printed);
    expect(verdictOf(found, RULE, 'cr')).toEqual(against('fault', 'independent'));
    expect(findingsOf(found, RULE)[0]!.temperatureK).toBe(440);
  });

  it('runs through a glass transition and a peak of Cp, whose rows are printed twice', () => {
    const { cr } = laws();
    const peak: Law = {
      ...cr,
      parts: [
        { fromK: 1, cp: (t) => 40 + 12 * Math.exp((t - 380) / 60) },
        { fromK: 380, cp: (t) => 44 + 0.01 * (t - 380) },
      ],
    };
    const printed = alone();
    const rows = [TR, 300, 310, 320, 330, 340, 350, 360, 370, 380, 380, 390, 400, 420, 440, 460, 480, 500];
    printed.tables = { cr: rowsOf(peak, rows) };
    const { findings } = examined(printed);
    expect(findings).toEqual([]);
    const upper = printed.tables.cr![10]!;
    upper[S] = moved(upper[S]!, 0.4);
    expect(examined(printed).findings.some(({ severity }) => severity === 'fault')).toBe(true);
  });

  it('takes the last of three rows at one temperature for the upper side of a step in Cp', () => {
    const { cr } = laws();
    const step: Law = {
      ...cr,
      parts: [
        { fromK: 1, cp: () => 40 },
        { fromK: 380, cp: () => 52 },
      ],
    };
    const printed = alone();
    const rows = rowsOf(step, [TR, 300, 320, 340, 360, 380, 380, 400, 420, 440, 460, 480, 500]);
    printed.tables = { cr: rows.toSpliced(6, 0, [...rows[5]!]) };
    expect(printed.tables.cr!.slice(5, 8).map((row) => row[CP])).toEqual(['40.000', '40.000', '52.000']);
    expect(examined(printed).findings).toEqual([]);
    const upper = printed.tables.cr![8]!;
    upper[S] = moved(upper[S]!, 0.4);
    const found = findingsOf(examined(printed), RULE);
    expect(found.map(({ temperatureK, severity }) => [temperatureK, severity])).toEqual([[400, 'fault']]);
  });

  it.each([
    ['without a column of S', (printed: ReturnType<typeof alone>) => (printed.without = [S]), 'entropies'],
    ['without a column of Cp', (printed: ReturnType<typeof alone>) => (printed.without = [CP]), 'heat capacities'],
    ['on a single row', (printed: ReturnType<typeof alone>) => printed.tables.cr!.splice(1), 'two rows'],
    [
      'where no two rows beside each other print S',
      (printed: ReturnType<typeof alone>) => {
        printed.tables.cr!.forEach((row, i) => {
          if (i !== 3) row[S] = '';
        });
      },
      'side by side',
    ],
  ])('is untestable %s, and says what is missing', (_, change, missing) => {
    const printed = alone();
    change(printed);
    const outcome = outcomeOf(examined(printed), RULE, 'cr');
    expect(outcome).toMatchObject({ outcome: 'untestable', evidence: null });
    expect(outcome.missing).toContain(missing);
  });
});
