import { ErrorSum, type UncertainCurve } from './error-sum.js';
import { rowsCovariance, type StateCovariance } from './rows-covariance.js';

export type { LevelError, LevelOrigin, UncertainCurve } from './error-sum.js';
export { crossCovariance, type StateCovariance } from './rows-covariance.js';

/** The covariance of (H, S) at T, levels included. A level carried from another curve brings that curve's errors with it. */
export function stateCovariance(curve: UncertainCurve, temperatureK: number): StateCovariance {
  const { uEnthalpyLevelJPerMol: uH, uEntropyLevelJPerMolK: uS } = curve;
  if (!isCarried(curve) || (uH === 0 && uS === 0)) {
    const { hh, hs, ss } = rowsCovariance(curve, temperatureK);
    return { hh: hh + uH * uH, hs, ss: ss + uS * uS };
  }
  const h = new ErrorSum().add(curve, temperatureK, 1, 0);
  const s = new ErrorSum().add(curve, temperatureK, 0, 1);
  return { hh: h.covariance(h), hs: h.covariance(s), ss: s.covariance(s) };
}

/** u(G) at T [J/mol]. */
export function gibbsUncertainty(curve: UncertainCurve, temperatureK: number): number {
  const { hh, hs, ss } = stateCovariance(curve, temperatureK);
  return Math.sqrt(Math.max(0, hh - 2 * temperatureK * hs + temperatureK * temperatureK * ss));
}

/** u(a G_a - b G_b) at T [J/mol]: what the two owe to one anchor, one transition or one curve cancels. */
export function gibbsDifferenceUncertainty(
  first: UncertainCurve,
  a: number,
  second: UncertainCurve,
  b: number,
  temperatureK: number,
): number {
  if (!isCarried(first) && !isCarried(second) && !shareDatum(first, second)) {
    return Math.hypot(a * gibbsUncertainty(first, temperatureK), b * gibbsUncertainty(second, temperatureK));
  }
  const sum = new ErrorSum();
  sum.add(first, temperatureK, a, -a * temperatureK);
  sum.add(second, temperatureK, -b, b * temperatureK);
  return Math.sqrt(Math.max(0, sum.covariance(sum)));
}

function isCarried(curve: UncertainCurve): boolean {
  return (curve.enthalpyLevel?.from ?? null) !== null || (curve.entropyLevel?.from ?? null) !== null;
}

function shareDatum(a: UncertainCurve, b: UncertainCurve): boolean {
  for (const x of [a.enthalpyLevel, a.entropyLevel]) {
    for (const y of [b.enthalpyLevel, b.entropyLevel]) {
      if (x?.errors.some((one) => y?.errors.some((other) => one.key === other.key))) return true;
    }
  }
  return false;
}
