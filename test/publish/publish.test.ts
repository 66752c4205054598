import { describe, expect, test } from 'vitest';
import { concatTables, inputsTable, publish } from '../../pipeline/publish/publish.js';
import { type PublishedTable, RELEASE_TABLES } from '../../schemas/release-tables.js';
import {
  crossing,
  curve,
  finding,
  functionRows,
  ISOBAR,
  judged,
  reconciled,
  sentence,
  stated,
  suspect,
  unstatedCrossing,
} from './hand-made.js';
import { rowsOf } from './read.js';

const settings = { sentence };

describe('publish', () => {
  test('every table has the fields that are described, in that order and of that kind', () => {
    const { artefact, findings } = publish([reconciled('oil')], settings);
    expect(findings).toEqual([]);
    for (const [name, table] of Object.entries({ ...artefact, inputs: inputsTable([]) })) {
      const described: PublishedTable = RELEASE_TABLES[name as keyof typeof RELEASE_TABLES];
      const kinds = Object.entries(table.columns).map(([field, { kind }]) => [field, kind]);
      expect(kinds, name).toEqual(described.fields.map((field) => [field.name, field.kind]));
    }
  });

  test('keys are fields of their table, and names stay apart when case is ignored', () => {
    for (const [name, table] of Object.entries(RELEASE_TABLES) as [string, PublishedTable][]) {
      const names = table.fields.map((field) => field.name);
      expect(names, name).toEqual(expect.arrayContaining([...table.key]));
      expect(new Set(names.map((field) => field.toLowerCase())).size, name).toBe(names.length);
    }
  });

  test('functions hold the rows of each phase with their basis and side in words', () => {
    const rows = rowsOf(publish([reconciled('oil')], settings).artefact.functions);
    expect(rows.map((row) => row.phase)).toEqual(['cr', 'cr', 'cr', 'g', 'g', 'g']);
    expect(rows[1]).toEqual({
      substance: 'oil',
      phase: 'cr',
      isobar_Pa: null,
      temperature_K: 298.15,
      heat_capacity_J_per_mol_K: 25.3,
      entropy_J_per_mol_K: 50.5,
      enthalpy_J_per_mol: 0,
      gibbs_energy_J_per_mol: -15056.574999999999,
      u_heat_capacity_J_per_mol_K: 0.1,
      u_entropy_J_per_mol_K: 0.1,
      u_enthalpy_J_per_mol: 1e-9,
      u_gibbs_energy_J_per_mol: 30,
      stable: true,
      basis: 'interpolated',
      side: 'below',
    });
    expect(rows[2]).toMatchObject({ stable: false, basis: 'extrapolated', side: 'above' });
    expect(rows[0]).toMatchObject({ basis: 'measured', side: null });
  });

  test('a phase whose entropy has no level has neither entropy nor Gibbs energy, whatever the curve holds', () => {
    const floating = curve('cr', undefined, { hasEntropyLevel: false });
    const nothing = new Float64Array(3).fill(Number.NaN);
    const functions = functionRows('cr', undefined, { entropyJPerMolK: nothing, gibbsEnergyJPerMol: nothing });
    const { artefact } = publish([reconciled('oil', { curves: [floating], functions: [functions] })], settings);
    const row = rowsOf(artefact.functions)[0]!;
    expect(row).toMatchObject({
      entropy_J_per_mol_K: null,
      u_entropy_J_per_mol_K: null,
      gibbs_energy_J_per_mol: null,
      u_gibbs_energy_J_per_mol: null,
      enthalpy_J_per_mol: -2203.125,
    });
    expect(rowsOf(artefact.pieces)[0]).toMatchObject({ entropy_J_per_mol_K: null, enthalpy_J_per_mol: -2203.125 });
    expect(rowsOf(artefact.phases)[0]).toMatchObject({ entropy_zero: null, enthalpy_zero: 'elements-298.15' });
    const values = artefact.functions.columns.entropy_J_per_mol_K;
    expect(values?.kind === 'number' && values.values.some(Number.isNaN)).toBe(false);
  });

  test('pieces are the intervals of the curve with H and S where each begins', () => {
    const rows = rowsOf(publish([reconciled('oil')], settings).artefact.pieces);
    expect(rows).toHaveLength(4);
    expect(rows[1]).toEqual({
      substance: 'oil',
      phase: 'cr',
      isobar_Pa: null,
      low_K: 298.15,
      high_K: 400,
      c0: 25.3,
      c1: 1e-7,
      c2: 0,
      c3: 0,
      enthalpy_J_per_mol: 0,
      entropy_J_per_mol_K: 50.5,
    });
  });

  test('a two-sided temperature makes no piece of no width, and its upper piece starts from the upper side', () => {
    const sided = curve('cr', undefined, {
      knotK: Float64Array.of(200, 298.15, 298.15, 400),
      c0: Float64Array.of(20.1, 0, 26.5),
      c1: new Float64Array(3),
      c2: new Float64Array(3),
      c3: new Float64Array(3),
      enthalpyJPerMol: Float64Array.of(-2000, 0, 125, 3000),
      entropyJPerMolK: Float64Array.of(40, 50, 51, 59),
    });
    const rows = rowsOf(publish([reconciled('oil', { curves: [sided], functions: [] })], settings).artefact.pieces);
    expect(rows.map((row) => [row.low_K, row.high_K, row.c0, row.enthalpy_J_per_mol])).toEqual([
      [200, 298.15, 20.1, -2000],
      [298.15, 400, 26.5, 125],
    ]);
  });

  test('a phase on an isobar is kept apart from its standard state', () => {
    const parts = {
      curves: [curve('g'), curve('g', ISOBAR)],
      functions: [functionRows('g'), functionRows('g', ISOBAR, { heatCapacityJPerMolK: Float64Array.of(1, 2, 3) })],
    };
    const { artefact } = publish([reconciled('steam', parts)], settings);
    expect(rowsOf(artefact.functions).map((row) => [row.isobar_Pa, row.heat_capacity_J_per_mol_K])).toEqual([
      [null, 20.1],
      [null, 25.3],
      [null, 25.300000000000004],
      [101325, 1],
      [101325, 2],
      [101325, 3],
    ]);
    expect(rowsOf(artefact.phases)).toMatchObject([
      { isobar_Pa: null, gas_state: 'ideal', standard_pressure_Pa: 100000, entropy_zero: 'absolute' },
      { isobar_Pa: 101325, gas_state: 'real', standard_pressure_Pa: null, entropy_zero: 'triple-point' },
    ]);
  });

  test('only a gas has a vapour species, and a doubt that names a phase empties its cleared range', () => {
    const doubt = finding('f1', 'oil', { fromPhase: 'cr', toPhase: null });
    const rows = rowsOf(
      publish([reconciled('oil', { findings: [doubt], verdict: 'flagged' })], settings).artefact.phases,
    );
    expect(rows).toMatchObject([
      { phase: 'cr', vapour_species: null, gas_state: null, cleared_from_K: null, measured_from_K: 200 },
      { phase: 'g', vapour_species: 'C4H12O2', vapour_formula_units: 2, cleared_from_K: 200, cleared_to_K: 400 },
    ]);
  });

  test('a stated transition stands beside its crossing, and a crossing that nobody stated stands alone', () => {
    const rows = rowsOf(publish([reconciled('oil')], settings).artefact.transitions);
    expect(rows).toHaveLength(2);
    expect(rows[0]).toMatchObject({
      transition: 1,
      from_phase: 'cr',
      stated_temperature_K: 350.25,
      computed_temperature_K: 350.375,
      difference_K: 0.125,
      transition_enthalpy_J_per_mol: 7010,
      slope_jump_J_per_mol_K: -20.0071,
      outcome: 'agrees',
      evidence: 'arithmetic',
    });
    expect(rows[1]).toMatchObject({
      transition: 2,
      from_phase: 'l',
      gas: 'real',
      order: null,
      stated_temperature_K: null,
      computed_temperature_K: 399.5,
      stable: false,
      outcome: null,
    });
  });

  test('a crossing of condensed phases stands once, though it was found at several pressures', () => {
    const parts = { crossings: [crossing, { ...crossing, pressurePa: 101325 }, unstatedCrossing] };
    const rows = rowsOf(publish([reconciled('oil', parts)], settings).artefact.transitions);
    expect(rows.map((row) => [row.from_phase, row.to_phase, row.pressure_Pa])).toEqual([
      ['cr', 'l', 100000],
      ['l', 'g', 100000],
    ]);
  });

  test('a boiling point stated without a word on the gas is the real one', () => {
    const boiling = { ...judged, stated: { ...stated, from: 'l', to: 'g' }, computedK: 399.5 };
    const rows = rowsOf(publish([reconciled('oil', { judged: [boiling] })], settings).artefact.transitions);
    expect(rows).toHaveLength(2);
    expect(rows[0]).toMatchObject({ to_phase: 'g', gas: null, computed_temperature_K: 399.5 });
    expect(rows[0]!.transition_enthalpy_J_per_mol).toBe(unstatedCrossing.enthalpyJPerMol);
  });

  test('a transition stated the other way round than the curves cross has the signs of its own direction', () => {
    const back = { ...judged, stated: { ...stated, from: 'l', to: 'cr' } };
    const rows = rowsOf(publish([reconciled('oil', { judged: [back] })], settings).artefact.transitions);
    expect(rows[0]).toMatchObject({ transition_enthalpy_J_per_mol: -7010, slope_jump_J_per_mol_K: 20.0071 });
  });

  test('what is withheld is judged in public and published nowhere', () => {
    const fault = finding('f1', 'brine', { severity: 'fault' });
    const withheld = reconciled('brine', {
      verdict: 'withheld',
      findings: [fault],
      suspects: [suspect('f1', 'brine')],
    });
    const { artefact } = publish([withheld, reconciled('oil')], settings);
    const withRows = Object.entries(artefact)
      .filter(([, table]) => rowsOf(table).some((row) => row.substance === 'brine' || row.finding === 'f1'))
      .map(([name]) => name);
    expect(withRows.sort()).toEqual(['coverage', 'evidence', 'findings', 'substances', 'suspects']);
    expect(rowsOf(artefact.substances).map((row) => [row.substance, row.verdict, row.faults])).toEqual([
      ['brine', 'withheld', 1],
      ['oil', 'cleared', 0],
    ]);
  });

  test('findings carry their sentence and their cells; general ones come first; empty text is an empty cell', () => {
    const general = finding('f0', '', {
      address: null,
      evidence: [],
      severity: 'note',
      fromPhase: null,
      toPhase: null,
    });
    const accepted = finding('f1', 'nameless', { accepted: true });
    const { artefact } = publish([reconciled('nameless', { findings: [accepted] })], { sentence, general: [general] });
    const rows = rowsOf(artefact.findings);
    expect(rows.map((row) => row.finding)).toEqual(['f0', 'f1']);
    expect(rows[0]).toMatchObject({ substance: null, source: null, line: null, message: sentence(general) });
    expect(rows[1]).toMatchObject({ line: 3, column: 'Tm, "K"', accepted: true, cause: null });
    expect(rowsOf(artefact.evidence).map((row) => row.printed)).toEqual(['350,25', '58.75\n*']);
    expect(rowsOf(artefact.substances)[0]).toMatchObject({ formula: null, doubts: 0, accepted: 1 });
  });

  test('a suspect says how many cells its hypothesis touches', () => {
    const column = { ...suspect('f1', 'brine'), cells: 14 };
    const cell = { ...suspect('f1', 'brine'), place: 2 };
    const { artefact } = publish([reconciled('brine', { suspects: [column, cell] })], settings);
    expect(rowsOf(artefact.suspects).map(({ place, line, cells }) => [place, line, cells])).toEqual([
      [1, 8, 14],
      [2, 8, 1],
    ]);
  });

  test('provenance tells the stretches of each curve with the step at the join, the anchors and the transitions', () => {
    const rows = rowsOf(publish([reconciled('oil')], settings).artefact.provenance);
    expect(
      rows.map((row) => [row.phase, row.quantity, row.source, row.first_line, row.step_heat_capacity_J_per_mol_K]),
    ).toEqual([
      ['cr', 'heat-capacity', 'desk', 2, null],
      ['cr', 'heat-capacity', 'bench', 4, -0.0125],
      ['g', 'heat-capacity', 'desk', 2, null],
      ['g', 'heat-capacity', 'bench', 4, -0.0125],
      ['cr', 'entropy', 'desk', 2, null],
      ['cr>l', 'transition-temperature', 'desk', 3, null],
      ['cr>l', 'transition-enthalpy', 'desk', 3, null],
    ]);
  });

  test('partitions joined in order are the library published at once', () => {
    const cases = [
      reconciled('a', { findings: [finding('f1', 'a')], suspects: [suspect('f1', 'a')] }),
      reconciled('b', { verdict: 'withheld' }),
      reconciled('c', { curves: [curve('l', ISOBAR)], functions: [functionRows('l', ISOBAR)] }),
    ];
    const whole = publish(cases, settings).artefact;
    const joined = concatTables([
      publish(cases.slice(0, 1), settings).artefact,
      publish([], settings).artefact,
      publish(cases.slice(1), settings).artefact,
    ]);
    for (const name of Object.keys(whole) as (keyof typeof whole)[]) {
      expect(rowsOf(joined[name]), name).toEqual(rowsOf(whole[name]));
      for (const [field, column] of Object.entries(whole[name].columns)) {
        const other = joined[name].columns[field]!;
        if (column.kind === 'text' && other.kind === 'text') expect(other.words, field).toEqual(column.words);
      }
    }
    expect(joined.functions.rows).toBe(9);
  });

  test('inputs stand by source and file whatever order they were read in', () => {
    const input = (source: string, file: string) => ({
      source,
      file,
      bytes: 5_000_000_000,
      sha256: 'a'.repeat(64),
      citation: null,
      licence: 'CC0-1.0',
      basis: null,
    });
    const rows = rowsOf(inputsTable([input('desk', 'b.csv'), input('', 'substances.csv'), input('desk', 'a.csv')]));
    expect(rows.map((row) => [row.source, row.file, row.bytes])).toEqual([
      [null, 'substances.csv', 5e9],
      ['desk', 'a.csv', 5e9],
      ['desk', 'b.csv', 5e9],
    ]);
  });
});
