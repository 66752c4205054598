import { factorise, whiten } from '../numeric/cholesky.js';

/**
 * Adjustment in condition form: y (m) are the misclosures of conditions that should vanish, Q their covariance. For a datum
 * with direction d (its effect on y): the normalised residual, redundancy and smallest detectable error of
 * W. Baarda, A testing procedure for use in geodetic networks (Netherlands Geodetic Commission, 1968), section 4.
 */
export interface Whitened {
  readonly m: number;
  readonly factor: Float64Array;
  readonly y: Float64Array;
  /** y^T Q^-1 y: the global test's statistic, m degrees of freedom. */
  readonly chiSquare: number;
}

export interface DatumTest {
  /** w = d^T Q^-1 y / sqrt(d^T Q^-1 d). */
  readonly w: number;
  /** The error of the datum that would close the conditions best, and its standard uncertainty. */
  readonly error: number;
  readonly uError: number;
  /** r = u^2 d^T Q^-1 d, 0 (nothing checks it) to 1. */
  readonly redundancy: number;
  readonly smallestDetectable: number;
}

/** delta0 of Baarda at alpha = 0.1 % and power 80 %. */
export const NON_CENTRALITY = 4.13;

/** A condition whose own part of its variance is below this share repeats the others: rounding leaves some 1e-16. */
const REPEATED = 1e-13;

/** Conditions that repeat each other make Q singular: null comes back. */
export function whitened(y: Float64Array, q: Float64Array, m: number): Whitened | null {
  const factor = q.slice(0, m * m);
  if (!factorise(factor, m)) return null;
  for (let i = 0; i < m; i++) if (factor[i * m + i] ** 2 < REPEATED * q[i * m + i]) return null;
  const z = y.slice(0, m);
  whiten(factor, m, z);
  let chiSquare = 0;
  for (let i = 0; i < m; i++) chiSquare += z[i] * z[i];
  return { m, factor, y: z, chiSquare };
}

/** Null where the datum does not show in any condition. */
export function testDatum(system: Whitened, direction: Float64Array, u: number): DatumTest | null {
  const z = direction.slice(0, system.m);
  whiten(system.factor, system.m, z);
  let zz = 0;
  let zy = 0;
  for (let i = 0; i < system.m; i++) {
    zz += z[i] * z[i];
    zy += z[i] * system.y[i];
  }
  if (!(zz > 0)) return null;
  const root = Math.sqrt(zz);
  return {
    w: zy / root,
    error: zy / zz,
    uError: 1 / root,
    redundancy: Math.min(1, u * u * zz),
    smallestDetectable: NON_CENTRALITY / root,
  };
}

/** The statistic of other misclosures under the same covariance. */
export function chiSquareOf(system: Whitened, y: Float64Array): number {
  const z = y.slice(0, system.m);
  whiten(system.factor, system.m, z);
  let sum = 0;
  for (let i = 0; i < system.m; i++) sum += z[i] * z[i];
  return sum;
}
