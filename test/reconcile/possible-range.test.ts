import { describe, expect, it } from 'vitest';
import { explanationOf, scoreInGroup } from '../../pipeline/reconcile/explained.js';
import { possibleRange } from '../../pipeline/reconcile/possible-range.js';
import type { HarmonisedCase } from '../../schemas/harmonised.js';
import { columnOf, harmonised, POLICY, rowOf, tableOf } from '../harmonise/raw.js';

const transitions = tableOf(
  [
    columnOf('T', 'transition-temperature', 'K'),
    columnOf('dH', 'transition-enthalpy', 'kJ/mol'),
    columnOf('dS', 'transition-entropy', 'J/(mol.K)'),
  ],
  { holds: 'transitions', file: 'transitions.csv' },
);
const anchors = tableOf([columnOf('S', 'entropy', 'J/(mol.K)')], { holds: 'anchors', file: 'anchors.csv' });

/** As iron does: alpha, gamma, alpha again, liquid, gas. */
function returning(): HarmonisedCase {
  const rows = [
    ['cr-alpha', 'cr-gamma', '1184.000', '0.900', '0.760'],
    ['cr-gamma', 'cr-alpha', '1665.000', '0.837', '0.503'],
    ['cr-alpha', 'l', '1809.000', '13.807', '7.632'],
    ['l', 'g', '3133.345', '349.585', '111.569'],
  ] as const;
  return harmonised({
    anchors: [rowOf(anchors, { phase: 'cr-alpha' }, { entropy: '27.28' })],
    transitions: rows.map(([from, to, T, dH, dS], i) =>
      rowOf(
        transitions,
        { 'from-phase': from, 'to-phase': to, ...(to === 'g' && { gas: 'ideal' }) },
        { 'transition-temperature': T, 'transition-enthalpy': dH, 'transition-entropy': dS },
        i + 2,
      ),
    ),
  });
}

const range = (quantity: Parameters<typeof possibleRange>[0], index = -1) =>
  possibleRange(quantity, index < 0 ? anchors : transitions, index, returning());

describe('what a stated number can be', () => {
  it('is between the transitions before and after, of which a phase’s return is none', () => {
    expect(range('transition-temperature', 0)).toEqual([0, 20_000]);
    expect(range('transition-temperature', 1)).toEqual([0, 1809]);
    expect(range('transition-temperature', 2)).toEqual([1665, 3133.345]);
    expect(range('transition-temperature', 3)).toEqual([1809, 20_000]);
  });

  it('is bounded by nothing where its neighbours contradict each other', () => {
    const substance = returning();
    const [, , melting, boiling] = substance.transitions;
    const low = { ...boiling!, temperature: { ...boiling!.temperature, value: 1600 } };
    const contradicting = { ...substance, transitions: [...substance.transitions.slice(0, 2), melting!, low] };
    expect(possibleRange('transition-temperature', transitions, 2, contradicting)).toEqual([0, 20_000]);
  });

  it('is positive for what cannot be negative, and anything for the rest', () => {
    expect(range('entropy')[0]).toBe(0);
    expect(possibleRange('entropy', { ...anchors, entropyZero: 'steam' }, -1, returning())[0]).toBe(
      Number.NEGATIVE_INFINITY,
    );
    expect(range('transition-entropy', 0)[0]).toBe(0);
    expect(range('pressure')[0]).toBe(0);
    expect(range('enthalpy-of-formation')).toEqual([Number.NEGATIVE_INFINITY, Number.POSITIVE_INFINITY]);
  });
});

describe('a suspect in its group', () => {
  const suspect = (file: string, line: number, column: string, proposed: number, uProposed: number) => ({
    address: { source: 'desk', file, line, column },
    proposed,
    uProposed,
  });

  it('counts for nothing where its proposed value cannot be', () => {
    // dS in units of R closes as well with a melting point of 15040 K, above the boiling point.
    expect(scoreInGroup(returning(), suspect('transitions.csv', 4, 'T', 15_040, 30), POLICY)).toBeLessThan(-1000);
    expect(scoreInGroup(returning(), suspect('anchors.csv', 2, 'S', -51, 2), POLICY)).toBeLessThan(-1000);
    expect(scoreInGroup(returning(), suspect('transitions.csv', 4, 'dS', -7.6, 0.01), POLICY)).toBeLessThan(-1000);
  });

  it('has its explanation’s score, or none', () => {
    const melted = suspect('transitions.csv', 4, 'dS', 63.456, 0.02);
    expect(explanationOf(returning(), melted, POLICY)?.slip).toBe('in-units-of-r');
    expect(scoreInGroup(returning(), melted, POLICY)).toBe(explanationOf(returning(), melted, POLICY)!.score);
    expect(scoreInGroup(returning(), suspect('transitions.csv', 4, 'dS', 9.213, 0.001), POLICY)).toBeNull();
  });

  it('that cannot be told from what can be is weighed as any other', () => {
    expect(scoreInGroup(returning(), suspect('transitions.csv', 4, 'dS', -0.01, 0.02), POLICY)).toBeGreaterThan(-20);
  });

  it('is not explained by a value that cannot be', () => {
    // Three places to the right: a melting point of 1.8 million kelvin.
    expect(explanationOf(returning(), suspect('transitions.csv', 4, 'T', 1_809_000, 300), POLICY)).toBeNull();
  });
});
