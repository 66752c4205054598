import { describe, expect, it } from 'vitest';
import { policySchema } from '../../schemas/policy.js';
import type { ColumnMeaning, TableMeaning } from '../../schemas/table-meaning.js';
import { columnOf, harmonised, POLICY, rowOf, tableOf, wordsOf } from './raw.js';

const P = columnOf('p', 'pressure', 'kPa');
const T = columnOf('T', 'temperature', 'K');

/** Rows of [T, p] over `l`, on lines 2 and on. */
function vapours(
  rows: readonly (readonly [string, string])[],
  { columns = [T, P], ...rest }: Partial<TableMeaning> = {},
  policy = POLICY,
  phase = 'l',
) {
  const table = tableOf(columns, { holds: 'vapour-pressures', ...rest });
  const { vapourPressures, made } = harmonised(
    { vapourPressures: rows.map(([t, p], i) => rowOf(table, { phase }, { temperature: t, pressure: p }, i + 2)) },
    policy,
  );
  return { rows: vapourPressures, made, table };
}

const one = (t: string, p: string, rest: Partial<TableMeaning> = {}) => vapours([[t, p]], rest).rows[0]!;
const inUnit = (unit: string, more: Partial<ColumnMeaning> = {}) => columnOf('p', 'pressure', unit, more);

describe('a vapour pressure', () => {
  it('is its phase, a temperature and a pressure in SI, each with its cell', () => {
    const { rows, made, table } = vapours([
      ['373.124', '101.325'],
      ['298.150', '3.1699'],
    ]);
    expect(made).toEqual([]);
    expect(rows.map(({ phase, temperature, pressure }) => [phase, temperature.value, pressure.value])).toEqual([
      ['l', 373.124, 101325],
      ['l', 298.15, 3169.9],
    ]);
    expect(rows[1]!.table).toBe(table);
    expect(rows[1]!.pressure).toMatchObject({
      printed: '3.1699',
      unit: 'kPa',
      factor: 1000,
      offset: 0,
      origin: 'printed digits',
      address: { source: 'desk', file: 'table.csv', line: 3, column: 'p' },
    });
    expect(rows[1]!.temperature.address).toEqual({ source: 'desk', file: 'table.csv', line: 3, column: 'T' });
  });

  // UCUM: atm, m[Hg] (133.3220 kPa) and [psi] by their definitions.
  it.each([
    ['Pa', '101325', 101325],
    ['kPa', '101.325', 101325],
    ['bar', '1.01325', 101325],
    ['mbar', '1013.25', 101325],
    ['atm', '1', 101325],
    ['mm[Hg]', '760', 760 * 133.322],
    ['[psi]', '14.696', 14.696 * 6894.757293168],
  ])('is read in %s', (unit, printed, pascal) => {
    const { pressure } = one('373.124', printed, { columns: [T, inUnit(unit)] });
    expect(Math.abs(pressure.value / pascal - 1)).toBeLessThan(1e-7);
    expect(pressure.unit).toBe(unit);
  });

  it('has a temperature in degrees, and a constant one that is exact', () => {
    const celsius = columnOf('t', 'temperature', 'Cel');
    const { temperature } = one('25.00', '3.1699', { columns: [celsius, P] });
    expect(temperature.value).toBeCloseTo(298.15, 10);
    expect(temperature).toMatchObject({ factor: 1, offset: 273.15, unit: 'Cel' });
    const boiling = one('373.124', '101325', { columns: [T] });
    expect(boiling.pressure).toMatchObject({ value: 101325, u: 0, halfUnit: 0, address: { line: 0 } });
  });

  it('keeps an impossible number for the rule that finds it', () => {
    expect(one('373.124', '-3.17').pressure.value).toBe(-3170);
    expect(one('373.124', '0').pressure.value).toBe(0);
    expect(one('-25.00', '3.17').temperature.value).toBe(-25);
  });

  it('whose unit is refused is left out, and that is said once for its column', () => {
    const { rows, made } = vapours(
      [
        ['373.12', '760'],
        ['298.15', '24'],
      ],
      { columns: [T, inUnit('torr')] },
    );
    expect(rows).toEqual([]);
    expect(made).toHaveLength(1);
    expect(made[0]).toMatchObject({ severity: 'fault', address: { column: 'p' }, detail: { problem: 'unit-unknown' } });
    expect(wordsOf(made[0]!)).toContain('mm[Hg]');
  });
});

