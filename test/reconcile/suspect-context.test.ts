import { describe, expect, it } from 'vitest';
import { explain } from '../../pipeline/reconcile/explain.js';
import { explanationOf } from '../../pipeline/reconcile/explained.js';
import type { SuspectContext } from '../../pipeline/reconcile/slips/slip.js';
import { suspectContext } from '../../pipeline/reconcile/suspect-context.js';
import type { HarmonisedCase } from '../../schemas/harmonised.js';
import { columnOf, harmonised, POLICY, rowOf, seriesOf, tableOf } from '../harmonise/raw.js';

/** An invented medium of 50 g/mol: a gas table at 1 atm, anchors of two sources, two transitions, a vapour pressure. */
function medium(): HarmonisedCase {
  const gas = tableOf(
    [
      columnOf('T', 'temperature', 'Cel'),
      columnOf('S', 'entropy', 'J/(g.K)'),
      columnOf('H', 'enthalpy-increment', 'kJ/mol'),
    ],
    { file: 'g.csv', standardPressurePa: 101325, temperatureScale: 'IPTS-68' },
  );
  const solid = tableOf([columnOf('T', 'temperature', 'K'), columnOf('H', 'enthalpy-increment', 'kJ/mol')], {
    file: 'cr.csv',
  });
  const anchors = (source: string) =>
    tableOf(
      [
        columnOf('DfH', 'enthalpy-of-formation', 'kJ/mol'),
        columnOf('S', 'entropy', 'J/(mol.K)'),
        columnOf('DfG', 'gibbs-energy-of-formation', 'kJ/mol'),
        columnOf('H298-H0', 'enthalpy-from-zero', 'kJ/mol'),
        columnOf('Cp', 'heat-capacity', 'J/(mol.K)'),
      ],
      { holds: 'anchors', file: 'anchors.csv', source },
    );
  const transitions = tableOf(
    [
      columnOf('T', 'transition-temperature', 'K'),
      columnOf('dH', 'transition-enthalpy', 'J/g'),
      columnOf('dS', 'transition-entropy', 'J/(mol.K)'),
      columnOf('p', 'pressure', 'bar'),
    ],
    { holds: 'transitions', file: 'transitions.csv', temperatureScale: 'not-stated' },
  );
  const pressures = tableOf([columnOf('T', 'temperature', 'K'), columnOf('p', 'pressure', 'mm[Hg]')], {
    holds: 'vapour-pressures',
    file: 'pressures.csv',
  });
  const vapour = (T: string, p: string, line: number) =>
    rowOf(pressures, { phase: 'l' }, { temperature: T, pressure: p }, line);
  return harmonised({
    series: [
      seriesOf(gas, 'g', [
        ['25', '4.0000', '0.000'],
        ['100', '4.2000', '3.000'],
      ]),
      seriesOf(solid, 'cr', [
        ['0', '-9.500'],
        ['298.15', '0.000'],
      ]),
    ],
    anchors: [
      rowOf(
        anchors('desk'),
        { phase: 'cr' },
        {
          'enthalpy-of-formation': '-400.000',
          entropy: '75.00',
          'gibbs-energy-of-formation': '-350.000',
          'heat-capacity': '60.0',
        },
      ),
      rowOf(
        anchors('desk'),
        { phase: 'l' },
        { 'enthalpy-of-formation': '-390.000', 'enthalpy-from-zero': '12.000' },
        3,
      ),
      rowOf(anchors('other'), { phase: 'cr' }, { 'enthalpy-of-formation': '-412.500' }),
    ],
    transitions: [
      rowOf(
        transitions,
        { 'from-phase': 'cr', 'to-phase': 'l' },
        { 'transition-temperature': '500', 'transition-enthalpy': '180', 'transition-entropy': '18.00' },
      ),
      rowOf(
        transitions,
        { 'from-phase': 'l', 'to-phase': 'g', gas: 'ideal' },
        { 'transition-temperature': '900.00', 'transition-entropy': '88.00', pressure: '750.062' },
        3,
      ),
    ],
    vapourPressures: [vapour('600', '1.250', 2), vapour('620', '1.250', 3)],
  });
}

const at = (file: string, line: number, column: string, source = 'desk'): SuspectContext => {
  const found = suspectContext(medium(), { address: { source, file, line, column } });
  if (found === null) throw new Error(`nothing at ${file}:${line} ${column}`);
  return found;
};
const values = (steps: readonly { value: number }[] | undefined) =>
  (steps ?? []).map(({ value }) => Math.round(value * 1000) / 1000);

