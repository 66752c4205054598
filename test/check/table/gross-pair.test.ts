import { describe, expect, it } from 'vitest';
import { CP, examined, F, findingsOf, H, type Law, laws, medium, rowsOf, S } from '../medium.js';

/** Every 20 K, heat capacities alone where not said otherwise; some rows times a factor. */
function spoilt(factors: Readonly<Record<number, number>>, law: Law = laws().cr, without = [S, F, H]) {
  const printed = medium();
  printed.tables = {
    cr: rowsOf(
      law,
      Array.from({ length: 16 }, (_, i) => 300 + 20 * i),
    ),
  };
  printed.without = without;
  for (const [line, factor] of Object.entries(factors)) {
    const row = printed.tables.cr![Number(line)]!;
    row[CP] = (Number(row[CP]) * factor).toFixed(3);
  }
  return examined(printed);
}

describe('two grossly wrong heat capacities side by side', () => {
  it.each([
    [{ 7: 1 / 4.184, 8: 1000 }],
    [{ 6: 3.9, 8: 0.24 }],
    [{ 6: 3.9, 9: 0.24 }],
    [{ 5: 0.12, 9: 0.007 }],
    [{ 6: 1.4, 7: 1.4 }],
  ])('are both named, and no other cell: %j', (factors) => {
    const found = spoilt(factors);
    const lines = Object.keys(factors).map(Number);
    expect(found.named.map(({ row }) => row).sort((a, b) => a - b)).toEqual(lines);
    expect(findingsOf(found, 'heat-capacity-smooth').map(({ severity }) => severity)).toEqual(['fault']);
  });

  it('are both named beside entropies and enthalpies', () => {
    const { named, findings } = spoilt({ 6: 0.12, 7: 0.1 }, laws().cr, []);
    expect(named.map(({ row, quantity }) => `${quantity} ${row}`).sort()).toEqual([
      'heat-capacity 6',
      'heat-capacity 7',
    ]);
    expect(findings.map(({ rule }) => rule)).toEqual(['heat-capacity-smooth']);
  });

  it('are not seen in a sharp peak, nor in a step', () => {
    const { cr } = laws();
    const peak: Law = { ...cr, parts: [{ fromK: 1, cp: (t) => 40 + 60 * Math.exp(-(((t - 450) / 25) ** 2)) }] };
    const step: Law = {
      ...cr,
      parts: [
        { fromK: 1, cp: () => 40 },
        { fromK: 450, cp: () => 60 },
      ],
    };
    for (const law of [peak, step]) expect(spoilt({}, law).named).toEqual([]);
  });
});
