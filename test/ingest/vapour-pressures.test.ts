import { describe, expect, it } from 'vitest';
import { brief, describeSource, LEAD, read, reading, TIN } from './small-source.js';

const TABLE = {
  file: 'a.csv',
  holds: 'vapour-pressures',
  substance: { column: 'Name' },
  phase: { column: 'Phase' },
  columns: {
    t: { is: 'temperature', unit: 'Cel' },
    p: { is: 'pressure', unit: 'mm[Hg]' },
    up: { is: 'uncertainty', of: 'pressure', unit: '%' },
    Note: { is: 'note' },
  },
};
const HEADER = 'Name,Phase,t,p,up,Note\n';

function readTable(table: object, text: string, head: object = {}, corrections?: string) {
  return read(describeSource(table, head), { 'a.csv': text }, [LEAD, TIN], corrections);
}

describe('a table of vapour pressures', () => {
  it('becomes rows by substance, with their condensed phase, cells, uncertainties and notes', () => {
    const { cases, general } = readTable(
      TABLE,
      `${HEADER}lead,l,1162.0,10.00,1.5,smoothed\ntin,l,1703,10.0,,\nlead,l,1309,40.0,,\nlead,cr,300,1.2e-9,50,\n`,
    );
    expect(general).toEqual([]);
    const [lead, tin] = cases;
    expect([lead!.findings, tin!.findings]).toEqual([[], []]);
    expect(lead!.vapourPressures.map(({ line, words }) => [line, words.phase, words.note])).toEqual([
      [2, 'l', 'smoothed'],
      [4, 'l', ''],
      [5, 'cr', ''],
    ]);
    expect(lead!.vapourPressures[0]!.cells).toEqual({
      temperature: {
        column: 0,
        value: 1162,
        decimals: 1,
        usualDecimals: 0,
        printed: '1162.0',
        corrected: false,
        uncertainty: null,
      },
      pressure: {
        column: 1,
        value: 10,
        decimals: 2,
        usualDecimals: 1,
        printed: '10.00',
        corrected: false,
        uncertainty: 1.5,
      },
    });
    expect(lead!.vapourPressures[2]!.cells.pressure).toMatchObject({ value: 1.2e-9, decimals: 10, uncertainty: 50 });
    expect(tin!.vapourPressures).toHaveLength(1);
    expect([lead!.series, lead!.anchors, lead!.transitions]).toEqual([[], [], []]);
  });

  it('may have substance, phase and one of the two numbers as constants', () => {
    const columns = { t: TABLE.columns.t };
    const constant = { file: 'a.csv', holds: 'vapour-pressures', substance: 'lead', phase: 'l', columns };
    for (const more of [
      { pressure: { value: 1, unit: 'atm' } },
      { constants: { pressure: { value: 1, unit: 'atm' } } },
    ]) {
      const { cases, general, parts } = readTable({ ...constant, ...more }, 't\n1749\n');
      expect([...general, ...cases[0]!.findings]).toEqual([]);
      const [row] = cases[0]!.vapourPressures;
      expect(row!.cells.pressure).toMatchObject({ column: -1, value: 101325, printed: '1 atm' });
      expect(row!.cells.temperature).toMatchObject({ column: 0, value: 1749 });
      // The pressure of its rows, not an isobar of the real substance.
      expect(parts[0]!.plan.meaning.isobarPa).toBeNull();
    }
  });

  it('maps names and phases, keeps rows by "where", and reads decimal commas, thin spaces and minus signs', () => {
    const { cases, general, tallies } = readTable(
      {
        ...TABLE,
        decimal: ',',
        delimiter: ';',
        names: { Pb: 'lead' },
        phases: { liq: 'l' },
        where: { t: { from: -50 } },
      },
      `${HEADER.replaceAll(',', ';')}Pb;liq;−20,5;1\u2009013,25;;\nPb;liq;−90;1,0;;\n`,
    );
    expect([...general, ...cases[0]!.findings]).toEqual([]);
    expect(cases[0]!.vapourPressures.map(({ cells }) => [cells.temperature!.value, cells.pressure!.value])).toEqual([
      [-20.5, 1013.25],
    ]);
    expect(tallies).toEqual([{ read: 1, leftOut: 1 }]);
  });

  it('is corrected like any other: the cell still tells what was printed, a withdrawn cell or row is gone', () => {
    const entry = { file: 'a.csv', reason: 'misprint', who: 'A. Nobody', date: '2026-02-03' };
    const entries = [
      { ...entry, line: 2, column: 'p', printed: '01.0', corrected: '10.0' },
      { ...entry, line: 3, column: 't', printed: '1209', corrected: '1309' },
      { ...entry, line: 4, column: 'p', printed: '99', corrected: null },
      { ...entry, line: 5, column: null, printed: 'lead,l,1500,x,,', corrected: null },
    ];
    const { cases, general } = readTable(
      TABLE,
      `${HEADER}lead,l,1162,01.0,,\nlead,l,1209,40.0,,\nlead,l,1400,99,,\nlead,l,1500,x,,\n`,
      {},
      JSON.stringify(entries),
    );
    expect([...general, ...cases[0]!.findings]).toEqual([]);
    const rows = cases[0]!.vapourPressures;
    expect(rows.map(({ line }) => line)).toEqual([2, 3]);
    expect(rows[0]!.cells.pressure).toMatchObject({ value: 10, decimals: 1, printed: '01.0', corrected: true });
    expect(rows[0]!.cells.temperature!.corrected).toBe(false);
    expect(rows[1]!.cells.temperature).toMatchObject({ value: 1309, printed: '1209', corrected: true });
  });

  it('flags the substance where a correction is out of date', () => {
    const entry = { file: 'a.csv', line: 2, column: 'p', printed: '11', corrected: '12', reason: 'r', who: 'w' };
    const { cases } = readTable(
      TABLE,
      `${HEADER}lead,l,1162,10,,\n`,
      {},
      JSON.stringify([{ ...entry, date: '2026-02-03' }]),
    );
    expect(brief(cases[0]!.findings)).toEqual(['doubt lead correction-out-of-date a.csv:2 p']);
    expect(cases[0]!.vapourPressures[0]!.cells.pressure).toMatchObject({ value: 10, corrected: false });
  });
});

