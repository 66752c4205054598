import { describe, expect, it } from 'vitest';
import { against, CP, checked, findingsOf, medium, moved, outcomeOf, S, silent, T, verdictOf } from '../medium.js';

const RULE = 'entropy-rises';
/** S of the crystal's row at 440 K lies below the row before it; nothing but S is printed. */
function fallen(basis: 'evaluated' | 'measured' = 'evaluated', by = -5) {
  const printed = medium(basis);
  const row = printed.tables.cr!.find((one) => one[T] === '440')!;
  row[S] = moved(row[S]!, by);
  printed.without = [CP];
  return checked(printed);
}

describe(RULE, () => {
  it.each([
    ['evaluated', 'arithmetic'],
    ['measured', 'independent'],
  ] as const)('is silent on tables and transitions in which S rises (%s)', (basis, evidence) => {
    const clean = checked(medium(basis));
    for (const place of ['cr', 'l', 'g', 'cr>l', 'l>g'])
      expect(verdictOf(clean, RULE, place)).toEqual(silent(evidence));
  });

  it('finds an S below that of the row before, and shows both', () => {
    const found = fallen();
    expect(verdictOf(found, RULE, 'cr')).toEqual(against('fault', 'arithmetic'));
    const [finding] = findingsOf(found, RULE);
    expect(finding).toMatchObject({ temperatureK: 440, address: { file: 'cr.csv', line: 10, column: 'S' } });
    expect(finding!.evidence.map(({ line }) => line)).toEqual([10, 9]);
    expect(finding!.difference).toBeLessThan(0);
  });

  it('allows two equal rows, and a fall within the uncertainty of measured ones', () => {
    const printed = medium();
    printed.without = [CP];
    printed.tables.cr![8]![S] = printed.tables.cr![7]![S]!;
    expect(verdictOf(checked(printed), RULE, 'cr')).toEqual(silent('arithmetic'));
    expect(verdictOf(fallen('measured', -2.6), RULE, 'cr')).toEqual(silent('independent'));
    expect(verdictOf(fallen('measured', -40), RULE, 'cr')).toEqual(against('fault', 'independent'));
  });

  it('leaves a cell that the row checks have named to its own rule', () => {
    const printed = medium();
    printed.tables.cr![8]![S] = moved(printed.tables.cr![8]![S]!, -5);
    const found = checked(printed);
    expect(verdictOf(found, RULE, 'cr')).toEqual(silent('arithmetic'));
    expect(findingsOf(found, 'entropy-follows-heat-capacity').map(({ severity }) => severity)).toEqual(['fault']);
  });

  it('finds a liquid with less entropy than its crystal at the melting point', () => {
    const printed = medium();
    printed.without = [S, 3];
    printed.anchors[1]!.S = moved(printed.anchors[1]!.S, -30);
    const found = checked(printed);
    const [finding] = findingsOf(found, RULE);
    expect(finding).toMatchObject({ severity: 'fault', fromPhase: 'cr', toPhase: 'l', unit: 'J/(mol.K)' });
    expect(finding!.observed).toBeCloseTo(-12, 1);
    expect(finding!.detail).toEqual({ code: 'entropy-order', above: 'l', below: 'cr' });
    expect(outcomeOf(found, RULE, 'cr>l')).toMatchObject({ outcome: 'disagrees', evidence: 'arithmetic' });
  });

  it('is untestable without S in a table, and across a continuous transition', () => {
    const printed = medium();
    printed.without = [S];
    expect(outcomeOf(checked(printed), RULE, 'cr')).toMatchObject({
      outcome: 'untestable',
      evidence: null,
      missing: 'a column of entropies',
    });
    Object.assign(printed.transitions[0]!, { order: 'continuous', to: 'cr' });
    expect(outcomeOf(checked(printed), RULE, 'cr>cr')).toMatchObject({ outcome: 'untestable', evidence: null });
  });
});
