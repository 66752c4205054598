import { describe, expect, it } from 'vitest';
import { examine } from '../../../pipeline/check/check.js';
import { makeFinding } from '../../../schemas/make-finding.js';
import { caseOf, examined, medium, outcomeOf, settings } from '../medium.js';

const note = (severity: 'fault' | 'doubt' | 'note') =>
  makeFinding({
    rule: 'row-readable',
    severity,
    substance: 'medium',
    detail: { code: 'reading', problem: 'cell-not-a-number', read: 'x', wanted: 'a number', remedy: 'Mend it' },
  });

describe('row-readable', () => {
  it('agrees where every row was read, and where only a note was made of it', () => {
    expect(outcomeOf(examined(medium()), 'row-readable', '')).toMatchObject({ outcome: 'agrees', missing: null });
    const noted = examine([caseOf(medium(), { findings: [note('note')] })], settings).artefact[0]!;
    expect(outcomeOf(noted, 'row-readable', '').outcome).toBe('agrees');
    expect(noted.findings).toHaveLength(1);
  });

  it.each(['fault', 'doubt'] as const)('disagrees where reading left a %s, and keeps it', (severity) => {
    const left = examine([caseOf(medium(), { findings: [note(severity)] })], settings).artefact[0]!;
    expect(outcomeOf(left, 'row-readable', '').outcome).toBe('disagrees');
    expect(left.findings.map((one) => one.severity)).toEqual([severity]);
  });

  it('finds a unit that cannot be what its column is', () => {
    const printed = medium();
    const one = caseOf(printed);
    const table = one.series[0]!.table;
    const columns = table.columns.map((column) => (column.is === 'entropy' ? { ...column, unit: 'furlong' } : column));
    printed.meaning = { columns };
    const { findings, outcomes } = examined({ ...printed, tables: { cr: printed.tables.cr! } });
    expect(outcomeOf({ findings, outcomes }, 'row-readable', '').outcome).toBe('disagrees');
    expect(findings.find(({ rule }) => rule === 'row-readable')?.detail).toMatchObject({ problem: 'unit-unknown' });
  });

  it('is untestable where no table mentions the substance', () => {
    const bare = caseOf({ ...medium(), tables: {}, anchors: [], transitions: [] });
    const outcome = outcomeOf(examine([bare], settings).artefact[0]!, 'row-readable', '');
    expect(outcome).toMatchObject({ outcome: 'untestable', evidence: null });
    expect(outcome.missing).toContain('table');
  });
});
