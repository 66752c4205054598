import { describe, expect, it } from 'vitest';
import { against, examined, F, findingsOf, H, medium, moved, outcomeOf, S, silent, T, verdictOf } from '../medium.js';

const RULE = 'functions-close';
const alone = (basis: 'evaluated' | 'measured' = 'evaluated') => {
  const printed = medium(basis);
  printed.tables = { g: printed.tables.g! };
  return printed;
};
const at = (printed: ReturnType<typeof alone>, t: string) => printed.tables.g!.find((one) => one[T] === t)!;
function spoilt(by: number, basis: 'evaluated' | 'measured' = 'evaluated') {
  const printed = alone(basis);
  const row = at(printed, '700');
  row[F] = moved(row[F]!, by);
  return examined(printed);
}

describe(RULE, () => {
  it('is silent on a clean table, evaluated or measured', () => {
    expect(verdictOf(examined(alone()), RULE, 'g')).toEqual(silent('arithmetic'));
    expect(verdictOf(examined(alone('measured')), RULE, 'g')).toEqual(silent('independent'));
  });

  it.each([0.4, -0.4, 15])('finds a -[G - H(Tr)]/T that is off by %d J/(mol K), a fault', (by) => {
    const found = spoilt(by);
    expect(verdictOf(found, RULE, 'g')).toEqual(against('fault', 'arithmetic'));
    const [finding] = findingsOf(found, RULE);
    expect(finding!.temperatureK).toBe(700);
    expect(finding!.address).toMatchObject({ file: 'g.csv', column: '-[G-H(Tr)]/T' });
    expect(finding!.difference).toBeCloseTo(by, 2);
    expect(found.named.map(({ quantity }) => quantity)).toEqual(['gibbs-function']);
    expect(found.findings.map(({ rule }) => rule)).toEqual([RULE]);
  });

  it('takes one that is off by less than anyone would notice for a doubt', () => {
    expect(verdictOf(spoilt(0.03), RULE, 'g')).toEqual(against('doubt', 'arithmetic'));
  });

  it('is silent on what rounding can do, at its worst', () => {
    expect(verdictOf(spoilt(0.001), RULE, 'g')).toEqual(silent('arithmetic'));
  });

  it('leaves a wrong S or H to their own rules, and the pair of S with the -[G - H(Tr)]/T computed from it', () => {
    for (const [columns, rule] of [
      [[S], 'entropy-follows-heat-capacity'],
      [[S, F], 'entropy-follows-heat-capacity'],
      [[H], 'enthalpy-follows-heat-capacity'],
    ] as const) {
      const printed = alone();
      const row = at(printed, '700');
      for (const column of columns) row[column] = moved(row[column]!, 0.9);
      const found = examined(printed);
      expect(found.findings.map((one) => [one.rule, one.severity])).toEqual([[rule, 'fault']]);
      expect(verdictOf(found, RULE, 'g')).toEqual(silent('arithmetic'));
    }
  });

  it('finds a slip in a measured table beyond its uncertainties', () => {
    expect(verdictOf(spoilt(40, 'measured'), RULE, 'g')).toEqual(against('fault', 'independent'));
  });

  it.each([[[S]], [[H]], [[F]]])('is untestable without column %j, and says what is missing', (without) => {
    const printed = alone();
    printed.without = without;
    const outcome = outcomeOf(examined(printed), RULE, 'g');
    expect(outcome).toMatchObject({ outcome: 'untestable', evidence: null });
    expect(outcome.missing).toContain('-[G - H(Tr)]/T');
  });
});