describe('bad vapour pressures', () => {
  it.each([
    ['a pressure that is no number', 'lead,l,1162,ten,,', 'fault lead cell-not-a-number a.csv:3 p', 'ten'],
    ['a temperature that is no number', 'lead,l,116 2°,10,,', 'fault lead cell-not-a-number a.csv:3 t', '116 2°'],
    ['an infinite pressure', 'lead,l,1162,inf,,', 'fault lead cell-not-finite a.csv:3 p', 'inf'],
    ['a pressure that is missing', 'lead,l,1162,,,', 'fault lead required-missing a.csv:3 p', ''],
    ['a temperature that is missing', 'lead,l,,10,,', 'fault lead required-missing a.csv:3 t', ''],
    ['an uncertainty that is no number', 'lead,l,1162,10,few,', 'fault lead cell-not-a-number a.csv:3 up', 'few'],
    ['a phase that is not known', 'lead,molten,1162,10,,', 'fault lead phase-unmapped a.csv:3 Phase', 'molten'],
    ['a gas instead of what it stands over', 'lead,g,1162,10,,', 'fault lead required-missing a.csv:3 Phase', 'g'],
    ['a row that is cut short', 'lead,l,1162', 'fault lead row-too-short a.csv:3', 'lead,l,1162'],
    ['a row that is too long', 'lead,l,1162,10,,,7', 'fault lead row-too-long a.csv:3', 'lead,l,1162,10,,,7'],
  ])('are told by file, line and column with the text as read: %s', (what, row, told, text) => {
    const { cases } = readTable(TABLE, `${HEADER}lead,l,1100,5,,\n${row}\nlead,l,1309,40,,\ntin,l,1703,10,,\n`);
    expect(brief(cases[0]!.findings)).toEqual([told]);
    const { read: found, wanted, remedy } = reading(cases[0]!.findings[0]);
    expect(found).toBe(text);
    expect(wanted).not.toBe('');
    expect(remedy).not.toBe('');
    // The other rows go on; only an uncertainty may lack in the row itself.
    const kept = what.startsWith('an uncertainty') ? [2, 3, 4] : [2, 4];
    expect(cases[0]!.vapourPressures.map(({ line }) => line)).toEqual(kept);
    expect(brief(cases[1]!.findings)).toEqual([]);
    expect(cases[1]!.vapourPressures).toHaveLength(1);
  });

  it('say both cells of a row where both are missing, and several rows in one finding', () => {
    const { cases } = readTable({ ...TABLE, missing: ['-'] }, `${HEADER}lead,l,-,-,,\nlead,l,1162,-,,\n\n`);
    expect(brief(cases[0]!.findings)).toEqual([
      'fault lead required-missing a.csv:2 t',
      'fault lead required-missing a.csv:2 p',
    ]);
    expect(cases[0]!.findings[1]!.evidence.map(({ line }) => line)).toEqual([2, 3]);
    expect(reading(cases[0]!.findings[1]).wanted).toBe('a pressure in every row');
  });

  it('of a name that is not known belong to nobody and are told once', () => {
    const { cases, general } = readTable(TABLE, `${HEADER}lede,l,1162,10,,\nlede,l,1309,40,,\n`);
    expect(brief(general)).toEqual(['fault - name-unmapped a.csv:2 Name']);
    expect(cases[0]!.vapourPressures).toEqual([]);
  });

  it('in a file without the column, or with one that nobody names, withhold the substances of the table', () => {
    const missing = readTable(TABLE, 'Name,Phase,t,up,Note\nlead,l,1162,,\n');
    expect(brief(missing.cases[0]!.findings)).toEqual(['fault lead column-missing a.csv:1 p']);
    const unknown = readTable(TABLE, 'Name,Phase,t,p,up,Note,dHvap\nlead,l,1162,10,,,178\n');
    expect(brief(unknown.cases[0]!.findings)).toEqual(['fault lead column-unknown a.csv:1 dHvap']);
    expect(unknown.cases[0]!.vapourPressures).toHaveLength(1);
  });
});

