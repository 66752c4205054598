/** Laws in an invented medium: columns that cannot be told apart, runs of rows, and what is no law at all. */
import { describe, expect, it } from 'vitest';
import type { ExaminedCase } from '../../../schemas/checked.js';
import { CP, examined, F, H, medium, moved, outcomeOf, type Printed, S, T } from '../medium.js';

const crystal = (without: number[] = []): Printed => {
  const printed = medium();
  printed.tables = { cr: printed.tables.cr! };
  printed.without = without;
  return printed;
};
const scale = (printed: Printed, column: number, factor: number, rows: (i: number) => boolean = () => true) => {
  printed.tables.cr!.forEach((row, i) => {
    if (rows(i) && row[column] !== '') row[column] = (Number(row[column]) * factor).toFixed(3);
  });
  return printed;
};
const columnsOf = ({ findings }: ExaminedCase) =>
  findings.flatMap(({ detail, cause }) => (detail.code === 'column' ? [{ ...detail, cause }] : []));
const CAL = 1 / 4.184;

describe('columns that a table cannot tell apart', () => {
  it('S and Cp alone are one group; an anchor tells them apart', () => {
    const printed = scale(crystal([F, H]), S, 1 / 1.3);
    printed.anchors = [];
    const found = examined(printed);
    expect(columnsOf(found)).toMatchObject([{ explanation: null }]);
    expect(found.suspects.map(({ place, group }) => [place, group])).toEqual([
      [1, 1],
      [2, 1],
    ]);
    expect(found.suspects.map(({ toldApartBy }) => toldApartBy)).toEqual(
      Array(2).fill('an entropy of cr at 298.15 K from elsewhere'),
    );
    const ratios = new Map(found.suspects.map((one) => [one.address.column, one.proposed / one.observed]));
    expect(ratios.get('S')).toBeCloseTo(1.3, 3);
    expect(ratios.get('Cp')).toBeCloseTo(1 / 1.3, 3);
    const anchored = examined(scale(crystal([F, H]), S, 1 / 1.3));
    expect(anchored.suspects.map(({ address }) => address.column)).toEqual(['S']);
  });

  it('without an anchor, Cp of some 3 R an atom tells calories from joules', () => {
    for (const [column, quantity] of [
      [S, 'entropy'],
      [CP, 'heat-capacity'],
    ] as const) {
      const printed = scale(crystal([F, H]), column, CAL);
      printed.anchors = [];
      const found = examined(printed);
      expect(columnsOf(found)).toMatchObject([{ quantity, explanation: 'calorie-read-as-joule' }]);
      expect(found.suspects).toHaveLength(1);
    }
  });

  it('an anchor that is met by S as printed leaves Cp', () => {
    const found = examined(scale(crystal([F, H]), CP, CAL));
    expect(columnsOf(found)).toMatchObject([{ quantity: 'heat-capacity', explanation: 'calorie-read-as-joule' }]);
    expect(found.suspects[0]!.address.column).toBe('Cp');
    expect(found.named.every(({ quantity }) => quantity === 'heat-capacity')).toBe(true);
    expect(found.named).toHaveLength(printedRows());
  });

  it('-[G - H]/T is never accused where no row holds all three functions together', () => {
    const found = examined(scale(crystal([H]), F, CAL));
    expect(columnsOf(found)).toEqual([]);
  });
});

describe('runs of rows', () => {
  const rows = printedRows();
  it.each([
    ['S', S, 'entropy'],
    ['H', H, 'enthalpy-increment'],
    ['-[G - H]/T', F, 'gibbs-function'],
    ['Cp', CP, 'heat-capacity'],
  ])('%s in calories from one row to the end is named with just these rows', (_, column, quantity) => {
    const found = examined(scale(crystal(), column, CAL, (i) => i >= rows - 7));
    expect(columnsOf(found)).toMatchObject([{ quantity, explanation: 'calorie-read-as-joule', cells: 7 }]);
    expect(found.findings).toHaveLength(1);
    expect(found.named.map(({ row }) => row).sort((a, b) => a - b)).toEqual(
      Array.from({ length: 7 }, (_row, i) => rows - 7 + i),
    );
  });

  it('from the beginning to one row, too', () => {
    const found = examined(scale(crystal(), S, CAL, (i) => i < 6));
    expect(columnsOf(found)).toMatchObject([{ quantity: 'entropy', cells: 6 }]);
  });
});

