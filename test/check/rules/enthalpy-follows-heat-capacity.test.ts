import { describe, expect, it } from 'vitest';
import { against, CP, examined, findingsOf, H, medium, moved, outcomeOf, silent, T, verdictOf } from '../medium.js';

const RULE = 'enthalpy-follows-heat-capacity';
const alone = (basis: 'evaluated' | 'measured' = 'evaluated') => {
  const printed = medium(basis);
  printed.tables = { l: printed.tables.l! };
  return printed;
};
/** H - H(Tr) of the row at 440 K is off by so many kJ/mol. */
function spoilt(by: number, basis: 'evaluated' | 'measured' = 'evaluated') {
  const printed = alone(basis);
  const row = printed.tables.l!.find((one) => one[T] === '440')!;
  row[H] = moved(row[H]!, by);
  return examined(printed);
}

describe(RULE, () => {
  it('is silent on a clean table, evaluated or measured', () => {
    expect(verdictOf(examined(alone()), RULE, 'l')).toEqual(silent('arithmetic'));
    expect(verdictOf(examined(alone('measured')), RULE, 'l')).toEqual(silent('independent'));
    expect(outcomeOf(examined(alone()), RULE, 'l').smallestDetectable).toBeGreaterThan(0);
  });

  it.each([0.3, -0.3, 9])('finds an increment that is off by %d kJ/mol, a fault', (by) => {
    const found = spoilt(by);
    expect(verdictOf(found, RULE, 'l')).toEqual(against('fault', 'arithmetic'));
    const [finding] = findingsOf(found, RULE);
    expect(finding!.address).toMatchObject({ file: 'l.csv', line: 10, column: 'H-H(Tr)' });
    expect(finding!.difference).toBeCloseTo(1000 * by, -1);
    expect(found.named.map(({ row, quantity }) => [row, quantity])).toEqual([[8, 'enthalpy-increment']]);
    expect(found.findings.map(({ rule }) => rule)).toEqual([RULE]);
  });

  it('takes an increment that is off by less than 50 J/mol for a doubt', () => {
    expect(verdictOf(spoilt(0.03), RULE, 'l')).toEqual(against('doubt', 'arithmetic'));
  });

  it('is silent on one unit of the last place, and makes no more than a note of three', () => {
    expect(verdictOf(spoilt(0.001), RULE, 'l')).toEqual(silent('arithmetic'));
    expect(verdictOf(spoilt(0.003), RULE, 'l')).toEqual({ ...silent('arithmetic'), severities: ['note'] });
  });

  it('finds an increment of a measured series, where it is more than its uncertainties', () => {
    expect(verdictOf(spoilt(8, 'measured'), RULE, 'l')).toEqual(against('fault', 'independent'));
    expect(verdictOf(spoilt(0.02, 'measured'), RULE, 'l')).toEqual(silent('independent'));
  });

  it.each([
    ['without a column of increments', [H], 'enthalpy increments'],
    ['without a column of Cp', [CP], 'heat capacities'],
  ])('is untestable %s, and says what is missing', (_, without, missing) => {
    const printed = alone();
    printed.without = without;
    const outcome = outcomeOf(examined(printed), RULE, 'l');
    expect(outcome).toMatchObject({ outcome: 'untestable', evidence: null });
    expect(outcome.missing).toContain(missing);
  });
});
