import type { CheckedCase } from '../../schemas/checked.js';
import type { PhaseCurve } from '../../schemas/curves.js';
import { entropyAt } from '../core/physics/curve.js';
import { crossCovariance, stateCovariance } from '../core/physics/curve-uncertainty.js';
import { equilibrium } from '../core/physics/equilibrium.js';
import { boilingTemperature, placePhase } from '../core/physics/placed-phase.js';
import { condensedTermUncertainty } from '../core/physics/pressure-terms.js';
import { type ConditionDatum, dataOf } from './condition-data.js';
import { type Anchored, type Joined, type Row, usesOf } from './condition-rows.js';

/**
 * What is stated about a substance's transitions and anchors as conditions y = 0 with covariance Q (m x m, row-major):
 * per transition G_to - G_from = 0, dH - stated dH = 0, dS - stated dS = 0; per phase S anchor - S of its table = 0; and
 * dH - T dS = 0 of the stated numbers where the curves rest on them.
 */
export interface ConditionSystem {
  readonly m: number;
  readonly y: Float64Array;
  readonly q: Float64Array;
  readonly data: readonly ConditionDatum[];
}

/** The system of one family of curves (`isobarPa`); null where there is nothing to compare. */
export function conditionsOf(checked: CheckedCase, isobarPa: number | null): ConditionSystem | null {
  const { assembled } = checked;
  const substance = assembled.examined.harmonised;
  const { curves } = assembled;
  const joined: Joined[] = [];
  const boiling = boilingTemperature(substance.transitions);
  for (const j of checked.judged) {
    const { stated } = j;
    if (!(stated.pressurePa > 0)) continue;
    if (stated.order !== 'first' || stated.from === stated.to || j.fromCurve < 0 || j.toCurve < 0) continue;
    const a = curves[j.fromCurve];
    const b = curves[j.toCurve];
    if (a.family.isobarPa !== isobarPa || b.family.isobarPa !== isobarPa) continue;
    if (!(a.hasEnthalpyLevel && a.hasEntropyLevel && b.hasEnthalpyLevel && b.hasEntropyLevel)) continue;
    const setting = { pressurePa: stated.pressurePa, gas: stated.gas ?? ('real' as const) };
    const from = placePhase(a, substance.substance, setting, boiling);
    const to = placePhase(b, substance.substance, setting, boiling);
    const low = Math.max(from.lowK, to.lowK);
    const high = Math.min(from.highK, to.highK);
    if (!(high > low)) continue;
    let atK = stated.temperature.value;
    if (atK < low || atK > high) atK = j.computedK ?? Math.min(high, Math.max(low, atK));
    const within =
      stated.table.basis !== 'measured' &&
      a.sources.every((s) => s === stated.table.source) &&
      b.sources.every((s) => s === stated.table.source);
    joined.push({ judged: j, from, to, atK, at: equilibrium(from, to, atK), within });
  }
  if (joined.length === 0) return null;

  const rows: Row[] = [];
  joined.forEach((j, k) => {
    const { stated } = j.judged;
    const offset = stated.temperature.value - j.atK;
    const byConstruction =
      curves[j.judged.fromCurve].carriedThrough === j.judged.index ||
      curves[j.judged.toCurve].carriedThrough === j.judged.index;
    if (!byConstruction) {
      rows.push({ kind: 'gap', transition: k, value: -(j.at.gapJPerMol + j.at.entropyJPerMolK * offset) });
      if (stated.enthalpy !== null)
        rows.push({
          kind: 'enthalpy',
          transition: k,
          value: j.at.enthalpyJPerMol + j.at.heatCapacityJPerMolK * offset - stated.enthalpy.value,
        });
      if (stated.entropy !== null)
        rows.push({
          kind: 'entropy',
          transition: k,
          value: j.at.entropyJPerMolK + (j.at.heatCapacityJPerMolK * offset) / j.atK - stated.entropy.value,
        });
    } else if (stated.enthalpy !== null && stated.entropy !== null) {
      rows.push({
        kind: 'closure',
        transition: k,
        value: stated.enthalpy.value - stated.temperature.value * stated.entropy.value,
      });
    }
  });
  const anchored: Anchored[] = [];
  for (const c of curves) {
    if (c.family.isobarPa !== isobarPa || c.entropyAnchor >= 0 || c.entropyLevelFrom === 'transition') continue;
    const anchor = substance.anchors.find(
      (a) => a.phase === c.phase && a.entropy !== null && a.table.entropyZero === c.family.entropyZero,
    );
    if (anchor === undefined || anchor.entropy === null) continue;
    const t = anchor.referenceTemperatureK;
    if (t < c.measuredFromK || t > c.measuredToK) continue;
    anchored.push({ curve: c, anchor });
    rows.push({ kind: 'anchor', transition: anchored.length - 1, value: anchor.entropy.value - entropyAt(c, t) });
  }
  const m = rows.length;
  if (m === 0) return null;
  const y = Float64Array.from(rows, (r) => r.value);
  const q = new Float64Array(m * m);
  addCurveNoise(q, rows, joined, anchored);
  const data = dataOf(rows, joined, anchored, substance, curves);
  for (const d of data) {
    for (let i = 0; i < m; i++) {
      for (let j = 0; j < m; j++) q[i * m + j] += d.direction[i] * d.u * d.u * d.direction[j];
    }
  }
  return { m, y, q, data };
}

function addCurveNoise(
  q: Float64Array,
  rows: readonly Row[],
  joined: readonly Joined[],
  anchored: readonly Anchored[],
): void {
  const m = rows.length;
  const uses = rows.map((r) => usesOf(r, joined, anchored));
  for (let i = 0; i < m; i++) {
    for (let k = 0; k <= i; k++) {
      let v = 0;
      for (const a of uses[i]) {
        for (const b of uses[k]) {
          if (a.curve !== b.curve) continue;
          if (a.atK === b.atK) {
            const { hh, hs, ss } = stateCovariance(withoutLevels(a.curve), a.atK);
            v += a.h * b.h * hh + (a.h * b.s + a.s * b.h) * hs + a.s * b.s * ss;
          } else {
            const [hh, hs, sh, ss] = crossCovariance(a.curve, a.atK, b.atK);
            v += a.h * b.h * hh + a.h * b.s * hs + a.s * b.h * sh + a.s * b.s * ss;
          }
        }
      }
      q[i * m + k] += v;
      if (k !== i) q[k * m + i] += v;
    }
    const row = rows[i];
    if (row.kind === 'anchor' || row.kind === 'closure') continue;
    const j = joined[row.transition];
    const gas = (j.to.term?.u(j.atK) ?? 0) + (j.from.term?.u(j.atK) ?? 0);
    const isobar = j.from.source.family.isobarPa;
    const volume = isobar === null ? condensedTermUncertainty(j.judged.stated.pressurePa) : 0;
    if (row.kind === 'gap') q[i * m + i] += gas * gas + volume * volume;
    // The departure of H is some four times that of G for a fluid near boiling (B falls about as 1/T^3).
    else if (row.kind === 'enthalpy') q[i * m + i] += 16 * gas * gas;
    else q[i * m + i] += (9 * gas * gas) / (j.atK * j.atK);
  }
}

/** Levels are data of their own here. */
function withoutLevels(curve: PhaseCurve): PhaseCurve {
  return { ...curve, uEnthalpyLevelJPerMol: 0, uEntropyLevelJPerMolK: 0 };
}
