import { describe, expect, it } from 'vitest';
import type { RawRow } from '../../schemas/raw.js';
import type { TableMeaning } from '../../schemas/table-meaning.js';
import { columnOf, harmonised, rowOf, tableOf, wordsOf } from './raw.js';

const COLUMNS = [
  columnOf('T', 'transition-temperature', 'K'),
  columnOf('p', 'pressure', 'atm'),
  columnOf('dH', 'transition-enthalpy', 'kJ/mol'),
  columnOf('dS', 'transition-entropy', 'J/(mol.K)'),
];

function transition(
  words: RawRow['words'],
  cells: Parameters<typeof rowOf>[2] = { 'transition-temperature': '600.60' },
  rest: Partial<TableMeaning> = {},
) {
  const table = tableOf(COLUMNS, { holds: 'transitions', ...rest });
  const result = harmonised({ transitions: [rowOf(table, { 'from-phase': 'cr', 'to-phase': 'l', ...words }, cells)] });
  return { stated: result.transitions[0], made: result.made };
}

describe('a stated transition', () => {
  it('is first order, without a gas, at the source’s standard pressure where nothing else is said', () => {
    const { stated, made } = transition(
      {},
      { 'transition-temperature': '600.60', 'transition-enthalpy': '4.774', 'transition-entropy': '7.948' },
    );
    expect(stated).toMatchObject({ from: 'cr', to: 'l', order: 'first', gas: null, pressurePa: 100000 });
    expect(stated.temperature).toMatchObject({ value: 600.6, origin: 'printed digits' });
    expect(stated.temperature.uRounding).toBeCloseTo(0.005 / Math.sqrt(3), 12);
    expect(stated.enthalpy?.value).toBe(4774);
    expect(stated.entropy?.value).toBe(7.948);
    expect(made).toEqual([]);
  });

  it('takes its own pressure, else the table’s isobar', () => {
    expect(transition({}, { 'transition-temperature': '600.60', pressure: '2' }).stated.pressurePa).toBe(202650);
    expect(transition({}, undefined, { isobarPa: 101325 }).stated.pressurePa).toBe(101325);
    expect(transition({}, undefined, { standardPressurePa: 101325 }).stated.pressurePa).toBe(101325);
  });

  it('keeps the cell of its pressure, exact as printed: a nominal pressure has no rounding and no default', () => {
    for (const basis of ['evaluated', 'measured'] as const) {
      const { stated } = transition({}, { 'transition-temperature': '600.60', pressure: '1' }, { basis });
      expect(stated.pressure).toMatchObject({
        value: 101325,
        u: 0,
        uRounding: 0,
        halfUnit: 0,
        printed: '1',
        factor: 101325,
      });
      expect(stated.pressure?.address).toEqual({ source: 'desk', file: 'table.csv', line: 2, column: 'p' });
      expect(stated.pressure?.origin).toBe('printed digits');
    }
  });

  it('has the uncertainty of its pressure that is stated, in a column of its own or by the descriptor', () => {
    const printed = { 'transition-temperature': '600.60', pressure: '2±0.02' };
    const columns = [...COLUMNS, columnOf('u(p)', 'uncertainty', 'atm', { of: 'pressure', coverage: 2 })];
    expect(transition({}, printed, { columns }).stated.pressure?.u).toBeCloseTo(0.01 * 101325, 9);
    const declared = columnOf('p', 'pressure', 'atm', {
      uncertainty: [{ relative: 0.01, absolute: null, coverage: 1, shared: false }],
    });
    const { stated } = transition(
      {},
      { 'transition-temperature': '600.60', pressure: '2' },
      { columns: COLUMNS.with(1, declared) },
    );
    expect(stated.pressure?.u).toBeCloseTo(0.01 * 202650, 8);
    expect(stated.pressure?.origin).toBe('source default');
    expect(stated.pressure?.uRounding).toBe(0);
  });

  it('has no cell of a pressure where the descriptor or nobody gives it', () => {
    expect(transition({}).stated.pressure).toBeNull();
    const table = tableOf(COLUMNS, { holds: 'transitions' });
    const row = rowOf(table, { 'from-phase': 'cr', 'to-phase': 'l' }, { 'transition-temperature': '600.60' });
    const constant = {
      column: -1,
      value: 50000,
      decimals: 20,
      usualDecimals: 20,
      printed: '0.5 bar',
      corrected: false,
    };
    const cells = { ...row.cells, pressure: { ...constant, uncertainty: null } };
    const [stated] = harmonised({ transitions: [{ ...row, cells }] }).transitions;
    expect(stated).toMatchObject({ pressurePa: 50000, pressure: null });
  });

  it('of a measured source takes the policy’s uncertainties', () => {
    const { stated } = transition(
      {},
      { 'transition-temperature': '600.60', 'transition-enthalpy': '4.774' },
      { basis: 'measured' },
    );
    expect(stated.temperature.origin).toBe('policy default');
    expect(stated.temperature.u).toBeCloseTo(Math.hypot(0.0005 * 600.6, 0.005 / Math.sqrt(3)), 10);
    expect(stated.enthalpy?.u).toBeCloseTo(Math.hypot(0.02 * 4774, 0.5 / Math.sqrt(3)), 8);
  });

  it('to a gas must say which gas, and its word is kept', () => {
    expect(transition({ 'to-phase': 'g', gas: 'ideal' })).toMatchObject({ stated: { gas: 'ideal' }, made: [] });
    expect(transition({ 'to-phase': 'g', gas: 'real' })).toMatchObject({ stated: { gas: 'real' }, made: [] });
    for (const gas of [undefined, 'perfect']) {
      const { made } = transition(gas === undefined ? { 'to-phase': 'g' } : { 'to-phase': 'g', gas });
      expect(made).toHaveLength(1);
      expect(made[0]).toMatchObject({
        severity: 'fault',
        fromPhase: 'cr',
        toPhase: 'g',
        detail: { problem: 'required-missing' },
      });
      expect(wordsOf(made[0])).toContain('ideal');
    }
  });

  it('keeps the order it states, and an unknown word is reported', () => {
    expect(transition({ order: 'continuous' }).stated.order).toBe('continuous');
    expect(transition({ order: 'glass' }).stated.order).toBe('glass');
    const { stated, made } = transition({ order: 'second' });
    expect(stated.order).toBe('first');
    expect(wordsOf(made[0])).toContain('second');
  });

  it('without a temperature is reported and left out', () => {
    const { stated, made } = transition({}, { 'transition-enthalpy': '4.774' });
    expect(stated).toBeUndefined();
    expect(made[0]).toMatchObject({ severity: 'fault', address: { line: 2, column: 'T' } });
  });

  it('takes a constant of the descriptor as exact and in SI', () => {
    const table = tableOf([columnOf('T', 'transition-temperature', 'K')], { holds: 'transitions' });
    const row = rowOf(
      table,
      { 'from-phase': 'l', 'to-phase': 'g', gas: 'real' },
      { 'transition-temperature': '373.12', pressure: '101325' },
    );
    expect(row.cells.pressure?.column).toBe(-1);
    expect(harmonised({ transitions: [row] }).transitions[0].pressurePa).toBe(101325);
  });
});
