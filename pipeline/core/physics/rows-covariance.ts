import { cubicIntegralOverT } from '../numeric/cubic.js';
import { type CurveArrays, enthalpyAt, entropyAt, intervalOf } from './curve.js';

/** Where a curve's own rows leave its H and S uncertain; shapes as in `CurveArrays`. */
export interface RowsUncertainty extends CurveArrays {
  readonly varH: Float64Array;
  readonly covHS: Float64Array;
  readonly varS: Float64Array;
  /** Smoother gains, 4 a knot. */
  readonly gain: Float64Array;
  readonly measuredFromK: number;
  readonly measuredToK: number;
  readonly uCalibrationRelative: number;
  readonly referenceK: number;
  readonly entropyReferenceK: number;
  readonly continuationGrowthPerK: number;
  /** Standard uncertainty of the bend inside each interval that neither end sees [J/mol]; absent: none. */
  readonly uBendJPerMol?: Float64Array | undefined;
}

/** Variances of H and S and their covariance at one temperature. */
export interface StateCovariance {
  readonly hh: number;
  readonly hs: number;
  readonly ss: number;
}

/**
 * The covariance of (H, S) at T: the neighbouring knots' joint covariance (smoothed, with the gain between them), carried
 * to T by linear weights, with what the way between the two adds, plus the common calibration and, beyond the data, the
 * growth of the continuation. Levels apart. Linear propagation, JCGM 100:2008, 5.2.2.
 */
export function rowsCovariance(curve: RowsUncertainty, temperatureK: number): StateCovariance {
  const i = intervalOf(curve, temperatureK);
  const t = shareOf(curve, i, temperatureK);
  const a = 1 - t;
  const g = 4 * i;
  const { varH, covHS, varS, gain } = curve;
  const j = i + 1;
  // Cov(x_i, x_j) = gain_i P_j.
  const c00 = gain[g] * varH[j] + gain[g + 1] * covHS[j];
  const c01 = gain[g] * covHS[j] + gain[g + 1] * varS[j];
  const c10 = gain[g + 2] * varH[j] + gain[g + 3] * covHS[j];
  const c11 = gain[g + 2] * covHS[j] + gain[g + 3] * varS[j];
  let hh = a * a * varH[i] + t * t * varH[j] + 2 * a * t * c00;
  let hs = a * a * covHS[i] + t * t * covHS[j] + a * t * (c01 + c10);
  let ss = a * a * varS[i] + t * t * varS[j] + 2 * a * t * c11;
  if (a * t > 0) {
    const between = betweenKnots(curve, i);
    hh += a * t * between.hh;
    hs += a * t * between.hs;
    ss += a * t * between.ss;
    const bend = bendAt(curve, i, t);
    hh += bend * bend;
    hs += (bend * bend) / temperatureK;
    ss += (bend / temperatureK) ** 2;
  }
  if (curve.uCalibrationRelative > 0) {
    const u2 = curve.uCalibrationRelative * curve.uCalibrationRelative;
    const dh = enthalpyAt(curve, temperatureK, i) - enthalpyAt(curve, curve.referenceK);
    const ds = entropyAt(curve, temperatureK, i) - entropyAt(curve, curve.entropyReferenceK);
    hh += u2 * dh * dh;
    hs += u2 * dh * ds;
    ss += u2 * ds * ds;
  }
  const [eH, eS] = continuationError(curve, temperatureK);
  hh += eH * eH;
  hs += eH * eS;
  ss += eS * eS;
  return { hh, hs, ss };
}

/**
 * Covariance of (H, S) at T1 with (H, S) at T2 of one curve, levels apart: [HH, HS, SH, SS], first index T1. The same linear
 * weights as in `rowsCovariance`, between knots whose covariance the smoother's gains carry; the calibration and the
 * continuation of one side are common to both.
 */
export function crossCovariance(
  curve: RowsUncertainty,
  first: number,
  second: number,
): [number, number, number, number] {
  addCrossCovariance(curve, first, second, four, 0);
  return [four[0], four[1], four[2], four[3]];
}

