/** `summary.json`: counts, the verdict of every substance, and what changed since the release that stood before. */
import { ABSENT_CODE, type ColumnTable, type IntegerColumn, type TextColumn } from '../../schemas/columns.js';
import type { Summary, Verdict } from '../../schemas/summary.js';

export interface SummaryInput {
  readonly release: string;
  readonly contentId: string;
  readonly version: string;
  /** ISO 8601 day. */
  readonly date: string;
  readonly substances: ColumnTable;
  /** Rows of each published table, all parts together. */
  readonly rows: Readonly<Record<string, number>>;
  /** Of the release that stands; null before the first. */
  readonly previous: Summary | null;
}

export function summary({ release, contentId, version, date, substances, rows, previous }: SummaryInput): Summary {
  const verdicts = verdictsOf(substances);
  const counts = { cleared: 0, flagged: 0, withheld: 0 };
  for (const verdict of Object.values(verdicts)) counts[verdict]++;
  return {
    release,
    contentId,
    version,
    date,
    counts: {
      substances: substances.rows,
      ...counts,
      faults: total(substances, 'faults'),
      doubts: total(substances, 'doubts'),
      notes: total(substances, 'notes'),
      accepted: total(substances, 'accepted'),
      rows: { ...rows },
    },
    verdicts,
    changes: changes(previous, verdicts),
  };
}

/** Verdict by substance, in the order of the table. */
export function verdictsOf(substances: ColumnTable): Record<string, Verdict> {
  const ids = substances.columns.substance as TextColumn;
  const verdict = substances.columns.verdict as TextColumn;
  const verdicts: [string, Verdict][] = [];
  for (let row = 0; row < substances.rows; row++) {
    if (ids.codes[row] === ABSENT_CODE) continue;
    verdicts.push([ids.words[ids.codes[row]!]!, verdict.words[verdict.codes[row]!] as Verdict]);
  }
  return Object.fromEntries(verdicts);
}

function changes(previous: Summary | null, now: Readonly<Record<string, Verdict>>): Summary['changes'] {
  if (previous === null) return { since: null, verdicts: [], added: Object.keys(now).sort(), removed: [] };
  const before = new Map(Object.entries(previous.verdicts));
  const moved: Summary['changes']['verdicts'] = [];
  const added: string[] = [];
  for (const [substance, to] of Object.entries(now)) {
    const from = before.get(substance);
    if (from === undefined) added.push(substance);
    else if (from !== to) moved.push({ substance, from, to });
    before.delete(substance);
  }
  moved.sort((a, b) => (a.substance < b.substance ? -1 : 1));
  return { since: previous.release, verdicts: moved, added: added.sort(), removed: [...before.keys()].sort() };
}

function total(table: ColumnTable, field: string): number {
  return (table.columns[field] as IntegerColumn).values.reduce((sum, count) => sum + count, 0);
}
