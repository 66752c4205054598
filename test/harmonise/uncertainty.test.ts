import { describe, expect, it } from 'vitest';
import type { SeriesQuantity } from '../../schemas/harmonised.js';
import type { Basis, ColumnMeaning, StatedUncertainty } from '../../schemas/table-meaning.js';
import { columnOf, harmonised, seriesOf, tableOf } from './raw.js';

const T = columnOf('T', 'temperature', 'K');
const SAYS: StatedUncertainty = { relative: null, absolute: null, coverage: 1, shared: false };

function heatCapacity(basis: Basis, columns: readonly ColumnMeaning[], rows: readonly (readonly string[])[]) {
  const result = harmonised({ series: [seriesOf(tableOf([T, ...columns], { basis }), 'cr', rows)] });
  return { quantity: result.series[0].heatCapacity as SeriesQuantity, made: result.made };
}

const ROWS = [
  ['300', '10.00'],
  ['400', '20.00'],
];
const cp = (uncertainty: readonly StatedUncertainty[]) =>
  columnOf('Cp', 'heat-capacity', 'cal_th/(mol.K)', { uncertainty });

describe('the standard uncertainty of a series', () => {
  it('is the policy’s where a measured source states none', () => {
    const { quantity } = heatCapacity('measured', [cp([])], ROWS);
    expect(quantity.origin).toBe('policy default');
    expect(quantity.uOwn[0]).toBeCloseTo(0.01 * 41.84, 12);
    expect(quantity.uOwn[1]).toBeCloseTo(0.01 * 83.68, 12);
  });

  it.each(['evaluated', 'computed'] as const)('is left to the digits where an %s source states none', (basis) => {
    const { quantity } = heatCapacity(basis, [cp([])], ROWS);
    expect(quantity.origin).toBe('printed digits');
    expect(Array.from(quantity.uOwn)).toEqual([0, 0]);
    expect(quantity.uSharedRelative).toBe(0);
  });

  it('is the descriptor’s with its coverage taken out, relative and absolute in quadrature', () => {
    const { quantity } = heatCapacity(
      'measured',
      [
        cp([
          { ...SAYS, relative: 0.006, coverage: 2 },
          { ...SAYS, absolute: 0.1 },
        ]),
      ],
      ROWS,
    );
    expect(quantity.origin).toBe('source default');
    expect(quantity.uOwn[1]).toBeCloseTo(Math.hypot(0.003 * 83.68, 0.1 * 4.184), 12);
  });

  it('keeps what the series shares apart, and takes no default beside it', () => {
    const { quantity } = heatCapacity(
      'measured',
      [cp([{ ...SAYS, relative: 0.004, coverage: 2, shared: true }])],
      ROWS,
    );
    expect(quantity.uSharedRelative).toBeCloseTo(0.002, 12);
    expect(Array.from(quantity.uOwn)).toEqual([0, 0]);
    const absolute = heatCapacity('evaluated', [cp([{ ...SAYS, absolute: 0.15, shared: true }])], ROWS).quantity;
    expect(absolute.uSharedRelative).toBeCloseTo(0.15 / Math.sqrt((10 ** 2 + 20 ** 2) / 2), 12);
  });

  it('is the row’s own before all, in its own unit, and the default where the row is empty', () => {
    const u = columnOf('u', 'uncertainty', 'J/(mol.K)', { of: 'heat-capacity', coverage: 2 });
    const { quantity } = heatCapacity(
      'measured',
      [cp([]), u],
      [
        ['300', '10.00', '0.4'],
        ['400', '20.00', ''],
      ],
    );
    expect(quantity.origin).toBe('stated');
    expect(quantity.uOwn[0]).toBeCloseTo(0.2, 12);
    expect(quantity.uOwn[1]).toBeCloseTo(0.01 * 83.68, 12);
  });

  it('may be printed in per cent, or in the unit of its quantity', () => {
    const percent = columnOf('u', 'uncertainty', '%', { of: 'heat-capacity' });
    const silent = columnOf('u', 'uncertainty', null, { of: 'heat-capacity' });
    const rows = [['300', '10.00', '0.5']];
    expect(heatCapacity('measured', [cp([]), percent], rows).quantity.uOwn[0]).toBeCloseTo(0.005 * 41.84, 12);
    expect(heatCapacity('measured', [cp([]), silent], rows).quantity.uOwn[0]).toBeCloseTo(0.5 * 4.184, 12);
  });

  it('shared by the series in a column becomes a share of the values', () => {
    const u = columnOf('u', 'uncertainty', 'cal_th/(mol.K)', { of: 'heat-capacity', shared: true });
    const { quantity } = heatCapacity(
      'measured',
      [cp([]), u],
      [
        ['300', '10.00', '0.1'],
        ['400', '20.00', '0.2'],
      ],
    );
    expect(quantity.uSharedRelative).toBeCloseTo(0.01, 12);
    expect(Array.from(quantity.uOwn)).toEqual([0, 0]);
  });

  it('in an unknown unit is reported, and the default stands in', () => {
    const u = columnOf('u', 'uncertainty', 'J/mol K', { of: 'heat-capacity' });
    const { quantity, made } = heatCapacity('measured', [cp([]), u], [['300', '10.00', '0.4']]);
    expect(made[0]).toMatchObject({ address: { column: 'u' }, detail: { problem: 'unit-unknown' } });
    expect(quantity.origin).toBe('policy default');
    expect(quantity.uOwn[0]).toBeCloseTo(0.4184, 12);
  });
});
