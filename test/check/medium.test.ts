import { describe, expect, it } from 'vitest';
import { RULES } from '../../schemas/finding.js';
import { checked, entropyOf, integral, laws, medium } from './medium.js';

describe('the invented medium', () => {
  it('has the integrals that closed forms give', () => {
    const { cr } = laws();
    const closed = 42 * Math.log(500 / 298.15) + 0.02 * (500 - 298.15) + 1.5e5 * (500 ** -2 - 298.15 ** -2);
    expect(entropyOf(cr, 500) - entropyOf(cr, 298.15)).toBeCloseTo(closed, 9);
    expect(integral((x) => x ** 5, 1, 3)).toBeCloseTo((3 ** 6 - 1) / 6, 9);
  });

  it('is found fault with by no rule, and asked by every one', () => {
    const { findings, outcomes } = checked(medium());
    expect(findings).toEqual([]);
    // The adjustment is asked afterwards.
    expect(new Set(outcomes.map(({ rule }) => rule))).toEqual(new Set(RULES.filter((r) => r !== 'adjustment-closes')));
    expect(outcomes.filter(({ outcome }) => outcome === 'disagrees')).toEqual([]);
    expect(outcomes.filter(({ outcome }) => outcome === 'untestable')).toEqual([]);
  });
});
