import { describe, expect, it } from 'vitest';
import { ingest } from '../../pipeline/ingest/ingest.js';
import { NO_CELL } from '../../schemas/raw.js';
import { brief, COLUMNS, describeSource, LEAD, read, reading, TIN } from './small-source.js';

const MORE = {
  ...COLUMNS,
  F: { is: 'gibbs-function', unit: 'J/(mol.K)' },
  H: { is: 'enthalpy-increment', unit: 'kJ/mol' },
};
const TABLE = {
  file: 'a.csv',
  holds: 'thermal-functions',
  substance: { column: 'Name' },
  phase: { column: 'Phase' },
  columns: COLUMNS,
};
const ALONE = { file: 'a.csv', holds: 'thermal-functions', substance: 'lead', phase: 'cr', columns: COLUMNS };

function readTable(table: object, text: string, head: object = {}, corrections?: string) {
  return read(describeSource(table, head), { 'a.csv': text }, [LEAD, TIN], corrections);
}

describe('a table of thermal functions', () => {
  it('becomes columns by substance and phase, in file order, each cell with its line and digits', () => {
    const { cases, general } = readTable(
      TABLE,
      'Name,Phase,T,Cp,S\nlead,cr,298.15,26.65,64.785\nlead,l,600,30.6,93\nlead,cr,300,26.8,64.95\ntin,cr,300,27.1,51.3\nlead,cr,400,27.45,72.8\n',
    );
    expect(general).toEqual([]);
    const [lead, tin] = cases;
    expect(lead!.findings).toEqual([]);
    expect(lead!.series.map(({ phase, rows }) => [phase, rows])).toEqual([
      ['cr', 3],
      ['l', 1],
    ]);
    const [crystal] = lead!.series;
    expect([...crystal!.line]).toEqual([2, 4, 6]);
    const [t, cp, s] = crystal!.columns;
    expect(t).toMatchObject({ is: 'temperature', column: 0, corrected: null });
    expect([...t!.values]).toEqual([298.15, 300, 400]);
    expect([...t!.decimals]).toEqual([2, 0, 0]);
    expect([...cp!.values]).toEqual([26.65, 26.8, 27.45]);
    expect([...cp!.decimals]).toEqual([2, 1, 2]);
    expect(cp!.usualDecimals).toBe(2);
    expect([...s!.values]).toEqual([64.785, 64.95, 72.8]);
    expect(crystal!.text(1, 1)).toBe('26.8');
    expect(crystal!.text(2, 0)).toBe('400');
    expect(crystal!.text(0, 99)).toBe('');
    expect(tin!.series).toHaveLength(1);
  });

  it('keeps a limit row at 0 K, whose −[G − H]/T is infinite or blank', () => {
    for (const infinite of ['INFINITE', '', 'inf', '∞']) {
      const { cases } = readTable(
        { ...ALONE, columns: MORE },
        `T,Cp,S,F,H\n0,0.,0.,${infinite},-6.878\n100,24.426,36.829,87.950,-5.112\n`,
      );
      expect(cases[0]!.findings).toEqual([]);
      const f = cases[0]!.series[0]!.columns.find(({ is }) => is === 'gibbs-function')!;
      expect([...f.values]).toEqual([0, 87.95]);
      expect([...f.decimals]).toEqual([NO_CELL, 3]);
    }
  });

  it('reports an infinity anywhere else', () => {
    const { cases } = readTable(
      { ...ALONE, columns: MORE },
      'T,Cp,S,F,H\n100,24.426,36.829,INFINITE,-5.112\n0,0,inf,inf,1e999\n',
    );
    expect(brief(cases[0]!.findings)).toEqual([
      'fault lead cell-not-finite a.csv:2 F',
      'fault lead cell-not-finite a.csv:3 S',
      'fault lead cell-not-finite a.csv:3 H',
    ]);
  });

  it('takes a declared mark for no value, even one that is a number', () => {
    const { cases } = readTable({ ...ALONE, missing: ['-', '-999'] }, 'T,Cp,S\n300,-,64\n400,-999,72\n500,-999.0,79\n');
    expect(cases[0]!.findings).toEqual([]);
    expect([...cases[0]!.series[0]!.columns[1]!.decimals]).toEqual([NO_CELL, NO_CELL, 1]);
  });

  it('keeps rows printed twice at one temperature, and their notes', () => {
    const { cases } = readTable(
      { ...ALONE, columns: { ...COLUMNS, Note: { is: 'note' } } },
      'T,Cp,S,Note\n1042,83.7,69.1,lambda\n1042,72.0,69.1,\n1100,46,71.9\n',
    );
    const [series] = cases[0]!.series;
    expect(cases[0]!.findings).toEqual([]);
    expect([...series!.columns[0]!.values]).toEqual([1042, 1042, 1100]);
    expect(series!.notes).toEqual(['lambda', '', '']);
  });

  it('runs through several phases with increments from one of them', () => {
    const { cases } = readTable(
      { ...TABLE, columns: MORE, incrementsFrom: 'crystal' },
      'Name,Phase,T,Cp,S,F,H\nlead,crystal,300,26,64,64,0.05\nlead,liquid,700,30,99,75,17.1\n',
      { phases: { crystal: 'cr', liquid: 'l' } },
    );
    expect(cases[0]!.series.map(({ phase, incrementsFrom }) => [phase, incrementsFrom])).toEqual([
      ['cr', 'cr'],
      ['l', 'cr'],
    ]);
  });

  it('is split by a calorimeter’s series, and has its uncertainties beside it', () => {
    const columns = {
      ...COLUMNS,
      Run: { is: 'series' },
      uCp: { is: 'uncertainty', of: 'heat-capacity', unit: 'J/(mol.K)' },
    };
    const { cases } = readTable(
      { ...ALONE, columns },
      'Run,T,Cp,S,uCp\nI,300,26,64,0.2\nII,300,26.1,64,0.3\nI,310,26.2,65,\n',
    );
    const [first, second] = cases[0]!.series;
    expect([first!.series, second!.series]).toEqual(['I', 'II']);
    expect(first!.uncertainties[0]).toMatchObject({ of: 'heat-capacity', column: 4 });
    expect([...first!.uncertainties[0]!.values]).toEqual([0.2, 0]);
    expect([...first!.uncertainties[0]!.decimals]).toEqual([1, NO_CELL]);
    expect(first!.columns.map(({ is }) => is)).toEqual(['temperature', 'heat-capacity', 'entropy']);
  });

  it('counts the rows that `where` leaves out and does not report them', () => {
    const table = { ...ALONE, where: { T: { from: 300, to: 400 }, State: { not: ['x', 'y'] } } };
    const { cases, general, tallies } = readTable(
      table,
      'T,Cp,S,State\n200,a,b,c\n300,26,64,\n350,26,64,x\n400,27,72,z\n500,1,1,\n',
    );
    expect([general, cases[0]!.findings]).toEqual([[], []]);
    expect([...cases[0]!.series[0]!.line]).toEqual([3, 5]);
    expect(tallies).toEqual([{ read: 2, leftOut: 3 }]);
  });

  it('reads decimal commas, tabs, comments, blank lines and trailing delimiters as they come', () => {
    const { cases } = readTable(
      { ...ALONE, decimal: ',', delimiter: '\t', comment: '#' },
      '# head\nT\tCp\tS\r\n\r\n300\t26,65\t−64,785\t\t\r\n# x\n\t\t\n400\t27\t72\r\n',
    );
    expect(cases[0]!.findings).toEqual([]);
    expect([...cases[0]!.series[0]!.columns[1]!.values]).toEqual([26.65, 27]);
    expect([...cases[0]!.series[0]!.columns[2]!.values]).toEqual([-64.785, 72]);
    expect([...cases[0]!.series[0]!.line]).toEqual([4, 7]);
  });

  it('reads cells apart by runs of spaces', () => {
    const { cases } = readTable(
      { ...ALONE, delimiter: 'spaces' },
      '  T   Cp   S\n300   26.65  64.785\n 1000\t30   100\n',
    );
    expect(cases[0]!.findings).toEqual([]);
    expect([...cases[0]!.series[0]!.columns[0]!.values]).toEqual([300, 1000]);
    expect(cases[0]!.series[0]!.text(1, 2)).toBe('100');
  });

  it('reads quoted cells, doubled quotes and line breaks inside them', () => {
    const { cases } = readTable(
      { ...ALONE, columns: { ...COLUMNS, Note: { is: 'note' } } },
      'T,Cp,S,Note\n"300","26.65",64.785,"a ""best"" value, smoothed"\n400,27,72,"two\nlines"\n500,28,79,5" tube\n',
    );
    expect(cases[0]!.findings).toEqual([]);
    expect(cases[0]!.series[0]!.notes).toEqual(['a "best" value, smoothed', 'two\nlines', '5" tube']);
    expect([...cases[0]!.series[0]!.line]).toEqual([2, 3, 5]);
    expect(cases[0]!.series[0]!.text(0, 1)).toBe('26.65');
  });

  it('nests its phase names by substance', () => {
    const { cases } = readTable(TABLE, 'Name,Phase,T,Cp,S\nlead,alpha,300,26,64\ntin,alpha,300,27,51\n', {
      phases: { lead: { alpha: 'cr' }, tin: { alpha: 'cr-white' } },
    });
    expect(cases.map(({ series }) => series[0]!.phase)).toEqual(['cr', 'cr-white']);
  });
});