describe('the uncertainty of a vapour pressure', () => {
  it('of an evaluated source is its rounding', () => {
    const { temperature, pressure } = one('298.15', '3.170');
    expect(pressure.u).toBeCloseTo(0.5 / Math.sqrt(3), 10);
    expect(pressure.uRounding).toBe(pressure.u);
    expect(temperature.u).toBeCloseTo(0.005 / Math.sqrt(3), 12);
  });

  it('follows the significant digits that a table keeps', () => {
    const table = tableOf([T, P], { holds: 'vapour-pressures' });
    const printed = ['0.0123', '1.23', '12.3', '123'];
    const vapourPressures = printed.map((pressure, i) => {
      const row = rowOf(table, { phase: 'l' }, { temperature: `${250 + 50 * i}.00`, pressure }, i + 2);
      // More than half of the file prints two decimals.
      return { ...row, cells: { ...row.cells, pressure: { ...row.cells.pressure!, usualDecimals: 2 } } };
    });
    const halfUnits = harmonised({ vapourPressures }).vapourPressures.map(({ pressure }) => pressure.halfUnit);
    expect(halfUnits).toEqual([0.05, 5, 50, 500].map((half) => expect.closeTo(half, 10)));
  });

  it('of a measured source is the policy’s where nothing is stated, a transition temperature’s share for T', () => {
    const { rows } = vapours([['400.00', '3.170']], { basis: 'measured' });
    const { temperature, pressure } = rows[0]!;
    expect(pressure.origin).toBe('policy default');
    expect(pressure.u).toBeCloseTo(Math.hypot(0.01 * 3170, 0.5 / Math.sqrt(3)), 8);
    expect(temperature.origin).toBe('policy default');
    expect(temperature.u).toBeCloseTo(Math.hypot(0.0005 * 400, 0.005 / Math.sqrt(3)), 10);
    const defaultUncertainty = { pressureRelative: 0.05, transitionTemperatureRelative: 0.001 };
    const other = vapours([['400.00', '3.170']], { basis: 'measured' }, policySchema.parse({ defaultUncertainty }));
    expect(other.rows[0]!.pressure.u).toBeCloseTo(Math.hypot(0.05 * 3170, 0.5 / Math.sqrt(3)), 8);
    expect(other.rows[0]!.temperature.u).toBeCloseTo(Math.hypot(0.001 * 400, 0.005 / Math.sqrt(3)), 10);
  });

  it('is the descriptor’s or the row’s own where they state one, with its coverage factor taken out', () => {
    const stated = { relative: 0.02, absolute: null, coverage: 2, shared: false };
    const declared = one('400.00', '3.170', { columns: [T, inUnit('kPa', { uncertainty: [stated] })] });
    expect(declared.pressure.origin).toBe('source default');
    expect(declared.pressure.u).toBeCloseTo(Math.hypot(0.01 * 3170, 0.5 / Math.sqrt(3)), 8);

    const uP = columnOf('up', 'uncertainty', '%', { of: 'pressure', coverage: 2 });
    const uT = columnOf('uT', 'uncertainty', 'mK', { of: 'temperature' });
    const columns = [T, P, uP, uT];
    const own = one('400.00±50', '3.170±3', { columns, basis: 'measured' });
    expect(own.pressure.origin).toBe('stated');
    expect(own.pressure.u).toBeCloseTo(Math.hypot(0.015 * 3170, 0.5 / Math.sqrt(3)), 8);
    expect(own.temperature.u).toBeCloseTo(Math.hypot(0.05, 0.005 / Math.sqrt(3)), 10);
  });

  it('counts a temperature among finer ones as known to what it prints', () => {
    const table = tableOf([T, P], { holds: 'vapour-pressures' });
    const row = rowOf(table, { phase: 'l' }, { temperature: '1184', pressure: '3.170' });
    const coarse = { ...row, cells: { ...row.cells, temperature: { ...row.cells.temperature!, usualDecimals: 2 } } };
    expect(harmonised({ vapourPressures: [coarse] }).vapourPressures[0]!.temperature.halfUnit).toBe(0.5);
  });
});

describe('the temperature of a vapour pressure', () => {
  it('goes to ITS-90, and its offset says how', () => {
    const { temperature } = one('419.58', '0.02', {
      columns: [columnOf('t', 'temperature', 'Cel'), P],
      temperatureScale: 'IPTS-68',
    });
    // The zinc point: 419.58 degrees Celsius on IPTS-68, 692.677 K on ITS-90 (Preston-Thomas 1990).
    expect(temperature.value).toBeCloseTo(692.677, 2);
    expect(Number(temperature.printed) * temperature.factor + temperature.offset).toBeCloseTo(temperature.value, 10);
    expect(one('692.73', '0.02', { temperatureScale: 'not-stated' }).temperature.value).toBe(692.73);
    expect(one('692.73', '0.02', { temperatureScale: 'thermodynamic' }).temperature.value).toBe(692.73);
  });

  it('stays where no difference is published, with what it may be off by in u, told once for a table and phase', () => {
    const { rows, made } = vapours(
      [
        ['500.0', '1.0'],
        ['900.0', '10.0'],
        ['1336.2', '100.0'],
      ],
      { temperatureScale: 'IPTS-48' },
    );
    expect(rows.map(({ temperature }) => temperature.value === Number(temperature.printed))).toEqual([
      false,
      true,
      true,
    ]);
    expect(rows[1]!.temperature.u).toBeCloseTo(Math.hypot(0.15, 0.05) / Math.sqrt(3), 10);
    expect(rows[2]!.temperature.u).toBeGreaterThan(0.65);
    expect(made).toHaveLength(1);
    expect(made[0]).toMatchObject({ severity: 'note', fromPhase: 'l', address: { line: 3, column: 'T' } });
    expect(made[0]!.evidence.map(({ line, printed }) => [line, printed])).toEqual([
      [3, '900.0'],
      [4, '1336.2'],
    ]);
    expect(wordsOf(made[0]!)).toContain('1.2 K');
  });
});
