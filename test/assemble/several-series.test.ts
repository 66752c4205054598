import { describe, expect, it } from 'vitest';
import { enthalpyAt, entropyAt, gibbsAt, heatCapacityAt } from '../../pipeline/core/physics/curve.js';
import { stateCovariance } from '../../pipeline/core/physics/curve-uncertainty.js';
import type { TableMeaning } from '../../schemas/table-meaning.js';
import { integral } from '../core/numeric/quadrature.js';
import { anchorOf, assembled, curveOfPhase, datum, POLICY, seriesOf } from './cases.js';
import { einstein, type Model, steps, TR, withReference } from './model.js';

const TRUTH = einstein([
  { weight: 1, thetaK: 200 },
  { weight: 2, thetaK: 600 },
]);
/** Everything 2 % higher: another laboratory. */
const HIGHER: Model = { cp: (t) => 1.02 * TRUTH.cp(t), s: (t) => 1.02 * TRUTH.s(t), h: (t) => 1.02 * TRUTH.h(t) };

const cpOnly = (model: Model, temperatureK: number[], table: Partial<TableMeaning>, phase = 'cr') =>
  seriesOf({
    phase,
    temperatureK,
    cp: { values: temperatureK.map(model.cp), decimals: 4 },
    table: { file: `${table.source}.csv`, ...table },
  });

const complete = (model: Model, temperatureK: number[], table: Partial<TableMeaning>, incrementsFrom?: string) =>
  seriesOf({
    phase: 'cr',
    temperatureK,
    cp: { values: temperatureK.map(model.cp), decimals: 3 },
    s: { values: temperatureK.map(model.s), decimals: 3 },
    increment: { values: temperatureK.map((t) => model.h(t) - model.h(TR)), decimals: 3, factor: 1000 },
    table: { file: `${table.source}.csv`, ...table },
    ...(incrementsFrom === undefined ? {} : { incrementsFrom }),
  });

const ANCHOR = anchorOf('cr', { h: datum(-100000), s: datum(TRUTH.s(TR)) });

/** H and S on both sides of T, and their jump there. */
function jumpAt(curve: ReturnType<typeof curveOfPhase>, t: number): { h: number; s: number } {
  const below = curve.knotK.indexOf(t) - 1;
  const above = below + 1;
  return {
    h: enthalpyAt(curve, t, above) - enthalpyAt(curve, t, below),
    s: entropyAt(curve, t, above) - entropyAt(curve, t, below),
  };
}

