import type { CheckedCase, JudgedTransition } from '../../schemas/checked.js';
import type { PhaseCurve } from '../../schemas/curves.js';
import type { Anchor, Datum, HarmonisedCase } from '../../schemas/harmonised.js';
import { entropyAt } from '../core/physics/curve.js';
import { crossCovariance, stateCovariance } from '../core/physics/curve-uncertainty.js';
import { type Equilibrium, equilibrium } from '../core/physics/equilibrium.js';
import { isGas, type PlacedPhase, placePhase } from '../core/physics/placed-phase.js';
import { condensedTermUncertainty } from '../core/physics/pressure-terms.js';

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

export interface ConditionDatum {
  readonly kind: 'temperature' | 'enthalpy' | 'entropy' | 'formation-enthalpy' | 'anchor-entropy';
  readonly datum: Datum;
  readonly u: number;
  /** dy/d(datum), m long. */
  readonly direction: Float64Array;
  /** For a transition's data: which one. */
  readonly transition: number;
  readonly phase: string;
  /** For a temperature: the conditions re-solved with the crossing in its place; null where there is none. */
  readonly resolved: { readonly value: number; readonly y: Float64Array } | null;
}

interface Row {
  readonly kind: 'gap' | 'enthalpy' | 'entropy' | 'anchor' | 'closure';
  readonly transition: number;
  readonly value: number;
}

interface Joined {
  readonly judged: JudgedTransition;
  readonly from: PlacedPhase<PhaseCurve>;
  readonly to: PlacedPhase<PhaseCurve>;
  readonly atK: number;
  readonly at: Equilibrium;
  readonly within: boolean;
}

