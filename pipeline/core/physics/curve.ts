import { cubicIntegral, cubicIntegralOverT, cubicValue } from '../numeric/cubic.js';

/**
 * One phase's curve: n knots, n - 1 intervals; Cp(T) = c0 + c1 x + c2 x^2 + c3 x^3 [J/(mol K)], x = T - knotK[i].
 * H [J/mol] and S [J/(mol K)] at the knots; between them their exact integrals.
 */
export interface CurveArrays {
  readonly knotK: Float64Array;
  readonly c0: Float64Array;
  readonly c1: Float64Array;
  readonly c2: Float64Array;
  readonly c3: Float64Array;
  readonly enthalpyJPerMol: Float64Array;
  readonly entropyJPerMolK: Float64Array;
}

/**
 * The interval that holds T: the last i with knotK[i] <= T, within 0..n-2. At a knot printed twice that is the upper
 * side. Outside the curve the end interval is returned; the caller decides whether that may be asked.
 */
export function intervalOf(curve: CurveArrays, temperatureK: number): number {
  const knots = curve.knotK;
  let low = 0;
  let high = knots.length - 1;
  while (high - low > 1) {
    const middle = (low + high) >> 1;
    if (knots[middle] <= temperatureK) low = middle;
    else high = middle;
  }
  return low;
}

export function heatCapacityAt(curve: CurveArrays, temperatureK: number, i = intervalOf(curve, temperatureK)): number {
  return cubicValue(curve.c0[i], curve.c1[i], curve.c2[i], curve.c3[i], temperatureK - curve.knotK[i]);
}

export function enthalpyAt(curve: CurveArrays, temperatureK: number, i = intervalOf(curve, temperatureK)): number {
  const x = temperatureK - curve.knotK[i];
  return curve.enthalpyJPerMol[i] + cubicIntegral(curve.c0[i], curve.c1[i], curve.c2[i], curve.c3[i], x);
}

export function entropyAt(curve: CurveArrays, temperatureK: number, i = intervalOf(curve, temperatureK)): number {
  const x = temperatureK - curve.knotK[i];
  return (
    curve.entropyJPerMolK[i] + cubicIntegralOverT(curve.c0[i], curve.c1[i], curve.c2[i], curve.c3[i], curve.knotK[i], x)
  );
}

/** G = H - T S on the curve's zeros [J/mol]. */
export function gibbsAt(curve: CurveArrays, temperatureK: number, i = intervalOf(curve, temperatureK)): number {
  return enthalpyAt(curve, temperatureK, i) - temperatureK * entropyAt(curve, temperatureK, i);
}