const four = new Float64Array(4);

/** The same into `out` from `at` on. Plain scalars: every substance asks for a dozen of them. */
export function addCrossCovariance(
  curve: RowsUncertainty,
  first: number,
  second: number,
  out: Float64Array,
  at: number,
): void {
  if (first > second) {
    addCrossCovariance(curve, second, first, out, at);
    const hs = out[at + 1];
    out[at + 1] = out[at + 2];
    out[at + 2] = hs;
    return;
  }
  const { varH, covHS, varS, gain } = curve;
  const i = intervalOf(curve, first);
  const j = intervalOf(curve, second);
  const t1 = shareOf(curve, i, first);
  const t2 = shareOf(curve, j, second);
  // Cov(x_j, x_j+1) = gain_j P_j+1; with it Cov(x_j, x(T2)), and Cov(x_j+1, x(T2)) for two temperatures in one interval.
  const g = 4 * j;
  const k = j + 1;
  const s0 = gain[g] * varH[k] + gain[g + 1] * covHS[k];
  const s1 = gain[g] * covHS[k] + gain[g + 1] * varS[k];
  const s2 = gain[g + 2] * varH[k] + gain[g + 3] * covHS[k];
  const s3 = gain[g + 2] * covHS[k] + gain[g + 3] * varS[k];
  const b2 = 1 - t2;
  let n0 = b2 * varH[j] + t2 * s0;
  let n1 = b2 * covHS[j] + t2 * s1;
  let n2 = b2 * covHS[j] + t2 * s2;
  let n3 = b2 * varS[j] + t2 * s3;
  const b1 = 1 - t1;
  let hh: number;
  let hs: number;
  let sh: number;
  let ss: number;
  if (i === j) {
    hh = b1 * n0 + t1 * (b2 * s0 + t2 * varH[k]);
    hs = b1 * n1 + t1 * (b2 * s2 + t2 * covHS[k]);
    sh = b1 * n2 + t1 * (b2 * s1 + t2 * covHS[k]);
    ss = b1 * n3 + t1 * (b2 * s3 + t2 * varS[k]);
    if (t1 * b2 > 0) {
      const between = betweenKnots(curve, i);
      hh += t1 * b2 * between.hh;
      hs += t1 * b2 * between.hs;
      sh += t1 * b2 * between.hs;
      ss += t1 * b2 * between.ss;
      const bend = bendAt(curve, i, t1) * bendAt(curve, i, t2);
      hh += bend;
      hs += bend / second;
      sh += bend / first;
      ss += bend / (first * second);
    }
  } else {
    let m0 = n0;
    let m1 = n1;
    let m2 = n2;
    let m3 = n3;
    for (let at = j - 1; at >= i; at--) {
      m0 = n0;
      m1 = n1;
      m2 = n2;
      m3 = n3;
      const q = 4 * at;
      const g0 = gain[q];
      const g1 = gain[q + 1];
      const g2 = gain[q + 2];
      const g3 = gain[q + 3];
      n0 = g0 * m0 + g1 * m2;
      n1 = g0 * m1 + g1 * m3;
      n2 = g2 * m0 + g3 * m2;
      n3 = g2 * m1 + g3 * m3;
    }
    hh = b1 * n0 + t1 * m0;
    hs = b1 * n1 + t1 * m1;
    sh = b1 * n2 + t1 * m2;
    ss = b1 * n3 + t1 * m3;
  }
  if (curve.uCalibrationRelative > 0) {
    const u2 = curve.uCalibrationRelative * curve.uCalibrationRelative;
    const h0 = enthalpyAt(curve, curve.referenceK);
    const z0 = entropyAt(curve, curve.entropyReferenceK);
    const h1 = enthalpyAt(curve, first) - h0;
    const z1 = entropyAt(curve, first) - z0;
    const h2 = enthalpyAt(curve, second) - h0;
    const z2 = entropyAt(curve, second) - z0;
    hh += u2 * h1 * h2;
    hs += u2 * h1 * z2;
    sh += u2 * z1 * h2;
    ss += u2 * z1 * z2;
  }
  const { measuredFromK: from, measuredToK: to } = curve;
  if ((first > to && second > to) || (first < from && second < from)) {
    const [h1, z1] = continuationError(curve, first);
    const [h2, z2] = continuationError(curve, second);
    hh += h1 * h2;
    hs += h1 * z2;
    sh += z1 * h2;
    ss += z1 * z2;
  }
  out[at] = hh;
  out[at + 1] = hs;
  out[at + 2] = sh;
  out[at + 3] = ss;
}

