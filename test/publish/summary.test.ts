import { describe, expect, test } from 'vitest';
import { lossGuard, publish, summary } from '../../pipeline/publish/publish.js';
import { policySchema } from '../../schemas/policy.js';
import { type Summary, summarySchema, type Verdict } from '../../schemas/summary.js';
import { finding, reconciled, sentence } from './hand-made.js';

function summaryOf(verdicts: Record<string, Verdict>, previous: Summary | null = null): Summary {
  const cases = Object.entries(verdicts).map(([id, verdict]) =>
    reconciled(id, { verdict, findings: verdict === 'cleared' ? [] : [finding(`f-${id}`, id)] }),
  );
  const { substances } = publish(cases, { sentence }).artefact;
  const [release, contentId] = [`r${Object.keys(verdicts).length}`, 'a'.repeat(64)];
  return summary({
    release,
    contentId,
    version: '0.1.0',
    date: '2026-01-31',
    substances,
    rows: { functions: 3 },
    previous,
  });
}

/** `withheld` of `count` substances withheld, the others cleared. */
function library(count: number, withheld: number): Record<string, Verdict> {
  return Object.fromEntries(
    Array.from({ length: count }, (_, i): [string, Verdict] => [`m${i}`, i < withheld ? 'withheld' : 'cleared']),
  );
}

describe('summary', () => {
  test('counts verdicts and findings, and fits its schema', () => {
    const made = summaryOf({ a: 'cleared', b: 'flagged', c: 'withheld', d: 'cleared' });
    expect(made.counts).toMatchObject({ substances: 4, cleared: 2, flagged: 1, withheld: 1, doubts: 2, faults: 0 });
    expect(made.verdicts).toEqual({ a: 'cleared', b: 'flagged', c: 'withheld', d: 'cleared' });
    expect(summarySchema.parse(JSON.parse(JSON.stringify(made)))).toEqual(made);
  });

  test('tells what moved, came and went since the release that stands', () => {
    const before = summaryOf({ a: 'cleared', b: 'flagged', gone: 'cleared' });
    expect(summaryOf({ new: 'cleared', b: 'cleared', a: 'withheld' }, before).changes).toEqual({
      since: 'r3',
      verdicts: [
        { substance: 'a', from: 'cleared', to: 'withheld' },
        { substance: 'b', from: 'flagged', to: 'cleared' },
      ],
      added: ['new'],
      removed: ['gone'],
    });
  });

  test('of a first release says that all is new', () => {
    expect(summaryOf({ b: 'cleared', a: 'cleared' }).changes).toEqual({
      since: null,
      verdicts: [],
      added: ['a', 'b'],
      removed: [],
    });
  });
});

describe('lossGuard', () => {
  const policy = policySchema.parse({}).lossGuard;
  const guard = (before: Record<string, Verdict>, after: Record<string, Verdict>) =>
    lossGuard(summaryOf(before), summaryOf(after), policy);

  test('lets a first release pass', () => {
    expect(lossGuard(null, summaryOf(library(9, 9)), policy)).toEqual({ held: false, lost: [], clearedBefore: 0 });
  });

  test('below three losses nothing is held, whatever their share', () => {
    expect(guard(library(4, 0), library(4, 2))).toEqual({ held: false, lost: ['m0', 'm1'], clearedBefore: 4 });
    expect(guard(library(4, 0), library(4, 3)).held).toBe(true);
  });

  test('in a large library the share decides: 1 % may go, more may not', () => {
    expect(guard(library(400, 0), library(400, 4)).held).toBe(false);
    expect(guard(library(400, 0), library(400, 5)).held).toBe(true);
  });

  test('only what was cleared and is withheld counts: not what was withheld before, is flagged, or left the list', () => {
    const before = { ...library(5, 0), x: 'withheld', y: 'flagged' } as Record<string, Verdict>;
    const after = { m0: 'flagged', m1: 'flagged', m2: 'cleared', x: 'withheld', y: 'withheld' } as const;
    expect(guard(before, after)).toEqual({ held: false, lost: [], clearedBefore: 5 });
  });

  test('holds when the release that stands cannot be read', () => {
    expect(lossGuard('unreadable', summaryOf(library(3, 0)), policy).held).toBe(true);
  });
});
