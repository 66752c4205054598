import { describe, expect, it } from 'vitest';
import type { CurveArrays } from '../../../pipeline/core/physics/curve.js';
import { crossingsOf, gibbsInDiagram } from '../../../pipeline/core/physics/diagram.js';
import { column, solved } from '../numeric/dense.js';
import { seeded } from '../numeric/random.js';
import { type Cubic, curveOf, phaseOf } from './curves.js';

/**
 * Two phases with one interval each, whose dG vanishes at the wanted temperatures: dCp = slope (T - m), and m, dH and dS at
 * 300 K are the solution of the linear equations dG(T_k) = 0 (dG = dH + int dCp - T (dS + int dCp/T), worked out by hand).
 */
function pairThrough(roots: readonly [number, number, number], slope: number): [CurveArrays, CurveArrays] {
  const t0 = 300;
  const rows = roots.map((t) => [1, -t, -slope * (t - t0) + t * slope * Math.log(t / t0)]);
  const right = roots.map((t) => -(slope * (t * t - t0 * t0)) / 2 + t * slope * (t - t0));
  const [[dH], [dS], [m]] = solved(rows, column(right));
  const lower = curveOf([t0, 1500], [[40, 0.01, 0, 0]], 0, 60);
  const upper = curveOf([t0, 1500], [[40 + slope * (t0 - m), 0.01 + slope, 0, 0]], dH, 60 + dS);
  return [lower, upper];
}

/** dCp constant: dG vanishes twice. */
function pairThroughTwo(roots: readonly [number, number], dCp: number): [CurveArrays, CurveArrays] {
  const t0 = 300;
  const rows = roots.map((t) => [1, -t]);
  const right = roots.map((t) => -dCp * (t - t0) + t * dCp * Math.log(t / t0));
  const [[dH], [dS]] = solved(rows, column(right));
  return [curveOf([t0, 1500], [[40, 0.01, 0, 0]], 0, 60), curveOf([t0, 1500], [[40 + dCp, 0.01, 0, 0]], dH, 60 + dS)];
}

function expectRoots(found: readonly number[], wanted: readonly number[], within = 1e-6): void {
  expect(found.length).toBe(wanted.length);
  wanted.forEach((t, k) => {
    expect(Math.abs(found[k] - t)).toBeLessThan(within);
  });
}

