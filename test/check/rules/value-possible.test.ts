import { describe, expect, it } from 'vitest';
import { examine } from '../../../pipeline/check/check.js';
import { columnOf, rowOf, tableOf } from '../../harmonise/raw.js';
import {
  against,
  CP,
  caseOf,
  checked,
  enthalpyOf,
  entropyOf,
  examined,
  F,
  findingsOf,
  H,
  type Law,
  laws,
  medium,
  rowsOf,
  S,
  settings,
  silent,
  T,
  TR,
  verdictOf,
} from '../medium.js';

function spoilt(row: number, column: number, text: string, basis: 'evaluated' | 'measured' = 'evaluated') {
  const printed = medium(basis);
  printed.tables.cr![row]![column] = text;
  return examined(printed);
}

describe('value-possible', () => {
  it.each([
    ['evaluated', 'arithmetic'],
    ['measured', 'independent'],
  ] as const)('is silent on clean tables and stated numbers (%s)', (basis, evidence) => {
    const clean = examined(medium(basis));
    expect(verdictOf(clean, 'value-possible', 'cr')).toEqual(silent(evidence));
    expect(verdictOf(clean, 'value-possible', '')).toEqual(silent(evidence));
  });

  it.each([
    ['a negative heat capacity', 5, CP, '-47.1', 'heat-capacity'],
    ['a heat capacity of zero far above 0 K', 5, CP, '0.000', 'heat-capacity'],
    ['a heat capacity that no molecule has', 5, CP, '4712345.1', 'heat-capacity'],
    ['a negative absolute entropy', 0, S, '-3.210', 'entropy'],
    ['a negative temperature', 0, T, '-25.00', 'temperature'],
    ['a temperature that no table reaches', 15, T, '60000', 'temperature'],
  ])('finds %s', (_, row, column, text, quantity) => {
    const found = spoilt(row, column, text);
    expect(verdictOf(found, 'value-possible', 'cr')).toEqual(against('fault', 'arithmetic'));
    const [finding] = findingsOf(found, 'value-possible');
    expect(finding!.detail).toMatchObject({ code: 'impossible', quantity, read: text });
    expect(finding!.address).toMatchObject({ file: 'cr.csv', line: row + 2 });
    expect(verdictOf(spoilt(row, column, text, 'measured'), 'value-possible', 'cr')).toEqual(
      against('fault', 'independent'),
    );
  });

  it('says several impossible cells of a column in one finding', () => {
    const printed = medium();
    for (const row of [4, 5, 6]) printed.tables.cr![row]![CP] = '-1.000';
    const found = findingsOf(examined(printed), 'value-possible');
    expect(found).toHaveLength(1);
    expect(found[0]!.evidence.map(({ line }) => line)).toEqual([6, 7, 8]);
  });

  it('takes a row at 0 K for a limit: Cp and S are zero there and -[G - H(Tr)]/T is not printed', () => {
    // Einstein's crystal of three oscillators a formula unit, theta = 150 K.
    const cp = (t: number): number => {
      const x = 150 / t;
      return t < 1 ? 0 : (9 * 8.31446261815324 * x * x * Math.exp(x)) / (Math.exp(x) - 1) ** 2;
    };
    const raw: Law = { parts: [{ fromK: 0, cp }], entropy: 0, enthalpy: 0 };
    const law = { ...raw, entropy: -entropyOf(raw, 0) };
    const printed = medium();
    printed.tables = { cr: rowsOf(law, [0, 4, 10, 20, 40, 60, 80, 100, 150, 200, 250, TR, 300, 350, 400]) };
    expect(printed.tables.cr![0]!.slice(CP, F)).toEqual(['0.000', '0.000']);
    expect(printed.tables.cr![0]![F]).toBe('');
    // So cold that Cp is printed as zero.
    expect(printed.tables.cr![1]![CP]).toBe('0.000');
    expect(Number(printed.tables.cr![0]![H])).toBeCloseTo(enthalpyOf(law, 0) / 1000, 3);
    const { findings } = examined(printed);
    expect(findings).toEqual([]);
  });

  it('asks no sign of an entropy that counts from another zero', () => {
    const printed = medium();
    const { cr } = laws();
    printed.tables = { cr: rowsOf({ ...cr, entropy: -20 }, [TR, 300, 320, 340, 360, 380]) };
    printed.meaning = { entropyZero: 'triple point' };
    printed.anchors = [];
    printed.transitions = [];
    expect(Number(printed.tables.cr![0]![S])).toBe(-20);
    expect(verdictOf(examined(printed), 'value-possible', 'cr')).toEqual(silent('arithmetic'));
  });

  it.each([
    ['T', '-38.834', 'transition-temperature', 'T'],
    ['p', '0', 'pressure', 'p'],
    ['p', '-1', 'pressure', 'p'],
  ] as const)('finds a transition whose %s is %s, and no number breaks over it', (key, text, quantity, column) => {
    const printed = medium();
    printed.transitions[1]![key] = text;
    const found = checked(printed);
    const [finding, ...more] = findingsOf(found, 'value-possible');
    expect(more).toEqual([]);
    expect(finding!.detail).toMatchObject({ code: 'impossible', quantity });
    expect(finding!.address).toMatchObject({ file: 'transitions.csv', line: 3, column });
    for (const { observed, difference, tolerance } of found.findings) {
      for (const value of [observed, difference, tolerance])
        if (value !== null) expect(value).toSatisfy(Number.isFinite);
    }
  });

  it('finds a negative absolute entropy among the anchors', () => {
    const printed = medium();
    printed.anchors[0]!.S = '-75.000';
    const [finding] = findingsOf(examined(printed), 'value-possible');
    expect(finding).toMatchObject({
      severity: 'fault',
      observed: -75,
      address: { file: 'anchors.csv', line: 2, column: 'S298' },
    });
  });

  const vapours = (rows: readonly (readonly [string, string])[]) => {
    const columns = [columnOf('T', 'temperature', 'K'), columnOf('p', 'pressure', 'kPa')];
    const table = tableOf(columns, { holds: 'vapour-pressures', file: 'vapour.csv' });
    return rows.map(([temperature, pressure], i) => rowOf(table, { phase: 'l' }, { temperature, pressure }, i + 2));
  };

  it.each([
    ['a negative pressure', '800.0', '-30.0', 'pressure', 'p', 'Pa', -30_000],
    ['a pressure of zero', '800.0', '0.0', 'pressure', 'p', 'Pa', 0],
    ['a temperature of zero', '0.0', '30.0', 'temperature', 'T', 'K', 0],
    ['a negative temperature', '-25.0', '30.0', 'temperature', 'T', 'K', -25],
    ['a temperature that no vapour reaches', '80000.0', '30.0', 'temperature', 'T', 'K', 80_000],
  ])('finds %s among the vapour pressures', (_, t, p, quantity, column, unit, observed) => {
    const rows = vapours([
      ['850.0', '60.0'],
      [t, p],
    ]);
    const [found] = examine([caseOf(medium(), { vapourPressures: rows })], settings).artefact;
    expect(verdictOf(found!, 'value-possible', '')).toEqual(against('fault', 'arithmetic'));
    const [finding, ...more] = findingsOf(found!, 'value-possible');
    expect(more).toEqual([]);
    expect(finding).toMatchObject({ severity: 'fault', fromPhase: 'l', toPhase: null, observed, unit });
    expect(finding!.address).toEqual({ source: 'desk', file: 'vapour.csv', line: 3, column });
    expect(finding!.detail).toMatchObject({ code: 'impossible', quantity, read: column === 'p' ? p : t });
  });

  it('says several impossible pressures in one finding, and nothing of possible ones', () => {
    const rows = vapours([
      ['700.0', '-5.0'],
      ['750.0', '12.0'],
      ['800.0', '-30.0'],
    ]);
    const [found] = examine([caseOf(medium(), { vapourPressures: rows })], settings).artefact;
    const findings = findingsOf(found!, 'value-possible');
    expect(findings.map(({ evidence }) => evidence.map(({ line, printed }) => [line, printed]))).toEqual([
      [
        [2, '-5.0'],
        [4, '-30.0'],
      ],
    ]);
    const bare = { ...medium(), tables: {}, anchors: [], transitions: [] };
    const [alone] = examine([caseOf(bare, { vapourPressures: vapours([['750.0', '12.0']]) })], settings).artefact;
    expect(verdictOf(alone!, 'value-possible', '')).toEqual(silent('arithmetic'));
    expect(verdictOf(alone!, 'row-readable', '')).toEqual(silent('arithmetic'));
  });

  it('says nothing of stated numbers where none are stated', () => {
    const printed = { ...medium(), anchors: [], transitions: [] };
    expect(examined(printed).outcomes.filter(({ rule, place }) => rule === 'value-possible' && place === '')).toEqual(
      [],
    );
  });
});