/** The system of one family of curves (`isobarPa`); null where there is nothing to compare. */
export function conditionsOf(checked: CheckedCase, isobarPa: number | null): ConditionSystem | null {
  const { assembled } = checked;
  const substance = assembled.examined.harmonised;
  const { curves } = assembled;
  const joined: Joined[] = [];
  const boiling = boilingOf(substance);
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
  const anchored: { curve: PhaseCurve; anchor: Anchor }[] = [];
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

/** How a curve's H and S at a row's temperature enter the row: signs for (H, S) of `to` and, opposite, of `from`. */
function weights(row: Row, j: Joined): [number, number] {
  if (row.kind === 'gap') return [1, -j.atK];
  if (row.kind === 'enthalpy') return [1, 0];
  return [0, 1];
}

interface Use {
  readonly curve: PhaseCurve;
  readonly atK: number;
  readonly h: number;
  readonly s: number;
}

function usesOf(
  row: Row,
  joined: readonly Joined[],
  anchored: readonly { curve: PhaseCurve; anchor: Anchor }[],
): Use[] {
  if (row.kind === 'closure') return [];
  if (row.kind === 'anchor') {
    const { curve, anchor } = anchored[row.transition];
    return [{ curve, atK: anchor.referenceTemperatureK, h: 0, s: -1 }];
  }
  const j = joined[row.transition];
  const [h, s] = weights(row, j);
  return [
    { curve: j.to.source, atK: j.atK, h: h / j.to.formulaUnits, s: s / j.to.formulaUnits },
    { curve: j.from.source, atK: j.atK, h: -h / j.from.formulaUnits, s: -s / j.from.formulaUnits },
  ];
}

function addCurveNoise(
  q: Float64Array,
  rows: readonly Row[],
  joined: readonly Joined[],
  anchored: readonly { curve: PhaseCurve; anchor: Anchor }[],
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

function dataOf(
  rows: readonly Row[],
  joined: readonly Joined[],
  anchored: readonly { curve: PhaseCurve; anchor: Anchor }[],
  substance: HarmonisedCase,
  curves: readonly PhaseCurve[],
): ConditionDatum[] {
  const m = rows.length;
  const data: ConditionDatum[] = [];
  const add = (
    kind: ConditionDatum['kind'],
    datum: Datum,
    u: number,
    transition: number,
    phase: string,
    fill: (row: Row, i: number) => number,
    resolved: ConditionDatum['resolved'] = null,
  ): void => {
    const direction = new Float64Array(m);
    let any = false;
    rows.forEach((row, i) => {
      direction[i] = fill(row, i);
      if (direction[i] !== 0) any = true;
    });
    if (any) data.push({ kind, datum, u, direction, transition, phase, resolved });
  };
  joined.forEach((j, k) => {
    const { stated } = j.judged;
    const { at } = j;
    const place = `${stated.from}>${stated.to}`;
    const uT = j.within ? stated.temperature.uRounding : stated.temperature.u;
    add(
      'temperature',
      stated.temperature,
      uT,
      j.judged.index,
      place,
      (row) => {
        if (row.kind === 'anchor' || row.transition !== k) return 0;
        if (row.kind === 'gap') return -at.entropyJPerMolK;
        if (row.kind === 'enthalpy') return at.heatCapacityJPerMolK;
        if (row.kind === 'entropy') return at.heatCapacityJPerMolK / j.atK;
        return -(stated.entropy?.value ?? 0);
      },
      resolvedAt(rows, joined, k),
    );
    const arithmetic = j.within || stated.table.basis !== 'measured';
    if (stated.enthalpy !== null) {
      const own = arithmetic ? stated.enthalpy.uRounding : stated.enthalpy.u;
      add('enthalpy', stated.enthalpy, own, j.judged.index, place, (row) => {
        if (row.kind === 'anchor') return 0;
        if (row.transition === k && row.kind === 'enthalpy') return -1;
        if (row.transition === k && row.kind === 'closure') return 1;
        return (
          carriedEnthalpy(row, joined, curves, j.judged.index) +
          (stated.entropy === null ? carriedEntropy(row, joined, curves, j.judged.index) / stated.temperature.value : 0)
        );
      });
    }
    if (stated.entropy !== null) {
      const own = arithmetic ? stated.entropy.uRounding : stated.entropy.u;
      add('entropy', stated.entropy, own, j.judged.index, place, (row) => {
        if (row.kind === 'anchor') return 0;
        if (row.transition === k && row.kind === 'entropy') return -1;
        if (row.transition === k && row.kind === 'closure') return -stated.temperature.value;
        return (
          carriedEntropy(row, joined, curves, j.judged.index) +
          (stated.enthalpy === null
            ? stated.temperature.value * carriedEnthalpy(row, joined, curves, j.judged.index)
            : 0)
        );
      });
    }
  });
  substance.anchors.forEach((anchor, index) => {
    const { enthalpyOfFormation: h, entropy: s } = anchor;
    if (h !== null) {
      const u = levelU(curves, index, 'h', h);
      add('formation-enthalpy', h, u, -1, anchor.phase, (row) => {
        let v = 0;
        for (const use of usesOf(row, joined, anchored))
          if (restsOn(use.curve, curves, substance, index, 'h')) v += use.h;
        return v;
      });
    }
    if (s !== null) {
      const u = levelU(curves, index, 's', s);
      add('anchor-entropy', s, u, -1, anchor.phase, (row) => {
        if (row.kind === 'anchor') return anchored[row.transition].anchor === anchor ? 1 : 0;
        let v = 0;
        for (const use of usesOf(row, joined, anchored))
          if (restsOn(use.curve, curves, substance, index, 's')) v += use.s;
        return v;
      });
    }
  });
  return data;
}

function levelU(curves: readonly PhaseCurve[], index: number, what: 'h' | 's', datum: Datum): number {
  for (const c of curves) {
    if (what === 'h' && c.enthalpyAnchor === index) return c.uEnthalpyLevelJPerMol;
    if (what === 's' && c.entropyAnchor === index) return c.uEntropyLevelJPerMolK;
  }
  return datum.uRounding > 0 ? Math.max(datum.uRounding, datum.origin === 'printed digits' ? 0 : datum.u) : datum.u;
}

/** Whether a curve's level comes from this anchor, itself or through transitions. */
function restsOn(
  curve: PhaseCurve,
  curves: readonly PhaseCurve[],
  substance: HarmonisedCase,
  anchor: number,
  what: 'h' | 's',
): boolean {
  let at: PhaseCurve | undefined = curve;
  for (let step = 0; at !== undefined && step < curves.length; step++) {
    if ((what === 'h' ? at.enthalpyAnchor : at.entropyAnchor) === anchor) return true;
    const from = what === 'h' ? at.enthalpyLevelFrom : at.entropyLevelFrom;
    if (from !== 'transition') return false;
    at = otherSide(at, curves, substance);
  }
  return false;
}

function otherSide(
  curve: PhaseCurve,
  curves: readonly PhaseCurve[],
  substance: HarmonisedCase,
): PhaseCurve | undefined {
  const stated = substance.transitions[curve.carriedThrough];
  const other = stated.from === curve.phase ? stated.to : stated.from;
  return curves.find((c) => c.phase === other && c.family.isobarPa === curve.family.isobarPa);
}

/** How a stated dH enters another transition's rows, through a level that it carries. */
function carriedEnthalpy(row: Row, joined: readonly Joined[], curves: readonly PhaseCurve[], index: number): number {
  return carried(row, joined, curves, index, 'h');
}

function carriedEntropy(row: Row, joined: readonly Joined[], curves: readonly PhaseCurve[], index: number): number {
  return carried(row, joined, curves, index, 's');
}

function carried(
  row: Row,
  joined: readonly Joined[],
  _curves: readonly PhaseCurve[],
  index: number,
  what: 'h' | 's',
): number {
  if (row.kind === 'anchor' || row.kind === 'closure') return 0;
  let v = 0;
  for (const use of usesOf(row, joined, [])) {
    const from = what === 'h' ? use.curve.enthalpyLevelFrom : use.curve.entropyLevelFrom;
    if (use.curve.carriedThrough !== index || from !== 'transition') continue;
    const stated = joined.find((j) => j.judged.index === index)?.judged.stated;
    const sign = stated?.to === use.curve.phase ? 1 : -1;
    v += sign * (what === 'h' ? use.h : use.s);
  }
  return v;
}

/** The conditions with transition k taken at its computed crossing: a large shift is re-solved, not linearised. */
function resolvedAt(rows: readonly Row[], joined: readonly Joined[], k: number): ConditionDatum['resolved'] {
  const j = joined[k];
  const crossing = j.judged.computedK;
  if (crossing === null) return null;
  const there = equilibrium(j.from, j.to, crossing);
  const { stated } = j.judged;
  const y = Float64Array.from(rows, (row) => {
    if (row.kind === 'anchor' || row.transition !== k) return row.value;
    if (row.kind === 'gap') return -there.gapJPerMol;
    if (row.kind === 'enthalpy') return there.enthalpyJPerMol - (stated.enthalpy?.value ?? 0);
    if (row.kind === 'entropy') return there.entropyJPerMolK - (stated.entropy?.value ?? 0);
    return (stated.enthalpy?.value ?? 0) - crossing * (stated.entropy?.value ?? 0);
  });
  return { value: crossing, y };
}

function boilingOf(substance: HarmonisedCase): number {
  for (const t of substance.transitions) if (isGas(t.to)) return t.temperature.value;
  return 500;
}
