import { describe, expect, it } from 'vitest';
import { checked, findingsOf, medium, outcomeOf, silent, verdictOf } from '../medium.js';

const RULE = 'heating-raises-entropy';
const melting = (found: ReturnType<typeof checked>) =>
  findingsOf(found, RULE).filter(({ fromPhase }) => fromPhase !== 'g' && fromPhase !== null);

describe(RULE, () => {
  it.each([
    ['evaluated', 'arithmetic'],
    ['measured', 'independent'],
  ] as const)('is silent where heating takes heat and raises entropy (%s)', (basis, evidence) => {
    expect(verdictOf(checked(medium(basis)), RULE, 'cr>l')).toEqual(silent(evidence));
    expect(verdictOf(checked(medium(basis)), RULE, 'l>g')).toEqual(silent(evidence));
  });

  it.each([
    ['dH', '-9.000', 'J/mol', 'evaluated'],
    ['dS', '-18.000', 'J/(mol.K)', 'evaluated'],
    ['dH', '-9.000', 'J/mol', 'measured'],
  ] as const)('finds a lost sign: %s = %s', (key, text, unit, basis) => {
    const printed = medium(basis);
    printed.transitions[0]![key] = text;
    const found = checked(printed);
    const [finding, ...more] = melting(found);
    expect(more).toEqual([]);
    expect(finding).toMatchObject({
      severity: 'fault',
      unit,
      address: { file: 'transitions.csv', line: 2, column: key },
    });
    expect(finding!.observed).toBeLessThan(0);
    expect(outcomeOf(found, RULE, 'cr>l').outcome).toBe('disagrees');
    expect(outcomeOf(found, RULE, 'l>g').outcome).toBe('agrees');
  });

  it('finds from and to exchanged, by the curves alone', () => {
    const printed = medium();
    Object.assign(printed.transitions[0]!, { from: 'l', to: 'cr', dH: '', dS: '' });
    const found = checked(printed);
    expect(outcomeOf(found, RULE, 'l>cr')).toMatchObject({ outcome: 'disagrees', evidence: 'arithmetic' });
    const [finding] = melting(found);
    expect(finding!.severity).toBe('fault');
    expect(finding!.observed).toBeCloseTo(-18, 1);
  });

  it('takes a printed zero for no fall', () => {
    const printed = medium();
    printed.tables = {};
    Object.assign(printed.transitions[0]!, { dH: '0.000', dS: '0.000' });
    expect(verdictOf(checked(printed), RULE, 'cr>l').severities).toEqual([]);
  });

  it.each([
    ['nothing is stated and no curve is there', { dH: '', dS: '' }, {}, 'cr>l', ''],
    ['the transition is continuous', { order: 'continuous', to: 'cr' }, undefined, 'cr>cr', 'first-order'],
  ])('is untestable where %s, and says so', (_, change, tables, place, missing) => {
    const printed = medium();
    Object.assign(printed.transitions[0]!, change);
    if (tables !== undefined) printed.tables = tables;
    const outcome = outcomeOf(checked(printed), RULE, place);
    expect(outcome).toMatchObject({ outcome: 'untestable', evidence: null });
    expect(outcome.missing).toContain(missing);
    expect(outcome.missing).not.toBe('');
  });
});
