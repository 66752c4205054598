import { describe, expect, it } from 'vitest';
import { FreeData, NON_CENTRALITY, whitened } from '../../../pipeline/core/physics/adjustment.js';
import { column, type Matrix, product, solved, transposed } from '../numeric/dense.js';
import { seeded } from '../numeric/random.js';

/**
 * Levelling network of C. D. Ghilani, Adjustment Computations, chapter 12 (figures from memory; they close on themselves):
 * bench marks X = 100.00 and Y = 107.50, unknown heights A, B, C, seven height differences over lines of 4, 3, 2, 3, 2, 2
 * and 2 miles. Published: A = 105.141, B = 104.483, C = 106.188 with equal weights, their residuals and S0 = 0.050;
 * 105.150, 104.489, 106.197 weighted by 1/length. Redundancy numbers and w are not among what is remembered of the example:
 * they are held against the adjustment by parameters below.
 */
const LINES = [
  { observed: 5.1 + 100, design: [1, 0, 0], miles: 4 },
  { observed: 2.34 - 107.5, design: [-1, 0, 0], miles: 3 },
  { observed: -1.25 + 107.5, design: [0, 0, 1], miles: 2 },
  { observed: -6.13 - 100, design: [0, 0, -1], miles: 3 },
  { observed: -0.68, design: [-1, 1, 0], miles: 2 },
  { observed: -3 + 107.5, design: [0, 1, 0], miles: 2 },
  { observed: 1.7, design: [0, -1, 1], miles: 2 },
];

/** Conditions on the seven: X-A-Y, X-C-Y, A-B-Y against X-A, and B-C against both; each vanishes for exact heights. */
const CONDITIONS: Matrix = [
  [1, 1, 0, 0, 0, 0, 0],
  [0, 0, 1, 1, 0, 0, 0],
  [1, 0, 0, 0, 1, -1, 0],
  [0, 0, 1, 0, 0, -1, -1],
];

function system(u: readonly number[], y: readonly number[], conditions: Matrix) {
  const scaled = conditions.map((row) => row.map((v, j) => v * u[j] ** 2));
  const q = product(scaled, transposed(conditions));
  const result = whitened(Float64Array.from(y), Float64Array.from(q.flat()), conditions.length);
  return { chiSquare: result.chiSquare, y: Float64Array.from(y), free: new FreeData(result) };
}

const testDatum = (s: ReturnType<typeof system>, d: Float64Array, u: number) => s.free.test(s.y, d, u);

const direction = (conditions: Matrix, i: number): Float64Array => Float64Array.from(conditions, (row) => row[i]);

/** The same network by parameters: heights, residuals and their cofactors from the normal equations (common practice). */
function byParameters(u: readonly number[], l: readonly number[], design: Matrix) {
  const weighted = design.map((row, i) => row.map((v) => v / u[i] ** 2));
  const normal = product(transposed(design), weighted);
  const inverse = solved(
    normal,
    normal.map((row, i) => row.map((_, j) => (i === j ? 1 : 0))),
  );
  const x = product(inverse, product(transposed(weighted), column(l))).map((row) => row[0]);
  const fitted = product(design, column(x)).map((row) => row[0]);
  const cofactor = product(product(design, inverse), transposed(design));
  return {
    x,
    residuals: l.map((v, i) => v - fitted[i]),
    redundancy: u.map((v, i) => 1 - cofactor[i][i] / v ** 2),
  };
}

