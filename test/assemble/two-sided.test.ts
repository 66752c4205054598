import { describe, expect, it } from 'vitest';
import { enthalpyAt, entropyAt, gibbsAt, heatCapacityAt } from '../../pipeline/core/physics/curve.js';
import { gibbsUncertainty, stateCovariance } from '../../pipeline/core/physics/curve-uncertainty.js';
import { integral } from '../core/numeric/quadrature.js';
import { anchorOf, assembled, curveOfPhase, datum, POLICY, rowsOfPhase, seriesOf } from './cases.js';
import { TR } from './model.js';

/** Cp rises to a peak at 500 K, steps down there, and falls: a lambda point printed on both sides. */
const below = (t: number): number => 25 + 0.01 * t + 8 * ((t - 298.15) / 201.85) ** 4;
const above = (t: number): number => 36 - 0.02 * (t - 500) + 1e-5 * (t - 500) ** 2;
const LOW = [TR, 325, 350, 375, 400, 425, 450, 475, 500];
const HIGH = [500, 525, 550, 600, 650, 700];

/** H - H(Tr) and S by quadrature, with a jump of `dH` at 500 K. */
function table(dH: number, print: 'all' | 'cp' = 'all') {
  const rows = [...LOW.map((t) => ({ t, up: false })), ...HIGH.map((t) => ({ t, up: true }))];
  const h = (t: number, up: boolean): number =>
    integral(below, TR, Math.min(t, 500)) + (up ? dH + (t > 500 ? integral(above, 500, t) : 0) : 0);
  const s = (t: number, up: boolean): number =>
    40 +
    integral((x) => below(x) / x, TR, Math.min(t, 500)) +
    (up ? dH / 500 + (t > 500 ? integral((x) => above(x) / x, 500, t) : 0) : 0);
  const series = seriesOf({
    phase: 'cr',
    temperatureK: rows.map((r) => r.t),
    cp: { values: rows.map((r) => (r.up ? above(r.t) : below(r.t))), decimals: 3 },
    ...(print === 'all'
      ? {
          s: { values: rows.map((r) => s(r.t, r.up)), decimals: 3 },
          increment: { values: rows.map((r) => h(r.t, r.up)), decimals: 3, factor: 1000 },
        }
      : {}),
  });
  return { series, h, s };
}

describe('rows printed twice', () => {
  it.each(['all', 'cp'] as const)('split Cp there and leave H, S and G continuous (%s printed)', (print) => {
    const { series, h, s } = table(0, print);
    const curve = curveOfPhase(
      assembled({ series: [series], anchors: [anchorOf('cr', { h: datum(0), s: datum(40) })] }),
      'cr',
    );
    const upper = curve.knotK.lastIndexOf(500);
    const lower = upper - 1;
    expect(curve.knotK[lower]).toBe(500);
    expect(heatCapacityAt(curve, 500, lower - 1)).toBeCloseTo(below(500), 2);
    expect(heatCapacityAt(curve, 500)).toBeCloseTo(above(500), 2);
    expect(curve.enthalpyJPerMol[lower]).toBe(curve.enthalpyJPerMol[upper]);
    expect(curve.entropyJPerMolK[lower]).toBe(curve.entropyJPerMolK[upper]);
    expect(gibbsAt(curve, 500, lower - 1)).toBeCloseTo(gibbsAt(curve, 500), 8);
    // Neither side is smoothed into the other: midway to the next rows both are still on their own law.
    for (const [t, law] of [
      [490, below],
      [462, below],
      [510, above],
      [530, above],
    ] as const)
      expect(Math.abs(heatCapacityAt(curve, t) - law(t))).toBeLessThan(0.05);
    expect(Math.abs(enthalpyAt(curve, 690) - h(690, true))).toBeLessThan(3);
    expect(Math.abs(entropyAt(curve, 690) - s(690, true))).toBeLessThan(0.01);
  });

  it('carry a jump of H and S where the two rows print one', () => {
    const { series, h, s } = table(400);
    const curve = curveOfPhase(assembled({ series: [series], anchors: [anchorOf('cr', { h: datum(0) })] }), 'cr');
    const upper = curve.knotK.lastIndexOf(500);
    expect(Math.abs(curve.enthalpyJPerMol[upper] - curve.enthalpyJPerMol[upper - 1] - 400)).toBeLessThan(1.5);
    expect(Math.abs(curve.entropyJPerMolK[upper] - curve.entropyJPerMolK[upper - 1] - 0.8)).toBeLessThan(1.5e-3);
    for (const [t, up] of [
      [450, false],
      [650, true],
    ] as const) {
      expect(Math.abs(enthalpyAt(curve, t) - h(t, up))).toBeLessThan(0.65);
      expect(Math.abs(entropyAt(curve, t) - s(t, up))).toBeLessThan(0.65e-3);
    }
  });

  it('are published twice, below and above, with the Cp of either side', () => {
    const { series } = table(400);
    const rows = rowsOfPhase(assembled({ series: [series] }), 'cr');
    const at = Array.from(rows.temperatureK.subarray(0, rows.rows)).flatMap((t, i) => (t === 500 ? [i] : []));
    expect(at.map((i) => rows.side[i])).toEqual([1, 2]);
    expect(rows.heatCapacityJPerMolK[at[0]]).toBeCloseTo(below(500), 2);
    expect(rows.heatCapacityJPerMolK[at[1]]).toBeCloseTo(above(500), 2);
    expect(rows.enthalpyJPerMol[at[1]] - rows.enthalpyJPerMol[at[0]]).toBeGreaterThan(390);
    expect(Array.from(rows.side).filter((v) => v !== 0).length).toBe(2);
  });
});

