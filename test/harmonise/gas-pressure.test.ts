import { describe, expect, it } from 'vitest';
import type { TableMeaning } from '../../schemas/table-meaning.js';
import { columnOf, harmonised, rowOf, seriesOf, tableOf } from './raw.js';

/** R ln 1.01325, IUPAC Green Book, 3rd ed. (2007), 2.11.1. */
const TERM = 0.1094;
const COLUMNS = [
  columnOf('T', 'temperature', 'K'),
  columnOf('S', 'entropy', 'J/(mol.K)'),
  columnOf('G', 'gibbs-function', 'J/(mol.K)'),
  columnOf('g', 'gibbs-energy', 'J/mol'),
];
const ROWS = [
  ['0', '0.', '', ''],
  ['298.15', '200.000', '200.000', '-59630.0'],
];

function shifts(phase: string, rest: Partial<TableMeaning>) {
  const { entropy, gibbsFunction, gibbsEnergy } = harmonised({
    series: [seriesOf(tableOf(COLUMNS, rest), phase, ROWS)],
  }).series[0];
  return [
    entropy?.values[0] ?? Number.NaN,
    (entropy?.values[1] ?? Number.NaN) - 200,
    (gibbsFunction?.values[1] ?? Number.NaN) - 200,
    (gibbsEnergy?.values[1] ?? Number.NaN) + 59630,
  ];
}

describe('the standard pressure of a gas', () => {
  it('of 1 atm becomes 1 bar: S and -[G-H]/T gain R ln 1.01325, G loses T times it, the limit row stays', () => {
    const [limit, entropy, gibbsFunction, gibbsEnergy] = shifts('g', { standardPressurePa: 101325 });
    expect(limit).toBe(0);
    expect(entropy).toBeCloseTo(TERM, 4);
    expect(gibbsFunction).toBeCloseTo(TERM, 4);
    expect(gibbsEnergy).toBeCloseTo(-298.15 * TERM, 1);
  });

  it('changes nothing at 1 bar, for a condensed phase, or on a stated isobar', () => {
    expect(shifts('g', {})).toEqual([0, 0, 0, 0]);
    expect(shifts('l', { standardPressurePa: 101325 })).toEqual([0, 0, 0, 0]);
    expect(shifts('glass', { standardPressurePa: 101325 })).toEqual([0, 0, 0, 0]);
    expect(shifts('g', { standardPressurePa: 101325, isobarPa: 101325 })).toEqual([0, 0, 0, 0]);
  });

  it('moves an anchor’s entropy too, in the offset', () => {
    const table = tableOf([columnOf('S', 'entropy', 'cal_th/(mol.K)')], {
      holds: 'anchors',
      standardPressurePa: 101325,
    });
    const of = (phase: string) =>
      harmonised({ anchors: [rowOf(table, { phase }, { entropy: '50.00' })] }).anchors[0].entropy;
    expect(of('g')?.value).toBeCloseTo(50 * 4.184 + TERM, 4);
    expect(of('g')?.offset).toBeCloseTo(TERM, 4);
    expect(of('g')?.factor).toBe(4.184);
    expect(of('cr')?.value).toBeCloseTo(50 * 4.184, 12);
  });
});