describe('adjustment in condition form', () => {
  const l = LINES.map((line) => line.observed);
  const design = LINES.map((line) => line.design);
  const misclosures = product(CONDITIONS, column(l)).map((row) => row[0]);

  it('has conditions that vanish whatever the heights are', () => {
    for (const row of product(CONDITIONS, design)) for (const v of row) expect(v).toBe(0);
  });

  it.each([
    ['equal weights', LINES.map(() => 0.05), [105.141, 104.483, 106.188]],
    ['weights by length', LINES.map((line) => 0.05 * Math.sqrt(line.miles)), [105.15, 104.489, 106.197]],
  ])('reproduces the published heights of a levelling network with %s', (_, u, published) => {
    const s = system(u, misclosures, CONDITIONS);
    // v = Q B' (B Q B')^-1 y: u^2 times the datum's share of the whitened misclosure.
    const residuals = LINES.map((_line, i) => {
      const test = testDatum(s, direction(CONDITIONS, i), u[i]);
      if (test === null) throw new Error('unchecked');
      return (test.error * u[i] ** 2) / test.uError ** 2;
    });
    expect(l[0] - residuals[0]).toBeCloseTo(published[0], 3);
    expect(l[5] - residuals[5]).toBeCloseTo(published[1], 3);
    expect(l[2] - residuals[2]).toBeCloseTo(published[2], 3);
  });

  it('reproduces the published residuals of the network with equal weights, and its S0', () => {
    const u = LINES.map(() => 0.05);
    const s = system(u, misclosures, CONDITIONS);
    const residuals = LINES.map((_line, i) => {
      const test = testDatum(s, direction(CONDITIONS, i), u[i])!;
      return (-test.error * u[i] ** 2) / test.uError ** 2;
    });
    const published = [0.041, 0.019, -0.062, -0.058, 0.022, -0.017, 0.005];
    for (const [i, v] of residuals.entries()) expect(Math.abs(v - published[i]), `line ${i + 1}`).toBeLessThan(0.0006);
    const s0 = Math.sqrt(residuals.reduce((sum, v) => sum + v * v, 0) / CONDITIONS.length);
    expect(s0).toBeCloseTo(0.05, 3);
  });

  it('has the residuals, redundancy numbers and w of the adjustment by parameters, and as many redundancies as conditions', () => {
    const u = LINES.map((line) => 0.05 * Math.sqrt(line.miles));
    const s = system(u, misclosures, CONDITIONS);
    const other = byParameters(u, l, design);
    let sum = 0;
    for (let i = 0; i < LINES.length; i++) {
      const test = testDatum(s, direction(CONDITIONS, i), u[i]);
      if (test === null) throw new Error('unchecked');
      expect(test.redundancy).toBeCloseTo(other.redundancy[i], 10);
      // w of the datum's residual over its own standard deviation (Baarda 1968, section 4).
      expect(test.w).toBeCloseTo(other.residuals[i] / (u[i] * Math.sqrt(other.redundancy[i])), 9);
      // The error that closes best is the residual over the redundancy.
      expect(test.error).toBeCloseTo(other.residuals[i] / other.redundancy[i], 9);
      expect(test.smallestDetectable).toBeCloseTo((NON_CENTRALITY * u[i]) / Math.sqrt(other.redundancy[i]), 9);
      sum += test.redundancy;
    }
    expect(sum).toBeCloseTo(CONDITIONS.length, 10);
    const vPv = other.residuals.reduce((total, v, i) => total + (v / u[i]) ** 2, 0);
    expect(s.chiSquare).toBeCloseTo(vPv, 9);
    expect(s.free.chiSquareOf(Float64Array.from(misclosures))).toBeCloseTo(s.chiSquare, 12);
  });

  it("reveals Baarda's smallest detectable error in 80 +- 3 % of 4000 draws, and accuses a clean datum in 0.1 %", () => {
    const u = LINES.map((line) => 0.05 * Math.sqrt(line.miles));
    const empty = system(u, [0, 0, 0, 0], CONDITIONS);
    const { normal } = seeded(1968);
    for (const i of [0, 4, 6]) {
      const clean = testDatum(empty, direction(CONDITIONS, i), u[i]);
      if (clean === null) throw new Error('unchecked');
      let revealed = 0;
      let accused = 0;
      for (let draw = 0; draw < 4000; draw++) {
        const errors = u.map((v) => v * normal());
        const y0 = product(CONDITIONS, column(errors)).map((row) => row[0]);
        const w0 = testDatum(system(u, y0, CONDITIONS), direction(CONDITIONS, i), u[i])?.w ?? 0;
        if (Math.abs(w0) > 3.29) accused++;
        errors[i] += clean.smallestDetectable;
        const y1 = product(CONDITIONS, column(errors)).map((row) => row[0]);
        const w1 = testDatum(system(u, y1, CONDITIONS), direction(CONDITIONS, i), u[i])?.w ?? 0;
        if (Math.abs(w1) > 3.29) revealed++;
      }
      expect(Math.abs(revealed / 4000 - 0.8)).toBeLessThan(0.03);
      // 4 expected; 14 or more would have a chance below 1e-4 (Poisson).
      expect(accused).toBeLessThan(14);
    }
  });

  it('names the datum that holds the error first where the network tells it apart', () => {
    const u = LINES.map((line) => 0.05 * Math.sqrt(line.miles));
    for (let bad = 0; bad < LINES.length; bad++) {
      const errors = LINES.map((_, i) => (i === bad ? 1.5 : 0));
      const y = product(CONDITIONS, column(errors)).map((row) => row[0]);
      const s = system(u, y, CONDITIONS);
      const w = LINES.map((_, i) => Math.abs(testDatum(s, direction(CONDITIONS, i), u[i])?.w ?? 0));
      expect(w.indexOf(Math.max(...w))).toBe(bad);
      expect(testDatum(s, direction(CONDITIONS, bad), u[bad])?.error).toBeCloseTo(1.5, 9);
    }
  });

  it('finds two errors, one set free after the other, as large as they are', () => {
    const u = LINES.map((line) => 0.05 * Math.sqrt(line.miles));
    const errors = [800, 0, 0, 0, 3, 0, 0];
    const y = product(CONDITIONS, column(errors)).map((row) => row[0]);
    const s = system(u, y, CONDITIONS);
    s.free.free(direction(CONDITIONS, 0));
    const second = testDatum(s, direction(CONDITIONS, 4), u[4]);
    expect(second?.error).toBeCloseTo(3, 8);
    s.free.free(direction(CONDITIONS, 4));
    expect(s.free.chiSquareOf(s.y)).toBeLessThan(1e-9);
    expect(testDatum(s, direction(CONDITIONS, 0), u[0])).toBeNull();
  });

  it('says so where a datum shows in no condition, and where conditions repeat each other', () => {
    const s = system([1, 1], [0.5], [[1, -1]]);
    expect(testDatum(s, Float64Array.of(0), 1)).toBeNull();
    const repeated = whitened(Float64Array.of(1, 1), Float64Array.of(2, 2, 2, 2), 2);
    // The second says nothing of its own: one degree of freedom, and the statistic of one condition alone.
    expect([repeated.freedom, repeated.chiSquare]).toEqual([1, expect.closeTo(0.5, 12)]);
    const free = new FreeData(repeated);
    expect(free.test(Float64Array.of(1, 1), Float64Array.of(1, 1), 1)!.w).toBeCloseTo(Math.SQRT1_2, 12);
  });
});
