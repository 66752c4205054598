/**
 * The first stage: raw bytes and their plans in, raw tables by substance out. Numbers stay as printed, every cell keeps
 * its address; nothing throws, and nothing is left out without a finding.
 */
import type { Finding } from '../../schemas/finding.js';
import type { RawCase, RawRow, RawSeries } from '../../schemas/raw.js';
import type { Substance } from '../../schemas/substances.js';
import type { IngestPart } from './plan.js';
import { readRows } from './read-rows.js';
import { SeriesGatherer } from './read-series.js';
import { Readings, readingFinding } from './reading.js';
import { RowReader } from './row-reader.js';
import type { Kind } from './table-quantities.js';

export { CORRECTIONS_FILE, type CorrectionsResult, readCorrections } from './corrections.js';
export { DESCRIPTOR_FILE, readDescriptor } from './descriptor.js';
export { indexRows } from './index-rows.js';
export { readJson } from './json-place.js';
export type { DescriptorResult, IngestPart, Layout, RowIndex, Runs, SourceInfo, TablePlan } from './plan.js';
export { type ReadingNote, readingFinding } from './reading.js';
export { addRunBytes, selectRuns } from './runs.js';
export { SubstanceNames } from './substance-names.js';
export { readSubstances, SUBSTANCES_FILE, type SubstancesResult } from './substances.js';
export { jsonFinding, zodFindings } from './zod-findings.js';

export interface IngestInput {
  /** The substances wanted, consecutive in the list that the runs point into. */
  readonly substances: readonly Substance[];
  /** Place of the first of them in that list. */
  readonly first?: number;
  /** Runs of other substances are passed over. */
  readonly parts: readonly IngestPart[];
}

export interface IngestSettings {
  /** Cells listed behind one finding of one substance; more are left uncounted. */
  readonly mostEvidence?: number;
}

/** Rows of one part that were read, and that its `where` left out. */
export interface RowTally {
  readonly read: number;
  readonly leftOut: number;
}

export interface IngestResult {
  /** One a substance, in the order given, those without data too. */
  readonly artefact: RawCase[];
  /** Always empty: what belongs to no substance is found by `readDescriptor`, `readCorrections` and `indexRows`. */
  readonly findings: readonly Finding[];
  /** By part. */
  readonly tallies: readonly RowTally[];
}

export function ingest(input: IngestInput, settings: IngestSettings = {}): IngestResult {
  const { substances, first = 0, parts } = input;
  let readings = new Readings('', 0);
  const tables = parts.map((part) => {
    const reader = new RowReader(part, () => readings);
    return {
      part,
      reader,
      gatherer: new SeriesGatherer(part, reader),
      runsOf: runsBySubstance(part, first, substances.length),
    };
  });
  const artefact: RawCase[] = [];
  for (const [place, substance] of substances.entries()) {
    readings = new Readings(substance.id, settings.mostEvidence ?? 1000);
    const series: RawSeries[] = [];
    const rows: Readonly<Record<Exclude<Kind, 'thermal-functions'>, RawRow[]>> = {
      anchors: [],
      transitions: [],
      'vapour-pressures': [],
    };
    const findings: Finding[] = [];
    for (const { part, reader, gatherer, runsOf } of tables) {
      const runs = runsOf(place);
      if (runs.length === 0) continue;
      const { broken, flaws } = part.index;
      for (const cause of broken === null ? flaws : [broken]) findings.push(ofSubstance(cause, substance.id));
      if (broken !== null) continue;
      const { holds } = part.plan.meaning;
      if (holds === 'thermal-functions') series.push(...gatherer.read(substance.id, runs));
      else for (const row of readRows(part, reader, substance.id, runs)) rows[holds].push(row);
    }
    findings.push(...readings.findings());
    const { anchors, transitions, 'vapour-pressures': vapourPressures } = rows;
    artefact.push({ substance, series, anchors, transitions, vapourPressures, findings: distinct(findings) });
  }
  return {
    artefact,
    findings: [],
    tallies: tables.map(({ reader }) => ({ read: reader.rowsRead, leftOut: reader.rowsLeftOut })),
  };
}

/** A table's fault as each substance in it meets it: withheld, with the table's own finding as the cause. */
function ofSubstance(cause: Finding, substance: string): Finding {
  if (cause.detail.code !== 'reading') throw new Error('a table fails by reading only');
  const { problem, read, wanted, remedy } = cause.detail;
  return readingFinding({
    problem,
    read,
    wanted,
    remedy,
    substance,
    address: cause.address!,
    cause: cause.id,
    evidence: cause.evidence,
  });
}

function distinct(findings: readonly Finding[]): Finding[] {
  return [...new Map(findings.map((finding) => [finding.id, finding])).values()];
}

const NONE: readonly number[] = [];

/** For each place among the substances wanted, the numbers of its runs in file order. */
function runsBySubstance(part: IngestPart, first: number, count: number): (place: number) => readonly number[] {
  const { runs } = part.index;
  const byPlace = new Map<number, number[]>();
  for (let run = 0; run < runs.count; run++) {
    const place = runs.substance[run]! - first;
    if (place < 0 || place >= count) continue;
    const known = byPlace.get(place);
    if (known === undefined) byPlace.set(place, [run]);
    else known.push(run);
  }
  return (place) => byPlace.get(place) ?? NONE;
}