describe('bad rows', () => {
  it('give one finding a column, with every cell behind it, and leave the other substances alone', () => {
    const { cases } = readTable(
      TABLE,
      'Name,Phase,T,Cp,S\nlead,cr,300,26..5,64\nlead,cr,400,27,7z\nlead,cr,500,2B,79\ntin,cr,300,27,51\n',
    );
    const [lead, tin] = cases;
    expect(brief(lead!.findings)).toEqual([
      'fault lead cell-not-a-number a.csv:2 Cp',
      'fault lead cell-not-a-number a.csv:3 S',
    ]);
    expect(lead!.findings[0]!.evidence.map(({ line, printed }) => [line, printed])).toEqual([
      [2, '26..5'],
      [4, '2B'],
    ]);
    expect(reading(lead!.findings[0]).wanted).toContain('heat-capacity');
    expect([...lead!.series[0]!.columns[1]!.decimals]).toEqual([NO_CELL, 0, NO_CELL]);
    expect(tin!.findings).toEqual([]);
    expect(tin!.series[0]!.rows).toBe(1);
  });

  it('are found when they are too short or too long, and not used', () => {
    const { cases } = readTable(ALONE, 'T,Cp,S\n300,26\n400,27,72\n500,28,79,1\n600,1,234,5\n700,29,84,,\n');
    expect(brief(cases[0]!.findings)).toEqual(['fault lead row-too-short a.csv:2', 'fault lead row-too-long a.csv:4']);
    expect(cases[0]!.findings[1]!.evidence.map(({ line }) => line)).toEqual([4, 5]);
    expect(reading(cases[0]!.findings[0])).toMatchObject({ read: '300,26' });
    expect([...cases[0]!.series[0]!.line]).toEqual([3, 6]);
  });

  it('are found without a temperature', () => {
    const { cases } = readTable({ ...ALONE, missing: ['-'] }, 'T,Cp,S\n,26,64\n-,26,64\n300 K,26,64\n400,27,72\n');
    expect(brief(cases[0]!.findings)).toEqual([
      'fault lead required-missing a.csv:2 T',
      'fault lead cell-not-a-number a.csv:4 T',
    ]);
    expect(cases[0]!.series[0]!.rows).toBe(1);
  });

  it('are found with a phase that nobody knows, once a phase', () => {
    const { cases } = readTable(
      TABLE,
      'Name,Phase,T,Cp,S\nlead,liqiud,300,26,64\nlead,liqiud,400,27,72\nlead,solid,500,28,79\nlead,cr,600,29,84\n',
      { phases: { liquid: 'l' } },
    );
    expect(brief(cases[0]!.findings)).toEqual([
      'fault lead phase-unmapped a.csv:2 Phase',
      'fault lead phase-unmapped a.csv:4 Phase',
    ]);
    expect(cases[0]!.findings[0]!.evidence.map(({ line }) => line)).toEqual([2, 3]);
    expect(reading(cases[0]!.findings[0]).wanted).toContain('nearest: liquid');
    expect(new Set(cases[0]!.findings.map(({ id }) => id)).size).toBe(2);
    expect(cases[0]!.series.map(({ phase }) => phase)).toEqual(['cr']);
  });

  it('keep their finding’s name when lines move', () => {
    const id = (text: string) => readTable(ALONE, text).cases[0]!.findings[0]!;
    const [here, there] = [id('T,Cp,S\n300,x,64\n'), id('T,Cp,S\n200,25,50\n300,x,64\n')];
    expect(here.id).toBe(there.id);
    expect(here.evidenceHash).toBe(there.evidenceHash);
    expect(here.address!.line).not.toBe(there.address!.line);
  });

  it('may be anything at all without a throw', () => {
    const junk = [
      '\u0000\u0001',
      '"',
      '"""',
      ',,,,,,,,',
      'lead',
      'lead,cr',
      '\r\r\n',
      'lead,cr,"300,26,64',
      'tin,g,1e999,−,∞',
      '🙂,🙂,🙂,🙂,🙂',
      'lead,cr,300,26,64',
    ];
    for (let i = 0; i < junk.length; i++) {
      const text = ['Name,Phase,T,Cp,S', ...junk.slice(i), ...junk.slice(0, i)].join('\n');
      const { cases } = readTable(TABLE, text);
      const used = cases.reduce((sum, one) => sum + one.series.reduce((rows, series) => rows + series.rows, 0), 0);
      expect(used).toBeGreaterThanOrEqual(i === 0 ? 1 : 0);
    }
  });
});

