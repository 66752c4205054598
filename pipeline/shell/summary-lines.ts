import type { Finding } from '../../schemas/finding.js';
import { sayFinding } from '../report/report.js';
import { count, wrap } from './text.js';
import type { VerdictLine } from './verdict-line.js';

export const CAUTION =
  'Nothing about decomposition, reactivity or ignition is modelled, and a withheld value is not to be replaced unseen by an older one.';

const MOST_NAMED = 25;
/** Wide enough for a cell and its figures on one line. */
const WIDTH = 110;

/** `24 substances: 16 cleared, 0 flagged, 8 withheld`, then each withheld substance with the cell to look at first. */
export function verdictLines(lines: readonly VerdictLine[]): string[] {
  const { cleared, flagged, withheld } = tally(lines);
  return [
    `${count(lines.length, 'substance')}: ${cleared} cleared, ${flagged} flagged, ${withheld} withheld`,
    ...named('Withheld', 'withheld', lines),
    ...named('Flagged', 'flagged', lines),
  ];
}

/** Findings that belong to a source or to the whole run, notes left out. */
export function generalLines(findings: readonly Finding[]): string[] {
  const grave = findings.filter(({ severity }) => severity !== 'note');
  if (grave.length === 0) return [];
  const shown = grave.slice(0, MOST_NAMED);
  return [
    'Sources',
    ...shown.flatMap((finding) => wrap(sayFinding(finding), 76).map((line, i) => `${i === 0 ? '  ' : '    '}${line}`)),
    ...(grave.length > shown.length ? [`  and ${grave.length - shown.length} more, in the table "findings"`] : []),
    '',
  ];
}

export function tally(lines: readonly VerdictLine[]): { cleared: number; flagged: number; withheld: number } {
  const counts = { cleared: 0, flagged: 0, withheld: 0 };
  for (const { verdict } of lines) counts[verdict]++;
  return counts;
}

export function cautionLines(): string[] {
  return wrap(CAUTION, 80);
}

function named(title: string, wanted: VerdictLine['verdict'], lines: readonly VerdictLine[]): string[] {
  const chosen = lines.filter(({ verdict }) => verdict === wanted);
  if (chosen.length === 0) return [];
  const shown = chosen.slice(0, MOST_NAMED);
  const more = chosen.length - shown.length;
  const width = Math.max(...shown.map(({ substance }) => substance.length));
  return [
    '',
    title,
    ...shown.flatMap(({ substance, reason }) =>
      wrap(reason, WIDTH - width - 4).map((line, i) => `  ${(i === 0 ? substance : '').padEnd(width)}  ${line}`),
    ),
    ...(more > 0 ? [`  and ${count(more, 'more', 'more')}, in the table "findings"`] : []),
  ];
}
