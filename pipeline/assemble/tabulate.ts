import type { Crossing, FunctionRows, PhaseCurve } from '../../schemas/curves.js';
import type { HarmonisedCase } from '../../schemas/harmonised.js';
import type { Policy } from '../../schemas/policy.js';
import { cubicIntegral, cubicIntegralOverT, cubicValue } from '../core/numeric/cubic.js';
import { integers, numbers } from '../core/numeric/room.js';
import { stateCovariance } from '../core/physics/curve-uncertainty.js';
import { gibbsInDiagram } from '../core/physics/diagram.js';
import { place } from './crossings.js';

const BASIS_MEASURED = 0;
const BASIS_INTERPOLATED = 1;
const BASIS_EXTRAPOLATED = 2;

/**
 * Values at the raw temperatures, 298.15 K, each crossing at the policy's pressure and the policy's grid, for one phase.
 * A row printed twice is published twice, `below` and `above`.
 */
export function tabulated(
  curve: PhaseCurve,
  all: readonly PhaseCurve[],
  crossings: readonly Crossing[],
  substance: HarmonisedCase,
  policy: Policy,
): FunctionRows {
  const mine = crossings.filter(
    (c) =>
      c.pressurePa === (curve.family.isobarPa ?? policy.pressurePa) &&
      c.family.isobarPa === curve.family.isobarPa &&
      c.gas !== 'ideal' &&
      (c.from === curve.phase || c.to === curve.phase),
  );
  const extra: number[] = mine.map((c) => c.temperatureK);
  const low = curve.knotK[0];
  const high = curve.knotK[curve.knotK.length - 1];
  if (298.15 >= low && 298.15 <= high) extra.push(298.15);
  const step = policy.grid.stepK;
  for (let k = Math.max(1, Math.ceil(low / step)); k * step <= high; k++) extra.push(k * step);
  extra.sort((a, b) => a - b);

  const knots = curve.knotK;
  const n = knots.length;
  const size = n + extra.length;
  const t = numbers(size);
  const interval = integers(size);
  const atKnot = integers(size);
  const side = new Uint8Array(size);
  let rows = 0;
  let e = 0;
  for (let k = 0; k < n; k++) {
    while (e < extra.length && extra[e] < knots[k]) {
      if (rows === 0 || extra[e] > t[rows - 1]) {
        t[rows] = extra[e];
        interval[rows] = Math.max(0, k - 1);
        atKnot[rows] = -1;
        rows++;
      }
      e++;
    }
    while (e < extra.length && extra[e] === knots[k]) e++;
    const twinAbove = k + 1 < n && knots[k + 1] === knots[k];
    const twinBelow = k > 0 && knots[k - 1] === knots[k];
    t[rows] = knots[k];
    interval[rows] = twinAbove || k === n - 1 ? Math.max(0, k - 1) : k;
    atKnot[rows] = k;
    side[rows] = twinAbove ? 1 : twinBelow ? 2 : 0;
    rows++;
  }

  const out: FunctionRows = {
    phase: curve.phase,
    family: curve.family,
    rows,
    temperatureK: t.subarray(0, rows),
    heatCapacityJPerMolK: numbers(rows),
    entropyJPerMolK: numbers(rows),
    enthalpyJPerMol: numbers(rows),
    gibbsEnergyJPerMol: numbers(rows),
    uHeatCapacityJPerMolK: numbers(rows),
    uEntropyJPerMolK: numbers(rows),
    uEnthalpyJPerMol: numbers(rows),
    uGibbsEnergyJPerMol: numbers(rows),
    stable: stability(curve, all, t, rows, mine, substance, policy),
    basis: new Uint8Array(rows),
    side: side.subarray(0, rows),
  };
  const carried = curve.enthalpyLevelFrom === 'transition' || curve.entropyLevelFrom === 'transition';
  const plain = curve.uCalibrationRelative === 0 && !carried;
  const { c0, c1, c2, c3, varH, covHS, varS, measuredFromK, measuredToK, knotKind } = curve;
  const enthalpy = curve.enthalpyJPerMol;
  const entropy = curve.entropyJPerMolK;
  const own = curve.uHeatCapacityJPerMolK;
  const calibration = curve.uCalibrationRelative;
  const growth = curve.continuationGrowthPerK;
  const levelHH = curve.uEnthalpyLevelJPerMol * curve.uEnthalpyLevelJPerMol;
  const levelSS = curve.uEntropyLevelJPerMolK * curve.uEntropyLevelJPerMolK;
  const { heatCapacityJPerMolK, enthalpyJPerMol, entropyJPerMolK, gibbsEnergyJPerMol, basis } = out;
  const { uHeatCapacityJPerMolK, uEnthalpyJPerMol, uEntropyJPerMolK, uGibbsEnergyJPerMol } = out;
  for (let r = 0; r < rows; r++) {
    const i = interval[r];
    const k = atKnot[r];
    const at = t[r];
    const x = at - knots[i];
    const cp = cubicValue(c0[i], c1[i], c2[i], c3[i], x);
    const h = k >= 0 ? enthalpy[k] : enthalpy[i] + cubicIntegral(c0[i], c1[i], c2[i], c3[i], x);
    const s = k >= 0 ? entropy[k] : entropy[i] + cubicIntegralOverT(c0[i], c1[i], c2[i], c3[i], knots[i], x);
    heatCapacityJPerMolK[r] = Math.round(cp * NINE_PLACES) / NINE_PLACES;
    enthalpyJPerMol[r] = Math.round(h * SIX_PLACES) / SIX_PLACES;
    entropyJPerMolK[r] = Math.round(s * NINE_PLACES) / NINE_PLACES;
    gibbsEnergyJPerMol[r] = Math.round((h - at * s) * SIX_PLACES) / SIX_PLACES;
    const beyond = at < measuredFromK ? measuredFromK - at : at > measuredToK ? at - measuredToK : 0;
    const near = k >= 0 ? own[k] : Math.max(own[i], own[i + 1]);
    const common = calibration * cp;
    const grown = growth * cp * beyond;
    uHeatCapacityJPerMolK[r] = short(Math.sqrt(near * near + common * common + grown * grown));
    let hh: number;
    let hs: number;
    let ss: number;
    if (k >= 0 && beyond === 0 && plain) {
      // At a knot the smoothed covariance itself, and the levels.
      hh = varH[k] + levelHH;
      hs = covHS[k];
      ss = varS[k] + levelSS;
    } else {
      const state = stateCovariance(curve, at);
      hh = state.hh;
      hs = state.hs;
      ss = state.ss;
    }
    uEnthalpyJPerMol[r] = short(Math.sqrt(Math.max(0, hh)));
    uEntropyJPerMolK[r] = short(Math.sqrt(Math.max(0, ss)));
    uGibbsEnergyJPerMol[r] = short(Math.sqrt(Math.max(0, hh - 2 * at * hs + at * at * ss)));
    basis[r] = beyond > 0 ? BASIS_EXTRAPOLATED : k >= 0 && knotKind[k] === 0 ? BASIS_MEASURED : BASIS_INTERPOLATED;
  }
  return out;
}