describe('beyond the data', () => {
  const { series } = table(0);
  const curve = curveOfPhase(assembled({ series: [series] }), 'cr');

  it('the last Cp is held over a tenth of the end temperature, H and S its exact integrals', () => {
    expect(curve.measuredFromK).toBe(TR);
    expect(curve.measuredToK).toBe(700);
    expect(curve.knotK[0]).toBeCloseTo(0.9 * TR, 9);
    expect(curve.knotK[curve.knotK.length - 1]).toBeCloseTo(770, 9);
    const last = heatCapacityAt(curve, 700 - 1e-9);
    const first = heatCapacityAt(curve, TR);
    expect(heatCapacityAt(curve, 769)).toBeCloseTo(last, 6);
    expect(heatCapacityAt(curve, 270)).toBeCloseTo(first, 6);
    expect(enthalpyAt(curve, 760) - enthalpyAt(curve, 700)).toBeCloseTo(60 * last, 5);
    expect(entropyAt(curve, 760) - entropyAt(curve, 700)).toBeCloseTo(last * Math.log(760 / 700), 8);
    expect(entropyAt(curve, TR) - entropyAt(curve, 270)).toBeCloseTo(first * Math.log(TR / 270), 8);
  });

  it('its uncertainty grows by 10 % of Cp per 100 K, and never shrinks again', () => {
    const rows = rowsOfPhase(assembled({ series: [series] }, { ...POLICY, grid: { stepK: 10 } }), 'cr');
    const beyond = Array.from({ length: rows.rows }, (_, i) => i).filter((i) => rows.temperatureK[i] > 700);
    expect(beyond.length).toBeGreaterThan(5);
    for (const i of beyond) {
      expect(rows.basis[i]).toBe(2);
      const growth = 0.001 * rows.heatCapacityJPerMolK[i] * (rows.temperatureK[i] - 700);
      expect(rows.uHeatCapacityJPerMolK[i] / growth).toBeGreaterThan(0.99);
      expect(rows.uHeatCapacityJPerMolK[i] / growth).toBeLessThan(1.05);
    }
    let before = 0;
    for (let t = 700; t <= 770; t += 5) {
      const u = Math.sqrt(stateCovariance(curve, t).hh);
      expect(u).toBeGreaterThanOrEqual(before);
      before = u;
    }
    expect(gibbsUncertainty(curve, 770)).toBeGreaterThan(gibbsUncertainty(curve, 700));
    expect(gibbsUncertainty(curve, 0.91 * TR)).toBeGreaterThan(gibbsUncertainty(curve, TR));
  });

  it('nothing is continued where the policy says none', () => {
    const none = { ...POLICY, continuation: { ...POLICY.continuation, method: 'none' as const } };
    const ended = curveOfPhase(assembled({ series: [series] }, none), 'cr');
    expect(ended.knotK[0]).toBe(TR);
    expect(ended.knotK[ended.knotK.length - 1]).toBe(700);
    expect(Array.from(ended.knotKind)).not.toContain(2);
  });
});
