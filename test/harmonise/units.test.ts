import { describe, expect, it } from 'vitest';
import { harmonise } from '../../pipeline/harmonise/harmonise.js';
import type { RawCase } from '../../schemas/raw.js';
import { columnOf, harmonised, POLICY, SUBSTANCE, seriesOf, tableOf, wordsOf } from './raw.js';

const FUNCTIONS = [
  columnOf('T', 'temperature', 'Cel'),
  columnOf('Cp', 'heat-capacity', 'cal_th/(mol.K)'),
  columnOf('S', 'entropy', 'J/(g.K)'),
  columnOf('H', 'enthalpy-increment', 'kJ/mol'),
  columnOf('G', 'gibbs-function', 'J/(mol.K)'),
];
const ROWS = [
  ['25', '10.00', '2.000', '0.00', '100.0'],
  ['100', '11.00', '2.100', '3.50', '100.9'],
  ['200', '12.00', '2.200', '', '102.0'],
];

describe('units of a series', () => {
  it('become SI and molar, and absent cells stay absent', () => {
    const [series] = harmonised({ series: [seriesOf(tableOf(FUNCTIONS), 'cr', ROWS)] }).series;
    expect(Array.from(series.temperatureK)).toEqual([298.15, 373.15, 473.15]);
    expect(series.heatCapacity?.values[1]).toBeCloseTo(46.024, 12);
    expect(series.entropy?.values[0]).toBeCloseTo(100, 12);
    expect(series.enthalpyIncrement?.values[1]).toBe(3500);
    expect(Array.from(series.enthalpyIncrement?.present ?? [])).toEqual([1, 1, 0]);
    expect(series.gibbsFunction?.values[2]).toBe(102);
    expect(series.enthalpy).toBeNull();
    expect(series.phase).toBe('cr');
    expect(series.text(1, 1)).toBe('11.00');
  });

  it('leave half a unit of the last place in SI', () => {
    const [series] = harmonised({ series: [seriesOf(tableOf(FUNCTIONS), 'cr', ROWS)] }).series;
    expect(series.heatCapacity?.halfUnit[0]).toBeCloseTo(0.005 * 4.184, 12);
    expect(series.entropy?.halfUnit[0]).toBeCloseTo(0.0005 * 50, 12);
    expect(series.enthalpyIncrement?.halfUnit[1]).toBeCloseTo(5, 12);
  });

  it('hand on the raw array where nothing is to be done, and never write to it', () => {
    const table = tableOf([columnOf('T', 'temperature', 'K'), columnOf('S', 'entropy', 'J/(mol.K)')], {
      standardPressurePa: 101325,
    });
    const solid = seriesOf(table, 'cr', [['300', '50.00']]);
    const gas = seriesOf(table, 'g', [['300', '200.00']]);
    const result = harmonised({ series: [solid, gas] });
    expect(result.series[0].entropy?.values).toBe(solid.columns[1].values);
    expect(result.series[1].entropy?.values).not.toBe(gas.columns[1].values);
    expect(gas.columns[1].values[0]).toBe(200);
  });

  it('that are unknown are reported once for a column and a substance, and only that column is lost', () => {
    const table = tableOf([
      columnOf('T', 'temperature', 'K'),
      columnOf('Cp', 'heat-capacity', 'J/(mol.k)'),
      columnOf('S', 'entropy', 'J/(mol.K)'),
    ]);
    const rows = [['300', '25.0', '50.00']];
    const result = harmonised({ series: [seriesOf(table, 'cr', rows), seriesOf(table, 'l', rows)] });
    expect(result.made).toHaveLength(1);
    expect(result.findings).toEqual(result.made);
    const [finding] = result.made;
    expect(finding).toMatchObject({
      rule: 'row-readable',
      severity: 'fault',
      substance: 'medium',
      address: { source: 'desk', file: 'table.csv', line: 0, column: 'Cp' },
      detail: { code: 'reading', problem: 'unit-unknown', read: 'J/(mol.k)' },
    });
    expect(wordsOf(finding)).toContain('J/(mol.K)');
    expect(result.series.map((series) => series.heatCapacity)).toEqual([null, null]);
    expect(result.series.map((series) => series.entropy?.values[0])).toEqual([50, 50]);
  });

  it('that do not fit the quantity are reported for each substance touched, and the others go on', () => {
    const table = tableOf([columnOf('T', 'temperature', 'K'), columnOf('H', 'enthalpy-increment', 'kJ')]);
    const good = tableOf([columnOf('T', 'temperature', 'K'), columnOf('H', 'enthalpy-increment', 'kJ/mol')], {
      source: 'other',
    });
    const rows = [['300', '1.0']];
    const raw = (id: string, meaning: typeof table): RawCase => ({
      substance: { ...SUBSTANCE, id },
      series: [seriesOf(meaning, 'cr', rows)],
      anchors: [],
      transitions: [],
      vapourPressures: [],
      findings: [],
    });
    const { artefact, findings } = harmonise([raw('a', table), raw('b', good), raw('c', table)], { policy: POLICY });
    expect(findings.map((finding) => finding.substance)).toEqual(['a', 'c']);
    expect(findings[0].detail).toMatchObject({ problem: 'unit-unfit', read: 'kJ' });
    expect(artefact[1].series[0].enthalpyIncrement?.values[0]).toBe(1000);
    expect(artefact[1].findings).toEqual([]);
  });

  it('need a temperature: a table without one is reported and left out', () => {
    const table = tableOf([columnOf('Cp', 'heat-capacity', 'J/(mol.K)')]);
    const result = harmonised({ series: [seriesOf(table, 'cr', [['25.0']])] });
    expect(result.series).toEqual([]);
    expect(result.made[0].detail).toMatchObject({ problem: 'required-missing' });
  });

  it('leaves out rows without a temperature, says so, and keeps the addresses of the others', () => {
    const table = tableOf([columnOf('T', 'temperature', 'K'), columnOf('Cp', 'heat-capacity', 'J/(mol.K)')]);
    const result = harmonised({
      series: [
        seriesOf(table, 'cr', [
          ['300', '25.0'],
          ['', '26.0'],
          ['400', '27.0'],
        ]),
      ],
    });
    const [series] = result.series;
    expect(Array.from(series.line)).toEqual([2, 4]);
    expect(Array.from(series.heatCapacity?.values ?? [])).toEqual([25, 27]);
    expect(series.text(1, 1)).toBe('27.0');
    expect(result.made[0]).toMatchObject({ address: { line: 3 }, detail: { problem: 'required-missing' } });
  });

  it('takes the rank of the heat capacity column before the table’s, and counts corrections', () => {
    const table = tableOf([
      columnOf('T', 'temperature', 'K'),
      columnOf('Cp', 'heat-capacity', 'J/(mol.K)', { rank: 4 }),
    ]);
    const given = seriesOf(table, 'cr', [
      ['300', '25.0'],
      ['400', '26.0'],
    ]);
    const columns = given.columns.map((column) => ({ ...column, corrected: Uint8Array.of(0, 1) }));
    expect(harmonised({ series: [{ ...given, columns }] }).series[0]).toMatchObject({ rank: 4, corrections: 2 });
    expect(harmonised({ series: [given] }).series[0].corrections).toBe(0);
  });
});
