import type { CheckedCase } from '../../../schemas/checked.js';
import type { PhaseCurve } from '../../../schemas/curves.js';
import type { Anchor, Datum, HarmonisedCase } from '../../../schemas/harmonised.js';
import { numbers } from '../../core/numeric/room.js';
import { equilibrium } from '../../core/physics/equilibrium.js';
import type { LevelOrigin, UncertainCurve } from '../../core/physics/error-sum.js';
import { addCrossCovariance } from '../../core/physics/rows-covariance.js';
import { uStated } from '../../core/physics/stated-u.js';
import {
  anchorConditions,
  atTemperature,
  type Condition,
  closureConditions,
  formationConditions,
  saturationConditions,
  slopeAtTemperature,
  transitionConditions,
} from './conditions.js';
import { type Joined, joinedTransitions, type Saturated, saturatedPairs } from './joined.js';
import { type StatedDatum, statedData } from './stated-data.js';

/** A stated number and how the conditions move with it. */
export interface ConditionDatum extends StatedDatum {
  /** dy/d(datum), m long; by ln p for a pressure. */
  readonly direction: Float64Array;
  /** All conditions that it shows in are one evaluated source's own. */
  readonly within: boolean;
}

/**
 * All that is stated about a substance on one isobar as conditions y = 0 with covariance Q (m x m, row-major): see
 * `conditions.ts`. Data that show in no condition are `unseen`: nothing else speaks of them.
 */
export interface ConditionSystem {
  readonly m: number;
  readonly y: Float64Array;
  readonly q: Float64Array;
  readonly conditions: readonly Condition[];
  readonly data: readonly ConditionDatum[];
  readonly unseen: readonly StatedDatum[];
  readonly joined: readonly Joined[];
  readonly saturated: readonly Saturated[];
  readonly curves: readonly PhaseCurve[];
  readonly substance: HarmonisedCase;
}

export function systemOf(checked: CheckedCase, isobarPa: number | null): ConditionSystem {
  const { assembled } = checked;
  const substance = assembled.examined.harmonised;
  const { curves } = assembled;
  const joined = joinedTransitions(checked, isobarPa);
  const saturated = isobarPa === null ? saturatedPairs(checked) : [];
  const isobarOf = (transition: number): number | null => {
    const judged = checked.judged.find((j) => j.index === transition);
    return curves[judged?.fromCurve ?? -1]?.family.isobarPa ?? null;
  };
  const conditions = [
    ...transitionConditions(joined),
    ...closureConditions(substance.transitions, (transition) => isobarOf(transition) === isobarPa, joined),
    ...anchorConditions(substance, curves, isobarPa),
    ...formationConditions(substance, curves, isobarPa),
    ...saturationConditions(saturated),
  ];
  const uOfAnchor = (key: string, anchor: Anchor, datum: Datum): number =>
    levelU(curves, key) ?? apartU(curves, anchor, datum);
  const stated = statedData(substance, isobarPa, isobarOf, joined, saturated, uOfAnchor);
  const m = conditions.length;
  const y = Float64Array.from(conditions, (c) => c.value);
  const q = new Float64Array(m * m);
  addRows(q, conditions);
  const noise = addData(q, conditions, stated);
  return { m, y, q, conditions, ...noise, joined, saturated, curves, substance };
}

/** Whether a curve's level comes from the datum `key`, itself or through transitions. */
export function restsOn(curve: UncertainCurve, key: string): boolean {
  const rests = (origin: LevelOrigin | undefined, what: 'enthalpyLevel' | 'entropyLevel'): boolean =>
    origin !== undefined &&
    (origin.errors.some((error) => error.key === key) || (origin.from !== null && rests(origin.from[what], what)));
  return rests(curve.enthalpyLevel, 'enthalpyLevel') || rests(curve.entropyLevel, 'entropyLevel');
}

/** The misclosures with a transition taken at another temperature, and how they move with it there. */
export interface Resolved {
  readonly value: number;
  readonly y: Float64Array;
  readonly direction: Float64Array;
}

