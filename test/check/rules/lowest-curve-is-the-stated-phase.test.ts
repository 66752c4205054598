import { describe, expect, it } from 'vitest';
import {
  against,
  checked,
  findingsOf,
  type Law,
  laws,
  medium,
  moved,
  outcomeOf,
  rowsOf,
  silent,
  TR,
  verdictOf,
} from '../medium.js';

const RULE = 'lowest-curve-is-the-stated-phase';

describe(RULE, () => {
  it.each([
    ['evaluated', 'arithmetic'],
    ['measured', 'independent'],
  ] as const)('is silent where crystal, liquid and gas follow each other as stated (%s)', (basis, evidence) => {
    expect(verdictOf(checked(medium(basis)), RULE, '')).toEqual(silent(evidence));
  });

  it('finds a liquid that would be stable where the crystal is stated', () => {
    const printed = medium();
    printed.anchors[1]!.H = moved(printed.anchors[1]!.H, -4);
    const found = checked(printed);
    expect(verdictOf(found, RULE, '')).toEqual(against('fault', 'arithmetic'));
    const [finding] = findingsOf(found, RULE);
    expect(finding!.detail).toMatchObject({ code: 'phase-order', lower: 'l', stated: 'cr' });
    expect(finding!.observed).toBeGreaterThan(finding!.tolerance!);
    expect(finding!.temperatureK).toBeLessThan(500);
  });

  it('finds from and to exchanged', () => {
    const printed = medium();
    Object.assign(printed.transitions[0]!, { from: 'l', to: 'cr' });
    printed.transitions.splice(1);
    expect(verdictOf(checked(printed), RULE, '')).toEqual(against('fault', 'arithmetic'));
  });

  it('is silent on a phase that returns because it is stated to, and finds it where it is not', () => {
    const { cr } = laws();
    // Form II has more entropy at first and, with its smaller heat capacity, less in the end.
    const raw: Law = {
      parts: [{ fromK: 1, cp: (t) => cr.parts[0]!.cp(t) - 10 }],
      entropy: cr.entropy + 4,
      enthalpy: cr.enthalpy + 1300,
    };
    const gap = (t: number) => {
      const dS = 4 - 10 * Math.log(t / TR);
      return 1300 - 10 * (t - TR) - t * dS;
    };
    const root = (low: number, high: number): number => {
      for (let k = 0; k < 80; k++) {
        const middle = (low + high) / 2;
        if (Math.sign(gap(middle)) === Math.sign(gap(low))) low = middle;
        else high = middle;
      }
      return low;
    };
    const lowest = TR * Math.exp(0.4);
    const temperatures = [TR, ...Array.from({ length: 60 }, (_, i) => 300 + 20 * i)];
    const printed = medium();
    printed.tables = { 'cr-I': rowsOf(cr, temperatures), 'cr-II': rowsOf(raw, temperatures) };
    printed.anchors = [
      { phase: 'cr-I', H: (cr.enthalpy / 1000).toFixed(3), S: cr.entropy.toFixed(3) },
      { phase: 'cr-II', H: (raw.enthalpy / 1000).toFixed(3), S: raw.entropy.toFixed(3) },
    ];
    const stated = (from: string, to: string, t: number) => ({ from, to, T: t.toFixed(2), dH: '', dS: '', p: '1' });
    expect(gap(lowest)).toBeLessThan(0);
    printed.transitions = [stated('cr-I', 'cr-II', root(TR, lowest)), stated('cr-II', 'cr-I', root(lowest, 1400))];
    const returns = checked(printed);
    expect(verdictOf(returns, RULE, '')).toEqual(silent('arithmetic'));
    printed.transitions.splice(1);
    const unsaid = checked(printed);
    expect(verdictOf(unsaid, RULE, '')).toEqual(against('fault', 'arithmetic'));
    expect(findingsOf(unsaid, RULE)[0]!.temperatureK).toBeGreaterThan(lowest);
  });

  it.each([
    [
      'no transition is stated',
      (printed: ReturnType<typeof medium>) => printed.transitions.splice(0),
      'stated transition',
    ],
    ['no phase has a curve', (printed: ReturnType<typeof medium>) => (printed.tables = {}), 'curves'],
    [
      'every level rests on the transitions themselves',
      (printed: ReturnType<typeof medium>) => {
        printed.anchors.splice(1);
        printed.without = [2, 3];
      },
      'do not rest on the transitions',
    ],
  ])('is untestable where %s, and says so', (_, change, missing) => {
    const printed = medium();
    change(printed);
    const outcome = outcomeOf(checked(printed), RULE, '');
    expect(outcome).toMatchObject({ outcome: 'untestable', evidence: null });
    expect(outcome.missing).toContain(missing);
  });
});
