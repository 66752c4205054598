import { describe, expect, it } from 'vitest';
import type { TableMeaning } from '../../schemas/table-meaning.js';
import { columnOf, harmonised, rowOf, seriesOf, tableOf, wordsOf } from './raw.js';

const T = columnOf('T', 'temperature', 'K');
const H = columnOf('H', 'enthalpy-increment', 'kJ/mol');
const G = columnOf('G', 'gibbs-function', 'J/(mol.K)');
const CP = columnOf('Cp', 'heat-capacity', 'J/(mol.K)');

const functions = (rest: Partial<TableMeaning>, columns = [T, H, G]) => tableOf(columns, rest);
const ANCHORS = tableOf([columnOf('dH0', 'enthalpy-from-zero', 'kJ/mol')], { holds: 'anchors', table: '#1' });

describe('increments that count from 0 K', () => {
  it('lose their own row at 298.15 K, and -[G-H]/T gains it over T', () => {
    const table = functions({ incrementsFromZeroK: true });
    const rows = [
      ['0', '0.000', ''],
      ['298.15', '6.000', '40.00'],
      ['500', '12.000', '55.00'],
    ];
    const [series] = harmonised({ series: [seriesOf(table, 'cr', rows)] }).series;
    expect(Array.from(series.enthalpyIncrement?.values ?? [])).toEqual([-6000, 0, 6000]);
    expect(series.gibbsFunction?.values[1]).toBeCloseTo(40 + 6000 / 298.15, 10);
    expect(series.gibbsFunction?.values[2]).toBeCloseTo(55 + 12, 10);
    // The rounding of what was taken off counts as well.
    expect(series.enthalpyIncrement?.halfUnit[2]).toBeCloseTo(1, 10);
  });

  it('drop -[G-H]/T at 0 K, which has no limit there', () => {
    const table = functions({ incrementsFromZeroK: true });
    const [series] = harmonised({
      series: [
        seriesOf(table, 'cr', [
          ['0', '0.000', '0.00'],
          ['298.15', '6.000', '40.00'],
        ]),
      ],
    }).series;
    expect(Array.from(series.gibbsFunction?.present ?? [])).toEqual([0, 1]);
  });

  it('use the anchor’s H(298.15 K) - H(0) where the table has no such row', () => {
    const table = functions({ incrementsFromZeroK: true });
    const given = seriesOf(table, 'cr', [['300', '6.100', '40.20']]);
    const anchor = rowOf(ANCHORS, { phase: 'cr' }, { 'enthalpy-from-zero': '6.05' });
    const [series] = harmonised({ series: [given], anchors: [anchor] }).series;
    expect(series.enthalpyIncrement?.values[0]).toBeCloseTo(50, 8);
  });

  it('count a whole table from the one phase that they run through', () => {
    const table = functions({ incrementsFromZeroK: true });
    const cr = seriesOf(table, 'cr', [['298.15', '6.000', '40.00']], { incrementsFrom: 'cr' });
    const l = seriesOf(table, 'l', [['600', '20.000', '60.00']], { incrementsFrom: 'cr' });
    const { series } = harmonised({ series: [cr, l] });
    expect(series[1].enthalpyIncrement?.values[0]).toBe(14000);
  });

  it('are taken out, with a finding, where no way to 298.15 K is known', () => {
    const table = functions({ incrementsFromZeroK: true });
    const { series, made } = harmonised({ series: [seriesOf(table, 'cr', [['300', '6.100', '40.20']])] });
    expect(series[0].enthalpyIncrement).toBeNull();
    expect(series[0].gibbsFunction).toBeNull();
    expect(made).toHaveLength(1);
    expect(made[0]).toMatchObject({ severity: 'fault', address: { column: 'H' } });
    expect(wordsOf(made[0])).toContain('enthalpy-from-zero');
  });
});

