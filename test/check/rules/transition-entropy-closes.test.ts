import { describe, expect, it } from 'vitest';
import { checked, findingsOf, medium, moved, outcomeOf, silent, verdictOf } from '../medium.js';

const RULE = 'transition-entropy-closes';
function spoilt(key: 'dH' | 'dS', text: string, basis: 'evaluated' | 'measured' = 'evaluated', bare = false) {
  const printed = medium(basis);
  printed.transitions[0]![key] = text;
  if (bare) printed.tables = {};
  return checked(printed);
}
const melting = (found: ReturnType<typeof checked>) =>
  findingsOf(found, RULE).filter(({ fromPhase }) => fromPhase === 'cr');

describe(RULE, () => {
  it('is silent where dH = T dS, stated and by the curves', () => {
    const clean = checked(medium());
    expect(verdictOf(clean, RULE, 'cr>l')).toEqual(silent('arithmetic'));
    expect(verdictOf(clean, RULE, 'l>g')).toEqual(silent('arithmetic'));
  });

  it('agrees on measured data, however uncertain the curves are', () => {
    const clean = checked(medium('measured'));
    for (const place of ['cr>l', 'l>g']) {
      const { outcome, evidence, severities } = verdictOf(clean, RULE, place);
      expect([outcome, evidence]).toEqual(['agrees', 'independent']);
      expect(severities).toEqual([]);
    }
  });

  it.each([
    ['dH', '2.151', 'kilocalories'],
    ['dH', '9.300', 'a digit'],
    ['dS', '1.800', 'the decimal point'],
    ['dS', '4.302', 'calories'],
  ] as const)('finds %s = %s (%s), a fault', (key, text, _) => {
    const found = spoilt(key, text);
    const [finding, ...more] = melting(found);
    expect(more).toEqual([]);
    expect(finding).toMatchObject({ severity: 'fault', unit: 'J/mol', address: { file: 'transitions.csv', line: 2 } });
    expect(outcomeOf(found, RULE, 'cr>l')).toMatchObject({ outcome: 'disagrees', evidence: 'arithmetic' });
    expect(outcomeOf(found, RULE, 'l>g').outcome).toBe('agrees');
  });

  it('says which of the three comparisons is worst, at the cell that it is about', () => {
    const about = (printed: ReturnType<typeof medium>) =>
      melting(checked(printed)).map(({ detail, address }) => [
        detail.code === 'transition' && detail.of,
        address?.column,
      ]);
    const bare = medium();
    bare.tables = {};
    bare.transitions[0]!.dH = '2.151';
    expect(about(bare)).toEqual([['stated', 'dH']]);
    const alone = medium();
    Object.assign(alone.transitions[0]!, { dH: '2.151', dS: '' });
    expect(about(alone)).toEqual([['enthalpy', 'dH']]);
    Object.assign(alone.transitions[0]!, { dH: '', dS: '1.800' });
    expect(about(alone)).toEqual([['entropy', 'dS']]);
  });

  it('compares the stated numbers with each other where no table reaches them', () => {
    expect(melting(spoilt('dH', '9.000', 'evaluated', true))).toEqual([]);
    expect(outcomeOf(spoilt('dH', '9.000', 'evaluated', true), RULE, 'cr>l').outcome).toBe('agrees');
    expect(melting(spoilt('dH', '2.151', 'evaluated', true)).map(({ severity }) => severity)).toEqual(['fault']);
  });

  it('compares one stated number with the curves where the other is not given', () => {
    const printed = medium();
    Object.assign(printed.transitions[0]!, { dH: '', dS: '19.000' });
    expect(melting(checked(printed)).map(({ severity }) => severity)).toEqual(['fault']);
    printed.transitions[0]!.dS = '18.000';
    expect(verdictOf(checked(printed), RULE, 'cr>l')).toEqual(silent('arithmetic'));
  });

  it('takes a difference of less than half a kelvin times dS for a doubt', () => {
    expect(melting(spoilt('dH', moved('9.000', 0.007))).map(({ severity }) => severity)).toEqual(['doubt']);
  });

  it('says nothing of what measured numbers are too uncertain to decide, and finds the rest', () => {
    const found = spoilt('dH', '9.200', 'measured');
    expect(melting(found)).toEqual([]);
    expect(outcomeOf(found, RULE, 'cr>l')).toMatchObject({ outcome: 'agrees', evidence: 'independent' });
    expect(melting(spoilt('dH', '2.151', 'measured')).map(({ severity }) => severity)).toEqual(['fault']);
  });

  it('closes the stated numbers of a continuous transition, zeros among them', () => {
    const printed = medium();
    const lambda = (dH: string, dS: string) => {
      printed.transitions[0] = { from: 'cr', to: 'cr', T: '400.000', dH, dS, p: '1', order: 'continuous' };
      return checked(printed);
    };
    expect(verdictOf(lambda('0.000', '0.000'), RULE, 'cr>cr')).toEqual(silent('arithmetic'));
    expect(melting(lambda('0.900', '0.000')).map(({ severity }) => severity)).not.toEqual([]);
    expect(outcomeOf(lambda('', ''), RULE, 'cr>cr')).toMatchObject({ outcome: 'untestable', evidence: null });
  });

  it('is untestable where neither is stated, or one alone and no curve', () => {
    const printed = medium();
    Object.assign(printed.transitions[0]!, { dH: '', dS: '' });
    expect(outcomeOf(checked(printed), RULE, 'cr>l')).toMatchObject({
      outcome: 'untestable',
      missing: 'a stated enthalpy or entropy of the transition',
    });
    const outcome = outcomeOf(spoilt('dS', '', 'evaluated', true), RULE, 'cr>l');
    expect(outcome.outcome).toBe('untestable');
    expect(outcome.missing).toContain('both the enthalpy and the entropy');
  });
});
