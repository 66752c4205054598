/** Raw tables made inline, for the tests of harmonise. */
import { harmonise } from '../../pipeline/harmonise/harmonise.js';
import { type Policy, policySchema } from '../../schemas/policy.js';
import type { NumberQuantity, TextQuantity } from '../../schemas/quantities.js';
import { NO_CELL, type RawCase, type RawCell, type RawRow, type RawSeries } from '../../schemas/raw.js';
import type { Substance } from '../../schemas/substances.js';
import type { ColumnMeaning, TableMeaning } from '../../schemas/table-meaning.js';

export const POLICY: Policy = policySchema.parse({});

export const SUBSTANCE: Substance = {
  id: 'medium',
  name: 'Medium',
  formula: 'X2Y',
  molarMassGPerMol: 50,
  atomsPerFormula: 3,
  criticalTemperatureK: null,
  criticalPressurePa: null,
  acentricFactor: null,
  polarA: null,
  polarB: null,
  class: null,
  vapourSpecies: null,
  residualEntropyJPerMolK: 0,
};

export function columnOf(
  header: string,
  is: ColumnMeaning['is'],
  unit: string | null,
  rest: Partial<ColumnMeaning> = {},
): ColumnMeaning {
  return { header, is, unit, of: null, per: null, uncertainty: [], rank: null, coverage: 1, shared: false, ...rest };
}

export function tableOf(columns: readonly ColumnMeaning[], rest: Partial<TableMeaning> = {}): TableMeaning {
  return {
    source: 'desk',
    file: 'table.csv',
    table: '#0',
    holds: 'thermal-functions',
    basis: 'evaluated',
    restsOn: [],
    rank: 1,
    temperatureScale: 'ITS-90',
    standardPressurePa: 100000,
    referenceTemperatureK: 298.15,
    enthalpyZero: 'elements-298.15',
    entropyZero: 'absolute',
    isobarPa: null,
    incrementsFromZeroK: false,
    columns,
    ...rest,
  };
}

const decimalsOf = (cell: string): number => (cell === '' ? NO_CELL : (cell.split('.')[1]?.length ?? 0));

/** `cells`: one text a row and a column, in the order of the table's columns; '' is absent. */
export function seriesOf(
  table: TableMeaning,
  phase: string,
  cells: readonly (readonly string[])[],
  rest: Partial<RawSeries> = {},
): RawSeries {
  const columns = table.columns.flatMap((meaning, column) => {
    if (meaning.is === 'uncertainty' || meaning.is === 'ignored' || meaning.is === 'note') return [];
    const texts = cells.map((row) => row[column]);
    const decimals = Int8Array.from(texts, decimalsOf);
    return [
      {
        is: meaning.is as NumberQuantity,
        column,
        values: Float64Array.from(texts, Number),
        decimals,
        usualDecimals: Math.max(...decimals),
        corrected: null,
      },
    ];
  });
  const uncertainties = table.columns.flatMap((meaning, column) => {
    if (meaning.is !== 'uncertainty' || meaning.of === null) return [];
    const texts = cells.map((row) => row[column]);
    return [
      { of: meaning.of, column, values: Float64Array.from(texts, Number), decimals: Int8Array.from(texts, decimalsOf) },
    ];
  });
  return {
    table,
    phase,
    series: '',
    incrementsFrom: null,
    rows: cells.length,
    line: Int32Array.from(cells, (_, row) => row + 2),
    columns,
    uncertainties,
    notes: null,
    text: (row, column) => cells[row][column],
    ...rest,
  };
}

/** A row of anchors, transitions or vapour pressures; numbers as printed, by column. */
export function rowOf(
  table: TableMeaning,
  words: RawRow['words'],
  printed: Partial<Record<NumberQuantity, string>>,
  line = 2,
): RawRow {
  const cells: Partial<Record<NumberQuantity, RawCell>> = {};
  for (const [quantity, text] of Object.entries(printed) as [NumberQuantity, string][]) {
    const column = table.columns.findIndex((entry) => entry.is === quantity);
    const [value, uncertainty] = text.split('±');
    const decimals = decimalsOf(value);
    cells[quantity] = {
      column,
      value: Number(value),
      decimals,
      usualDecimals: decimals,
      printed: value,
      corrected: false,
      uncertainty: uncertainty === undefined ? null : Number(uncertainty),
    };
  }
  return { table, line, cells, words: words as Partial<Record<TextQuantity, string>> };
}

export function harmonised(parts: Partial<RawCase>, policy: Policy = POLICY) {
  const raw: RawCase = {
    substance: SUBSTANCE,
    series: [],
    anchors: [],
    transitions: [],
    vapourPressures: [],
    findings: [],
    ...parts,
  };
  const { artefact, findings } = harmonise([raw], { policy });
  return { ...artefact[0], made: findings };
}

/** The words of a reading finding, for comparison. */
export function wordsOf(finding: { detail: { code: string } }): string {
  const { detail } = finding;
  return detail.code === 'reading' ? Object.values(detail).join(' | ') : detail.code;
}