describe('what is no law', () => {
  it.each([
    ['one wrong S', S, [5]],
    ['three wrong S', S, [3, 8, 12]],
    ['a wrong Cp', CP, [8]],
    ['two wrong H', H, [4, 9]],
  ])('%s: cells are named, no column', (_, column, wrong) => {
    const printed = crystal();
    for (const i of wrong) {
      const row = printed.tables.cr![i]!;
      row[column] = moved(row[column]!, 3 + i);
    }
    const found = examined(printed);
    expect(columnsOf(found)).toEqual([]);
    expect(found.suspects.filter(({ place }) => place <= wrong.length).every(({ cells }) => cells === 1)).toBe(true);
    expect(new Set(found.named.map(({ row }) => row))).toEqual(new Set(wrong));
  });

  it('figures thrown together close by no law', () => {
    const printed = crystal();
    printed.tables.cr!.forEach((row, i) => {
      row[S] = (40 + ((i * 7919) % 53)).toFixed(3);
    });
    expect(columnsOf(examined(printed))).toEqual([]);
  });

  it('a wrong H at Tr alone is a cell, not a zero that lies elsewhere', () => {
    const printed = crystal();
    const row = printed.tables.cr!.find((one) => one[T] === '298.15')!;
    row[H] = '2.500';
    const found = examined(printed);
    expect(columnsOf(found)).toEqual([]);
    expect(found.suspects[0]!.address).toMatchObject({ line: 2, column: 'H-H(Tr)' });
  });
});

describe('figures', () => {
  it('joules that end in noughts are known to ten joules only', () => {
    const printed = crystal();
    printed.tables.cr!.forEach((row) => {
      row[H] = (1000 * Number(Number(row[H]).toFixed(2))).toFixed(0);
      row[S] = Number(row[S]).toFixed(2);
      row[F] = Number(row[F]).toFixed(2);
    });
    expect(columnsOf(examined(printed))).toMatchObject([{ quantity: 'enthalpy-increment', explanation: 'kilo-added' }]);
  });
});

describe('temperatures below 0 K where only Cp stands beside them', () => {
  const inCelsius = (lowerBy: number) => {
    const printed = crystal([S, F, H]);
    for (const row of printed.tables.cr!) row[T] = (Number(row[T]) - 273.15 - lowerBy).toFixed(2);
    return printed;
  };

  it('are degrees Celsius, one finding with what cannot be as its consequence', () => {
    const found = examined(inCelsius(100));
    expect(columnsOf(found)).toMatchObject([
      { quantity: 'temperature', explanation: 'celsius-read-as-kelvin', cause: null },
    ]);
    const others = found.findings.filter(({ detail }) => detail.code !== 'column');
    expect(others.map(({ rule }) => rule)).toEqual(['value-possible']);
    expect(others[0]!.cause).not.toBeNull();
    expect(outcomeOf(found, 'value-possible', 'cr').outcome).toBe('disagrees');
    expect(new Set(found.named.map(({ quantity }) => quantity))).toEqual(new Set(['temperature']));
  });

  it('are degrees Fahrenheit where Celsius would leave some below 0 K', () => {
    const printed = crystal([S, F, H]);
    for (const row of printed.tables.cr!) row[T] = (1.8 * (Number(row[T]) - 290) - 459.67).toFixed(2);
    expect(columnsOf(examined(printed))).toMatchObject([{ explanation: 'fahrenheit-not-converted' }]);
  });

  it('are a cell where there is one alone', () => {
    const printed = crystal([S, F, H]);
    const row = printed.tables.cr![0]!;
    row[T] = `-${row[T]}`;
    const found = examined(printed);
    expect(columnsOf(found)).toEqual([]);
    expect(found.findings.some(({ rule }) => rule === 'value-possible')).toBe(true);
  });
});

function printedRows(): number {
  return medium().tables.cr!.length;
}