/**
 * Published values end nine decimals after J/(mol K) and six after J/mol, far below any uncertainty; what is exact to the
 * last bit stands in the pieces.
 */
const NINE_PLACES = 1e9;
const SIX_PLACES = 1e6;

/** Uncertainties are published with four or five significant digits; more would say nothing. */
function short(u: number): number {
  if (!(u > 1e-12 && u < 1e12)) return u;
  double[0] = u;
  const scale = SCALES[((words[1] >>> 20) & 0x7ff) - LOWEST_EXPONENT];
  return Math.round(u * scale) / scale;
}

const double = new Float64Array(1);
const words = new Uint32Array(double.buffer);
const LOWEST_EXPONENT = 1023 - 40;
/** By the binary exponent e from -40 on: the power of ten that leaves four digits of 2^e before the point. */
const SCALES = Float64Array.from({ length: 81 }, (_, k) => 10 ** (3 - Math.floor((k - 40) * Math.log10(2))));

function stability(
  curve: PhaseCurve,
  all: readonly PhaseCurve[],
  t: Float64Array,
  rows: number,
  mine: readonly Crossing[],
  substance: HarmonisedCase,
  policy: Policy,
): Uint8Array {
  const stable = new Uint8Array(rows).fill(1);
  const setting = { pressurePa: policy.pressurePa, gas: 'real' as const };
  const own = place(curve, substance, setting);
  if (!curve.hasEnthalpyLevel || !curve.hasEntropyLevel) return stable;
  for (const other of all) {
    if (other === curve || other.family.isobarPa !== curve.family.isobarPa) continue;
    if (!other.hasEnthalpyLevel || !other.hasEntropyLevel) continue;
    const rival = place(other, substance, setting);
    // The sign of the gap changes at the pair's crossings alone: it is worked out once between two of them.
    const cuts = mine
      .filter((c) => c.from === other.phase || c.to === other.phase)
      .map((c) => c.temperatureK)
      .sort((x, y) => x - y);
    let passed = -1;
    let lower = false;
    for (let r = 0; r < rows; r++) {
      const temperatureK = t[r];
      if (temperatureK <= 0 || temperatureK < rival.lowK) continue;
      if (temperatureK > rival.highK) break;
      let now = 0;
      while (now < cuts.length && cuts[now] < temperatureK) now++;
      if (now < cuts.length && cuts[now] === temperatureK) continue;
      if (now !== passed) {
        passed = now;
        lower = gibbsInDiagram(rival, temperatureK) < gibbsInDiagram(own, temperatureK);
      }
      if (lower) stable[r] = 0;
    }
  }
  return stable;
}
