import { describe, expect, it } from 'vitest';
import { debyeTail } from '../../pipeline/assemble/debye-tail.js';
import { limitPieces } from '../../pipeline/assemble/limit-interval.js';
import { enthalpyAt, entropyAt, heatCapacityAt } from '../../pipeline/core/physics/curve.js';
import { crossCovariance, stateCovariance } from '../../pipeline/core/physics/curve-uncertainty.js';
import type { PhaseCurve } from '../../schemas/curves.js';
import { eigenvalues, zeros } from '../core/numeric/dense.js';
import { integral } from '../core/numeric/quadrature.js';
import { anchorOf, assembled, curveOfPhase, datum, seriesOf } from './cases.js';
import { einstein, steps, TR, withReference } from './model.js';

/** P. Debye's function by quadrature (Ann. Phys. 344 (1912) 789): Cp, H - H(0) and S of one atom. */
function debye(thetaK: number) {
  const R = 8.31446261815324;
  const cp = (t: number): number =>
    t === 0
      ? 0
      : 9 *
        R *
        (t / thetaK) ** 3 *
        integral((x) => (x === 0 ? 0 : (x ** 4 * Math.exp(-x)) / Math.expm1(-x) ** 2), 0, Math.min(thetaK / t, 60));
  return {
    cp,
    h: (t: number): number => integral(cp, 0, t),
    s: (t: number): number => integral((x) => (x === 0 ? 0 : cp(x) / x), 0, t),
  };
}

const SOLID = debye(320);

function bare(temperatureK: number[], cp: (t: number) => number, shared = 0) {
  return seriesOf({ phase: 'cr', temperatureK, cp: { values: temperatureK.map(cp), decimals: 6, shared } });
}

/** Smallest eigenvalue over the largest of the joint covariance of (H, S) at the places. */
function leastEigenvalue(curve: PhaseCurve, places: readonly number[]): number {
  const m = zeros(2 * places.length, 2 * places.length);
  const size = [1, 1e-2];
  places.forEach((a, i) => {
    places.forEach((b, j) => {
      crossCovariance(curve, a, b).forEach((v, k) => {
        m[2 * i + (k >> 1)][2 * j + (k & 1)] = v / (size[k >> 1] * size[k & 1]);
      });
    });
  });
  const values = eigenvalues(m);
  return values[0] / values[values.length - 1];
}

