import { describe, expect, it } from 'vitest';
import {
  addRunBytes,
  indexRows,
  type RowIndex,
  readDescriptor,
  selectRuns,
  type TablePlan,
} from '../../pipeline/ingest/ingest.js';
import { NO_CELL } from '../../schemas/raw.js';
import { brief, COLUMNS, describeSource, encode, LEAD, reading, substance, TIN } from './small-source.js';

const BOTH = [LEAD, TIN];

function planOf(table: object, head: object = {}): TablePlan {
  const text = describeSource(
    {
      file: 'a.csv',
      holds: 'thermal-functions',
      phase: 'cr',
      substance: { column: 'Name' },
      columns: COLUMNS,
      ...table,
    },
    head,
  );
  const { plans, findings } = readDescriptor('desk', text, ['a.csv']);
  expect(findings).toEqual([]);
  return plans[0]!;
}

function stretches({ runs }: RowIndex, text: string): [number, number, string][] {
  const bytes = encode(text);
  return Array.from({ length: runs.count }, (_, i) => [
    runs.substance[i]!,
    runs.firstLine[i]!,
    new TextDecoder().decode(bytes.subarray(runs.byteStart[i]!, runs.byteEnd[i]!)),
  ]);
}

describe('the index of a table', () => {
  it('gives one run for each stretch of lines with one name', () => {
    const text = 'Name,T,Cp,S\nlead,300,26,64\nlead,400,27,72\ntin,300,27,51\nlead,500,28,79';
    const index = indexRows(planOf({}), encode(text), BOTH);
    expect(index.findings).toEqual([]);
    expect(stretches(index, text)).toEqual([
      [0, 2, 'lead,300,26,64\nlead,400,27,72\n'],
      [1, 4, 'tin,300,27,51\n'],
      [0, 5, 'lead,500,28,79'],
    ]);
  });

  it('is the same by the quick pass and by the careful one', () => {
    const rows = [
      'lead,300,26,64',
      '',
      '# a comment, tin',
      'lead,400,27,72',
      ',,,',
      'tin,300,27,51',
      'tin2,1,1,1',
      'tin,400,28,59',
      'lead,1,1,1',
      'leads,1,1,1',
      'lead,2,2,2',
    ];
    for (const end of ['\n', '\r\n', '\r']) {
      const text = `Name,T,Cp,S${end}${rows.join(end)}${end}`;
      const quick = indexRows(planOf({ comment: '#' }), encode(text), BOTH);
      const careful = indexRows(planOf({ comment: '#', where: { T: { from: 0 } } }), encode(text), BOTH);
      expect(stretches(quick, text).map(([place, line]) => [place, line])).toEqual([
        [0, 2],
        [1, 7],
        [1, 9],
        [0, 10],
        [0, 12],
      ]);
      expect(stretches(careful, text)).toEqual(stretches(quick, text));
      expect(brief(careful.findings)).toEqual(brief(quick.findings));
    }
  });

  it('counts lines through quoted line breaks and keeps quoted delimiters together', () => {
    const text = 'Name,T,Cp,S,Note\n"lead",300,26,64,"first\nsecond, third"\ntin,300,27,51,\n';
    const index = indexRows(planOf({ columns: { ...COLUMNS, Note: { is: 'note' } } }), encode(text), BOTH);
    expect(stretches(index, text)).toEqual([
      [0, 2, '"lead",300,26,64,"first\nsecond, third"\n'],
      [1, 4, 'tin,300,27,51,\n'],
    ]);
  });

  it('takes the whole table for one run where the substance is constant', () => {
    const text = 'by hand\n\nT,Cp,S\n300,26,64\n400,27,72\n';
    const index = indexRows(planOf({ substance: 'lead', skipLines: 1 }), encode(text), BOTH);
    expect(stretches(index, text)).toEqual([[0, 4, '300,26,64\n400,27,72\n']]);
  });

  it('reports a name that nobody knows once, with its first line, its rows and the nearest ids', () => {
    const text = 'Name,T,Cp,S\nlaed,300,26,64\nlaed,400,27,72\ntin,300,27,51\nlaed,500,28,79\n';
    const index = indexRows(planOf({}), encode(text), BOTH);
    expect(stretches(index, text).map(([place]) => place)).toEqual([1]);
    expect(brief(index.findings)).toEqual(['fault - name-unmapped a.csv:2 Name']);
    expect(reading(index.findings[0])).toMatchObject({ read: 'laed' });
    expect(reading(index.findings[0]).wanted).toContain('3 rows');
    expect(reading(index.findings[0]).wanted).toContain('nearest: lead');
  });

  it('knows a substance by the source’s names, and reports a name that leads nowhere', () => {
    const text = 'Name,T,Cp,S\nPb,300,26,64\nSn,300,27,51\n';
    const index = indexRows(planOf({ names: { Pb: 'lead', Sn: 'tinn' } }), encode(text), BOTH);
    expect(stretches(index, text).map(([place]) => place)).toEqual([0]);
    expect(brief(index.findings)).toEqual(['fault - substance-unknown a.csv:3 Name']);
    expect(reading(index.findings[0]).wanted).toContain('"tinn"');
    expect(reading(index.findings[0]).wanted).toContain('nearest: tin');
  });

  it('finds the nearest id by name or formula too', () => {
    const index = indexRows(planOf({}), encode('Name,T,Cp,S\nSn\n'), [substance('grey-metal', { formula: 'Sn' })]);
    expect(reading(index.findings[0]).wanted).toContain('nearest: grey-metal');
  });

  it('does not ask for names in rows that `where` leaves out', () => {
    const text = 'Name,T,Cp,S,State\nlead,300,26,64,s\nargon,300,20,154,g\n';
    const columns = { ...COLUMNS, State: { is: 'ignored' } };
    expect(brief(indexRows(planOf({ columns, where: { State: { not: 'g' } } }), encode(text), BOTH).findings)).toEqual(
      [],
    );
    expect(brief(indexRows(planOf({ columns }), encode(text), BOTH).findings)).toEqual([
      'fault - name-unmapped a.csv:3 Name',
    ]);
  });

  it('names a missing column and the nearest that is there', () => {
    const index = indexRows(planOf({}), encode('note\nName,T,CP,S\nlead,300,26,64\n'), BOTH);
    expect(brief(index.findings)[0]).toBe('fault - column-missing a.csv:1 T');
    const other = indexRows(planOf({ skipLines: 1 }), encode('note\nName,T,CP,S\nlead,300,26,64\n'), BOTH);
    expect(brief(other.findings)).toEqual(['fault - column-missing a.csv:2 Cp']);
    expect(reading(other.findings[0])).toMatchObject({ read: 'Name | T | CP | S' });
    expect(reading(other.findings[0]).wanted).toContain('nearest: CP');
    expect(other.broken?.id).toBe(other.findings[0]!.id);
    expect(other.runs.count).toBe(1);
  });

  it('names a column that nobody knows, unless the others are to be ignored', () => {
    const text = 'Name,T,Cp,S,Cv\nlead,300,26,64,25\n';
    const index = indexRows(planOf({}), encode(text), BOTH);
    expect(brief(index.findings)).toEqual(['fault - column-unknown a.csv:1 Cv']);
    expect(reading(index.findings[0]).wanted).toContain('nearest: Cp');
    expect(index.broken).toBeNull();
    expect(index.flaws).toHaveLength(1);
    expect(indexRows(planOf({ others: 'ignored' }), encode(text), BOTH).findings).toEqual([]);
  });

  it('lets another table of the source name the other columns of a file', () => {
    const text = JSON.stringify({
      title: 'x',
      basis: 'evaluated',
      tables: [
        {
          file: 'a.csv',
          holds: 'thermal-functions',
          substance: 'lead',
          phase: 'cr',
          columns: { T: COLUMNS.T, Cp: COLUMNS.Cp },
        },
        {
          file: 'a.csv',
          holds: 'thermal-functions',
          substance: 'lead',
          phase: 'l',
          columns: { T: COLUMNS.T, Cpl: COLUMNS.Cp },
        },
      ],
    });
    const { plans } = readDescriptor('desk', text, ['a.csv']);
    const index = (file: string) => plans.map((plan) => brief(indexRows(plan, encode(file), BOTH).findings));
    expect(index('T,Cp,Cpl\n300,1,2\n')).toEqual([[], []]);
    expect(index('T,Cp,Cpl,Cpg\n300,1,2,3\n')[0]).toEqual(['fault - column-unknown a.csv:1 Cpg']);
  });

  it('reads columns by their place where there is no header, or where a header stands twice', () => {
    const columns = { '#2': COLUMNS.T, '#3': COLUMNS.Cp };
    const bare = indexRows(
      planOf({ substance: { column: '#1' }, headerless: true, columns }),
      encode('lead,300,26\nlead,400,27\n'),
      BOTH,
    );
    expect(bare.findings).toEqual([]);
    expect([...bare.cellAt]).toEqual([1, 2, 0]);
    expect(bare.runs.firstLine[0]).toBe(1);
    const twice = indexRows(planOf({}), encode('Name,T,Cp,S,S\nlead,300,26,64,65\n'), BOTH);
    expect(reading(twice.findings[0]).read).toBe('"S" twice');
  });

  it('an empty file lacks its header line', () => {
    const index = indexRows(planOf({}), encode(''), BOTH);
    expect(reading(index.findings[0])).toMatchObject({
      problem: 'column-missing',
      read: 'nothing: the file ends before a header line',
    });
    expect(index.runs.count).toBe(0);
  });
});

