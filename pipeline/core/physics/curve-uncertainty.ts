import { type CurveArrays, enthalpyAt, entropyAt, intervalOf } from './curve.js';

/** What a curve's uncertainty is made of; shapes as in `CurveArrays`. */
export interface UncertainCurve extends CurveArrays {
  readonly varH: Float64Array;
  readonly covHS: Float64Array;
  readonly varS: Float64Array;
  /** Smoother gains, 4 a knot. */
  readonly gain: Float64Array;
  readonly measuredFromK: number;
  readonly measuredToK: number;
  readonly uEnthalpyLevelJPerMol: number;
  readonly uEntropyLevelJPerMolK: number;
  readonly uCalibrationRelative: number;
  readonly referenceK: number;
  readonly continuationGrowthPerK: number;
}

/** Variances of H and S and their covariance at one temperature, levels included. */
export interface StateCovariance {
  readonly hh: number;
  readonly hs: number;
  readonly ss: number;
}

/**
 * The covariance of (H, S) at T: the neighbouring knots' joint covariance (smoothed, with the gain between them), carried
 * to T by linear weights, plus the levels, the common calibration and, beyond the data, the growth of the continuation.
 * Linear propagation, JCGM 100:2008, 5.2.2.
 */
export function stateCovariance(curve: UncertainCurve, temperatureK: number): StateCovariance {
  const i = intervalOf(curve, temperatureK);
  const w = curve.knotK[i + 1] - curve.knotK[i];
  const t = w > 0 ? Math.min(1, Math.max(0, (temperatureK - curve.knotK[i]) / w)) : 0;
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
  hh += curve.uEnthalpyLevelJPerMol * curve.uEnthalpyLevelJPerMol;
  ss += curve.uEntropyLevelJPerMolK * curve.uEntropyLevelJPerMolK;
  if (curve.uCalibrationRelative > 0) {
    const u2 = curve.uCalibrationRelative * curve.uCalibrationRelative;
    const dh = enthalpyAt(curve, temperatureK, i) - enthalpyAt(curve, curve.referenceK);
    const ds = entropyAt(curve, temperatureK, i) - entropyAt(curve, curve.referenceK);
    hh += u2 * dh * dh;
    hs += u2 * dh * ds;
    ss += u2 * ds * ds;
  }
  const beyond = Math.max(curve.measuredFromK - temperatureK, temperatureK - curve.measuredToK, 0);
  if (beyond > 0) {
    const high = temperatureK > curve.measuredToK;
    const cp = high ? curve.c0[curve.c0.length - 1] : curve.c0[0];
    const uH = (curve.continuationGrowthPerK * cp * beyond * beyond) / 2;
    const uS = uH / (high ? curve.measuredToK : temperatureK);
    const sign = high ? 1 : -1;
    hh += uH * uH;
    hs += sign * sign * uH * uS;
    ss += uS * uS;
  }
  return { hh, hs, ss };
}

/** u(G) at T [J/mol]. */
export function gibbsUncertainty(curve: UncertainCurve, temperatureK: number): number {
  const { hh, hs, ss } = stateCovariance(curve, temperatureK);
  return Math.sqrt(Math.max(0, hh - 2 * temperatureK * hs + temperatureK * temperatureK * ss));
}

/**
 * Covariance of (H, S) at T1 with (H, S) at T2 of one curve, levels apart: [HH, HS, SH, SS], first index T1. From the
 * smoother's gains between the knots next above; the calibration and the continuation are common to both.
 */
export function crossCovariance(
  curve: UncertainCurve,
  first: number,
  second: number,
): [number, number, number, number] {
  if (first > second) {
    const [hh, hs, sh, ss] = crossCovariance(curve, second, first);
    return [hh, sh, hs, ss];
  }
  const i = intervalOf(curve, first) + 1;
  const j = intervalOf(curve, second) + 1;
  let a = curve.varH[j];
  let b = curve.covHS[j];
  let c = curve.covHS[j];
  let d = curve.varS[j];
  for (let k = j - 1; k >= i; k--) {
    const g = 4 * k;
    const g0 = curve.gain[g];
    const g1 = curve.gain[g + 1];
    const g2 = curve.gain[g + 2];
    const g3 = curve.gain[g + 3];
    [a, b, c, d] = [g0 * a + g1 * c, g0 * b + g1 * d, g2 * a + g3 * c, g2 * b + g3 * d];
  }
  if (curve.uCalibrationRelative > 0) {
    const u2 = curve.uCalibrationRelative * curve.uCalibrationRelative;
    const h0 = enthalpyAt(curve, curve.referenceK);
    const s0 = entropyAt(curve, curve.referenceK);
    const h1 = enthalpyAt(curve, first) - h0;
    const s1 = entropyAt(curve, first) - s0;
    const h2 = enthalpyAt(curve, second) - h0;
    const s2 = entropyAt(curve, second) - s0;
    a += u2 * h1 * h2;
    b += u2 * h1 * s2;
    c += u2 * s1 * h2;
    d += u2 * s1 * s2;
  }
  return [a, b, c, d];
}