describe('crossings of two phases', () => {
  it('has none where one phase lies below throughout, or where the two never meet in temperature', () => {
    const low = curveOf([300, 900], [[40, 0, 0, 0]], 0, 60);
    expect(crossingsOf(phaseOf(low), phaseOf(curveOf([300, 900], [[42, 0, 0, 0]], 30000, 65)))).toEqual([]);
    expect(crossingsOf(phaseOf(low), phaseOf(curveOf([950, 1200], [[42, 0, 0, 0]], 0, 65)))).toEqual([]);
  });

  it('finds the one crossing of a melting, dH/dS where Cp is the same, to 1e-9', () => {
    const solid = curveOf([300, 900], [[40, 0.01, 0, 0]], 0, 60);
    const liquid = curveOf([300, 900], [[40, 0.01, 0, 0]], 12345, 60 + 20);
    expectRoots(crossingsOf(phaseOf(solid), phaseOf(liquid)), [12345 / 20], 1e-6);
    expectRoots(crossingsOf(phaseOf(liquid), phaseOf(solid)), [12345 / 20], 1e-6);
  });

  it('finds both crossings inside one interval, near or far apart', () => {
    for (const roots of [
      [400, 1200],
      [700, 710],
      [301, 1499],
      [990, 990.5],
    ] as [number, number][]) {
      const [a, b] = pairThroughTwo(roots, 6);
      expectRoots(crossingsOf(phaseOf(a), phaseOf(b)), roots, 1e-4);
    }
  });

  it('finds all three crossings inside one interval', () => {
    for (const roots of [
      [450, 800, 1300],
      [700, 760, 820],
      [320, 1000, 1040],
    ] as [number, number, number][]) {
      const [a, b] = pairThrough(roots, 0.03);
      expectRoots(crossingsOf(phaseOf(a), phaseOf(b)), roots, 1e-4);
    }
  });

  it('sees a tangent once or not at all, two crossings just inside it and none just outside', () => {
    const [a, b] = pairThroughTwo([700, 700.001], 6);
    const moved = (by: number): CurveArrays => ({ ...b, enthalpyJPerMol: b.enthalpyJPerMol.map((h) => h + by) });
    const touching = crossingsOf(phaseOf(a), phaseOf(b));
    expect(touching.length).toBeLessThanOrEqual(2);
    for (const t of touching) expect(Math.abs(t - 700)).toBeLessThan(0.1);
    // dG = dCp (T - 700)^2/(2 T) near the tangent, to first order: 0.01 J/mol away it is sqrt(2 * 700 * 0.01/6) = 1.53 K wide.
    const sense = gibbsInDiagram(phaseOf(b), 800) > gibbsInDiagram(phaseOf(a), 800) ? -1 : 1;
    expectRoots(crossingsOf(phaseOf(a), phaseOf(moved(0.01 * sense))), [700 - 1.5275, 700 + 1.5275], 0.01);
    expect(crossingsOf(phaseOf(a), phaseOf(moved(-0.01 * sense)))).toEqual([]);
  });

  it('finds a phase that leaves and returns over several intervals, as bcc iron does', () => {
    const [a, b] = pairThroughTwo([620, 1180], 4);
    const cut = (c: CurveArrays, at: readonly number[]): CurveArrays => {
      const knots = [300, ...at, 1500];
      const [c0, c1] = [c.c0[0], c.c1[0]];
      const cubics = knots.slice(0, -1).map((t): Cubic => [c0 + c1 * (t - 300), c1, 0, 0]);
      return curveOf(knots, cubics, c.enthalpyJPerMol[0], c.entropyJPerMolK[0]);
    };
    const pieces = crossingsOf(phaseOf(cut(a, [400, 500, 620, 777])), phaseOf(cut(b, [450, 900, 1000, 1300])));
    expectRoots(pieces, [620, 1180], 1e-5);
  });

  it('counts a crossing that falls on a knot once, also on a knot that stands twice', () => {
    for (const knots of [
      [300, 600, 900],
      [300, 600, 600, 900],
    ]) {
      const cubics = knots.slice(1).map((): Cubic => [40, 0, 0, 0]);
      const solid = curveOf(knots, cubics, 0, 60);
      const liquid = curveOf(knots, cubics, 12000, 80);
      expectRoots(crossingsOf(phaseOf(solid), phaseOf(liquid)), [600], 1e-6);
    }
  });

  it('finds a crossing at the very first and the very last common temperature', () => {
    const solid = curveOf([300, 900], [[40, 0, 0, 0]], 0, 0);
    const early = curveOf([300, 900], [[40, 0, 0, 0]], 6000, 20);
    expectRoots(crossingsOf(phaseOf(solid), phaseOf(early)), [300]);
    const late = curveOf([300, 900], [[40, 0, 0, 0]], 18000, 20);
    expectRoots(crossingsOf(phaseOf(solid), phaseOf(late)), [900]);
  });

  it('takes the pressure term and the formula units of one mole into account', () => {
    const solid = curveOf([300, 900], [[40, 0, 0, 0]], 0, 60);
    const gas = curveOf([300, 900], [[40, 0, 0, 0]], 60000, 160);
    const shift = (t: number): number => 8.314 * Math.log(0.5) * t;
    expectRoots(crossingsOf(phaseOf(solid), phaseOf(gas, { shift })), [60000 / (100 - 8.314 * Math.log(0.5))], 1e-6);
    // Eight formula units in one mole of vapour: G of the vapour counts by an eighth.
    const vapour = curveOf([300, 900], [[320, 0, 0, 0]], 480000, 1280);
    expectRoots(crossingsOf(phaseOf(solid), phaseOf(vapour, { formulaUnits: 8 })), [60000 / 100], 1e-6);
  });

  it('finds on 300 random pairs exactly the changes of sign that a scan of 4000 points sees', () => {
    const { unit, normal } = seeded(20);
    let crossings = 0;
    let several = 0;
    for (let pair = 0; pair < 300; pair++) {
      const make = (h: number, s: number): CurveArrays => {
        const knots = [300];
        while (knots[knots.length - 1] < 1400) knots.push(knots[knots.length - 1] + 50 + 300 * unit());
        const cubics = knots.slice(1).map((t, i): Cubic => {
          const w = t - knots[i];
          return [35 + 6 * unit(), (3 * normal()) / w, (8 * normal()) / w ** 2, (8 * normal()) / w ** 3];
        });
        return curveOf(knots, cubics, h, s);
      };
      const a = phaseOf(make(0, 60));
      const s = 2 * normal();
      const b = phaseOf(make(s * (400 + 800 * unit()), 60 + s));
      const found = crossingsOf(a, b);
      const high = Math.min(a.highK, b.highK);
      const gap = (t: number): number => gibbsInDiagram(a, t) - gibbsInDiagram(b, t);
      const seen: number[] = [];
      let before = gap(300);
      for (let k = 1; k <= 4000; k++) {
        const t = 300 + ((high - 300) * k) / 4000;
        const after = gap(t);
        if (before > 0 !== after > 0) seen.push(t);
        before = after;
      }
      // A pair closer than the scan's step may be missed by the scan, never by us; an odd one cannot be.
      expect((found.length - seen.length) % 2).toBe(0);
      expect(found.length).toBeGreaterThanOrEqual(seen.length);
      for (const t of seen) expect(Math.min(...found.map((f) => Math.abs(f - t)))).toBeLessThan(0.4);
      for (const f of found) expect(Math.abs(gap(f))).toBeLessThan(1e-4);
      crossings += found.length;
      if (found.length > 1) several++;
    }
    expect(crossings).toBeGreaterThan(150);
    expect(several).toBeGreaterThan(30);
  });
});
