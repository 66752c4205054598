import { describe, expect, it } from 'vitest';
import type { RawCell } from '../../schemas/raw.js';
import type { Basis, StatedUncertainty } from '../../schemas/table-meaning.js';
import { columnOf, harmonised, rowOf, tableOf } from './raw.js';

function formation(basis: Basis, printed: string, uncertainty: readonly StatedUncertainty[] = []) {
  const columns = [
    columnOf('dfH', 'enthalpy-of-formation', 'kcal_th/mol', { uncertainty }),
    columnOf('u', 'uncertainty', 'kJ/mol', { of: 'enthalpy-of-formation', coverage: 2 }),
  ];
  const row = rowOf(
    tableOf(columns, { holds: 'anchors', basis }),
    { phase: 'cr' },
    { 'enthalpy-of-formation': printed },
    7,
  );
  const datum = harmonised({ anchors: [row] }).anchors[0].enthalpyOfFormation;
  if (datum === null) throw new Error('no datum');
  return datum;
}

describe('a stated number', () => {
  it('carries its value in SI, its rounding, its address and the way from print to value', () => {
    const datum = formation('evaluated', '-94.05');
    expect(datum.value).toBeCloseTo(-94.05 * 4184, 8);
    expect(datum.halfUnit).toBeCloseTo(0.005 * 4184, 8);
    expect(datum.uRounding).toBeCloseTo((0.005 * 4184) / Math.sqrt(3), 8);
    expect(datum.u).toBeCloseTo(datum.uRounding, 12);
    expect(datum).toMatchObject({
      origin: 'printed digits',
      printed: '-94.05',
      unit: 'kcal_th/mol',
      factor: 4184,
      offset: 0,
      address: { source: 'desk', file: 'table.csv', line: 7, column: 'dfH' },
    });
  });

  it('takes the policy’s uncertainty where a measured source states none, rounding in quadrature', () => {
    const datum = formation('measured', '-94.1');
    expect(datum.origin).toBe('policy default');
    expect(datum.u).toBeCloseTo(Math.hypot(1000, datum.uRounding), 8);
  });

  it('takes none where a formation enthalpy is 0 by definition', () => {
    const datum = formation('measured', '0.00');
    expect(datum.u).toBe(datum.uRounding);
    expect(datum.origin).toBe('printed digits');
  });

  it('takes what its row states before what the descriptor says, k = 1', () => {
    const declared = [{ relative: 0.01, absolute: null, coverage: 1, shared: false }];
    const own = formation('measured', '-94.05±0.8', declared);
    expect(own.origin).toBe('stated');
    expect(own.u).toBeCloseTo(Math.hypot(400, own.uRounding), 8);
    const source = formation('evaluated', '-94.05', declared);
    expect(source.origin).toBe('source default');
    expect(source.u).toBeCloseTo(Math.hypot(0.01 * 94.05 * 4184, source.uRounding), 8);
  });

  it.each([
    ['-94.1', 2, 0.005],
    ['-94', 2, 0.005],
    ['0', 2, 0],
    ['-94.052', 2, 0.0005],
  ])('printed as %s where %d decimals are usual is known to %d', (printed, usualDecimals, half) => {
    const table = tableOf([columnOf('dfH', 'enthalpy-of-formation', 'J/mol')], { holds: 'anchors' });
    const row = rowOf(table, { phase: 'cr' }, { 'enthalpy-of-formation': printed });
    const cell = { ...(row.cells['enthalpy-of-formation'] as RawCell), usualDecimals };
    const given = { ...row, cells: { 'enthalpy-of-formation': cell } };
    expect(harmonised({ anchors: [given] }).anchors[0].enthalpyOfFormation?.halfUnit).toBe(half);
  });
});
