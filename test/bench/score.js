/** Holds a release against the list of planted slips: what was found, what was accused wrongly, was the cell named first. */
import { join } from 'node:path';
import { DuckDBInstance } from '@duckdb/node-api';

/**
 * @typedef {object} Score
 * @property {number} planted
 * @property {number} found spoilt substances with a fault or a doubt
 * @property {number} first the planted cell is the first suspect of the substance's first finding that has suspects
 * @property {number} firstGroup … or in the same group as the first suspect
 * @property {number} clean
 * @property {number} falseFaults clean substances with a fault
 * @property {number} falseDoubts clean substances with a doubt and no fault
 * @property {number} withNotes clean substances with notes only
 * @property {Record<string, { planted: number, found: number, firstGroup: number }>} byKind
 * @property {{ substance: string, kind: string, found: boolean }[]} missed planted slips not found or not in the first group
 * @property {{ substance: string, rule: string, severity: string }[]} accused the first few of the clean ones
 */

/**
 * @param {string} release folder of the release
 * @param {readonly import('./bulk-library.js').Planted[]} planted
 * @param {number} substances
 * @returns {Promise<Score>}
 */
export async function scoreRelease(release, planted, substances) {
  const instance = await DuckDBInstance.create(':memory:');
  const connection = await instance.connect();
  const read = async (table, columns) => {
    const path = join(release, `${table}.parquet`).replaceAll("'", "''");
    const reader = await connection.runAndReadAll(`SELECT ${columns} FROM read_parquet('${path}') ORDER BY file_row_number`);
    return reader.getRowObjectsJson();
  };
  const findings = await read('findings', 'finding, substance, rule, severity, accepted');
  const suspects = await read('suspects', 'finding, place, "group", source, file, line, "column"');
  connection.closeSync();

  const suspectsOf = gatherBy(suspects, (s) => s.finding);
  const findingsOf = gatherBy(findings.filter((f) => f.substance), (f) => f.substance);
  const spoilt = new Set(planted.map((p) => p.substance));
  const score = {
    planted: planted.length,
    found: 0,
    first: 0,
    firstGroup: 0,
    clean: substances - spoilt.size,
    falseFaults: 0,
    falseDoubts: 0,
    withNotes: 0,
    byKind: {},
    missed: [],
    accused: [],
  };
  for (const slip of planted) {
    const own = findingsOf.get(slip.substance) ?? [];
    const found = own.some((f) => f.severity !== 'note');
    const list = firstSuspects(own, suspectsOf);
    const hits = list.filter((s) => isCell(s, slip));
    const first = found && hits.some((s) => Number(s.place) === 1);
    const firstGroup = found && hits.some((s) => s.group === list[0].group);
    score.byKind[slip.kind] ??= { planted: 0, found: 0, firstGroup: 0 };
    const kind = score.byKind[slip.kind];
    kind.planted++;
    if (found) kind.found++;
    if (firstGroup) kind.firstGroup++;
    if (found) score.found++;
    if (first) score.first++;
    if (firstGroup) score.firstGroup++;
    if (!firstGroup) score.missed.push({ substance: slip.substance, kind: slip.kind, found });
  }
  for (const [substance, own] of findingsOf) {
    if (spoilt.has(substance)) continue;
    const worst = ['fault', 'doubt', 'note'].find((s) => own.some((f) => f.severity === s));
    if (worst === 'fault') score.falseFaults++;
    else if (worst === 'doubt') score.falseDoubts++;
    else score.withNotes++;
    const finding = own.find((f) => f.severity === worst);
    if (worst !== 'note' && score.accused.length < 20) score.accused.push({ substance, rule: finding.rule, severity: worst });
  }
  return score;
}

/** The suspects, by place, of the first finding (the table is worst first) that has any. */
function firstSuspects(findings, suspectsOf) {
  for (const { finding } of findings) {
    const own = suspectsOf.get(finding);
    if (own !== undefined) return own.toSorted((a, b) => Number(a.place) - Number(b.place));
  }
  return [];
}

function isCell(suspect, slip) {
  return (
    suspect.source === slip.source &&
    suspect.file === slip.file &&
    Number(suspect.line) === slip.line &&
    suspect.column === slip.column
  );
}

function gatherBy(rows, key) {
  const gathered = new Map();
  for (const row of rows) {
    const own = gathered.get(key(row));
    if (own === undefined) gathered.set(key(row), [row]);
    else own.push(row);
  }
  return gathered;
}
