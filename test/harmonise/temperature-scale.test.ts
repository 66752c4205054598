import { describe, expect, it } from 'vitest';
import type { TemperatureScale } from '../../schemas/table-meaning.js';
import { columnOf, harmonised, rowOf, seriesOf, tableOf, wordsOf } from './raw.js';

const COLUMNS = [
  columnOf('T', 'temperature', 'K'),
  columnOf('Cp', 'heat-capacity', 'J/(mol.K)'),
  columnOf('S', 'entropy', 'J/(mol.K)'),
  columnOf('H', 'enthalpy-increment', 'J/mol'),
  columnOf('G', 'gibbs-function', 'J/(mol.K)'),
];

function series(temperatureScale: TemperatureScale, rows: readonly (readonly string[])[]) {
  const result = harmonised({ series: [seriesOf(tableOf(COLUMNS, { temperatureScale }), 'cr', rows)] });
  return { series: result.series[0], made: result.made };
}

describe('the temperatures of a series', () => {
  it('of 1968 become those of 1990, Cp with them, and the three functions still close', () => {
    const S = 80;
    const H = 24000;
    const { series: made, made: findings } = series('IPTS-68', [
      ['1235.08', '30.00', '80', '24000', `${S - H / 1235.08}`],
    ]);
    // Silver, IPTS-68 against ITS-90 (Preston-Thomas 1990).
    expect(made.temperatureK[0]).toBeCloseTo(1234.93, 2);
    // Rusby et al. (1994): t90 - t68 is -0.14921 K at 961.28 and -0.15079 K at 962.28 degrees Celsius.
    const slope = 1 + 0.15079 - 0.14921;
    expect(Math.abs((made.heatCapacity?.values[0] ?? 0) / 30 - slope)).toBeLessThan(2e-5);
    const increment = made.enthalpyIncrement?.values[0] ?? 0;
    expect(made.gibbsFunction?.values[0]).toBeCloseTo(S - increment / made.temperatureK[0], 3);
    expect(made.entropy?.values[0]).toBe(80);
    expect(made.scaleDoubtK).toBe(0);
    expect(findings).toEqual([]);
  });

  it('that are not stated stay, and what they may be off by is kept', () => {
    const { series: made } = series('not-stated', [
      ['300', '25', '50', '0', '50'],
      ['1300', '30', '90', '30000', '67'],
    ]);
    expect(Array.from(made.temperatureK)).toEqual([300, 1300]);
    expect(made.scaleDoubtK).toBeGreaterThan(1);
    expect(series('ITS-90', [['300', '25', '50', '0', '50']]).series.scaleDoubtK).toBe(0);
    expect(series('thermodynamic', [['3000', '25', '50', '0', '50']]).series.scaleDoubtK).toBe(0);
  });

  it('outside the published range stay, with a note and the possible difference', () => {
    const { series: made, made: findings } = series('IPTS-48', [
      ['300', '25', '50', '0', '50'],
      ['900', '30', '90', '30000', '67'],
    ]);
    expect(made.temperatureK[0]).not.toBe(300);
    expect(made.temperatureK[1]).toBe(900);
    expect(made.scaleDoubtK).toBeCloseTo(0.15, 12);
    expect(findings).toHaveLength(1);
    expect(findings[0]).toMatchObject({ severity: 'note', address: { line: 3 } });
    expect(wordsOf(findings[0])).toContain('0.15 K');
  });

  it.each([
    ['[degF]', '-459.67', '80.33'],
    ['Cel', '-273.15', '26.85'],
  ])('in %s meet 0 K exactly, which is a limit row', (unit, zero, later) => {
    const table = tableOf([columnOf('T', 'temperature', unit), columnOf('Cp', 'heat-capacity', 'J/(mol.K)')]);
    const rows = [
      [zero, '0.00'],
      [later, '25.00'],
    ];
    const [made] = harmonised({ series: [seriesOf(table, 'cr', rows)] }).series;
    expect(Array.from(made.temperatureK)).toEqual([0, 300]);
  });

  it('keep a limit row at 0 K in peace', () => {
    const { series: made, made: findings } = series('IPTS-68', [
      ['0', '0', '0', '-5000', ''],
      ['300', '25', '50', '0', '50'],
    ]);
    expect(made.temperatureK[0]).toBe(0);
    expect(findings).toEqual([]);
  });
});

describe('the temperature of a transition', () => {
  const columns = [columnOf('Tm', 'transition-temperature', 'Cel')];
  const transition = (temperatureScale: TemperatureScale, printed: string) => {
    const row = rowOf(
      tableOf(columns, { holds: 'transitions', temperatureScale }),
      { 'from-phase': 'cr', 'to-phase': 'l' },
      { 'transition-temperature': printed },
    );
    const result = harmonised({ transitions: [row] });
    return { datum: result.transitions[0].temperature, made: result.made };
  };

  it('goes to ITS-90, and its offset says how', () => {
    const { datum } = transition('IPTS-68', '419.58');
    expect(datum.value).toBeCloseTo(692.677, 2);
    expect(Number(datum.printed) * datum.factor + datum.offset).toBeCloseTo(datum.value, 10);
    expect(transition('not-stated', '419.58').datum.value).toBeCloseTo(692.73, 10);
  });

  it('takes the possible difference into u where no difference is published', () => {
    const { datum, made } = transition('IPTS-48', '1063.0');
    expect(datum.value).toBeCloseTo(1336.15, 10);
    expect(datum.u).toBeGreaterThan(0.65);
    expect(made[0]).toMatchObject({ severity: 'note', fromPhase: 'cr', toPhase: 'l' });
  });
});
