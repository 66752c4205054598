import { factoriseRanked, whiten } from '../numeric/cholesky.js';

/**
 * Adjustment in condition form: y (m) are the misclosures of conditions that should vanish, Q their covariance. For a datum
 * with direction d (its effect on y): the normalised residual, redundancy and smallest detectable error of
 * W. Baarda, A testing procedure for use in geodetic networks (Netherlands Geodetic Commission, 1968), section 4.
 */
export interface Whitened {
  readonly m: number;
  readonly factor: Float64Array;
  readonly y: Float64Array;
  /** y^T Q^-1 y: the global test's statistic. */
  readonly chiSquare: number;
  /** Its degrees of freedom: the conditions that do not repeat others. */
  readonly freedom: number;
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

/**
 * Tests that one substance shares its alpha over: of each transition the three rules and the three stated numbers, of each
 * anchor its two, of each vapour pressure one (its T and its p are one test), the order of the phases, and the whole.
 */
export function testCount(transitions: number, anchors: number, vapourPressures: number): number {
  return 6 * transitions + 2 * anchors + vapourPressures + 2;
}

/** A condition whose own part of its variance is below this share repeats the others: rounding leaves some 1e-16. */
const REPEATED = 1e-13;

/** Conditions that repeat others say nothing of their own and are left out. */
export function whitened(y: Float64Array, q: Float64Array, m: number): Whitened {
  const factor = q.slice(0, m * m);
  const freedom = factoriseRanked(factor, m, REPEATED);
  const z = y.slice(0, m);
  whiten(factor, m, z);
  let chiSquare = 0;
  for (let i = 0; i < m; i++) chiSquare += z[i] * z[i];
  return { m, factor, y: z, chiSquare, freedom };
}

/**
 * The same conditions with some data set free: each takes one direction of the whitened space out of y and of every other
 * datum, exactly as an unknown for its error would.
 */
export class FreeData {
  private readonly basis: Float64Array[] = [];

  private known: { readonly of: Float64Array; readonly z: Float64Array } | null = null;

  constructor(private readonly system: Whitened) {}

  /** Whitened, with what the free data can explain taken out. */
  reduced(vector: Float64Array): Float64Array {
    const { m, factor } = this.system;
    const z = vector.slice(0, m);
    whiten(factor, m, z);
    for (const e of this.basis) subtract(z, e);
    return z;
  }

  free(direction: Float64Array): void {
    const z = this.reduced(direction);
    const norm = Math.sqrt(dot(z, z));
    if (norm > 0) this.basis.push(z.map((v) => v / norm));
    this.known = null;
  }

  /** The statistic that is left of the misclosures y. */
  chiSquareOf(y: Float64Array): number {
    const z = this.reducedOnce(y);
    return dot(z, z);
  }

  /** Null where the datum does not show in any condition, or not beside the free ones. */
  test(y: Float64Array, direction: Float64Array, u: number): DatumTest | null {
    const { m, factor } = this.system;
    const z = direction.slice(0, m);
    whiten(factor, m, z);
    const whole = dot(z, z);
    for (const e of this.basis) subtract(z, e);
    const zz = this.basis.length === 0 ? whole : dot(z, z);
    if (!(zz > 1e-10 * whole)) return null;
    const zy = dot(z, this.reducedOnce(y));
    const root = Math.sqrt(zz);
    return {
      w: zy / root,
      error: zy / zz,
      uError: 1 / root,
      redundancy: Math.min(1, u * u * zz),
      smallestDetectable: NON_CENTRALITY / root,
    };
  }

  /** Many data are tested against the same misclosures. */
  private reducedOnce(y: Float64Array): Float64Array {
    if (this.known === null || this.known.of !== y) this.known = { of: y, z: this.reduced(y) };
    return this.known.z;
  }
}

function dot(a: Float64Array, b: Float64Array): number {
  let sum = 0;
  for (let i = 0; i < a.length; i++) sum += a[i] * b[i];
  return sum;
}

/** Takes the part along the unit vector e out of z. */
function subtract(z: Float64Array, e: Float64Array): void {
  const along = dot(z, e);
  for (let i = 0; i < z.length; i++) z[i] -= along * e[i];
}