describe('the tail below the lowest point', () => {
  it('gets back beta of a T^3 law, and gamma too for a metal', () => {
    const t = Float64Array.of(5, 8, 10, 14, 18);
    expect(
      debyeTail(
        t,
        t.map((x) => 6e-5 * x ** 3),
        false,
      )?.beta,
    ).toBeCloseTo(6e-5, 15);
    const metal = debyeTail(
      t,
      t.map((x) => 7e-4 * x + 6e-5 * x ** 3),
      true,
    );
    expect(metal?.beta).toBeCloseTo(6e-5, 14);
    expect(metal?.gamma).toBeCloseTo(7e-4, 12);
  });

  it('uses the points up to 20 K alone, and is nothing where there are none, or where they fall', () => {
    const t = Float64Array.of(10, 15, 30, 60);
    expect(debyeTail(t, Float64Array.of(0.06, 0.2025, 999, 999), false)?.beta).toBeCloseTo(6e-5, 12);
    expect(debyeTail(Float64Array.of(25, 30), Float64Array.of(1, 2), false)).toBeNull();
    expect(debyeTail(Float64Array.of(0, 10), Float64Array.of(0, 1), false)).toBeNull();
    expect(debyeTail(Float64Array.of(5, 10), Float64Array.of(1, 0.5), true)).toBeNull();
    expect(debyeTail(Float64Array.of(10, 20), Float64Array.of(-1, -2), false)).toBeNull();
  });

  it("closes a third-law entropy: Debye's solid measured from 12 K has S(298.15) and H - H(0) by quadrature of his function", () => {
    const grid = withReference([...steps(12, 20, 2), ...steps(25, 60, 5), ...steps(70, 320, 10)]);
    const curve = curveOfPhase(
      assembled({ series: [bare(grid, SOLID.cp)], anchors: [anchorOf('cr', { h: datum(0) })] }),
      'cr',
    );
    expect(curve.knotK[0]).toBe(0);
    expect(curve.measuredFromK).toBe(0);
    expect(curve.entropyLevelFrom).toBe('third-law');
    expect(Math.abs(entropyAt(curve, TR) / SOLID.s(TR) - 1)).toBeLessThan(3e-4);
    expect(Math.abs((enthalpyAt(curve, TR) - enthalpyAt(curve, 0)) / SOLID.h(TR) - 1)).toBeLessThan(3e-4);
    expect(Math.abs(entropyAt(curve, 0))).toBeLessThan(1e-12);
    // The tail's own few per cent are in u(S) at all temperatures above, as one common error.
    const own = 0.03 * ((curve.c3[0] * 12 ** 3) / 3);
    expect(Math.sqrt(stateCovariance(curve, 12).ss)).toBeCloseTo(own, 6);
    expect(Math.sqrt(stateCovariance(curve, TR).ss)).toBeGreaterThan(own);
    expect(crossCovariance(curve, 12, TR)[3]).toBeCloseTo(own ** 2, 9);
    expect(stateCovariance(curve, 0).ss).toBe(0);
    expect(leastEigenvalue(curve, [0, 3, 6, 12, 13, 20, 33, 100, TR, 310])).toBeGreaterThan(-1e-10);
  });

  it('counts a calibration of a third-law entropy from 0 K, that of H from the reference temperature', () => {
    const grid = withReference([...steps(12, 60, 4), ...steps(70, 320, 10)]);
    const make = (shared: number) =>
      curveOfPhase(
        assembled({ series: [bare(grid, SOLID.cp, shared)], anchors: [anchorOf('cr', { h: datum(0) })] }),
        'cr',
      );
    const extra = stateCovariance(make(0.01), TR).ss - stateCovariance(make(0), TR).ss;
    expect(Math.sqrt(extra) / (0.01 * SOLID.s(TR))).toBeCloseTo(1, 3);
    expect(stateCovariance(make(0.01), TR).hh).toBeCloseTo(stateCovariance(make(0), TR).hh, 9);
  });

  it('adds what the substance keeps at 0 K', () => {
    const grid = withReference([...steps(12, 60, 4), ...steps(70, 320, 10)]);
    const series = [bare(grid, SOLID.cp)];
    const without = curveOfPhase(assembled({ series }), 'cr');
    const ice = curveOfPhase(assembled({ series, substance: { residualEntropyJPerMolK: 3.41 } }), 'cr');
    expect(entropyAt(ice, TR) - entropyAt(without, TR)).toBeCloseTo(3.41, 10);
  });

  it('gives way to an anchored entropy, whose uncertainty then is all there is at its temperature', () => {
    const grid = withReference([...steps(12, 60, 4), ...steps(70, 320, 10)]);
    const curve = curveOfPhase(
      assembled({
        series: [bare(grid, SOLID.cp)],
        anchors: [anchorOf('cr', { h: datum(0), s: datum(30, 0.07) }, { source: 'other' })],
      }),
      'cr',
    );
    expect(curve.entropyLevelFrom).toBe('anchor');
    expect(entropyAt(curve, TR)).toBeCloseTo(30, 10);
    expect(Math.sqrt(stateCovariance(curve, TR).ss)).toBeCloseTo(0.07, 9);
    expect(Math.sqrt(stateCovariance(curve, 150).ss)).toBeGreaterThan(0.07);
  });

  it('is nothing for a liquid or a gas, nor above 20 K: there is no way down to 0 K', () => {
    const grid = steps(12, 60, 4);
    const liquid = seriesOf({
      phase: 'l',
      temperatureK: grid,
      cp: { values: grid.map((t) => 20 + t / 10), decimals: 3 },
    });
    expect(curveOfPhase(assembled({ series: [liquid] }), 'l').knotK[0]).toBeGreaterThan(0);
    const late = steps(25, 300, 25);
    const curve = curveOfPhase(assembled({ series: [bare(late, SOLID.cp)] }), 'cr');
    expect(curve.knotK[0]).toBeCloseTo(25 * 0.9, 9);
    expect(curve.entropyLevelFrom).not.toBe('third-law');
  });
});