describe('a descriptor of vapour pressures', () => {
  const CONSTANT = {
    file: 'a.csv',
    holds: 'vapour-pressures',
    substance: 'lead',
    phase: 'l',
    columns: { t: TABLE.columns.t, p: TABLE.columns.p },
  };
  const faultsOf = (table: object) => readTable(table, 't,p\n1162,10\n').general;

  it('wants the two numbers, a substance and a phase, each said once', () => {
    const { p: _p, ...onlyT } = CONSTANT.columns;
    const { t: _t, ...onlyP } = CONSTANT.columns;
    for (const [columns, quantity] of [
      [onlyT, 'pressure'],
      [onlyP, 'temperature'],
    ] as const) {
      const findings = faultsOf({ ...CONSTANT, columns });
      expect(brief(findings)).toEqual([expect.stringContaining('required-missing source.json')]);
      expect(reading(findings[0]).wanted).toBe(`"${quantity}" in a table of vapour-pressures`);
    }
    const { phase: _phase, ...noPhase } = CONSTANT;
    expect(reading(faultsOf(noPhase)[0]).wanted).toBe('"phase" in a table of vapour-pressures');
    const twice = faultsOf({ ...CONSTANT, constants: { pressure: { value: 1, unit: 'bar' } } });
    expect(reading(twice[0]).wanted).toContain('a column holds it already');
  });

  it('refuses the gas as its phase, by its own name or through the map', () => {
    for (const more of [{ phase: 'g' }, { phase: 'vap', phases: { vap: 'g' } }]) {
      const findings = faultsOf({ ...CONSTANT, ...more });
      expect(findings.map(({ severity, address }) => [severity, address?.column])).toEqual([
        ['fault', 'tables[0].phase'],
      ]);
      expect(reading(findings[0]).wanted).toContain('the condensed phase');
    }
    const nested = readTable({ ...CONSTANT, phase: 'vap', phases: { lead: { vap: 'g' } } }, 't,p\n1162,10\n');
    expect(brief(nested.cases[0]!.findings)).toEqual(['fault lead required-missing a.csv:2 phase']);
    expect(nested.cases[0]!.vapourPressures).toEqual([]);
  });

  it('knows every pressure unit and names the nearest codes for what is none', () => {
    for (const unit of ['Pa', 'hPa', 'kPa', 'MPa', 'mbar', 'bar', 'atm', 'att', 'mm[Hg]', "[in_i'Hg]", '[psi]'])
      expect(faultsOf({ ...CONSTANT, columns: { ...CONSTANT.columns, p: { is: 'pressure', unit } } })).toEqual([]);
    for (const [unit, problem, nearest] of [
      ['torr', 'unit-unknown', 'mm[Hg]'],
      ['mmHg', 'unit-unknown', 'mm[Hg]'],
      ['J/mol', 'unit-unfit', 'Pa'],
    ]) {
      const findings = faultsOf({ ...CONSTANT, columns: { ...CONSTANT.columns, p: { is: 'pressure', unit } } });
      expect(findings.map(({ address }) => address?.column)).toEqual(['tables[0].columns.p.unit']);
      expect(reading(findings[0])).toMatchObject({ problem, read: unit });
      expect(reading(findings[0]).wanted).toContain(nearest);
    }
  });

  it('refuses quantities that such a table does not hold', () => {
    const columns = { ...CONSTANT.columns, S: { is: 'entropy', unit: 'J/(mol.K)' } };
    expect(reading(faultsOf({ ...CONSTANT, columns })[0]).wanted).toContain(
      'for vapour-pressures: temperature, pressure',
    );
  });
});
