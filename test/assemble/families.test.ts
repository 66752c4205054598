import { describe, expect, it } from 'vitest';
import { compare } from '../../pipeline/assemble/families.js';
import { entropyAt } from '../../pipeline/core/physics/curve.js';
import type { TableMeaning } from '../../schemas/table-meaning.js';
import { anchorOf, assembled, curveOfPhase, datum, POLICY, seriesOf, transitionOf } from './cases.js';
import { steps, TR, withReference } from './model.js';

const GRID = withReference(steps(250, 450, 20));

const fluid = (phase: string, cp: number, h: number, s: number, table: Partial<TableMeaning>) =>
  seriesOf({
    phase,
    temperatureK: GRID,
    cp: { values: GRID.map(() => cp), decimals: 4 },
    s: { values: GRID.map((t) => s + cp * Math.log(t / 350)), decimals: 4 },
    h: { values: GRID.map((t) => h + cp * (t - 350)), decimals: 2 },
    table,
  });

const WATER_LIKE = {
  criticalTemperatureK: 600,
  criticalPressurePa: 5e6,
  acentricFactor: 0.3,
  polarA: 0,
  polarB: 0,
  class: 'molecular' as const,
};

describe('families of curves', () => {
  const isobar = { isobarPa: 101325, enthalpyZero: 'triple point', entropyZero: 'triple point' };
  const standard = { enthalpyZero: 'elements-298.15', entropyZero: 'absolute' };
  // Meets at 350 K on the isobar, at 340 K on the standard state: the two disagree, so that a mixture would show.
  const series = [
    fluid('l', 80, 0, 100, isobar),
    fluid('g', 40, 35000, 200, isobar),
    fluid('l', 80, 0, 100, standard),
    fluid('g', 40, 34000, 200, standard),
  ];
  const result = assembled({
    series,
    substance: WATER_LIKE,
    transitions: [transitionOf('l', 'g', datum(350), { gas: 'real', pressurePa: 101325 })],
  });

  it('are one for the standard state, first, and one for each isobar', () => {
    expect(result.curves.map((c) => [c.phase, c.family.isobarPa])).toEqual([
      ['l', null],
      ['g', null],
      ['l', 101325],
      ['g', 101325],
    ]);
  });

  it('are never crossed with each other, and an isobar gets no gas term on top of what is in its values', () => {
    const on = result.crossings.filter((c) => c.family.isobarPa === 101325);
    expect(on.length).toBe(1);
    expect(on[0].temperatureK).toBeCloseTo(350, 4);
    expect(on[0].pressurePa).toBe(101325);
    for (const c of result.crossings)
      expect(Math.abs(c.temperatureK - (c.family.isobarPa === null ? 340 : 350))).toBeLessThan(3);
    const standardOnes = result.crossings.filter((c) => c.family.isobarPa === null);
    expect(standardOnes.map((c) => [c.pressurePa, c.gas])).toEqual([
      [100000, 'real'],
      [101325, 'real'],
    ]);
    // Raising the pressure raises the boiling point.
    expect(standardOnes[1].temperatureK).toBeGreaterThan(standardOnes[0].temperatureK);
  });

  it('draw the ideal gas for a transition that says so, beside the real one', () => {
    const ideal = assembled({
      series: series.slice(2),
      substance: WATER_LIKE,
      transitions: [transitionOf('l', 'g', datum(340), { gas: 'ideal' })],
    });
    const [real, other] = ideal.crossings;
    expect([real.gas, other.gas]).toEqual(['real', 'ideal']);
    expect(other.temperatureK).toBeCloseTo(340 - 0.0, -1);
    expect(other.temperatureK).toBeGreaterThan(real.temperatureK);
    expect(other.uK).toBeLessThan(real.uK);
  });

  it('publish a condensed crossing once, whatever gas transitions there are', () => {
    const cr = seriesOf({
      phase: 'cr',
      temperatureK: GRID,
      cp: { values: GRID.map(() => 80), decimals: 4 },
      s: { values: GRID.map((t) => 80 + 80 * Math.log(t / 350)), decimals: 4 },
      h: { values: GRID.map((t) => -6000 + 80 * (t - 350)), decimals: 2 },
      table: standard,
    });
    const three = assembled({
      series: [cr, ...series.slice(2)],
      substance: WATER_LIKE,
      transitions: [transitionOf('l', 'g', datum(340), { gas: 'ideal' })],
    });
    const melting = three.crossings.filter((c) => c.from === 'cr' && c.to === 'l');
    expect(melting.length).toBe(1);
    expect(melting[0].gas).toBeNull();
    expect(melting[0].temperatureK).toBeCloseTo(300, 4);
    expect(melting[0].enthalpyJPerMol).toBeCloseTo(6000, 4);
    expect(melting[0].entropyJPerMolK).toBeCloseTo(20, 6);
    // u(T) = u(dG)/|dS|, some hundredths of a kelvin from the printed digits.
    expect(melting[0].uK).toBeGreaterThan(0);
    expect(melting[0].uK).toBeLessThan(0.01);
    expect(three.crossings.filter((c) => c.from === 'cr' && c.to === 'g').every((c) => !c.stable)).toBe(true);
    expect(melting[0].stable).toBe(true);
    expect(melting[0].measured).toBe(true);
  });

  it('take no level from an anchor on another zero', () => {
    const bare = seriesOf({ phase: 'l', temperatureK: GRID, cp: { values: GRID.map(() => 80), decimals: 3 } });
    const anchors = [
      anchorOf('l', { s: datum(10) }, { source: 'first', entropyZero: 'absolute' }),
      anchorOf('l', { s: datum(999) }, { source: 'second', rank: 2, entropyZero: 'triple point' }),
    ];
    const curve = curveOfPhase(assembled({ series: [bare], anchors }), 'l');
    expect(entropyAt(curve, TR)).toBeCloseTo(10, 9);
  });
});

describe('preference among series', () => {
  const make = (table: Partial<TableMeaning>, rows: number, withS = false) => {
    const temperatureK = steps(300, 300 + 10 * (rows - 1), 10);
    return seriesOf({
      phase: 'l',
      temperatureK,
      cp: { values: temperatureK.map(() => 80), decimals: 3 },
      ...(withS ? { s: { values: temperatureK.map(() => 1), decimals: 3 } } : {}),
      table,
    });
  };

  it('goes by preferred sources, rank, tables with S or H, more rows, then the name of the source', () => {
    const policy = { ...POLICY, preferredSources: ['z'] };
    const order = [
      make({ source: 'a', rank: 1 }, 5),
      make({ source: 'z', rank: 9 }, 3),
      make({ source: 'c', rank: 1 }, 3, true),
      make({ source: 'b', rank: 0.5 }, 3),
      make({ source: 'e', rank: 1 }, 4),
      make({ source: 'd', rank: 1 }, 4),
    ]
      .sort((a, b) => compare(a, b, policy))
      .map((s) => s.table.source);
    expect(order).toEqual(['z', 'b', 'c', 'a', 'd', 'e']);
  });
});
