import { describe, expect, it } from 'vitest';
import { Detectable } from './detectable.js';
import { seededRandom } from './random.js';
import type { Seen, SeenFinding, SeenSuspect } from './seen.js';
import { readLibrary } from './slip-library.js';
import { draftSlip, SLIP_KINDS, type Slip } from './slip-maker.js';
import { Findings, scoreSlip } from './slip-score.js';

const lead = readLibrary('test/published').substances.find(({ id }) => id === 'lead')!;
const drafted = (name: string, family: string): Slip =>
  draftSlip(SLIP_KINDS.find((kind) => kind.name === name && kind.family === family)!, lead, seededRandom(2))!;
const slip = drafted('in calories', 'table');
const [planted] = slip.cells as [Slip['cells'][number]];

const finding = (id: string, more: Partial<SeenFinding> = {}): SeenFinding => ({
  finding: id,
  evidenceHash: `cells of ${id}`,
  substance: 'lead',
  rule: 'functions-close',
  severity: 'fault',
  cause: null,
  ...more,
});
const suspect = (of: string, place: number, group: number, more: Partial<SeenSuspect> = {}): SeenSuspect => ({
  finding: of,
  place,
  group,
  cells: 1,
  source: planted.source,
  file: planted.file,
  line: planted.line,
  column: planted.column,
  explanation: null,
  explainedPrinted: null,
  proposedPrinted: planted.clean,
  normalisedResidual: 9,
  ...more,
});
const other = { column: 'another' };
const seen = (findings: readonly SeenFinding[], suspects: readonly SeenSuspect[] = []) =>
  new Findings({ findings, suspects });
const nothing = seen([]);

describe('the score of a slip', () => {
  it('is first when the root finding has the cell first, explained when it says what was planted', () => {
    const named = seen([finding('a')], [suspect('a', 1, 1)]);
    expect(scoreSlip(slip, nothing, named)).toMatchObject({
      caught: true,
      first: true,
      firstGroup: true,
      explained: false,
    });
    const explained = seen([finding('a')], [suspect('a', 1, 1, { explanation: 'calorie-read-as-joule' })]);
    expect(scoreSlip(slip, nothing, explained)).toMatchObject({ first: true, explained: true, groupSize: 1 });
    expect(scoreSlip(drafted('S off', 'table'), nothing, named).explained).toBeNull();
  });

  it('is in the first group when the cell stands second there, and not when in a later group', () => {
    const near = seen([finding('a')], [suspect('a', 1, 1, other), suspect('a', 2, 1)]);
    expect(scoreSlip(slip, nothing, near)).toMatchObject({ first: false, firstGroup: true, groupSize: 2 });
    const far = seen([finding('a')], [suspect('a', 1, 1, other), suspect('a', 2, 2)]);
    expect(scoreSlip(slip, nothing, far)).toMatchObject({ caught: true, firstGroup: false, groupSize: 1 });
  });

  it('gives no credit for the right words about another cell', () => {
    const wrong = seen([finding('a')], [suspect('a', 1, 1, { ...other, explanation: 'calorie-read-as-joule' })]);
    expect(scoreSlip(slip, nothing, wrong)).toMatchObject({ first: false, explained: false });
  });

  it('does not count notes, nor what the clean library has already', () => {
    expect(scoreSlip(slip, nothing, seen([finding('a', { severity: 'note' })])).caught).toBe(false);
    const doubt = seen([finding('a', { severity: 'doubt' })], [suspect('a', 1, 1)]);
    expect(scoreSlip(slip, doubt, doubt).caught).toBe(false);
    expect(scoreSlip(slip, doubt, seen([finding('a')], [suspect('a', 1, 1)])).first).toBe(true);
  });

  it('passes over findings that follow from another one, and takes faults before doubts', () => {
    const findings = [
      finding('doubt', { severity: 'doubt' }),
      finding('follows', { cause: 'root' }),
      finding('root', { rule: 'entropy-follows-heat-capacity' }),
    ];
    const suspects = [suspect('doubt', 1, 1, other), suspect('follows', 1, 1, other), suspect('root', 1, 1)];
    const score = scoreSlip(slip, nothing, seen(findings, suspects));
    expect(score).toMatchObject({ first: true, rootRule: 'entropy-follows-heat-capacity', roots: 2 });
  });

  it('holds one of two slips against every root finding, and every group of it', () => {
    const findings = [finding('a'), finding('b')];
    const two = seen(findings, [suspect('a', 1, 1, other), suspect('b', 1, 1)]);
    expect(scoreSlip(slip, nothing, two, true).first).toBe(false);
    expect(scoreSlip(slip, nothing, two, false).first).toBe(true);
    const table = seen([finding('a')], [suspect('a', 1, 1, other), suspect('a', 2, 2)]);
    expect(scoreSlip(slip, nothing, table, true).first).toBe(false);
    expect(scoreSlip(slip, nothing, table, false).first).toBe(true);
  });

  it('takes any cell of a column, and the row of a word', () => {
    const column = drafted('column in calories', 'many');
    const last = column.cells.at(-1)!;
    const at = { file: last.file, line: last.line, column: last.column };
    expect(scoreSlip(column, nothing, seen([finding('a')], [suspect('a', 1, 1, at)])).first).toBe(true);
    const words = drafted('from and to exchanged', 'datum');
    const row = { file: words.cells[0]!.file, line: words.cells[0]!.line, column: 'dS_J_mol_K' };
    expect(scoreSlip(words, nothing, seen([finding('a')], [suspect('a', 1, 1, row)])).first).toBe(true);
  });
});

