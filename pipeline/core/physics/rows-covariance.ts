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
}

/** Variances of H and S and their covariance at one temperature. */
export interface StateCovariance {
  readonly hh: number;
  readonly hs: number;
  readonly ss: number;
}

/**
 * The covariance of (H, S) at T: the neighbouring knots' joint covariance (smoothed, with the gain between them), carried
 * to T by linear weights, plus the common calibration and, beyond the data, the growth of the continuation. Levels apart.
 * Linear propagation, JCGM 100:2008, 5.2.2.
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
  if (first > second) {
    const [hh, hs, sh, ss] = crossCovariance(curve, second, first);
    return [hh, sh, hs, ss];
  }
  const { varH, covHS, varS, gain } = curve;
  const i = intervalOf(curve, first);
  const j = intervalOf(curve, second);
  const t1 = shareOf(curve, i, first);
  const t2 = shareOf(curve, j, second);
  const through = (k: number, m: Four): Four => {
    const [g0, g1, g2, g3] = [gain[4 * k], gain[4 * k + 1], gain[4 * k + 2], gain[4 * k + 3]];
    return [g0 * m[0] + g1 * m[2], g0 * m[1] + g1 * m[3], g2 * m[0] + g3 * m[2], g2 * m[1] + g3 * m[3]];
  };
  const at = (k: number): Four => [varH[k], covHS[k], covHS[k], varS[k]];
  // Cov(x_j, x(T2)), and Cov(x_j+1, x(T2)) for two temperatures in one interval.
  const low = mixed(1 - t2, at(j), t2, through(j, at(j + 1)));
  let sum: Four;
  if (i === j) {
    const step = through(j, at(j + 1));
    const high = mixed(1 - t2, [step[0], step[2], step[1], step[3]], t2, at(j + 1));
    sum = mixed(1 - t1, low, t1, high);
  } else {
    let next = low;
    for (let k = j - 1; k > i; k--) next = through(k, next);
    sum = mixed(1 - t1, through(i, next), t1, next);
  }
  let [hh, hs, sh, ss] = sum;
  if (curve.uCalibrationRelative > 0) {
    const u2 = curve.uCalibrationRelative * curve.uCalibrationRelative;
    const h0 = enthalpyAt(curve, curve.referenceK);
    const s0 = entropyAt(curve, curve.entropyReferenceK);
    const h1 = enthalpyAt(curve, first) - h0;
    const s1 = entropyAt(curve, first) - s0;
    const h2 = enthalpyAt(curve, second) - h0;
    const s2 = entropyAt(curve, second) - s0;
    hh += u2 * h1 * h2;
    hs += u2 * h1 * s2;
    sh += u2 * s1 * h2;
    ss += u2 * s1 * s2;
  }
  const [h1, s1] = continuationError(curve, first);
  const [h2, s2] = continuationError(curve, second);
  if (h1 * h2 > 0) {
    hh += h1 * h2;
    hs += h1 * s2;
    sh += s1 * h2;
    ss += s1 * s2;
  }
  return [hh, hs, sh, ss];
}

type Four = [number, number, number, number];

function mixed(a: number, x: Four, b: number, y: Four): Four {
  return [a * x[0] + b * y[0], a * x[1] + b * y[1], a * x[2] + b * y[2], a * x[3] + b * y[3]];
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