/** The conditions of a transition taken at its computed crossing: a large shift is re-solved, not linearised. */
export function resolvedAt(system: ConditionSystem, datum: ConditionDatum): Resolved | null {
  if (datum.kind !== 'temperature') return null;
  const k = system.joined.findIndex((j) => j.judged.index === datum.transition);
  const j = system.joined[k];
  if (j === undefined) return null;
  const { stated, computedK } = j.judged;
  if (j.carriesH !== j.carriesS) return resolvedThrough(system, datum, j);
  if (computedK === null) return null;
  const there = equilibrium(j.from, j.to, computedK);
  const dS = stated.entropy?.value ?? 0;
  const own = (c: Condition): boolean => c.joined === k;
  return {
    value: computedK,
    y: Float64Array.from(system.conditions, (c) => (own(c) ? atTemperature(c, there, computedK, stated) : c.value)),
    direction: Float64Array.from(system.conditions, (c, i) =>
      own(c) ? slopeAtTemperature(c, there, computedK, dS) : datum.direction[i],
    ),
  };
}

/**
 * Where one level was carried through the transition itself, it moves with the temperature: G is equal where the stated dH is
 * T dS of the curves, or dH of the curves T times the stated dS. By Newton's method from the stated temperature.
 */
function resolvedThrough(system: ConditionSystem, datum: ConditionDatum, j: Joined): Resolved | null {
  const { enthalpy, entropy } = j.judged.stated;
  const low = Math.max(j.from.lowK, j.to.lowK);
  const high = Math.min(j.from.highK, j.to.highK);
  let t = j.atK;
  let slope = 0;
  for (let step = 0; step < 20; step++) {
    const { enthalpyJPerMol: dH, entropyJPerMolK: dS, heatCapacityJPerMolK: dCp } = equilibrium(j.from, j.to, t);
    let gap: number;
    if (j.carriesH) {
      if (enthalpy === null) return null;
      gap = enthalpy.value - t * dS;
      slope = -dS - dCp;
    } else {
      const stated = entropy?.value ?? (enthalpy === null ? null : enthalpy.value / t);
      if (stated === null) return null;
      gap = dH - t * stated;
      slope = entropy === null ? dCp : dCp - stated;
    }
    if (slope === 0) return null;
    const next = Math.min(high, Math.max(low, t - gap / slope));
    if (Math.abs(next - t) < 1e-9 * t) break;
    t = next;
  }
  const k = system.joined.indexOf(j);
  const isGap = (c: Condition): boolean => c.joined === k && c.kind === 'gap';
  return {
    value: t,
    y: Float64Array.from(system.conditions, (c) => (isGap(c) ? 0 : c.value)),
    direction: Float64Array.from(system.conditions, (c, i) => (isGap(c) ? slope : datum.direction[i])),
  };
}

/** The error that the curve's level takes the anchor with: the rounding alone within one compiled source. */
function levelU(curves: readonly PhaseCurve[], key: string): number | null {
  for (const curve of curves) {
    for (const origin of [curve.enthalpyLevel, curve.entropyLevel]) {
      const own = origin?.errors.find((error) => error.key === key);
      if (own !== undefined) return own.u;
    }
  }
  return null;
}

/** Of an anchor that no level rests on: the rounding within one evaluated source, else what it has beside another's. */
function apartU(curves: readonly PhaseCurve[], anchor: Anchor, datum: Datum): number {
  const curve = curves.find((c) => c.phase === anchor.phase && c.family.isobarPa === anchor.table.isobarPa);
  const own = curve === undefined || curve.sources.every((s) => s === anchor.table.source);
  return own ? uStated(datum, anchor.table.basis === 'evaluated') : uStated(datum, false);
}

