import { createHash } from 'node:crypto';
import { mkdirSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { dirname, join } from 'node:path';
import { gzipSync } from 'node:zlib';
import { afterEach, describe, expect, it } from 'vitest';
import { ingest } from '../../pipeline/ingest/ingest.js';
import { readSources, type Sources } from '../../pipeline/shell/sources.js';
import { toUtf8 } from '../../pipeline/shell/sources-encoding.js';
import type { Finding } from '../../schemas/finding.js';

const folders: string[] = [];
afterEach(() => {
  for (const folder of folders.splice(0)) rmSync(folder, { recursive: true, force: true });
});

function folderOf(files: Readonly<Record<string, string | Uint8Array>>): string {
  const folder = mkdtempSync(join(tmpdir(), 'sources-'));
  folders.push(folder);
  for (const [file, content] of Object.entries(files)) {
    mkdirSync(dirname(join(folder, file)), { recursive: true });
    writeFileSync(join(folder, file), content);
  }
  return folder;
}

const SUBSTANCES = 'substance,name,formula\nlead,Lead,Pb\ntin,Tin,Sn\n';
const describeTable = (file: string, more: object = {}): string =>
  JSON.stringify({
    title: 'Desk tables',
    citation: 'The desk (1998)',
    licence: 'free',
    basis: 'measured',
    tables: [
      {
        file,
        holds: 'thermal-functions',
        substance: 'lead',
        phase: 'cr',
        columns: { T: { is: 'temperature', unit: 'K' }, Cp: { is: 'heat-capacity', unit: 'J/(mol.K)' } },
        ...more,
      },
    ],
  });
const TABLE = 'T,Cp\n300,26.65\n400,27.40\n';

const brief = (findings: readonly Finding[]): string[] =>
  findings.map(
    ({ detail, address, severity }) =>
      `${severity} ${detail.code === 'reading' ? detail.problem : ''} ${address?.source}/${address?.file}`,
  );

function heatCapacities({ substances, parts }: Sources): number[] {
  return ingest({ substances, parts }).artefact.flatMap(({ series }) =>
    series.flatMap(({ columns }) => [...columns[1]!.values]),
  );
}

describe('a folder of sources', () => {
  it('is read whole: substances, descriptors, tables, corrections, acceptances, policy', () => {
    const accepted = [
      {
        finding: '0123456789abcdef',
        evidenceHash: 'fedcba9876543210',
        reason: 'known',
        by: 'A. Nobody',
        date: '2026-01-01',
        until: '2026-12-31',
      },
    ];
    const corrections = [
      {
        file: 'a.csv',
        line: 3,
        column: 'Cp',
        printed: '27.40',
        corrected: '27.41',
        reason: 'x',
        who: 'y',
        date: '2026-01-01',
      },
    ];
    const sources = readSources(
      folderOf({
        'substances.csv': SUBSTANCES,
        'policy.json': '{}',
        'accepted.json': JSON.stringify(accepted),
        'README.md': 'not a source',
        'desk/source.json': describeTable('a.csv'),
        'desk/a.csv': TABLE,
        'desk/corrections.json': JSON.stringify(corrections),
        'desk/unused.txt': 'x',
      }),
    );
    expect(sources.findings).toEqual([]);
    expect(sources.substances.map(({ id }) => id)).toEqual(['lead', 'tin']);
    expect(sources.accepted).toEqual(accepted);
    expect(sources.sources).toMatchObject([{ id: 'desk', citation: 'The desk (1998)' }]);
    expect(heatCapacities(sources)).toEqual([26.65, 27.41]);
    expect(sources.inputs.map(({ source, file }) => `${source}/${file}`)).toEqual([
      '/substances.csv',
      '/accepted.json',
      '/policy.json',
      'desk/source.json',
      'desk/corrections.json',
      'desk/a.csv',
    ]);
    expect(sources.inputs.at(-1)).toEqual({
      source: 'desk',
      file: 'a.csv',
      bytes: TABLE.length,
      sha256: createHash('sha256').update(TABLE).digest('hex'),
      citation: 'The desk (1998)',
      licence: 'free',
      basis: 'measured',
    });
  });

  it('shares the bytes of its tables with workers', () => {
    const { parts } = readSources(
      folderOf({ 'substances.csv': SUBSTANCES, 'desk/source.json': describeTable('a.csv'), 'desk/a.csv': TABLE }),
    );
    expect(parts[0]!.bytes.buffer).toBeInstanceOf(SharedArrayBuffer);
    expect(structuredClone(parts[0]!.plan)).toEqual(parts[0]!.plan);
  });

  it('unpacks gzip and hashes what was received', () => {
    const packed = gzipSync(TABLE);
    const sources = readSources(
      folderOf({
        'substances.csv': SUBSTANCES,
        'desk/source.json': describeTable('tables/*.csv.gz'),
        'desk/tables/a.csv.gz': packed,
      }),
    );
    expect(sources.findings).toEqual([]);
    expect(heatCapacities(sources)).toEqual([26.65, 27.4]);
    expect(sources.inputs.at(-1)).toMatchObject({
      file: 'tables/a.csv.gz',
      bytes: packed.length,
      sha256: createHash('sha256').update(packed).digest('hex'),
    });
    expect(sources.parts[0]!.bytes.buffer).toBeInstanceOf(SharedArrayBuffer);
  });

  it('reports a damaged gzip and withholds what it held', () => {
    const sources = readSources(
      folderOf({
        'substances.csv': SUBSTANCES,
        'desk/source.json': describeTable('a.csv.gz'),
        'desk/a.csv.gz': 'no gzip',
      }),
    );
    expect(brief(sources.findings)).toEqual(['fault file-unreadable desk/a.csv.gz']);
    const [lead, tin] = ingest({ substances: sources.substances, parts: sources.parts }).artefact;
    expect(brief(lead!.findings)).toEqual(['fault file-unreadable desk/a.csv.gz']);
    expect(lead!.findings[0]!.cause).toBe(sources.findings[0]!.id);
    expect(tin!.findings).toEqual([]);
  });

  it('converts UTF-16 and Latin-1 and says so, and passes a byte-order mark over in silence', () => {
    const columns = { 'T/°C': { is: 'temperature', unit: 'Cel' }, Cp: { is: 'heat-capacity', unit: 'J/(mol.K)' } };
    const text = 'T/°C,Cp\n26,26.65\n126,27.40\n';
    const utf16 = Buffer.from(`\uFEFF${text}`, 'utf16le');
    const files: [string, Uint8Array, string[]][] = [
      ['UTF-16', utf16, ['note encoding-converted desk/a.csv']],
      ['UTF-16 turned round', Buffer.from(utf16).swap16(), ['note encoding-converted desk/a.csv']],
      ['UTF-16 without a mark', Buffer.from(text, 'utf16le'), ['note encoding-converted desk/a.csv']],
      ['Latin-1', Buffer.from(text, 'latin1'), ['note encoding-converted desk/a.csv']],
      ['UTF-8 with a mark', Buffer.from(`\uFEFF${text}`), []],
      ['UTF-8', Buffer.from(text), []],
    ];
    for (const [name, bytes, findings] of files) {
      const sources = readSources(
        folderOf({
          'substances.csv': SUBSTANCES,
          'desk/source.json': describeTable('a.csv', { columns }),
          'desk/a.csv': bytes,
        }),
      );
      expect({ name, findings: brief(sources.findings), values: heatCapacities(sources) }).toEqual({
        name,
        findings,
        values: [26.65, 27.4],
      });
    }
  });

  it('reports a broken descriptor and reads the other sources', () => {
    const sources = readSources(
      folderOf({
        'substances.csv': SUBSTANCES,
        'broken/source.json': '{ "title": ',
        'broken/a.csv': TABLE,
        'desk/source.json': describeTable('a.csv'),
        'desk/a.csv': TABLE,
        'empty/a.csv': TABLE,
      }),
    );
    expect(brief(sources.findings)).toEqual([
      'fault descriptor-unreadable broken/source.json',
      'fault file-missing empty/source.json',
    ]);
    expect(heatCapacities(sources)).toEqual([26.65, 27.4]);
  });

  it('reads a file once though two tables name it, and reports it once', () => {
    const table = JSON.parse(describeTable('a.csv')) as { tables: object[] };
    table.tables.push({ ...table.tables[0], phase: 'l' });
    const sources = readSources(
      folderOf({
        'substances.csv': SUBSTANCES,
        'desk/source.json': JSON.stringify(table),
        'desk/a.csv': 'T,cP\n300,26\n',
      }),
    );
    expect(sources.inputs.filter(({ file }) => file === 'a.csv')).toHaveLength(1);
    expect(brief(sources.findings)).toEqual(['fault column-missing desk/a.csv']);
    expect(sources.parts[0]!.bytes).toBe(sources.parts[1]!.bytes);
  });

  it('reports what is wrong with the acceptances and keeps the good ones', () => {
    const good = {
      finding: '0123456789abcdef',
      evidenceHash: 'fedcba9876543210',
      reason: 'known',
      by: 'A. Nobody',
      date: '2026-01-01',
      until: '2026-12-31',
    };
    const read = (text: string) => readSources(folderOf({ 'substances.csv': SUBSTANCES, 'accepted.json': text }));
    const mixed = read(JSON.stringify([good, { ...good, until: 'for ever', findng: 'x' }]));
    expect(mixed.accepted).toEqual([good]);
    expect(mixed.findings.map(({ address }) => address?.column)).toEqual(['[1].until', '[1].findng']);
    expect(brief(read('[').findings)).toEqual(['fault descriptor-unreadable /accepted.json']);
    expect(brief(read('{}').findings)).toEqual(['fault descriptor-invalid /accepted.json']);
  });

  it('without its list of substances is a fault of the whole', () => {
    const sources = readSources(folderOf({ 'desk/source.json': describeTable('a.csv'), 'desk/a.csv': TABLE }));
    expect(brief(sources.findings)).toEqual(['fault file-missing /substances.csv', 'fault name-unmapped desk/a.csv']);
  });

  it('that does not exist is the caller’s mistake', () => {
    expect(() => readSources('/no/such/folder')).toThrow('ENOENT');
  });
});

describe('the bytes of a text', () => {
  it('are told apart without a mark', () => {
    expect(toUtf8(Buffer.from('plain')).encoding).toBe('UTF-8');
    expect(toUtf8(Buffer.from('naïve − 😀')).encoding).toBe('UTF-8');
    expect(toUtf8(Buffer.from('naïve', 'latin1')).encoding).toBe('Latin-1');
    expect(toUtf8(Buffer.from('plain', 'utf16le')).encoding).toBe('UTF-16 (little-endian)');
    expect(toUtf8(new Uint8Array(0)).encoding).toBe('UTF-8');
    expect(toUtf8(Uint8Array.of(0x41, 0xe2, 0x88)).encoding).toBe('Latin-1');
  });

  it('that are UTF-8 already are not copied', () => {
    const raw = Buffer.from('plain');
    expect(toUtf8(raw).bytes).toBe(raw);
  });
});
