import { describe, expect, it } from 'vitest';
import type { Slip } from './slip-maker.js';
import { leastFrom, type Seen, scoreSlip } from './slip-score.js';
import { listCells } from './source-cells.js';

const slip: Slip = {
  kind: 'entropy',
  substance: 'lead',
  source: 'handbook-lead',
  file: 'pb-003.tsv',
  line: 12,
  column: 'S',
  printed: '88.9',
  clean: '89.9',
  place: 'l',
  temperatureK: 700,
  change: -1,
  timesLeast: 10,
};
const finding = (id: string, more: Partial<Seen['findings'][number]> = {}) => ({
  finding: id,
  evidenceHash: `cells of ${id}`,
  substance: 'lead',
  rule: 'functions-close',
  severity: 'fault',
  cause: null,
  ...more,
});
const suspect = (id: string, place: number, group: number, column = 'S') => ({
  finding: id,
  place,
  group,
  source: 'handbook-lead',
  file: 'pb-003.tsv',
  line: 12,
  column,
});
const seen = (findings: Seen['findings'], suspects: Seen['suspects'] = []): Seen => ({
  findings,
  suspects,
  coverage: [],
});
const nothing = seen([]);

describe('the score of a slip', () => {
  it('is good when the root finding has the cell first and nobody else is accused', () => {
    const spoilt = seen([finding('a')], [suspect('a', 1, 1)]);
    expect(scoreSlip(slip, nothing, spoilt)).toMatchObject({ found: true, first: true, firstGroup: true, good: true });
  });

  it('is good too when the cell stands second in the first group, and not in a later group', () => {
    const near = seen([finding('a')], [suspect('a', 1, 1, 'H'), suspect('a', 2, 1)]);
    expect(scoreSlip(slip, nothing, near)).toMatchObject({ first: false, firstGroup: true, good: true });
    const far = seen([finding('a')], [suspect('a', 1, 1, 'H'), suspect('a', 2, 2)]);
    expect(scoreSlip(slip, nothing, far)).toMatchObject({ found: true, firstGroup: false, good: false });
  });

  it('does not count notes, nor what the clean library has already', () => {
    expect(scoreSlip(slip, nothing, seen([finding('a', { severity: 'note' })])).found).toBe(false);
    const doubt = seen([finding('a', { severity: 'doubt' })], [suspect('a', 1, 1)]);
    expect(scoreSlip(slip, doubt, doubt).found).toBe(false);
    const graver = seen([finding('a')], [suspect('a', 1, 1)]);
    expect(scoreSlip(slip, doubt, graver).good).toBe(true);
  });

  it('passes over findings that follow from another one, and takes faults before doubts', () => {
    const findings = [
      finding('doubt', { severity: 'doubt' }),
      finding('follows', { cause: 'root' }),
      finding('root', { rule: 'entropy-follows-heat-capacity' }),
    ];
    const suspects = [suspect('doubt', 1, 1, 'Cp'), suspect('follows', 1, 1, 'H'), suspect('root', 1, 1)];
    expect(scoreSlip(slip, nothing, seen(findings, suspects))).toMatchObject({
      good: true,
      rootRule: 'entropy-follows-heat-capacity',
    });
  });

  it('is not good when another substance is accused', () => {
    const spoilt = seen([finding('a'), finding('b', { substance: 'copper' })], [suspect('a', 1, 1)]);
    expect(scoreSlip(slip, nothing, spoilt)).toMatchObject({ elsewhere: ['copper'], good: false });
  });
});

describe('the least change of a cell', () => {
  const cells = listCells('test/published');
  const enthalpy = cells.find((cell) => cell.substance === 'lead' && cell.quantity === 'enthalpy-increment')!;
  const formation = cells.find(
    (cell) => cell.substance === 'lead' && cell.quantity === 'enthalpy-of-formation' && cell.place === 'l',
  )!;
  const covered = (rule: string, place: string, outcome: string, smallestDetectable: number | null): Seen => ({
    ...nothing,
    coverage: [{ substance: 'lead', rule, place, outcome, smallestDetectable }],
  });

  it('is 1.5 times the printed smallest detectable error where that is the larger', () => {
    const wide = leastFrom(covered('enthalpy-follows-heat-capacity', 'cr', 'agrees', 400));
    expect(wide(enthalpy)).toBeCloseTo(0.6, 12);
    const narrow = leastFrom(covered('enthalpy-follows-heat-capacity', 'cr', 'agrees', 1));
    expect(narrow(enthalpy)).toBeCloseTo(0.05, 12);
  });

  it('has no bound where no rule can test the cell', () => {
    expect(leastFrom(nothing)(enthalpy)).toBe(Number.POSITIVE_INFINITY);
    const untestable = leastFrom(covered('enthalpy-follows-heat-capacity', 'cr', 'untestable', null));
    expect(untestable(enthalpy)).toBe(Number.POSITIVE_INFINITY);
  });

  it('tests an anchor through the transitions of its phase', () => {
    expect(leastFrom(covered('gibbs-continuous', 'cr>l', 'agrees', 2))(formation)).toBeCloseTo(0.05, 12);
    expect(leastFrom(covered('gibbs-continuous', 'cr>g', 'agrees', 2))(formation)).toBe(Number.POSITIVE_INFINITY);
  });
});
