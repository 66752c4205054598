import { describe, expect, it } from 'vitest';
import { checked, findingsOf, MELTING, medium, moved, outcomeOf, silent, verdictOf } from '../medium.js';

const RULE = 'crossing-agrees';
/** The melting point off by so many kelvins. */
function spoilt(by: number, basis: 'evaluated' | 'measured' = 'evaluated') {
  const printed = medium(basis);
  printed.transitions[0]!.T = moved(printed.transitions[0]!.T, by);
  return checked(printed);
}
const melting = (found: ReturnType<typeof checked>) =>
  findingsOf(found, RULE).filter(({ fromPhase }) => fromPhase === 'cr');

describe(RULE, () => {
  it.each([
    ['evaluated', 'arithmetic'],
    ['measured', 'independent'],
  ] as const)('is silent where the curves cross at the stated temperature (%s)', (basis, evidence) => {
    const clean = checked(medium(basis));
    expect(verdictOf(clean, RULE, 'cr>l')).toEqual(silent(evidence));
    expect(verdictOf(clean, RULE, 'l>g')).toEqual(silent(evidence));
    expect(Math.abs(clean.judged[0]!.computedK! - MELTING.atK)).toBeLessThan(3 * clean.judged[0]!.uComputedK!);
  });

  it.each([4, -4, -273.15])('finds a melting point that is off by %d K, a fault', (by) => {
    const found = spoilt(by);
    const [finding, ...more] = melting(found);
    expect(more).toEqual([]);
    expect(finding).toMatchObject({
      severity: 'fault',
      unit: 'K',
      address: { file: 'transitions.csv', line: 2, column: 'T' },
    });
    expect(finding!.difference!).toBeCloseTo(by, 0);
    expect(finding!.expected!).toBeCloseTo(MELTING.atK, 0);
    expect(outcomeOf(found, RULE, 'cr>l')).toMatchObject({ outcome: 'disagrees', evidence: 'arithmetic' });
    expect(outcomeOf(found, RULE, 'l>g').outcome).toBe('agrees');
  });

  it('takes one that is off by less than half a kelvin for a doubt', () => {
    expect(melting(spoilt(0.35)).map(({ severity }) => severity)).toEqual(['doubt']);
  });

  it('says nothing of one where measured data are too uncertain to say, and finds one that they can tell', () => {
    const found = spoilt(4, 'measured');
    expect(melting(found)).toEqual([]);
    expect(outcomeOf(found, RULE, 'cr>l')).toMatchObject({ outcome: 'agrees', evidence: 'independent' });
    const printed = medium('measured');
    printed.transitions[1]!.T = moved(printed.transitions[1]!.T, -273.15);
    expect(findingsOf(checked(printed), RULE).map(({ severity, fromPhase }) => [severity, fromPhase])).toEqual([
      ['fault', 'l'],
    ]);
  });

  it('finds curves that do not cross at all within their tables', () => {
    const printed = medium();
    printed.tables.cr!.splice(13);
    printed.tables.l!.splice(13);
    printed.anchors[1]!.H = moved(printed.anchors[1]!.H, 8);
    printed.transitions[0]!.T = '420.000';
    const [finding] = melting(checked(printed));
    expect(finding!.severity).toBe('fault');
    expect(finding!.detail).toMatchObject({ what: 'not-crossed', computedK: null });
  });

  it.each([
    ['a phase has no table', (printed: ReturnType<typeof medium>) => delete printed.tables.l, 'l', 'table of l'],
    [
      'a level is carried through it',
      (printed: ReturnType<typeof medium>) => {
        printed.anchors.splice(1);
        printed.without = [2, 3];
      },
      'l',
      'carried through',
    ],
    [
      'it is continuous',
      (printed: ReturnType<typeof medium>) => Object.assign(printed.transitions[0]!, { order: 'continuous', to: 'cr' }),
      'cr',
      'first-order',
    ],
  ])('is untestable where %s, and says so', (_, change, to, missing) => {
    const printed = medium();
    change(printed);
    const outcome = outcomeOf(checked(printed), RULE, `cr>${to}`);
    expect(outcome).toMatchObject({ outcome: 'untestable', evidence: null });
    expect(outcome.missing).toContain(missing);
  });
});