describe('increments that count from another temperature', () => {
  it('lose the row at 298.15 K where there is one', () => {
    const table = functions({ referenceTemperatureK: 273.15 });
    const [series] = harmonised({
      series: [
        seriesOf(table, 'cr', [
          ['298.15', '0.500', '40.00'],
          ['400', '2.600', '41.00'],
        ]),
      ],
    }).series;
    expect(Array.from(series.enthalpyIncrement?.values ?? [])).toEqual([0, 2100]);
  });

  it('are moved with the heat capacity where the way is short', () => {
    const table = functions({ referenceTemperatureK: 293.15 }, [T, H, CP]);
    const rows = [
      ['293.15', '0.000', '24.00'],
      ['393.15', '2.500', '26.00'],
    ];
    const { series, made } = harmonised({ series: [seriesOf(table, 'cr', rows)] });
    expect(series[0].enthalpyIncrement?.values[0]).toBeCloseTo(-5 * 24.05, 8);
    expect(made).toEqual([]);
  });

  it('are taken out, with a finding, where the way is long or no heat capacity shows it', () => {
    const far = functions({ referenceTemperatureK: 500 }, [T, H, CP]);
    expect(harmonised({ series: [seriesOf(far, 'cr', [['500', '0.000', '24.00']])] }).made).toHaveLength(1);
    const bare = functions({ referenceTemperatureK: 293.15 }, [T, H]);
    expect(harmonised({ series: [seriesOf(bare, 'cr', [['400', '2.500']])] }).made).toHaveLength(1);
  });

  it('stay untouched where they count from 298.15 K', () => {
    const given = seriesOf(functions({}), 'cr', [['298.15', '0.000', '40.00']]);
    const [series] = harmonised({ series: [given] }).series;
    expect(series.enthalpyIncrement?.values[0]).toBe(0);
    expect(series.gibbsFunction?.values).toBe(given.columns[2].values);
  });

  it('of 298.15 K on the scale of 1968 are moved by its 6 mK', () => {
    const table = functions({ temperatureScale: 'IPTS-68' }, [T, H, CP]);
    const [series] = harmonised({ series: [seriesOf(table, 'cr', [['298.15', '0.000', '25.00']])] }).series;
    expect(series.temperatureK[0]).toBeCloseTo(298.1437, 3);
    expect(series.enthalpyIncrement?.values[0]).toBeCloseTo(25 * (series.temperatureK[0] - 298.15), 2);
  });
});

describe('anchors at another temperature', () => {
  const columns = [
    columnOf('S', 'entropy', 'J/(mol.K)'),
    columnOf('dH0', 'enthalpy-from-zero', 'kJ/mol'),
    columnOf('dfH', 'enthalpy-of-formation', 'kJ/mol'),
    columnOf('dfG', 'gibbs-energy-of-formation', 'kJ/mol'),
  ];
  const anchorTable = (referenceTemperatureK: number) =>
    tableOf(columns, { holds: 'anchors', referenceTemperatureK, table: '#1' });
  const cp = seriesOf(tableOf([T, CP]), 'cr', [
    ['290', '30.00'],
    ['300', '30.00'],
  ]);
  const printed = {
    entropy: '50.000',
    'enthalpy-from-zero': '8.000',
    'enthalpy-of-formation': '-400.00',
    'gibbs-energy-of-formation': '-370.00',
  };

  it('come to 298.15 K with the heat capacity of their phase', () => {
    const row = rowOf(anchorTable(293.15), { phase: 'cr' }, printed);
    const [anchor] = harmonised({ series: [cp], anchors: [row] }).anchors;
    expect(anchor.referenceTemperatureK).toBe(298.15);
    expect(anchor.entropy?.value).toBeCloseTo(50 + 30 * Math.log(298.15 / 293.15), 10);
    expect(anchor.enthalpyFromZero?.value).toBeCloseTo(8150, 8);
    expect(anchor.enthalpyOfFormation?.value).toBe(-400000);
    expect(anchor.enthalpyOfFormation?.u).toBeCloseTo(Math.hypot(5 / Math.sqrt(3), 250 / Math.sqrt(3)), 8);
    // dG/dT of formation is minus its entropy, here -30 kJ/mol over 293.15 K.
    expect(anchor.gibbsEnergyOfFormation?.value).toBeCloseTo(-370000 + (30000 / 293.15) * 5, 6);
  });

  it('stay where they are, with a finding, where nothing leads to 298.15 K', () => {
    const row = rowOf(anchorTable(293.15), { phase: 'cr' }, printed);
    const result = harmonised({ anchors: [row] });
    expect(result.anchors[0].referenceTemperatureK).toBe(293.15);
    expect(result.anchors[0].entropy?.value).toBe(50);
    expect(result.made).toHaveLength(1);
    expect(
      harmonised({ series: [cp], anchors: [rowOf(anchorTable(500), { phase: 'cr' }, printed)] }).made,
    ).toHaveLength(1);
  });
});
