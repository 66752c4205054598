import { describe, expect, it } from 'vitest';
import { readDescriptor } from '../../pipeline/ingest/ingest.js';
import { sourceSchema } from '../../schemas/source.js';
import { brief, COLUMNS, describeSource, read, reading } from './small-source.js';

const TABLE = { file: 'lead.csv', holds: 'thermal-functions', substance: 'lead', phase: 'cr', columns: COLUMNS };

function plansOf(table: object, head: object = {}, files: readonly string[] = ['lead.csv']) {
  return readDescriptor('desk', describeSource(table, head), files);
}

describe('a descriptor', () => {
  it('resolves into one plan for each table of each file', () => {
    const { source, plans, findings } = plansOf(
      { ...TABLE, file: 'lead-*.tsv', skipLines: 1, comment: '#', missing: ['INFINITE', '-'] },
      { citation: 'A. Nobody (1998)', year: 1998, rank: 2, temperatureScale: 'IPTS-68' },
      ['lead-a.tsv', 'lead-b.tsv', 'tin.tsv', 'old/lead-c.tsv'],
    );
    expect(findings).toEqual([]);
    expect(source).toMatchObject({
      id: 'desk',
      title: 'a source',
      citation: 'A. Nobody (1998)',
      year: 1998,
      basis: 'evaluated',
      licence: null,
    });
    expect(plans.map(({ file }) => file)).toEqual(['lead-a.tsv', 'lead-b.tsv']);
    expect(plans[0]).toMatchObject({
      layout: { delimiter: '\t', skipLines: 1, comment: '#', decimal: '.', missing: ['INFINITE', '-'] },
      substance: { constant: 'lead' },
      words: { phase: { constant: 'cr' } },
      meaning: {
        source: 'desk',
        table: '#0',
        rank: 2,
        temperatureScale: 'IPTS-68',
        standardPressurePa: 100000,
        referenceTemperatureK: 298.15,
        isobarPa: null,
      },
    });
    expect(plans[0]!.meaning.columns.map(({ header, is, unit }) => [header, is, unit])).toEqual([
      ['T', 'temperature', 'K'],
      ['Cp', 'heat-capacity', 'J/(mol.K)'],
      ['S', 'entropy', 'J/(mol.K)'],
    ]);
  });

  it('lets every key of the source stand on a table, where it wins', () => {
    const head = {
      rank: 1,
      standardPressure: { value: 1, unit: 'bar' },
      restsOn: ['other'],
      decimal: ',',
      entropyZero: 'absolute',
    };
    const { plans, findings } = plansOf(
      {
        ...TABLE,
        id: 'smoothed',
        rank: 3,
        basis: 'measured',
        standardPressure: { value: 1, unit: 'atm' },
        restsOn: ['series'],
        referenceTemperature: { value: 0, unit: 'Cel' },
      },
      head,
    );
    expect(findings).toEqual([]);
    expect(plans[0]!.meaning).toMatchObject({
      table: 'smoothed',
      rank: 3,
      basis: 'measured',
      standardPressurePa: 101325,
      restsOn: ['series'],
      referenceTemperatureK: 273.15,
      entropyZero: 'absolute',
    });
    expect(plans[0]!.layout).toMatchObject({ decimal: ',', delimiter: ';' });
  });

  it('keeps what a column says of its uncertainty, rank and basis by atom', () => {
    const { plans, findings } = plansOf({
      ...TABLE,
      columns: {
        ...COLUMNS,
        Cp: {
          is: 'heat-capacity',
          unit: '[k]',
          per: 'atom',
          rank: 4,
          uncertainty: { relative: 0.004, coverage: 2, shared: true },
        },
        uS: { is: 'uncertainty', of: 'entropy', unit: 'J/(mol.K)', coverage: 2 },
        '  H-H(Tr)  ': { is: 'enthalpy-increment', unit: 'kJ/mol', from: 0 },
        rest: { is: 'ignored' },
      },
    });
    expect(findings).toEqual([]);
    const [, cp, , us, h, rest] = plans[0]!.meaning.columns;
    expect(cp).toMatchObject({
      per: 'atom',
      rank: 4,
      uncertainty: [{ relative: 0.004, absolute: null, coverage: 2, shared: true }],
    });
    expect(us).toMatchObject({ is: 'uncertainty', of: 'entropy', coverage: 2, shared: false });
    expect(h).toMatchObject({ header: 'H-H(Tr)' });
    expect(rest).toMatchObject({ is: 'ignored', unit: null });
    expect(plans[0]!.meaning.incrementsFromZeroK).toBe(true);
  });

  it('takes theory for a computed source’s temperature scale unless it says otherwise', () => {
    expect(plansOf(TABLE, { basis: 'computed' }).plans[0]!.meaning.temperatureScale).toBe('thermodynamic');
    expect(plansOf(TABLE).plans[0]!.meaning.temperatureScale).toBe('not-stated');
  });

  it('states an isobar by the table’s pressure', () => {
    expect(plansOf({ ...TABLE, pressure: { value: 1, unit: 'atm' } }).plans[0]!.meaning.isobarPa).toBe(101325);
  });

  it('reads names kept as a two-column file', () => {
    const text = describeSource({ ...TABLE, substance: 'Pb', names: 'names.csv' });
    const { plans, findings } = readDescriptor(
      'desk',
      text,
      ['lead.csv', 'names.csv'],
      () => 'name,substance\nPb,lead\n"Sn, white",tin\n',
    );
    expect(findings).toEqual([]);
    expect(plans[0]!.names).toMatchObject({ Pb: 'lead', 'Sn, white': 'tin' });
  });

  it('finds the substance in a file’s name', () => {
    const { plans, findings } = plansOf(
      { ...TABLE, file: 'Sheet-*.csv', substance: { fileName: '^Sheet-(.+)\\.csv$' } },
      {},
      ['Sheet-lead.csv', 'Sheet-tin.csv'],
    );
    expect(findings).toEqual([]);
    expect(plans.map(({ substance }) => substance)).toEqual([{ constant: 'lead' }, { constant: 'tin' }]);
  });

  it('can be checked whole by the published schema too', () => {
    expect(sourceSchema.safeParse(JSON.parse(describeSource(TABLE))).success).toBe(true);
    expect(sourceSchema.safeParse(JSON.parse(describeSource({ ...TABLE, holds: 'anchor' }))).success).toBe(false);
  });
});

