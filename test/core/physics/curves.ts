/** Curves made by hand: Cp as cubics between knots, H and S at the knots by quadrature, and chains of errors. */
import { smoothChain } from '../../../pipeline/core/numeric/gaussian-chain.js';
import type { CurveArrays } from '../../../pipeline/core/physics/curve.js';
import type { UncertainCurve } from '../../../pipeline/core/physics/curve-uncertainty.js';
import type { DiagramPhase } from '../../../pipeline/core/physics/diagram.js';
import { integral } from '../numeric/quadrature.js';
import { seeded } from '../numeric/random.js';

export type Cubic = readonly [number, number, number, number];

/** `cubics[i]` is Cp in T - knotsK[i]; H and S start at the first knot. */
export function curveOf(knotsK: readonly number[], cubics: readonly Cubic[], h0 = 0, s0 = 0): CurveArrays {
  const h = [h0];
  const s = [s0];
  for (let i = 0; i + 1 < knotsK.length; i++) {
    const low = knotsK[i];
    const width = knotsK[i + 1] - low;
    const [c0, c1, c2, c3] = cubics[i];
    const cp = (x: number): number => c0 + c1 * x + c2 * x ** 2 + c3 * x ** 3;
    h.push(h[i] + integral(cp, 0, width));
    s.push(s[i] + (width === 0 ? 0 : integral((x) => cp(x) / (low + x), 0, width, -low)));
  }
  const part = (k: number): Float64Array => Float64Array.from(cubics, (c) => c[k]);
  return {
    knotK: Float64Array.from(knotsK),
    c0: part(0),
    c1: part(1),
    c2: part(2),
    c3: part(3),
    enthalpyJPerMol: Float64Array.from(h),
    entropyJPerMolK: Float64Array.from(s),
  };
}

export function phaseOf(curve: CurveArrays, rest: Partial<DiagramPhase> = {}): DiagramPhase {
  const { knotK } = curve;
  return { curve, lowK: knotK[0], highK: knotK[knotK.length - 1], shift: null, formulaUnits: 1, ...rest };
}

/** A curve of n knots with the covariances of a chain observed here and there, levels and the rest as asked. */
export function uncertainCurve(seed: number, n: number, rest: Partial<UncertainCurve> = {}): UncertainCurve {
  const { unit } = seeded(seed);
  const knots = [200];
  for (let i = 1; i < n; i++) knots.push(knots[i - 1] + 10 + 60 * unit());
  const curve = curveOf(
    knots,
    knots.slice(1).map((_, i) => [25 + i, 0.02, 0, 0]),
    1000,
    40,
  );
  const array = (f: (i: number) => number): Float64Array => Float64Array.from({ length: n }, (_, i) => f(i));
  const width = (i: number): number => (i < n - 1 ? knots[i + 1] - knots[i] : 0);
  const error = array((i) => (i < n - 1 ? 0.5 + 2 * unit() : 0));
  const none = Number.POSITIVE_INFINITY;
  const chain = smoothChain({
    n,
    temperatureK: curve.knotK,
    stepH: array((i) => (i < n - 1 ? curve.enthalpyJPerMol[i + 1] - curve.enthalpyJPerMol[i] : 0)),
    stepS: array((i) => (i < n - 1 ? curve.entropyJPerMolK[i + 1] - curve.entropyJPerMolK[i] : 0)),
    stepVarH: array((i) => error[i] ** 2),
    stepCovHS: array((i) => error[i] ** 2 / (knots[i] + width(i) / 2)),
    stepVarS: array((i) => (1.02 * error[i] ** 2) / (knots[i] + width(i) / 2) ** 2),
    observedH: curve.enthalpyJPerMol,
    observedHVar: array(() => (unit() < 0.6 ? 9 : none)),
    observedS: curve.entropyJPerMolK,
    observedSVar: array(() => (unit() < 0.6 ? 1e-5 : none)),
    observedF: array((i) => curve.entropyJPerMolK[i] - curve.enthalpyJPerMol[i] / knots[i]),
    observedFVar: array(() => (unit() < 0.4 ? 1e-5 : none)),
    startH: curve.enthalpyJPerMol[0],
    startHVar: 25,
    startS: curve.entropyJPerMolK[0],
    startSVar: 1e-4,
  });
  return {
    ...curve,
    varH: chain.varH,
    covHS: chain.covHS,
    varS: chain.varS,
    gain: chain.gain,
    measuredFromK: knots[0],
    measuredToK: knots[n - 1],
    uEnthalpyLevelJPerMol: 0,
    uEntropyLevelJPerMolK: 0,
    uCalibrationRelative: 0,
    referenceK: knots[1],
    entropyReferenceK: knots[1],
    continuationGrowthPerK: 0.001,
    ...rest,
  };
}
