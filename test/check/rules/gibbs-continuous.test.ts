import { describe, expect, it } from 'vitest';
import { checked, findingsOf, MELTING, medium, moved, outcomeOf, silent, verdictOf } from '../medium.js';

const RULE = 'gibbs-continuous';
/** The formation enthalpy of the liquid off by so many kJ/mol: G of the liquid is shifted by as much. */
function spoilt(by: number, basis: 'evaluated' | 'measured' = 'evaluated') {
  const printed = medium(basis);
  printed.anchors[1]!.H = moved(printed.anchors[1]!.H, by);
  return checked(printed);
}

describe(RULE, () => {
  it.each([
    ['evaluated', 'arithmetic'],
    ['measured', 'independent'],
  ] as const)('is silent on clean phases, condensed and gas (%s)', (basis, evidence) => {
    const clean = checked(medium(basis));
    expect(verdictOf(clean, RULE, 'cr>l')).toEqual(silent(evidence));
    expect(verdictOf(clean, RULE, 'l>g')).toEqual(silent(evidence));
    expect(outcomeOf(clean, RULE, 'cr>l').smallestDetectable).toBeGreaterThan(0);
  });

  it.each([0.5, -0.5, 100])('finds a gap of %d kJ/mol at both transitions of the liquid', (by) => {
    const found = spoilt(by);
    const faults = findingsOf(found, RULE).filter(({ severity }) => severity === 'fault');
    expect(faults.map(({ fromPhase, toPhase }) => `${fromPhase}>${toPhase}`)).toEqual(['cr>l', 'l>g']);
    expect(outcomeOf(found, RULE, 'cr>l')).toMatchObject({ outcome: 'disagrees', evidence: 'arithmetic' });
    // Of the lower phase less the upper one.
    expect(faults[0]!.difference! / 1000).toBeCloseTo(-by, 2);
    expect(faults[1]!.difference! / 1000).toBeCloseTo(by, 2);
    expect(found.judged[0]!.gapJPerMol! / 1000).toBeCloseTo(by, 2);
    expect(found.judged[1]!.gapJPerMol! / 1000).toBeCloseTo(-by, 2);
    expect(faults[0]!).toMatchObject({ unit: 'J/mol', temperatureK: MELTING.atK });
    expect(Math.abs(faults[0]!.difference!)).toBeGreaterThan(faults[0]!.tolerance!);
  });

  it('takes a gap that moves the melting point by less than half a kelvin for a doubt', () => {
    // 0.35 K times dS = 18 J/(mol K).
    const found = spoilt(0.0063);
    const [melting] = findingsOf(found, RULE).filter(({ fromPhase }) => fromPhase === 'cr');
    expect(melting!.severity).toBe('doubt');
    expect(outcomeOf(found, RULE, 'cr>l').outcome).toBe('disagrees');
  });

  it('says nothing of a gap that measured data are too uncertain to decide, but how small an error would show', () => {
    const found = spoilt(0.6, 'measured');
    expect(findingsOf(found, RULE)).toEqual([]);
    expect(outcomeOf(found, RULE, 'cr>l')).toMatchObject({ outcome: 'agrees', evidence: 'independent' });
    expect(outcomeOf(found, RULE, 'cr>l').smallestDetectable).toBeGreaterThan(600);
    expect(findingsOf(spoilt(20, 'measured'), RULE)[0]!.severity).toBe('fault');
  });

  it.each([
    ['a phase has no table', (printed: ReturnType<typeof medium>) => delete printed.tables.l, 'table of l'],
    [
      'the table ends far below',
      (printed: ReturnType<typeof medium>) => {
        printed.tables.cr!.splice(6);
        printed.tables.l!.splice(6);
      },
      'reach',
    ],
    [
      'a level is carried through the transition itself',
      (printed: ReturnType<typeof medium>) => {
        printed.anchors.splice(1);
        printed.without = [2, 3];
      },
      'an anchor or an entropy of its own',
    ],
    [
      'it is continuous',
      (printed: ReturnType<typeof medium>) => {
        printed.transitions[0]!.order = 'continuous';
        printed.transitions[0]!.to = 'cr';
      },
      'first-order',
    ],
  ])('is untestable where %s, and says so', (_, change, missing) => {
    const printed = medium();
    change(printed);
    const found = checked(printed);
    const outcome = outcomeOf(found, RULE, `cr>${printed.transitions[0]!.to}`);
    expect(outcome).toMatchObject({ outcome: 'untestable', evidence: null });
    expect(outcome.missing).toContain(missing);
    expect(findingsOf(found, RULE).filter(({ fromPhase }) => fromPhase === 'cr')).toEqual([]);
  });
});