describe('a descriptor that cannot be read', () => {
  it('is one finding with the line and the character', () => {
    const { source, plans, findings } = readDescriptor('desk', '{\n  "title": "x"\n  "tables": []\n}', []);
    expect({ source, plans }).toEqual({ source: null, plans: [] });
    expect(brief(findings)).toEqual(['fault - descriptor-unreadable source.json:3 character 3']);
    expect(reading(findings[0])).toMatchObject({ read: '"tables": []', wanted: '"," or "}"' });
  });

  it('names each wrong key with what is known there', () => {
    const { findings } = plansOf({
      ...TABLE,
      subtance: 'lead',
      holds: 'thermal-function',
      columns: { ...COLUMNS, Cp: { is: 'heat-capcity', unit: 'J/(mol.K)' }, S: { is: 'entropy' } },
    });
    expect(brief(findings)).toEqual([
      'fault - descriptor-invalid source.json:7 tables[0].holds',
      'fault - descriptor-invalid source.json:16 tables[0].columns.Cp.is',
      'fault - descriptor-invalid source.json:19 tables[0].columns.S.unit',
      'fault - descriptor-invalid source.json:23 tables[0].subtance',
    ]);
    expect(reading(findings[0])).toMatchObject({ read: '"thermal-function"' });
    expect(reading(findings[0]).wanted).toContain('nearest: thermal-functions');
    expect(reading(findings[1]).wanted).toContain('nearest: heat-capacity');
    expect(reading(findings[2])).toMatchObject({ read: 'nothing', wanted: 'text in double quotes' });
    expect(reading(findings[3]).wanted).toContain('nearest: substance');
    expect(reading(findings[3]).remedy).toContain('line 23');
  });

  it('withholds the substances that its tables touch', () => {
    const files = { 'lead.csv': 'T,Cp,S\n300,26,64\n' };
    const { cases, general } = read(describeSource(TABLE, { basis: 'guessed' }), files);
    expect(brief(general)).toEqual(['fault - descriptor-invalid source.json:3 basis']);
    expect(brief(cases[0]!.findings)).toEqual(['fault lead descriptor-invalid source.json:3 basis']);
    expect(cases[0]!.findings[0]!.cause).toBe(general[0]!.id);
    expect(cases[1]!.findings).toEqual([]);
  });

  it('keeps a broken table from its own substances only', () => {
    const text = JSON.stringify({
      title: 'two',
      basis: 'evaluated',
      tables: [
        TABLE,
        {
          ...TABLE,
          file: 'mixed.csv',
          substance: { column: 'What' },
          columns: { ...COLUMNS, Cp: { is: 'heat-capacity', unit: 'J/K' } },
        },
      ],
    });
    const { cases, general } = read(text, {
      'lead.csv': 'T,Cp,S\n300,26,64\n',
      'mixed.csv': 'What,T,Cp,S\ntin,300,27,51\ntin,400,28,59\n',
    });
    expect(brief(general)).toEqual(['fault - unit-unfit source.json:1 tables[1].columns.Cp.unit']);
    expect(cases[0]!.series).toHaveLength(1);
    expect(cases[0]!.findings).toEqual([]);
    expect(cases[1]!.series).toHaveLength(0);
    expect(brief(cases[1]!.findings)).toEqual(['fault tin unit-unfit source.json:1 tables[1].columns.Cp.unit']);
  });

  it('names an unknown unit and what to write', () => {
    const { findings } = plansOf({ ...TABLE, columns: { ...COLUMNS, S: { is: 'entropy', unit: 'cal/mol/K/x' } } });
    expect(brief(findings)).toEqual(['fault - unit-unknown source.json:21 tables[0].columns.S.unit']);
    expect(reading(findings[0])).toMatchObject({ read: 'cal/mol/K/x' });
    expect(reading(findings[0]).wanted).toContain('cal_th/(mol.K)');
  });

  it('says which quantity, phase or file is missing', () => {
    const { T: _, ...withoutT } = COLUMNS;
    expect(brief(plansOf({ ...TABLE, columns: withoutT }).findings)).toEqual([
      'fault - required-missing source.json:5 tables[0]',
    ]);
    expect(brief(plansOf({ ...TABLE, phase: 'crystal' }).findings)).toEqual([
      'fault - descriptor-invalid source.json:9 tables[0].phase',
    ]);
    const missing = plansOf({ ...TABLE, file: 'laed.csv' });
    expect(brief(missing.findings)).toEqual(['fault - file-missing source.json:6 tables[0].file']);
    expect(reading(missing.findings[0]).wanted).toContain('lead.csv');
    expect(missing.plans[0]).toMatchObject({
      substance: { constant: 'lead' },
      broken: { id: missing.findings[0]!.id },
    });
  });

  it('wants a basis on the source or on the table', () => {
    const text = JSON.stringify({ title: 'x', tables: [TABLE] });
    expect(brief(readDescriptor('desk', text, ['lead.csv']).findings)).toEqual([
      'fault - required-missing source.json:1 tables[0].basis',
    ]);
  });

  it('refuses a quantity said twice', () => {
    const twice = plansOf({ ...TABLE, columns: { ...COLUMNS, S2: { is: 'entropy', unit: 'J/(mol.K)' } } });
    expect(reading(twice.findings[0]).wanted).toContain('stands twice');
    const words = plansOf({ ...TABLE, columns: { ...COLUMNS, P: { is: 'phase' } } });
    expect(reading(words.findings[0]).wanted).toContain('a column holds it already');
  });
});

