/** Small sources in the test's own lines: descriptor, tables and corrections in, cases and findings out. */
import { type IngestPart, indexRows, ingest, readCorrections, readDescriptor } from '../../pipeline/ingest/ingest.js';
import type { Finding } from '../../schemas/finding.js';
import type { RawCase } from '../../schemas/raw.js';
import type { Substance } from '../../schemas/substances.js';

export function substance(id: string, more: Partial<Substance> = {}): Substance {
  return {
    id,
    name: id,
    formula: '',
    molarMassGPerMol: 100,
    atomsPerFormula: null,
    criticalTemperatureK: null,
    criticalPressurePa: null,
    acentricFactor: null,
    polarA: null,
    polarB: null,
    class: null,
    vapourSpecies: null,
    residualEntropyJPerMolK: 0,
    ...more,
  };
}

export const LEAD = substance('lead', { name: 'Lead', formula: 'Pb' });
export const TIN = substance('tin', { name: 'Tin', formula: 'Sn' });

/** Temperature, heat capacity, entropy, increment and Gibbs function under short headers. */
export const COLUMNS = {
  T: { is: 'temperature', unit: 'K' },
  Cp: { is: 'heat-capacity', unit: 'J/(mol.K)' },
  S: { is: 'entropy', unit: 'J/(mol.K)' },
} as const;

export const encode = (text: string): Uint8Array => new TextEncoder().encode(text);

export function describeSource(table: object, head: object = {}): string {
  return JSON.stringify({ title: 'a source', basis: 'evaluated', ...head, tables: [table] }, null, 2);
}

export interface Read {
  readonly cases: readonly RawCase[];
  readonly parts: readonly IngestPart[];
  /** Of the descriptor, the corrections and the index. */
  readonly general: readonly Finding[];
  readonly tallies: readonly { readonly read: number; readonly leftOut: number }[];
}

export function read(
  descriptor: string,
  files: Readonly<Record<string, string>>,
  substances: readonly Substance[] = [LEAD, TIN],
  correctionsText = '[]',
): Read {
  const { plans, findings } = readDescriptor('desk', descriptor, Object.keys(files), (file) => files[file] ?? null);
  const corrections = readCorrections('desk', correctionsText, plans);
  const parts = plans.map((plan): IngestPart => {
    const bytes = encode(files[plan.file] ?? '');
    const ours = corrections.corrections.filter(({ file }) => file === plan.file);
    return { plan, bytes, corrections: ours, index: indexRows(plan, bytes, substances, ours) };
  });
  const { artefact, tallies } = ingest({ substances, parts });
  const general = [...findings, ...corrections.findings, ...parts.flatMap(({ index }) => index.findings)];
  return { cases: artefact, parts, general, tallies };
}

/** Problem, file, line and column of each finding, with its severity and substance, for short comparisons. */
export function brief(findings: readonly Finding[]): string[] {
  return findings.map(({ detail, address, severity, substance: id }) => {
    const problem = detail.code === 'reading' ? detail.problem : detail.code;
    return `${severity} ${id === '' ? '-' : id} ${problem} ${address?.file}:${address?.line} ${address?.column}`.trim();
  });
}

export function reading(finding: Finding | undefined): {
  problem: string;
  read: string;
  wanted: string;
  remedy: string;
} {
  if (finding?.detail.code !== 'reading') throw new Error('no finding about reading');
  return finding.detail;
}
