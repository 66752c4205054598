import { describe, expect, it } from 'vitest';
import { explain } from '../../pipeline/reconcile/explain.js';
import { orderedByExplanation } from '../../pipeline/reconcile/order-in-group.js';

/** A formation enthalpy in calories for joules: what it should be is known to 20 J/mol. */
function scoreOfCalories(): number {
  const [best] = explain(
    {
      ...{ quantity: 'enthalpy-of-formation', printed: '-89.366', observed: -89366, factor: 1000, offset: 0 },
      ...{ unit: 'kJ/mol', molarMassGPerMol: 100, temperatureK: 298.15, rowAbove: null, partner: null, gas: false },
    },
    -373909,
    20,
    50,
  );
  expect(best?.slip).toBe('calorie-read-as-joule');
  return best!.score;
}

const unexplained = (w: number) => ({ wSquared: w * w, score: null });

describe('the suspects of one group', () => {
  it('keep the order of their residuals where none is explained', () => {
    expect(orderedByExplanation([unexplained(-31), unexplained(30.9), unexplained(31.1)])).toEqual([2, 0, 1]);
  });

  it('have the one that a slip of units explains first where the data cannot tell', () => {
    const explained = { wSquared: 30 ** 2, score: scoreOfCalories() };
    expect(orderedByExplanation([unexplained(30), explained, unexplained(30)])).toEqual([1, 0, 2]);
    // 8 units of chi squared are less than a calorie is worth at such a residual.
    expect(orderedByExplanation([unexplained(Math.sqrt(908)), explained])).toEqual([1, 0]);
  });

  it('leave an explained one behind where the data speak against it', () => {
    const explained = { wSquared: 30 ** 2, score: scoreOfCalories() };
    expect(orderedByExplanation([explained, unexplained(Math.sqrt(930))])).toEqual([1, 0]);
  });

  it('are not turned by an explanation that meets no better than chance', () => {
    expect(orderedByExplanation([unexplained(30), { wSquared: 30 ** 2, score: -9 }])).toEqual([0, 1]);
  });

  it('have the more usual of two slips first', () => {
    const members = [
      { wSquared: 400, score: Math.log(0.02) },
      { wSquared: 400, score: Math.log(0.05) },
    ];
    expect(orderedByExplanation(members)).toEqual([1, 0]);
  });

  it('may be none, or one', () => {
    expect(orderedByExplanation([])).toEqual([]);
    expect(orderedByExplanation([unexplained(0)])).toEqual([0]);
  });

  it('keep their order where nothing tells them apart', () => {
    expect(orderedByExplanation([unexplained(7), unexplained(-7), unexplained(7)])).toEqual([0, 1, 2]);
  });
});