describe('several series of one phase', () => {
  const preferred = cpOnly(TRUTH, steps(200, 400, 10), { source: 'alpha', rank: 1 });
  const lower = cpOnly(HIGHER, steps(100, 300, 20), { source: 'beta', rank: 2 });
  const upper = cpOnly(HIGHER, steps(350, 700, 50), { source: 'gamma', rank: 3 });
  const result = assembled({ series: [upper, lower, preferred], anchors: [ANCHOR] });
  const curve = curveOfPhase(result, 'cr');

  it('take the preferred one where they overlap, the others where they reach further', () => {
    for (const t of [200, 233, 300, 355, 399]) expect(heatCapacityAt(curve, t) / TRUTH.cp(t)).toBeCloseTo(1, 4);
    for (const t of [110, 150, 190, 410, 500, 650])
      expect(Math.abs(heatCapacityAt(curve, t) / HIGHER.cp(t) - 1)).toBeLessThan(0.002);
    expect(curve.measuredFromK).toBe(100);
    expect(curve.measuredToK).toBe(700);
  });

  it('run on in H and S at the join, while Cp steps', () => {
    for (const t of [200, 400]) {
      const { h, s } = jumpAt(curve, t);
      expect(Math.abs(h)).toBeLessThan(1e-9);
      expect(Math.abs(s)).toBeLessThan(1e-12);
    }
    const expected = integral(HIGHER.cp, 400, 650) + integral(TRUTH.cp, TR, 400) + (-100000 - 0);
    expect(Math.abs(enthalpyAt(curve, 650) - expected)).toBeLessThan(5);
  });

  it('record where each stretch came from, and the step of Cp at the join', () => {
    expect(curve.origins.map((o) => [o.source, o.lowK, o.highK])).toEqual([
      ['beta', 100, 200],
      ['alpha', 200, 400],
      ['gamma', 400, 700],
    ]);
    const step = curve.origins.map((o) => o.stepHeatCapacityJPerMolK);
    expect(step[0]).toBeCloseTo(0.02 * TRUTH.cp(200), 2);
    expect(step[1]).toBeNull();
    expect(step[2]).toBeCloseTo(0.02 * TRUTH.cp(400), 1);
    expect(curve.sources).toEqual(['alpha', 'beta', 'gamma', 'desk']);
  });

  it("follow the policy's preferred sources before ranks, and tables with S or H before bare ones of one rank", () => {
    const policy = { ...POLICY, preferredSources: ['beta'] };
    const chosen = curveOfPhase(assembled({ series: [upper, lower, preferred], anchors: [ANCHOR] }, policy), 'cr');
    expect(heatCapacityAt(chosen, 250) / HIGHER.cp(250)).toBeCloseTo(1, 3);
    const bare = cpOnly(HIGHER, steps(200, 400, 5), { source: 'delta' });
    const full = complete(TRUTH, withReference(steps(200, 400, 20)), { source: 'epsilon' });
    const both = curveOfPhase(assembled({ series: [bare, full] }), 'cr');
    expect(Math.abs(heatCapacityAt(both, 300) / TRUTH.cp(300) - 1)).toBeLessThan(1e-3);
  });

  it('record the step also where one series ends exactly where the other begins', () => {
    const below = cpOnly(HIGHER, steps(100, 200, 20), { source: 'beta', rank: 2 });
    const above = cpOnly(HIGHER, steps(400, 700, 50), { source: 'gamma', rank: 2 });
    const abutting = curveOfPhase(assembled({ series: [preferred, below, above], anchors: [ANCHOR] }), 'cr');
    const step = abutting.origins.map((o) => o.stepHeatCapacityJPerMolK);
    expect(step[0]).toBeCloseTo(0.02 * TRUTH.cp(200), 2);
    expect(step[2]).toBeCloseTo(0.02 * TRUTH.cp(400), 2);
  });

  it('reach each other in whatever order their ranks put them: the last one may close the way to an earlier one', () => {
    const far = cpOnly(TRUTH, steps(500, 700, 50), { source: 'far', rank: 2 });
    const between = cpOnly(TRUTH, steps(380, 520, 20), { source: 'between', rank: 3 });
    const joined = curveOfPhase(assembled({ series: [preferred, far, between], anchors: [ANCHOR] }), 'cr');
    expect(joined.measuredToK).toBe(700);
    expect(joined.origins.map((o) => o.source)).toEqual(['alpha', 'between', 'far']);
    expect(Math.abs(enthalpyAt(joined, 690) - (TRUTH.h(690) - TRUTH.h(TR) - 100000))).toBeLessThan(5);
  });

  it('bridge a gap that a continuation would cross anyway, with an error of its own, and no wider one', () => {
    const near = cpOnly(TRUTH, steps(420, 700, 20), { source: 'near', rank: 2 });
    const bridged = curveOfPhase(assembled({ series: [preferred, near], anchors: [ANCHOR] }), 'cr');
    expect(bridged.measuredToK).toBe(700);
    expect(Math.abs(enthalpyAt(bridged, 690) - (TRUTH.h(690) - TRUTH.h(TR) - 100000))).toBeLessThan(10);
    const { h, s } = jumpAt(bridged, 420);
    expect(Math.abs(h)).toBeLessThan(1e-9);
    expect(Math.abs(s)).toBeLessThan(1e-12);
    expect(stateCovariance(bridged, 420).hh).toBeGreaterThan(stateCovariance(bridged, 400).hh);
    const far = cpOnly(TRUTH, steps(600, 700, 20), { source: 'far', rank: 2 });
    expect(curveOfPhase(assembled({ series: [preferred, far], anchors: [ANCHOR] }), 'cr').measuredToK).toBe(400);
  });
});