describe('usual decimals of a row table', () => {
  const plan = (): TablePlan => {
    const text = describeSource({
      file: 'a.csv',
      holds: 'anchors',
      phase: 'cr',
      substance: { column: 'Name' },
      columns: { H: { is: 'enthalpy-of-formation', unit: 'kJ/mol' }, S: COLUMNS.S },
    });
    return readDescriptor('desk', text, ['a.csv']).plans[0]!;
  };

  it('are those that more than half of the cells print, over the whole file, zeros aside', () => {
    const rows = ['lead,0.,64.785', 'tin,-2.03,51.2', 'lead,4.28,71.71', 'tin,7,60.1', 'lead,0.000,1.1'];
    const index = indexRows(plan(), encode(`Name,H,S\n${rows.join('\n')}\n`), BOTH);
    expect([...index.usualDecimals]).toEqual([2, 1, NO_CELL]);
  });

  it('of a column that holds nothing are no number', () => {
    expect([...indexRows(plan(), encode('Name,H,S\nlead,,64.785\n'), BOTH).usualDecimals]).toEqual([
      NO_CELL,
      3,
      NO_CELL,
    ]);
  });
});

describe('runs of a partition', () => {
  it('are those of its substances, and their bytes can be summed', () => {
    const index = indexRows(planOf({}), encode('Name,T,Cp,S\nlead,300,26,64\ntin,300,27,51\nlead,500,28,79\n'), BOTH);
    expect([...selectRuns(index, 1, 2).runs.substance]).toEqual([1]);
    expect([...selectRuns(index, 0, 1).runs.firstLine]).toEqual([2, 4]);
    const bytesOf = new Float64Array(2);
    addRunBytes(index, bytesOf);
    expect([...bytesOf]).toEqual([30, 14]);
  });
});