describe('a missing column', () => {
  it('withholds each substance that the table touches, with the table’s finding as the cause', () => {
    const { cases, general } = readTable(TABLE, 'Name,Phase,T,S\nlead,cr,300,64\n');
    expect(brief(general)).toEqual(['fault - column-missing a.csv:1 Cp']);
    expect(brief(cases[0]!.findings)).toEqual(['fault lead column-missing a.csv:1 Cp']);
    expect(cases[0]!.findings[0]!.cause).toBe(general[0]!.id);
    expect(cases[0]!.series).toEqual([]);
    expect(cases[1]!.findings).toEqual([]);
  });

  it('that is unknown is a fault too, though the rest is read', () => {
    const { cases } = readTable(ALONE, 'T,Cp,S,Cv\n300,26,64,25\n');
    expect(brief(cases[0]!.findings)).toEqual(['fault lead column-unknown a.csv:1 Cv']);
    expect(cases[0]!.series[0]!.rows).toBe(1);
  });
});

describe('anchors', () => {
  const table = {
    file: 'a.csv',
    holds: 'anchors',
    substance: { column: 'Name' },
    phase: { column: 'Phase' },
    columns: {
      H: { is: 'enthalpy-of-formation', unit: 'kJ/mol' },
      S: COLUMNS.S,
      uS: { is: 'uncertainty', of: 'entropy', unit: 'J/(mol.K)' },
    },
  };

  it('are rows with their phase, cells and uncertainties', () => {
    const { cases, general } = readTable(
      table,
      'Name,Phase,H,S,uS\nlead,cr,0.0,64.785,0.3\nlead,l,4.283,71.710,\nlead,g,,175.37,\n',
    );
    expect(general).toEqual([]);
    const [crystal, liquid, gas] = cases[0]!.anchors;
    expect(crystal).toMatchObject({ line: 2, words: { phase: 'cr' } });
    expect(crystal!.cells.entropy).toEqual({
      column: 1,
      value: 64.785,
      decimals: 3,
      usualDecimals: 3,
      printed: '64.785',
      corrected: false,
      uncertainty: 0.3,
    });
    expect(liquid!.cells['enthalpy-of-formation']).toMatchObject({ value: 4.283, usualDecimals: 3, uncertainty: null });
    expect(gas!.cells['enthalpy-of-formation']).toBeUndefined();
    expect(cases[0]!.findings).toEqual([]);
  });

  it('give a finding for a cell that is no number', () => {
    const { cases } = readTable(table, 'Name,Phase,H,S,uS\nlead,cr,0.0,64.785(30),0.3\n');
    expect(brief(cases[0]!.findings)).toEqual(['fault lead cell-not-a-number a.csv:2 S']);
  });
});

