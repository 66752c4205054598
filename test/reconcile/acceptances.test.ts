import { describe, expect, it } from 'vitest';
import type { Acceptance } from '../../schemas/accepted.js';
import { medium, moved, S } from '../check/medium.js';
import { reconciled, rootsOf } from './reconciled.js';

function spoilt() {
  const printed = medium();
  printed.anchors[1]!.H = moved(printed.anchors[1]!.H, 3);
  return printed;
}

const [root] = rootsOf(reconciled(spoilt()));
const entry: Acceptance = {
  finding: root!.id,
  evidenceHash: root!.evidenceHash,
  reason: 'Measured anew; the liquid of the table is another form.',
  by: 'A curator',
  date: '2026-01-10',
  until: '2026-06-30',
};
const lapses = (found: ReturnType<typeof reconciled>) =>
  found.findings.flatMap((one) =>
    one.detail.code === 'reading' && one.detail.problem === 'acceptance-lapsed' ? [one] : [],
  );

describe('an accepted disagreement', () => {
  it.each(['2026-01-10', '2026-03-01', '2026-06-30'])(
    'is in force on %s: the substance is cleared, its findings stay, marked',
    (date) => {
      const before = reconciled(spoilt(), { date });
      expect(before.verdict).toBe('withheld');
      const taken = reconciled(spoilt(), { date, accepted: [entry] });
      expect(taken.verdict).toBe('cleared');
      expect(taken.findings.map(({ id }) => id)).toEqual(before.findings.map(({ id }) => id));
      expect(taken.findings.filter(({ severity }) => severity !== 'note').every(({ accepted }) => accepted)).toBe(true);
      expect(lapses(taken)).toEqual([]);
    },
  );

  it('does not hold before its date, and nothing is said of it', () => {
    const early = reconciled(spoilt(), { date: '2026-01-09', accepted: [entry] });
    expect(early.verdict).toBe('withheld');
    expect(early.findings.some(({ accepted }) => accepted)).toBe(false);
    expect(lapses(early)).toEqual([]);
  });

  it('lapses after its last day, and says so in a note', () => {
    const late = reconciled(spoilt(), { date: '2026-07-01', accepted: [entry] });
    expect(late.verdict).toBe('withheld');
    const [note, ...more] = lapses(late);
    expect(more).toEqual([]);
    expect(note).toMatchObject({ severity: 'note', substance: 'medium', rule: root!.rule });
    expect(note!.detail).toMatchObject({ read: 'the date 2026-07-01', wanted: expect.stringContaining('2026-06-30') });
  });

  it('lapses when a printed cell behind it changes', () => {
    const printed = spoilt();
    printed.transitions[0]!.T = '500.010';
    const changed = reconciled(printed, { date: '2026-03-01', accepted: [entry] });
    expect(rootsOf(changed)[0]!.id).toBe(entry.finding);
    expect(changed.verdict).toBe('withheld');
    expect(lapses(changed)[0]!.detail).toMatchObject({ wanted: expect.stringContaining(entry.evidenceHash) });
  });

  it('keeps its name when rows move, since neither lines nor values go into it', () => {
    const printed = spoilt();
    printed.tables.cr!.splice(3, 1);
    printed.tables.l!.splice(3, 1);
    expect(reconciled(printed, { date: '2026-03-01', accepted: [entry] }).verdict).toBe('cleared');
  });

  it('accepts that finding and what follows from it, and no other', () => {
    const printed = spoilt();
    printed.tables.cr![8]![S] = moved(printed.tables.cr![8]![S]!, 5);
    const taken = reconciled(printed, { date: '2026-03-01', accepted: [entry] });
    expect(taken.verdict).toBe('withheld');
    const open = taken.findings.filter(({ severity, accepted }) => severity !== 'note' && !accepted);
    expect(open.map(({ rule }) => rule)).toEqual(['entropy-follows-heat-capacity']);
  });

  it('of another substance or finding changes nothing', () => {
    const other = { ...entry, finding: '0123456789abcdef' };
    const found = reconciled(spoilt(), { date: '2026-03-01', accepted: [other] });
    const without = reconciled(spoilt(), { date: '2026-03-01' });
    expect([found.verdict, found.findings]).toEqual([without.verdict, without.findings]);
  });
});