/** B diag(rows) B^T: what the tables' own errors do, each curve at each temperature once. */
function addRows(q: Float64Array, conditions: readonly Condition[]): void {
  const m = conditions.length;
  const curves: UncertainCurve[] = [];
  const atK: number[] = [];
  const stateOf = (curve: UncertainCurve, t: number): number => {
    for (let s = 0; s < curves.length; s++) if (curves[s] === curve && atK[s] === t) return s;
    curves.push(curve);
    atK.push(t);
    return curves.length - 1;
  };
  const states = conditions.map((c) => c.sum.rows.map((row) => stateOf(row.curve, row.atK)));
  const n = curves.length;
  const known = numbers(4 * n * n);
  for (let a = 0; a < n; a++) {
    for (let b = 0; b <= a; b++) {
      if (curves[a] !== curves[b]) continue;
      const at = 4 * (a * n + b);
      addCrossCovariance(curves[a], atK[a], atK[b], known, at);
      const mirror = 4 * (b * n + a);
      known[mirror] = known[at];
      known[mirror + 3] = known[at + 3];
      const hs = known[at + 1];
      const sh = known[at + 2];
      known[mirror + 1] = sh;
      known[mirror + 2] = hs;
    }
  }
  for (let i = 0; i < m; i++) {
    const one = conditions[i];
    const oneRows = one.sum.rows;
    for (let k = 0; k <= i; k++) {
      const other = conditions[k];
      const otherRows = other.sum.rows;
      let v = i === k ? one.variance : 0;
      for (let a = 0; a < oneRows.length; a++) {
        const x = oneRows[a];
        for (let b = 0; b < otherRows.length; b++) {
          const z = otherRows[b];
          if (x.curve !== z.curve) continue;
          const at = 4 * (states[i][a] * n + states[k][b]);
          v += x.h * (z.h * known[at] + z.s * known[at + 1]) + x.s * (z.h * known[at + 2] + z.s * known[at + 3]);
        }
      }
      q[i * m + k] += v;
      if (k !== i) q[k * m + i] += v;
    }
  }
}

/** D diag(u^2) D^T of the data, and of what levels owe to no single number. */
function addData(
  q: Float64Array,
  conditions: readonly Condition[],
  stated: readonly StatedDatum[],
): { data: ConditionDatum[]; unseen: StatedDatum[] } {
  const m = conditions.length;
  const places = new Map<string | Float64Array, number>();
  const us: number[] = [];
  const directions: Float64Array[] = [];
  for (let i = 0; i < m; i++) {
    const terms = conditions[i].sum.data;
    for (let t = 0; t < terms.length; t++) {
      const { key, by, u } = terms[t];
      let k = places.get(key);
      if (k === undefined) {
        k = us.length;
        places.set(key, k);
        us.push(u);
        directions.push(numbers(m));
      }
      directions[k][i] += by;
    }
  }
  const data: ConditionDatum[] = [];
  const unseen: StatedDatum[] = [];
  for (const one of stated) {
    const k = places.get(one.key);
    if (k === undefined || isNegligible(directions[k], conditions)) {
      unseen.push(one);
      continue;
    }
    us[k] = one.u;
    data.push(seen(one, directions[k], conditions));
  }
  for (let k = 0; k < us.length; k++) {
    const u2 = us[k] * us[k];
    const direction = directions[k];
    if (u2 === 0) continue;
    for (let i = 0; i < m; i++) {
      const by = direction[i] * u2;
      if (by === 0) continue;
      for (let j = 0; j < m; j++) q[i * m + j] += by * direction[j];
    }
  }
  return { data, unseen };
}

function seen(one: StatedDatum, direction: Float64Array, conditions: readonly Condition[]): ConditionDatum {
  const { key, kind, datum, u, transition, phases, place } = one;
  let within = true;
  for (let i = 0; i < conditions.length; i++) if (direction[i] !== 0 && !conditions[i].within) within = false;
  return { key, kind, datum, u, transition, phases, place, direction, within };
}

/** What phases share cancels, but for the rounding of the sum. */
function isNegligible(direction: Float64Array, conditions: readonly Condition[]): boolean {
  for (let i = 0; i < direction.length; i++) {
    const size = conditions[i].kind === 'gap' || conditions[i].kind === 'saturation' ? 1e-6 : 1e-9;
    if (Math.abs(direction[i]) > size) return false;
  }
  return true;
}
