import { describe, expect, it } from 'vitest';
import { CP, examined, F, findingsOf, H, type Law, laws, medium, rowsOf, S, silent, T, verdictOf } from '../medium.js';

const RULE = 'heat-capacity-smooth';

/** The crystal with S and H printed so coarsely that 5 % of one Cp cannot show in them. */
function coarse(atK: string | null, factor = 1) {
  const printed = medium();
  printed.tables = { cr: printed.tables.cr! };
  printed.without = [F];
  for (const row of printed.tables.cr!) {
    row[S] = Number(row[S]).toFixed(0);
    row[H] = Number(row[H]).toFixed(0);
    if (row[T] === atK) row[CP] = (Number(row[CP]) * factor).toFixed(3);
  }
  return examined(printed);
}

/** Four rows between two temperatures printed from both sides, among longer stretches; one Cp of the given row spoilt. */
function between(line: number | null, factor = 1) {
  const { cr } = laws();
  const law: Law = {
    ...cr,
    parts: [
      { fromK: 1, cp: (t) => 40 + 0.02 * t },
      { fromK: 400, cp: (t) => 30 + 0.05 * t },
      { fromK: 460, cp: (t) => 60 - 0.01 * t },
    ],
  };
  const printed = medium();
  printed.tables = {
    cr: rowsOf(law, [300, 320, 340, 360, 380, 400, 400, 420, 440, 460, 460, 480, 500, 520, 540, 560]),
  };
  if (line !== null) {
    const row = printed.tables.cr![line]!;
    row[CP] = (Number(row[CP]) * factor).toFixed(3);
  }
  return examined(printed);
}

describe('a wrong Cp beside entropies and enthalpies too coarse to show it', () => {
  it.each([
    ['in the middle', '440'],
    ['in the second row', '320'],
    ['in the last row but one', '580'],
  ])('is named by its neighbours, %s', (_, atK) => {
    const found = coarse(atK, 1.05);
    expect(findingsOf(found, RULE).map(({ severity, temperatureK }) => [severity, temperatureK])).toEqual([
      ['fault', Number(atK)],
    ]);
    expect(found.named).toHaveLength(1);
  });

  it('is not there in the clean table', () => {
    expect(coarse(null).findings).toEqual([]);
  });
});

describe('a wrong Cp in a stretch of four rows between two-sided ones', () => {
  it.each([
    [7, 1 / 4.184],
    [7, 1.05],
    [8, 1000],
    [8, 0.95],
  ])('is named by the integrals: row %d off by the factor %d', (line, factor) => {
    const found = between(line, factor);
    expect(found.named.map(({ row, quantity }) => [row, quantity])).toEqual([[line, 'heat-capacity']]);
    const [finding] = findingsOf(found, RULE);
    expect(finding!.expected! * factor).toBeCloseTo(finding!.observed!, factor > 2 ? -2 : 1);
    expect(found.suspects[0]!.proposed).toBeCloseTo(finding!.observed! / factor, 1);
  });

  it('is not there in the clean table', () => {
    const found = between(null);
    expect(verdictOf(found, RULE, 'cr')).toEqual(silent('arithmetic'));
    expect(found.findings).toEqual([]);
  });
});
