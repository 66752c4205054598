/** Slips that touch many printed numbers at once, in the invented medium: each is one suspect, in place of many. */
import { describe, expect, it } from 'vitest';
import { CP, enthalpyOf, entropyOf, F, H, laws, medium, type Printed, S } from '../check/medium.js';
import { groupOf, reconciled, rootsOf, suspectsOf } from './reconciled.js';

const R = 8.31446261815324;
const scaled = (text: string, ratio: number): string => (Number(text) * ratio).toFixed(text.split('.')[1]!.length);

/** The one root's first suspect. */
function firstOf(printed: Printed) {
  const found = reconciled(printed);
  const roots = rootsOf(found);
  const [first] = suspectsOf(found.suspects, roots[0]!);
  return { roots, first: first!, group: groupOf(found, roots[0]!) };
}

/** The medium with the temperatures that it boils at below 1 bar, as G of its laws has them. */
function boilingPoints(basis: 'evaluated' | 'measured'): Printed {
  const printed = medium(basis);
  const { l, g } = laws();
  const gap = (t: number, bar: number): number =>
    enthalpyOf(g, t) - enthalpyOf(l, t) - t * (entropyOf(g, t) - entropyOf(l, t) - R * Math.log(bar));
  for (const bar of [0.5, 0.2]) {
    let [low, high] = [500, 900];
    for (let k = 0; k < 60; k++) {
      const middle = (low + high) / 2;
      if (gap(middle, bar) > 0) low = middle;
      else high = middle;
    }
    const boiling = { from: 'l', to: 'g', T: low.toFixed(3), dH: '', dS: '', p: String(bar), gas: 'ideal' };
    printed.transitions.push(boiling);
  }
  return printed;
}

describe('many numbers at once', () => {
  it('from and to of a transition exchanged are one suspect, where a sign alone would need two', () => {
    const printed = medium();
    Object.assign(printed.transitions[0]!, { from: 'l', to: 'cr' });
    const { first, roots } = firstOf(printed);
    expect(roots).toHaveLength(1);
    // The phases are constants of this table: the sizes are shown as they would stand with the phases as stated.
    expect([first.explanation, first.cells, first.printed, first.proposedPrinted]).toEqual([
      'from-and-to-exchanged',
      2,
      '9.000',
      '-9.000',
    ]);
  });

  it('dH and dS of a transition exchanged are one suspect', () => {
    const printed = medium();
    const { dH, dS } = printed.transitions[0]!;
    Object.assign(printed.transitions[0]!, { dH: dS, dS: dH });
    const { first, roots } = firstOf(printed);
    expect(roots).toHaveLength(1);
    expect([first.explanation, first.cells]).toEqual(['enthalpy-and-entropy-exchanged', 2]);
    expect(Number(first.proposedPrinted)).toBeCloseTo(Number(dH), 3);
  });

  it.each([
    ['dH', 1 / 4.184, 'calorie-read-as-joule'],
    ['dS', 1 / 4.184, 'calorie-read-as-joule'],
    ['dH', 1000, 'kilo-added'],
  ] as const)('the whole column %s of the transitions times %f is one suspect', (key, ratio, code) => {
    const printed = medium();
    const clean = printed.transitions[0]![key];
    for (const one of printed.transitions) one[key] = scaled(one[key], ratio);
    const { first, roots } = firstOf(printed);
    expect(roots).toHaveLength(1);
    expect([first.explanation, first.cells]).toEqual([code, 2]);
    expect(Number(first.proposedPrinted) / Number(clean)).toBeCloseTo(1, 3);
  });

  it('every formation enthalpy in kilocalories is one suspect', () => {
    const printed = medium();
    for (const one of printed.anchors) one.H = scaled(one.H, 1 / 4.184);
    const { first, roots } = firstOf(printed);
    expect(roots).toHaveLength(1);
    expect([first.explanation, first.cells]).toEqual(['calorie-read-as-joule', 3]);
  });

  it('both transition temperatures in degrees Celsius are one suspect', () => {
    const printed = medium();
    for (const one of printed.transitions) one.T = (Number(one.T) - 273.15).toFixed(3);
    const { first } = firstOf(printed);
    expect([first.explanation, first.cells, first.proposedPrinted]).toEqual([
      'celsius-read-as-kelvin',
      2,
      expect.stringMatching(/^500\.000$/),
    ]);
  });

  it('every entropy of the gas at 1 atm, its anchor with it, is one suspect', () => {
    const printed = medium();
    const step = R * Math.log(1.01325);
    for (const row of printed.tables.g!) {
      row[S] = (Number(row[S]) - step).toFixed(3);
      row[F] = (Number(row[F]) - step).toFixed(3);
    }
    printed.anchors[2]!.S = (Number(printed.anchors[2]!.S) - step).toFixed(3);
    const { first, roots } = firstOf(printed);
    expect(roots).toHaveLength(1);
    expect(first.explanation).toBe('atmosphere-for-bar');
    expect(first.cells).toBeGreaterThan(2 * printed.tables.g!.length);
  });

  it('a table of heat capacities alone in calories is one suspect', () => {
    const printed = medium();
    printed.without = [S, F, H];
    for (const row of printed.tables.l!) row[CP] = scaled(row[CP]!, 1 / 4.184);
    const { first } = firstOf(printed);
    expect([first.explanation, first.cells]).toEqual(['calorie-read-as-joule', printed.tables.l!.length]);
  });

  it.each([
    ['evaluated', 'torr', 750.061683, 'torr-read-as-pascal'],
    ['measured', 'torr', 750.061683, 'torr-read-as-pascal'],
    ['evaluated', 'kilopascal', 100, 'pascal-read-as-bar-or-atmosphere'],
    ['measured', 'kilopascal', 100, 'pascal-read-as-bar-or-atmosphere'],
  ] as const)('the pressures of boiling points (%s) in %s are one suspect', (basis, _, ratio, code) => {
    const clean = boilingPoints(basis);
    expect(reconciled(clean).verdict).toBe('cleared');
    for (const one of clean.transitions.slice(1)) one.p = (Number(one.p) * ratio).toPrecision(7);
    const { first, roots } = firstOf(clean);
    expect(roots).toHaveLength(1);
    expect([first.explanation, first.cells, first.address.column]).toEqual([code, 3, 'p']);
    expect(Number(first.proposedPrinted)).toBeCloseTo(1, 5);
  });

  it('leave single slips alone: one number in calories is one number', () => {
    for (const key of ['dH', 'dS'] as const) {
      const printed = medium();
      printed.transitions[0]![key] = scaled(printed.transitions[0]![key], 1 / 4.184);
      const { first, roots } = firstOf(printed);
      expect(roots).toHaveLength(1);
      expect([first.cells, first.explanation]).toEqual([1, 'calorie-read-as-joule']);
    }
  });
});
