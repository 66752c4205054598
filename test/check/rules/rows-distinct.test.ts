import { describe, expect, it } from 'vitest';
import {
  against,
  CP,
  examined,
  findingsOf,
  H,
  type Law,
  laws,
  medium,
  moved,
  outcomeOf,
  rowsOf,
  S,
  silent,
  T,
  verdictOf,
} from '../medium.js';

const verdict = (printed: ReturnType<typeof medium>) => verdictOf(examined(printed), 'rows-distinct', 'cr');
/** The crystal alone, its row of 400 K printed a second time. */
function twice(change: (row: string[]) => void, basis: 'evaluated' | 'measured' = 'evaluated') {
  const printed = medium(basis);
  const rows = printed.tables.cr!;
  const at = rows.findIndex((row) => row[T] === '400');
  const again = [...rows[at]!];
  change(again);
  printed.tables = { cr: rows.toSpliced(at + 1, 0, again) };
  return printed;
}

describe('rows-distinct', () => {
  it('is silent on an evaluated table with rising temperatures', () => {
    expect(verdict(medium())).toEqual(silent('arithmetic'));
  });

  it('is silent on a row printed twice with the same numbers, or with another Cp: the two sides of a step in Cp', () => {
    expect(verdict(twice(() => {}))).toEqual(silent('arithmetic'));
    expect(verdict(twice((row) => (row[CP] = moved(row[CP]!, 3))))).toEqual(silent('arithmetic'));
  });

  it('is silent on the two sides of a glass transition', () => {
    const { l } = laws();
    const glass: Law = {
      ...l,
      parts: [
        { fromK: 1, cp: () => 48 },
        { fromK: 380, cp: l.parts[0]!.cp },
      ],
    };
    const printed = medium();
    printed.tables = { cr: rowsOf(glass, [298.15, 300, 320, 340, 360, 380, 380, 400, 420, 440, 460]) };
    expect(verdict(printed)).toEqual(silent('arithmetic'));
  });

  it('leaves rows that differ in S and in H to the rule of jumps', () => {
    const printed = twice((row) => {
      row[S] = moved(row[S]!, 10);
      row[H] = moved(row[H]!, 4);
    });
    expect(verdict(printed)).toEqual(silent('arithmetic'));
  });

  it('finds two rows of one temperature that differ in S alone, and names both lines', () => {
    const found = examined(twice((row) => (row[S] = moved(row[S]!, 0.5))));
    expect(verdictOf(found, 'rows-distinct', 'cr')).toEqual(against('fault', 'arithmetic'));
    const [finding] = findingsOf(found, 'rows-distinct');
    expect(finding!.temperatureK).toBe(400);
    expect(finding!.difference).toBeCloseTo(0.5, 9);
    expect(finding!.address).toMatchObject({ file: 'cr.csv', column: 'S' });
    expect(finding!.detail).toMatchObject({ code: 'rows-disagree', otherLine: finding!.address!.line - 1 });
    expect(finding!.evidence).toHaveLength(2);
  });

  it('finds temperatures that fall in an evaluated table, once', () => {
    const printed = medium();
    const rows = printed.tables.cr!;
    printed.tables = { cr: [...rows.slice(0, 6), rows[7]!, rows[6]!, rows[9]!, rows[8]!, ...rows.slice(10)] };
    const found = examined(printed);
    expect(verdictOf(found, 'rows-distinct', 'cr')).toEqual(against('fault', 'arithmetic'));
    expect(findingsOf(found, 'rows-distinct')[0]!.detail).toEqual({ code: 'temperatures-fall', previousK: 420 });
  });

  it('lets a measured series return to a temperature, and compares its heat capacities there', () => {
    const returned = twice((row) => (row[CP] = moved(row[CP]!, 0.4)), 'measured');
    expect(verdict(returned)).toEqual(silent('independent'));
    returned.tables.cr!.push(returned.tables.cr![3]!);
    expect(verdict(returned)).toEqual(silent('independent'));
    const apart = examined(twice((row) => (row[CP] = moved(row[CP]!, 8)), 'measured'));
    expect(verdictOf(apart, 'rows-distinct', 'cr')).toEqual(against('doubt', 'independent'));
    expect(findingsOf(apart, 'rows-distinct')[0]!.temperatureK).toBe(400);
  });

  it('is untestable on a single row, and on a measured series that never returns', () => {
    const one = medium();
    one.tables = { cr: one.tables.cr!.slice(0, 1) };
    expect(outcomeOf(examined(one), 'rows-distinct', 'cr')).toMatchObject({
      outcome: 'untestable',
      missing: 'at least two rows',
    });
    const once = outcomeOf(examined(medium('measured')), 'rows-distinct', 'cr');
    expect(once.outcome).toBe('untestable');
    expect(once.missing).toContain('two rows at one temperature');
  });
});
