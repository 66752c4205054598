import type { PhaseCurve } from '../../schemas/curves.js';
import type { Datum, HarmonisedCase } from '../../schemas/harmonised.js';
import { equilibrium } from '../core/physics/equilibrium.js';
import { type Anchored, type Joined, type Row, usesOf } from './condition-rows.js';

/** A stated number and how it enters the conditions. */
export interface ConditionDatum {
  readonly kind: 'temperature' | 'enthalpy' | 'entropy' | 'formation-enthalpy' | 'anchor-entropy';
  readonly datum: Datum;
  readonly u: number;
  /** dy/d(datum), m long. */
  readonly direction: Float64Array;
  /** For a transition's data: which one. */
  readonly transition: number;
  /** The phases that it bears on: a transition's two, or those whose level rests on the anchor. */
  readonly phases: readonly string[];
  /** For a temperature: the conditions re-solved with the crossing in its place; null where there is none. */
  readonly resolved: { readonly value: number; readonly y: Float64Array } | null;
}

/** Every stated number that shows in a condition. */
export function dataOf(
  rows: readonly Row[],
  joined: readonly Joined[],
  anchored: readonly Anchored[],
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
    phases: readonly string[],
    fill: (row: Row, i: number) => number,
    resolved: ConditionDatum['resolved'] = null,
  ): void => {
    const direction = new Float64Array(m);
    let any = false;
    rows.forEach((row, i) => {
      direction[i] = fill(row, i);
      if (direction[i] !== 0) any = true;
    });
    if (any) data.push({ kind, datum, u, direction, transition, phases, resolved });
  };
  joined.forEach((j, k) => {
    const { stated } = j.judged;
    const { at } = j;
    const place = [stated.from, stated.to];
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
          carried(row, joined, j.judged.index, 'h') +
          (stated.entropy === null ? carried(row, joined, j.judged.index, 's') / stated.temperature.value : 0)
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
          carried(row, joined, j.judged.index, 's') +
          (stated.enthalpy === null ? stated.temperature.value * carried(row, joined, j.judged.index, 'h') : 0)
        );
      });
    }
  });
  substance.anchors.forEach((anchor, index) => {
    const { enthalpyOfFormation: h, entropy: s } = anchor;
    const restingOn = (what: 'h' | 's'): string[] => {
      const found = curves.filter((c) => restsOn(c, curves, substance, index, what)).map((c) => c.phase);
      return found.includes(anchor.phase) ? found : [anchor.phase, ...found];
    };
    if (h !== null) {
      const u = levelU(curves, index, 'h', h);
      add('formation-enthalpy', h, u, -1, restingOn('h'), (row) => {
        let v = 0;
        for (const use of usesOf(row, joined, anchored))
          if (restsOn(use.curve, curves, substance, index, 'h')) v += use.h;
        return v;
      });
    }
    if (s !== null) {
      const u = levelU(curves, index, 's', s);
      add('anchor-entropy', s, u, -1, restingOn('s'), (row) => {
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

/** How a stated dH or dS enters another transition's rows, through a level that it carries. */
function carried(row: Row, joined: readonly Joined[], index: number, what: 'h' | 's'): number {
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
