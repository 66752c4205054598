import { describe, expect, it } from 'vitest';
import {
  against,
  checked,
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
  TR,
  verdictOf,
} from '../medium.js';

const RULE = 'slope-jumps-only-at-transitions';
/** The crystal's table with S and H of every row from 400 K on raised by a jump of 5 J/(mol K), 400 K printed from both sides. */
function jumped(columns: readonly number[] = [S, H], basis: 'evaluated' | 'measured' = 'evaluated') {
  const printed = medium(basis);
  const rows = printed.tables.cr!;
  const at = rows.findIndex((row) => row[T] === '400');
  printed.tables.cr = rows.flatMap((row, i) => {
    if (i < at) return [row];
    const above = [...row];
    if (columns.includes(S)) above[S] = moved(row[S]!, 5);
    if (columns.includes(H)) above[H] = moved(row[H]!, 2);
    return i === at ? [row, above] : [above];
  });
  printed.without = [3];
  return printed;
}

describe(RULE, () => {
  it('is silent on a table without a jump, and on the two sides of a glass transition', () => {
    expect(verdictOf(checked(medium()), RULE, 'cr')).toEqual(silent('arithmetic'));
    const { l } = laws();
    const glass: Law = {
      ...l,
      parts: [
        { fromK: 1, cp: () => 45 },
        { fromK: 400, cp: l.parts[0]!.cp },
      ],
    };
    const printed = medium();
    printed.tables.l = rowsOf(glass, [TR, 320, 340, 360, 380, 400, 400, 420, 440, 460, 480, 500]);
    expect(verdictOf(checked(printed), RULE, 'l')).toEqual(silent('arithmetic'));
  });

  it('finds a jump of S and H inside a phase where no transition is stated', () => {
    const found = checked(jumped());
    expect(verdictOf(found, RULE, 'cr')).toEqual(against('fault', 'arithmetic'));
    const [finding] = findingsOf(found, RULE);
    expect(finding).toMatchObject({ temperatureK: 400, unit: 'J/(mol.K)', address: { file: 'cr.csv', column: 'S' } });
    expect(finding!.difference).toBeCloseTo(5, 9);
    // 2 kJ/mol are 400 K times 5 J/(mol K).
    expect(finding!.detail).toEqual({ code: 'unstated-jump', quantity: 'entropy', closes: true });
  });

  it('does not call a jump a transition’s where dH is not T dS, or where it gives off heat', () => {
    for (const heat of [2.1, -2]) {
      const printed = jumped();
      const rows = printed.tables.cr!;
      for (const row of rows.slice(rows.findLastIndex((row) => row[T] === '400'))) row[H] = moved(row[H]!, heat - 2);
      const [finding] = findingsOf(checked(printed), RULE);
      expect(finding!.detail).toEqual({ code: 'unstated-jump', quantity: 'entropy' });
    }
  });

  it('is silent on that jump where a first-order transition of the phase is stated there', () => {
    const printed = jumped();
    printed.transitions.push({ from: 'cr', to: 'cr-II', T: '400.000', dH: '2.000', dS: '5.000', p: '1' });
    expect(verdictOf(checked(printed), RULE, 'cr')).toEqual(silent('arithmetic'));
    printed.transitions.at(-1)!.T = '460.000';
    expect(verdictOf(checked(printed), RULE, 'cr').outcome).toBe('disagrees');
    Object.assign(printed.transitions.at(-1)!, { T: '400.000', order: 'continuous' });
    expect(verdictOf(checked(printed), RULE, 'cr').outcome).toBe('disagrees');
  });

  it('leaves a step of S alone to the rows that disagree', () => {
    const found = checked(jumped([S]));
    expect(verdictOf(found, RULE, 'cr').outcome).toBe('agrees');
    expect(findingsOf(found, 'rows-distinct')).toHaveLength(1);
  });

  it.each([
    ['without S and H', { without: [S, H] }, 'entropies or enthalpies'],
    ['on a measured series, which may return', { basis: 'measured' as const }, 'evaluated table'],
  ])('is untestable %s, and says so', (_, change, missing) => {
    const outcome = outcomeOf(checked({ ...medium(), ...change }), RULE, 'cr');
    expect(outcome).toMatchObject({ outcome: 'untestable', evidence: null });
    expect(outcome.missing).toContain(missing);
  });
});