describe('transitions', () => {
  const table = {
    file: 'a.csv',
    holds: 'transitions',
    substance: 'lead',
    columns: {
      Ttr: { is: 'transition-temperature', unit: 'K' },
      dH: { is: 'transition-enthalpy', unit: 'kJ/mol' },
      From: { is: 'from-phase' },
      To: { is: 'to-phase' },
      Kind: { is: 'order' },
      Gas: { is: 'gas' },
    },
    constants: { pressure: { value: 1, unit: 'atm' } },
  };

  it('are rows with both phases, their order, the state of the gas and constants in SI', () => {
    const { cases, general } = readTable(
      table,
      'Ttr,dH,From,To,Kind,Gas\n600.6,4.774,cr,l,,\n2019.022,177.582,l,g,first,Ideal\n400,0.000,am,l,glass,\n1042,,cr,cr,lambda,\n',
    );
    expect(general).toEqual([]);
    expect(cases[0]!.findings).toEqual([]);
    const [melting, boiling, glass, curie] = cases[0]!.transitions;
    expect(melting).toMatchObject({ line: 2, words: { 'from-phase': 'cr', 'to-phase': 'l', order: 'first' } });
    expect(melting!.words.gas).toBeUndefined();
    expect(melting!.printedPhases).toEqual({ from: 'cr', to: 'l' });
    expect(melting!.cells.pressure).toMatchObject({ column: -1, value: 101325, printed: '1 atm', uncertainty: null });
    expect(melting!.cells['transition-temperature']).toMatchObject({
      value: 600.6,
      decimals: 1,
      usualDecimals: 0,
      printed: '600.6',
    });
    expect(boiling!.words).toMatchObject({ order: 'first', gas: 'ideal' });
    expect([glass!.words.order, curie!.words.order]).toEqual(['glass', 'continuous']);
  });

  it('want to know whether a gas is real or ideal, a known order and a temperature', () => {
    const { cases } = readTable(
      table,
      'Ttr,dH,From,To,Kind,Gas\n2019,177,l,g,,\n600,4.7,cr,l,third,\n,4.7,cr,l,,\n600,4.7,cr,l,,perhaps\n',
    );
    expect(brief(cases[0]!.findings)).toEqual([
      'fault lead required-missing a.csv:2 Gas',
      'fault lead required-missing a.csv:3 Kind',
      'fault lead required-missing a.csv:4 Ttr',
    ]);
    expect(cases[0]!.findings[0]!.evidence.map(({ line }) => line)).toEqual([2, 5]);
    expect(cases[0]!.transitions).toEqual([]);
  });

  it('may have both phases as constants', () => {
    const { From: _f, To: _t, ...columns } = table.columns;
    const { cases, general } = readTable(
      { ...table, columns, constants: { 'from-phase': 'cr', 'to-phase': 'l' } },
      'Ttr,dH,Kind,Gas\n600.6,4.774,,\n',
    );
    expect(general).toEqual([]);
    expect(cases[0]!.transitions[0]!.words).toMatchObject({ 'from-phase': 'cr', 'to-phase': 'l' });
  });
});