describe('what is described and not yet read', () => {
  it('is a note for the kinds of tables to come', () => {
    for (const holds of [
      'heat-capacity-equations',
      'volumes',
      'second-virials',
      'vapour-pressure-equations',
      'coexistence',
    ]) {
      const { plans, findings } = plansOf({ file: 'lead.csv', holds, substance: 'lead', columns: { a: { is: 'c1' } } });
      expect(plans).toEqual([]);
      expect(brief(findings)).toEqual(['note - kind-not-yet-read source.json:7 tables[0].holds']);
    }
  });

  it.each([
    [{ widths: [10, 12] }, 'widths'],
    [{ thousands: ',' }, 'thousands'],
    [{ fillDown: ['T'] }, 'fillDown'],
    [{ phase: { inOrder: ['cr', 'l'] } }, 'phase'],
    [{ others: { is: 'heat-capacity', unit: 'J/(mol.K)', header: 'substance' } }, 'others'],
    [{ columns: { ...COLUMNS, T: { is: 'temperature', as: ['reciprocal'], unit: '/kK' } } }, 'columns.T.as'],
    [{ columns: { ...COLUMNS, X: { is: ['from-phase', 'to-phase'], split: '→' } } }, 'columns.X'],
    [
      {
        columns: {
          ...COLUMNS,
          Cp: { is: 'heat-capacity', unit: 'J/(mol.K)', uncertainty: [{ relative: 0.01, below: 20 }] },
        },
      },
      'columns.Cp.uncertainty',
    ],
    [{ file: 'lead.parquet' }, 'file'],
  ])('is refused by name for the layout %j', (more, place) => {
    const { plans, findings } = plansOf({ ...TABLE, ...more }, {}, ['lead.csv', 'lead.parquet']);
    expect(findings.map(({ severity, address }) => [severity, address?.column])).toEqual([
      ['fault', `tables[0].${place}`],
    ]);
    expect(reading(findings[0])).toMatchObject({ problem: 'kind-not-yet-read' });
    expect(plans.every(({ broken }) => broken?.id === findings[0]!.id)).toBe(true);
  });
});
