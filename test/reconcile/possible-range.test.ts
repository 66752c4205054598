import { describe, expect, it } from 'vitest';
import { explanationOf, scoreInGroup } from '../../pipeline/reconcile/explained.js';
import { neighbouringTemperatures, possibleRange } from '../../pipeline/reconcile/possible-range.js';
import { usualSize } from '../../pipeline/reconcile/usual-size.js';
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

const [, , melting, boiling] = returning().transitions;

describe('the temperature of a transition', () => {
  const neighbours = (index: number) => neighbouringTemperatures(returning().transitions, index);

  it('is between the transitions before and after, of which a phase’s return is none', () => {
    expect(neighbours(0)).toEqual([0, 20_000]);
    expect(neighbours(1)).toEqual([0, 1809]);
    expect(neighbours(2)).toEqual([1665, 3133.345]);
    expect(neighbours(3)).toEqual([1809, 20_000]);
    expect(neighbours(-1)).toEqual([0, 20_000]);
  });

  it('is bounded by nothing where its neighbours contradict each other', () => {
    const low = { ...boiling!, temperature: { ...boiling!.temperature, value: 1600 } };
    const contradicting = [...returning().transitions.slice(0, 2), melting!, low];
    expect(neighbouringTemperatures(contradicting, 2)).toEqual([0, 20_000]);
  });
});

describe('what a stated number can be', () => {
  it('is positive for what cannot be negative, and anything for the rest', () => {
    expect(possibleRange('entropy', anchors)[0]).toBe(0);
    expect(possibleRange('entropy', { ...anchors, entropyZero: 'steam' })[0]).toBe(Number.NEGATIVE_INFINITY);
    expect(possibleRange('transition-entropy', transitions)[0]).toBe(0);
    expect(possibleRange('transition-temperature', transitions)).toEqual([0, 20_000]);
    expect(possibleRange('pressure', anchors)[0]).toBe(0);
    expect(possibleRange('enthalpy-of-formation', anchors)).toEqual([
      Number.NEGATIVE_INFINITY,
      Number.POSITIVE_INFINITY,
    ]);
  });
});

describe('how usual a size is', () => {
  const melts = { temperatureK: 1809, gas: false, transition: 2 };
  const boils = { temperatureK: 3133.345, gas: true, transition: 3 };

  it('follows the rules of thumb: a boiling point’s entropy lies near 90, another transition’s far less closely near 15', () => {
    expect(usualSize('transition-entropy', 90, 0.1, boils, returning())).toBeCloseTo(0, 12);
    expect(usualSize('transition-entropy', 15, 0.1, melts, returning())).toBeCloseTo(0, 12);
    expect(usualSize('transition-entropy', 9, 0.1, boils, returning())).toBe(-12);
    expect(usualSize('transition-entropy', 7.6, 0.1, melts, returning())).toBeGreaterThan(-0.5);
    expect(usualSize('transition-entropy', 0.018, 0.001, melts, returning())).toBeLessThan(-10);
  });

  it('is that of the entropy for an enthalpy, by the transition’s temperature', () => {
    expect(usualSize('transition-enthalpy', 1809 * 15, 10, melts, returning())).toBeCloseTo(0, 12);
    expect(usualSize('transition-enthalpy', -5, 1, melts, returning())).toBe(-12);
  });

  it('speaks against a temperature out of order, and of no formation enthalpy', () => {
    expect(usualSize('transition-temperature', 1809, 1, melts, returning())).toBeGreaterThan(-0.5);
    expect(usualSize('transition-temperature', 3500, 1, melts, returning())).toBeLessThan(-5);
    expect(usualSize('transition-temperature', 3134, 1, melts, returning())).toBeGreaterThan(-1);
    expect(usualSize('enthalpy-of-formation', 1e9, 1, melts, returning())).toBe(0);
  });
});

describe('a suspect in its group', () => {
  const suspect = (file: string, line: number, column: string, proposed: number, uProposed: number) => ({
    address: { source: 'desk', file, line, column },
    proposed,
    uProposed,
  });

  it('counts for nothing where its proposed value cannot be', () => {
    expect(scoreInGroup(returning(), suspect('anchors.csv', 2, 'S', -51, 2), POLICY)).toBeLessThan(-1000);
    expect(scoreInGroup(returning(), suspect('transitions.csv', 4, 'dS', -7.6, 0.01), POLICY)).toBeLessThan(-1000);
    // A number that cannot be told from a possible one is weighed as any other.
    expect(scoreInGroup(returning(), suspect('transitions.csv', 4, 'dS', -0.01, 0.02), POLICY)).toBeGreaterThan(-30);
  });

  it('is weighed by its explanation, and by how usual its size is', () => {
    const score = (column: string, proposed: number, u: number) =>
      scoreInGroup(returning(), suspect('transitions.csv', 4, column, proposed, u), POLICY)!;
    // dS a thousand times too small, or dH a thousand times too large: 7632 and 0.0138 are no entropies of fusion.
    expect(explanationOf(returning(), suspect('transitions.csv', 4, 'dS', 7632, 2), POLICY)?.slip).toBe('kilo-dropped');
    expect(score('dS', 63.456, 0.02)).toBeGreaterThan(score('dS', 7632, 2) + 5);
    // Units of R before no known error.
    expect(explanationOf(returning(), suspect('transitions.csv', 4, 'dS', 63.456, 0.02), POLICY)?.slip).toBe(
      'in-units-of-r',
    );
    expect(score('dS', 63.456, 0.02)).toBeGreaterThan(score('dS', 60.1, 0.02) + 3);
  });

  it('that prints a formation enthalpy of zero is the last to be wrong', () => {
    const table = tableOf([columnOf('dfH', 'enthalpy-of-formation', 'kJ/mol')], {
      holds: 'anchors',
      file: 'anchors.csv',
    });
    const element = harmonised({
      anchors: [
        rowOf(table, { phase: 'cr' }, { 'enthalpy-of-formation': '0.000' }),
        rowOf(table, { phase: 'l' }, { 'enthalpy-of-formation': '7.777' }, 3),
      ],
    });
    const zero = scoreInGroup(element, suspect('anchors.csv', 2, 'dfH', 1234, 20), POLICY)!;
    const liquid = scoreInGroup(element, suspect('anchors.csv', 3, 'dfH', 7777 - 1234, 20), POLICY)!;
    expect(liquid - zero).toBeCloseTo(Math.log(50), 9);
  });

  it('is null where no number stands', () => {
    expect(scoreInGroup(returning(), suspect('anchors.csv', 9, 'S', 1, 1), POLICY)).toBeNull();
  });
});

describe('an explanation', () => {
  it('leads to no value that cannot be', () => {
    // Two places to the right: a melting point of 180 900 K.
    expect(
      explanationOf(
        returning(),
        {
          address: { source: 'desk', file: 'transitions.csv', line: 4, column: 'T' },
          proposed: 180_900,
          uProposed: 30,
        },
        POLICY,
      ),
    ).toBeNull();
  });
});