describe('the surroundings of a suspect cell', () => {
  it('are null where no number stands', () => {
    expect(suspectContext(medium(), { address: { source: 'desk', file: 'g.csv', line: 9, column: 'S' } })).toBeNull();
    expect(suspectContext(medium(), { address: { source: 'desk', file: 'g.csv', line: 2, column: 'X' } })).toBeNull();
  });

  it('of a table hold the factor of its unit, not what a standard pressure added', () => {
    const cell = at('g.csv', 3, 'S');
    expect(cell).toMatchObject({ quantity: 'entropy', printed: '4.2000', unit: 'J/(g.K)', factor: 50, gas: true });
    expect(cell.observed).toBeCloseTo(210.1094, 4);
    expect(cell.rowAbove).toMatchObject({ printed: '4.0000' });
    // One digit, the 0.1094 kept.
    const [best] = explain(cell, 230.1094, 0.003, 0.05);
    expect(best).toMatchObject({ slip: 'one-digit-wrong', correctedPrinted: '4.6000' });
  });

  it('of a table’s temperature hold its scale and its offset', () => {
    expect(at('g.csv', 3, 'T')).toMatchObject({
      quantity: 'temperature',
      offset: 273.15,
      factor: 1,
      temperatureScale: 'IPTS-68',
    });
  });

  it('hold every number of an anchor, with the same column of the line above', () => {
    expect(at('anchors.csv', 2, 'DfG')).toMatchObject({ quantity: 'gibbs-energy-of-formation', observed: -350000 });
    expect(at('anchors.csv', 2, 'Cp')).toMatchObject({ quantity: 'heat-capacity', observed: 60 });
    expect(at('anchors.csv', 3, 'H298-H0')).toMatchObject({ quantity: 'enthalpy-from-zero', observed: 12000 });
    expect(at('anchors.csv', 3, 'DfH').rowAbove).toEqual({ printed: '-400.000', observed: -400000 });
    expect(at('anchors.csv', 2, 'DfH').rowAbove).toBeNull();
  });

  it('hold temperature and pressure of a vapour pressure', () => {
    expect(at('pressures.csv', 2, 'T')).toMatchObject({ quantity: 'temperature', observed: 600 });
    const pressure = at('pressures.csv', 3, 'p');
    expect(pressure).toMatchObject({ quantity: 'pressure', unit: 'mm[Hg]', rowAbove: { printed: '1.250' } });
    expect(explain(pressure, 1250, 5, 12)[0]?.slip).toBe('copied-from-row-above');
    expect(explain(at('pressures.csv', 2, 'p'), 1250, 5, 12)[0]?.slip).toBe('pascal-read-as-torr');
  });

  it('hold H(Tr) - H(0) of the phase, by an anchor or by the row at 0 K', () => {
    expect(values(at('anchors.csv', 3, 'DfH').enthalpiesFromZero)).toEqual([12000]);
    expect(values(at('anchors.csv', 2, 'DfH').enthalpiesFromZero)).toEqual([9500]);
    expect(values(at('g.csv', 3, 'H').enthalpiesFromZero)).toEqual([]);
  });

  it('hold what lies between scales: another phase, and another source of it', () => {
    expect(values(at('anchors.csv', 3, 'DfH').enthalpyScaleSteps).sort()).toEqual([-12500, -400000, -412500].sort());
    expect(values(at('anchors.csv', 2, 'DfH').enthalpyScaleSteps)).toEqual([-390000]);
  });

  it('hold the other transitions, with T dS for a dH that is not stated', () => {
    expect(values(at('transitions.csv', 2, 'dH').transitionEnthalpies)).toEqual([79200]);
    expect(values(at('transitions.csv', 2, 'dS').transitionEntropies)).toEqual([88]);
    expect(values(at('anchors.csv', 2, 'S').transitionEntropies)).toEqual([18, 88]);
    expect(at('transitions.csv', 2, 'dH').partner).toEqual({ printed: '18.00', observed: 18 });
  });
});

describe('the explanation of one cell of a substance', () => {
  const explanation = (file: string, line: number, column: string, proposed: number, uProposed: number) =>
    explanationOf(medium(), { address: { source: 'desk', file, line, column }, proposed, uProposed }, POLICY);

  it.each([
    ['different-enthalpy-scales', 'anchors.csv', 3, 'DfH', -402500, 3],
    ['counted-from-zero-kelvin', 'anchors.csv', 2, 'DfH', -390500, 3],
    ['transition-left-out', 'anchors.csv', 2, 'S', 93, 0.02],
    ['old-temperature-scale', 'transitions.csv', 3, 'T', 899.876, 0.01],
    ['kilo-per-mole-read-as-per-gram', 'transitions.csv', 2, 'dH', 180000, 100],
    ['other-formula-molar-mass', 'transitions.csv', 2, 'dH', (9000 * 68.015) / 50, 4],
  ])('is %s', (slip, file, line, column, proposed, u) => {
    expect(explanation(file, line, column, proposed, u)?.slip).toBe(slip);
  });

  it('of a transition’s pressure is a unit, a decimal point or a digit, exact as printed', () => {
    expect(at('transitions.csv', 3, 'p')).toMatchObject({
      quantity: 'pressure',
      transition: 1,
      factor: 1e5,
      gas: true,
    });
    const torr = explanation('transitions.csv', 3, 'p', 100100, 300);
    expect([torr?.slip, torr?.correctedPrinted]).toEqual(['torr-read-as-pascal', '1.000000']);
    expect(explanation('transitions.csv', 3, 'p', 0.4 * 750.062e5, 1e5)).toBeNull();
    // An atmosphere for a bar.
    expect(explanation('transitions.csv', 3, 'p', 1.01325 * 750.062e5, 1e4)).toBeNull();
  });

  it('is none where nothing usual leads there', () => {
    expect(explanation('anchors.csv', 2, 'S', 88.77, 0.02)).toBeNull();
    expect(explanation('nowhere.csv', 2, 'S', 88.77, 0.02)).toBeNull();
  });
});