/**
 * What the way between two knots adds over the straight line from one to the other, t (1 - t) of it at the share t of the
 * way: with it u runs straight from the one to the other, of H, of S and of H - TS, where errors grow on the way; nothing
 * where both knots are as uncertain, since what two rows' own rounding leaves open is no error of the way between them.
 */
function betweenKnots({ knotK, varH, covHS, varS, gain }: RowsUncertainty, i: number): StateCovariance {
  const j = i + 1;
  const g = 4 * i;
  const t = (knotK[i] + knotK[j]) / 2;
  const c00 = gain[g] * varH[j] + gain[g + 1] * covHS[j];
  const c01and10 = gain[g] * covHS[j] + gain[g + 1] * varS[j] + gain[g + 2] * varH[j] + gain[g + 3] * covHS[j];
  const c11 = gain[g + 2] * covHS[j] + gain[g + 3] * varS[j];
  const gibbsI = Math.max(0, varH[i] - 2 * t * covHS[i] + t * t * varS[i]);
  const gibbsJ = Math.max(0, varH[j] - 2 * t * covHS[j] + t * t * varS[j]);
  const hh = lacking(varH[i], varH[j], c00);
  const ss = lacking(varS[i], varS[j], c11);
  const gg = lacking(gibbsI, gibbsJ, c00 - t * c01and10 + t * t * c11);
  const most = Math.sqrt(hh * ss);
  return { hh, hs: Math.min(most, Math.max(-most, (hh + t * t * ss - gg) / (2 * t))), ss };
}

/** Of two variances and their covariance: 2 sqrt(a b) in place of twice the covariance, and no more than they differ by. */
function lacking(a: number, b: number, covariance: number): number {
  return Math.max(0, Math.min(Math.abs(b - a), 2 * (Math.sqrt(a * b) - covariance)));
}

/**
 * One standard uncertainty of H at the share t of an interval from the bend between its ends: the second bump of the chain,
 * 60 x (1 - x)(1 - 2x), has the integral 30 x^2 (1 - x)^2. S errs by that over T, and G by nothing.
 */
function bendAt({ uBendJPerMol }: RowsUncertainty, i: number, t: number): number {
  return uBendJPerMol === undefined || i >= uBendJPerMol.length ? 0 : 30 * t * t * (1 - t) * (1 - t) * uBendJPerMol[i];
}

function shareOf(curve: RowsUncertainty, i: number, temperatureK: number): number {
  const w = curve.knotK[i + 1] - curve.knotK[i];
  return w > 0 ? Math.min(1, Math.max(0, (temperatureK - curve.knotK[i]) / w)) : 0;
}

/**
 * One standard uncertainty of (H, S) from an error of Cp that grows in proportion to the distance from the data, Cp itself
 * held: its exact integrals over T and over ln T, so that most of it cancels in H - TS. [0, 0] within the data.
 */
function continuationError(curve: RowsUncertainty, temperatureK: number): [number, number] {
  const { measuredFromK: from, measuredToK: to } = curve;
  if (temperatureK >= from && temperatureK <= to) return [0, 0];
  const high = temperatureK > to;
  const rate = curve.continuationGrowthPerK * (high ? curve.c0[curve.c0.length - 1] : curve.c0[0]);
  const edge = high ? to : from;
  const x = temperatureK - edge;
  const sign = high ? 1 : -1;
  return [(sign * rate * x * x) / 2, sign * rate * cubicIntegralOverT(0, 1, 0, 0, edge, x)];
}