describe('corrections', () => {
  const entry = {
    file: 'a.csv',
    line: 3,
    column: 'Cp',
    printed: '72.4',
    corrected: '27.40',
    reason: 'digits exchanged',
    who: 'A. Nobody',
    date: '2026-02-03',
  };
  const TEXT = 'T,Cp,S\n300,26.65,64.785\n400,72.4,72.80\n500,28.1,79.05\n';
  const corrected = (...entries: object[]) => readTable(ALONE, TEXT, {}, JSON.stringify(entries));

  it('are laid over the cell, which still tells what was printed', () => {
    const { cases, general } = corrected(entry);
    expect([general, cases[0]!.findings]).toEqual([[], []]);
    const [series] = cases[0]!.series;
    expect([...series!.columns[1]!.values]).toEqual([26.65, 27.4, 28.1]);
    expect([...series!.columns[1]!.decimals]).toEqual([2, 2, 1]);
    expect([...series!.columns[1]!.corrected!]).toEqual([0, 1, 0]);
    expect(series!.columns[2]!.corrected).toBeNull();
    expect(series!.text(1, 1)).toBe('72.4');
  });

  it('withdraw a cell, or a row', () => {
    const cell = corrected({ ...entry, corrected: null }).cases[0]!.series[0]!;
    expect([...cell.columns[1]!.decimals]).toEqual([2, NO_CELL, 1]);
    const row = corrected({ ...entry, column: null, printed: '400,72.4,72.80', corrected: null });
    expect([...row.cases[0]!.series[0]!.line]).toEqual([2, 4]);
    expect(row.cases[0]!.findings).toEqual([]);
  });

  it('that are out of date are not applied, and flag the substance', () => {
    const { cases } = corrected(
      { ...entry, printed: '72.40' },
      { ...entry, line: 4, column: null, printed: 'x', corrected: null },
    );
    expect(brief(cases[0]!.findings)).toEqual([
      'doubt lead correction-out-of-date a.csv:3 Cp',
      'doubt lead correction-out-of-date a.csv:4',
    ]);
    expect(reading(cases[0]!.findings[0])).toMatchObject({ read: '72.4', wanted: '72.40' });
    expect([...cases[0]!.series[0]!.columns[1]!.values]).toEqual([26.65, 72.4, 28.1]);
  });

  it('that meet no row, no column or no file are reported', () => {
    const { general } = corrected(
      { ...entry, line: 9 },
      { ...entry, column: 'Cv' },
      { ...entry, file: 'b.csv' },
      { ...entry, line: 1 },
    );
    expect(brief(general)).toEqual([
      'doubt - correction-out-of-date corrections.json:1 [2].file',
      'doubt - correction-out-of-date a.csv:9 Cp',
      'doubt - correction-out-of-date a.csv:3 Cv',
      'doubt - correction-out-of-date a.csv:1 Cp',
    ]);
  });

  it('that cannot be read are reported and the others applied', () => {
    const { cases, general } = corrected(
      { ...entry, corrected: 27.4 },
      { ...entry, line: 2, printed: '26.65', corrected: '26.66' },
    );
    expect(brief(general)).toEqual(['fault - descriptor-invalid corrections.json:1 [0].corrected']);
    expect([...cases[0]!.series[0]!.columns[1]!.values]).toEqual([26.66, 72.4, 28.1]);
    expect(brief(readTable(ALONE, TEXT, {}, '[{]').general)).toEqual([
      'fault - descriptor-unreadable corrections.json:1 character 3',
    ]);
  });

  it('repair a temperature, a phase and a transition’s cell', () => {
    const phase = readTable(
      TABLE,
      'Name,Phase,T,Cp,S\nlead,c,3OO,26,64\n',
      {},
      JSON.stringify([
        { ...entry, line: 2, column: 'Phase', printed: 'c', corrected: 'cr' },
        { ...entry, line: 2, column: 'T', printed: '3OO', corrected: '300' },
      ]),
    );
    expect(phase.cases[0]!.findings).toEqual([]);
    expect(phase.cases[0]!.series[0]).toMatchObject({ phase: 'cr', rows: 1 });
    const columns = { T: { is: 'transition-temperature', unit: 'K' } };
    const constants = { 'from-phase': 'cr', 'to-phase': 'l' };
    const table = { file: 'a.csv', holds: 'transitions', substance: 'lead', columns, constants };
    const row = readTable(
      table,
      'T\n327.46\n',
      {},
      JSON.stringify([{ ...entry, line: 2, column: 'T', printed: '327.46', corrected: '600.61' }]),
    );
    expect(row.cases[0]!.transitions[0]!.cells['transition-temperature']).toMatchObject({
      value: 600.61,
      printed: '327.46',
      corrected: true,
    });
  });
});

describe('a partition', () => {
  it('gives each substance what the whole gives it', () => {
    const text =
      'Name,Phase,T,Cp,S\nlead,cr,300,26.65,64\nlead,cr,x,26,64\ntin,cr,300,27.1,51\ntin,l,600,28,70\nlead,l,700,30.6,99\n';
    const { cases, parts } = readTable(TABLE, text);
    const alone = [LEAD, TIN].map((one, first) => ingest({ substances: [one], first, parts }).artefact[0]!);
    const plain = (value: unknown) =>
      JSON.parse(JSON.stringify(value, (_, part) => (ArrayBuffer.isView(part) ? [...(part as Int8Array)] : part)));
    expect(plain(alone)).toEqual(plain(cases));
    expect(cases.map(({ findings }) => findings.length)).toEqual([1, 0]);
  });
});
