import type { ReconciledCase } from '../../schemas/checked.js';
import type { Finding } from '../../schemas/finding.js';
import { figure, plusMinus } from '../report/report.js';
import { count, table } from './text.js';

/** A substance before and after a change, as rows: verdict, findings by gravity, and each transition's crossing. */
export function beforeAfterLines(before: ReconciledCase, after: ReconciledCase): string[] {
  const rows = [
    ['', 'before', 'after'],
    ['verdict', before.verdict, after.verdict],
    ['findings', tally(before.findings), tally(after.findings)],
    ...crossings(before, after),
  ];
  return table(rows);
}

/** Findings that only the change brings about: what it does not mend, or breaks. */
export function newFindings(before: ReconciledCase, after: ReconciledCase): Finding[] {
  const known = new Set(before.findings.map(({ id }) => id));
  return after.findings.filter(({ id, severity }) => severity !== 'note' && !known.has(id));
}

function tally(findings: readonly Finding[]): string {
  const open = findings.filter(({ accepted }) => !accepted);
  const parts = (['fault', 'doubt', 'note'] as const).flatMap((severity) => {
    const n = open.filter((one) => one.severity === severity).length;
    return n === 0 ? [] : [count(n, severity)];
  });
  const accepted = findings.length - open.length;
  if (accepted > 0) parts.push(`${accepted} accepted`);
  return parts.length === 0 ? 'none' : parts.join(', ');
}

function crossings(before: ReconciledCase, after: ReconciledCase): string[][] {
  return before.checked.judged.map((was) => {
    const is = after.checked.judged.find(({ index }) => index === was.index);
    return [`${was.stated.from} → ${was.stated.to}, stated and computed`, ...[was, is].map(said)];
  });
}

function said(one: ReconciledCase['checked']['judged'][number] | undefined): string {
  if (one === undefined) return 'not judged';
  const { stated, computedK, uComputedK } = one;
  const computed = computedK === null ? 'no crossing' : plusMinus(computedK, uComputedK ?? 0);
  return `${figure(stated.temperature.value)} K, ${computed}${computedK === null ? '' : ' K'}`;
}