describe('series with printed S and H among several', () => {
  const grid = withReference(steps(200, 500, 25));

  it('keep the preferred one its own printed S and H where another with S and H reaches lower or higher', () => {
    const best = complete(TRUTH, grid, { source: 'alpha', rank: 1 });
    const other = complete(HIGHER, withReference(steps(100, 800, 50)), { source: 'beta', rank: 2 });
    const curve = curveOfPhase(assembled({ series: [best, other], anchors: [ANCHOR] }), 'cr');
    for (const t of [200, 350, 500]) {
      expect(Math.abs(entropyAt(curve, t) - TRUTH.s(t))).toBeLessThan(0.65e-3);
      expect(Math.abs(enthalpyAt(curve, t) - (TRUTH.h(t) - TRUTH.h(TR) - 100000))).toBeLessThan(0.65);
    }
    // Beyond, the other's steps are added on.
    expect(entropyAt(curve, 800) - entropyAt(curve, 500)).toBeCloseTo(HIGHER.s(800) - HIGHER.s(500), 2);
    expect(entropyAt(curve, 200) - entropyAt(curve, 100)).toBeCloseTo(HIGHER.s(200) - HIGHER.s(100), 2);
  });

  it('take the levels of the one that prints them where the preferred one is bare', () => {
    const bare = cpOnly(TRUTH, steps(200, 400, 10), { source: 'alpha', rank: 1 });
    const full = complete(TRUTH, withReference(steps(100, 800, 50)), { source: 'beta', rank: 2 });
    const curve = curveOfPhase(assembled({ series: [bare, full], anchors: [ANCHOR] }), 'cr');
    for (const t of [150, TR, 600, 800]) {
      expect(Math.abs(entropyAt(curve, t) - TRUTH.s(t))).toBeLessThan(0.02);
      expect(Math.abs(gibbsAt(curve, t) - (TRUTH.h(t) - TRUTH.h(TR) - 100000 - t * TRUTH.s(t)))).toBeLessThan(15);
    }
  });

  it('are whole where the other prints S only within the stretch that is not taken', () => {
    const bare = cpOnly(TRUTH, steps(200, 400, 10), { source: 'alpha', rank: 1 });
    const temperatureK = withReference(steps(250, 700, 50));
    const partly = seriesOf({
      phase: 'cr',
      temperatureK,
      cp: { values: temperatureK.map(TRUTH.cp), decimals: 3 },
      s: { values: temperatureK.map((t) => (t === TR ? TRUTH.s(t) : Number.NaN)), decimals: 3 },
      table: { source: 'beta', rank: 2, file: 'beta.csv' },
    });
    const curve = curveOfPhase(assembled({ series: [bare, partly], anchors: [ANCHOR] }), 'cr');
    for (const t of [210, TR, 650]) {
      expect(Math.abs(entropyAt(curve, t) - TRUTH.s(t))).toBeLessThan(0.02);
      expect(enthalpyAt(curve, t)).not.toBeNaN();
    }
  });

  it('do not hold increments counted from another phase at zero at the reference temperature', () => {
    // A table of cr-II whose increments count from H(298.15 K) of cr: 3 kJ/mol above, at 298.15 K too.
    const temperatureK = withReference(steps(250, 800, 50));
    const from = seriesOf({
      phase: 'cr',
      temperatureK,
      cp: { values: temperatureK.map(TRUTH.cp), decimals: 3 },
      s: { values: temperatureK.map(TRUTH.s), decimals: 3 },
      increment: { values: temperatureK.map((t) => 3000 + TRUTH.h(t) - TRUTH.h(TR)), decimals: 3, factor: 1000 },
      incrementsFrom: 'cr-0',
      table: { source: 'beta', rank: 2, file: 'beta.csv' },
    });
    const bare = cpOnly(TRUTH, steps(260, 400, 10), { source: 'alpha', rank: 1 });
    const curve = curveOfPhase(assembled({ series: [bare, from], anchors: [ANCHOR] }), 'cr');
    // Whatever the level is taken from, no interval may be bent by 3 kJ/mol.
    for (const t of [255, TR, 320, 420, 600, 790])
      expect(Math.abs(heatCapacityAt(curve, t) / TRUTH.cp(t) - 1)).toBeLessThan(0.01);
  });
});