describe('the interval from a row at 0 K', () => {
  it('never dips below zero, and meets Cp, H and S of the first row, for crystals of every stiffness', () => {
    for (const theta of [90, 160, 320, 800, 1900]) {
      for (const firstK of [50, 100, 200]) {
        const crystal = einstein([
          { weight: 0.6, thetaK: theta },
          { weight: 0.4, thetaK: 2.2 * theta },
        ]);
        const grid = withReference([0, ...steps(firstK, 400, 50), 500, 600]);
        const zero = (f: (t: number) => number) => (t: number) => (t === 0 ? 0 : f(t));
        const h0 = crystal.h(TR);
        const series = seriesOf({
          phase: 'cr',
          temperatureK: grid,
          cp: { values: grid.map(zero(crystal.cp)), decimals: 3 },
          s: { values: grid.map(zero(crystal.s)), decimals: 3 },
          increment: { values: grid.map((t) => zero(crystal.h)(t) - h0), decimals: 3, factor: 1000 },
        });
        const curve = curveOfPhase(assembled({ series: [series] }), 'cr');
        const reference = enthalpyAt(curve, TR);
        const q = series.enthalpyIncrement;
        expect(Math.abs(enthalpyAt(curve, firstK) - reference - (q?.values[1] ?? 0))).toBeLessThan(0.65);
        expect(Math.abs(entropyAt(curve, firstK) - crystal.s(firstK))).toBeLessThan(0.65e-3);
        expect(Math.abs(enthalpyAt(curve, 0) - reference + h0)).toBeLessThan(0.65);
        expect(Math.abs(entropyAt(curve, 0))).toBeLessThan(0.65e-3);
        // Where H at the first row is hardly more than its rounding, the printed figures themselves may ask for a sliver below
        // zero: the highest point of a bump of two roundings, 1.5 * 1.3 J/mol over the interval.
        const least = Math.min(...steps(0, firstK, firstK / 200).map((t) => heatCapacityAt(curve, t)));
        expect(least).toBeGreaterThan(crystal.h(firstK) > 10 ? -1e-9 : (-1.5 * 1.3) / firstK);
        expect(leastEigenvalue(curve, [0, firstK / 20, firstK / 3, firstK, firstK + 10, TR, 500])).toBeGreaterThan(
          -1e-10,
        );
      }
    }
  });

  it('has two pieces that join in Cp and slope and add up to the wanted H and S by quadrature', () => {
    const high = 100;
    const cp = SOLID.cp(high);
    const dH = SOLID.h(high);
    const dS = SOLID.s(high);
    const p = limitPieces(high, cp, dH, dS);
    if (p === null) throw new Error('no pieces');
    const { thetaK, beta } = p;
    expect(p.c0).toBeCloseTo(beta * thetaK ** 3, 12);
    expect(p.c1).toBeCloseTo(3 * beta * thetaK ** 2, 12);
    const upper = (x: number): number => p.c0 + p.c1 * x + p.c2 * x ** 2 + p.c3 * x ** 3;
    const w = high - thetaK;
    expect(upper(w)).toBeCloseTo(cp, 9);
    expect((beta * thetaK ** 4) / 4 + integral(upper, 0, w)).toBeCloseTo(dH, 7);
    expect((beta * thetaK ** 3) / 3 + integral((x) => upper(x) / (thetaK + x), 0, w, -thetaK)).toBeCloseTo(dS, 9);
    for (let x = 0; x <= w; x += w / 500) expect(upper(x)).toBeGreaterThanOrEqual(-1e-9);
  });

  it('is not there for a gas: its row at 0 K is a convention', () => {
    const grid = [0, 100, 200, TR, 400];
    const gas = seriesOf({
      phase: 'g',
      temperatureK: grid,
      cp: { values: grid.map((t) => (t === 0 ? 0 : 29.1)), decimals: 3 },
      s: { values: grid.map((t) => (t === 0 ? 0 : 190 + 29.1 * Math.log(t / TR))), decimals: 3 },
    });
    const curve = curveOfPhase(assembled({ series: [gas] }), 'g');
    expect(curve.measuredFromK).toBe(100);
    expect(curve.knotK[0]).toBeGreaterThan(0);
  });
});