describe('the smallest detectable error of a cell', () => {
  const enthalpy = lead.cells.find((cell) => cell.quantity === 'enthalpy-increment' && cell.temperatureK === 400)!;
  const formation = lead.cells.find((cell) => cell.quantity === 'enthalpy-of-formation' && cell.place === 'l')!;
  const covered = (...rows: readonly (readonly [string, string, string, number | null])[]): Detectable => {
    const coverage = rows.map(([rule, place, outcome, smallestDetectable]) => ({
      ...{ substance: 'lead', rule, place, outcome, smallestDetectable },
    }));
    return new Detectable({ findings: [], suspects: [], coverage } satisfies Seen);
  };

  it('is the sharpest of the rules that test its quantity in its phase', () => {
    const place = enthalpy.place;
    const rules = covered(
      ['enthalpy-follows-heat-capacity', place, 'agrees', 400],
      ['functions-close', place, 'agrees', 0.005],
      ['functions-close', 'g', 'agrees', 0.001],
    );
    expect(rules.leastOf(enthalpy)).toBeCloseTo(2, 12);
    expect(covered(['enthalpy-follows-heat-capacity', place, 'agrees', 1]).leastOf(enthalpy)).toBe(1);
  });

  it('has no bound where no rule can test the cell', () => {
    expect(covered().leastOf(enthalpy)).toBe(Number.POSITIVE_INFINITY);
    const untestable = covered(['enthalpy-follows-heat-capacity', enthalpy.place, 'untestable', null]);
    expect(untestable.leastOf(enthalpy)).toBe(Number.POSITIVE_INFINITY);
  });

  it('of an anchor is what the adjustment says, else what the transitions of its phase say', () => {
    expect(covered(['gibbs-continuous', 'cr>l', 'agrees', 2]).leastOf(formation)).toBe(2);
    expect(covered(['gibbs-continuous', 'cr>g', 'agrees', 2]).leastOf(formation)).toBe(Number.POSITIVE_INFINITY);
    const both = covered(['gibbs-continuous', 'cr>l', 'agrees', 2], ['adjustment-closes', 'dfH l', 'agrees', 7]);
    expect(both.leastOf(formation)).toBe(7);
    const untested = covered(['gibbs-continuous', 'cr>l', 'agrees', 2], ['adjustment-closes', 'dfH g', 'agrees', 7]);
    expect(untested.leastOf(formation)).toBe(Number.POSITIVE_INFINITY);
  });

  it('asks for slips of 1.5 times that', () => {
    const change = Math.abs(planted.changeSi!);
    const rule = { entropy: 'entropy-follows-heat-capacity' }[planted.cell!.quantity] ?? 'functions-close';
    const least = (times: number) => {
      const scale =
        rule === 'functions-close' && planted.cell!.quantity.startsWith('enthalpy') ? planted.cell!.temperatureK : 1;
      return covered([rule, planted.cell!.place, 'agrees', change / times / scale]);
    };
    expect(least(1.51).isTestable(slip)).toBe(true);
    expect(least(1.49).isTestable(slip)).toBe(false);
  });
});
