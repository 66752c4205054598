import type { CheckedCase } from '../../../schemas/checked.js';
import type { PhaseCurve } from '../../../schemas/curves.js';
import type { Anchor, Datum, HarmonisedCase } from '../../../schemas/harmonised.js';
import type { Policy } from '../../../schemas/policy.js';
import { crossCovariance } from '../../core/physics/curve-uncertainty.js';
import { equilibrium } from '../../core/physics/equilibrium.js';
import type { LevelOrigin, UncertainCurve } from '../../core/physics/error-sum.js';
import {
  anchorConditions,
  atTemperature,
  type Condition,
  saturationConditions,
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

export function systemOf(checked: CheckedCase, isobarPa: number | null, policy: Policy): ConditionSystem {
  const { assembled } = checked;
  const substance = assembled.examined.harmonised;
  const { curves } = assembled;
  const joined = joinedTransitions(checked, isobarPa);
  const saturated = isobarPa === null ? saturatedPairs(checked) : [];
  const conditions = [
    ...transitionConditions(joined),
    ...anchorConditions(substance, curves, isobarPa),
    ...saturationConditions(saturated),
  ];
  const uOfAnchor = (key: string, anchor: Anchor, datum: Datum): number =>
    levelU(curves, key) ?? apartU(curves, anchor, datum, key, policy);
  const isobarOf = (transition: number): number | null => {
    const judged = checked.judged.find((j) => j.index === transition);
    return curves[judged?.fromCurve ?? -1]?.family.isobarPa ?? null;
  };
  const stated = statedData(substance, isobarPa, isobarOf, joined, saturated, uOfAnchor, policy);
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

/** The conditions of a transition taken at its computed crossing: a large shift is re-solved, not linearised. */
export function resolvedAt(
  system: ConditionSystem,
  datum: StatedDatum,
): { readonly value: number; readonly y: Float64Array } | null {
  if (datum.kind !== 'temperature') return null;
  const k = system.joined.findIndex((j) => j.judged.index === datum.transition);
  const crossingK = system.joined[k]?.judged.computedK ?? null;
  if (crossingK === null) return null;
  const j = system.joined[k];
  const there = equilibrium(j.from, j.to, crossingK);
  const y = Float64Array.from(system.conditions, (c) =>
    c.joined === k ? atTemperature(c, there, crossingK, j.judged.stated) : c.value,
  );
  return { value: crossingK, y };
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

/**
 * Of an anchor that no level rests on: the rounding within one evaluated source, else what is stated; and where only the
 * digits of another source speak, what the policy takes for a measured one.
 */
function apartU(curves: readonly PhaseCurve[], anchor: Anchor, datum: Datum, key: string, policy: Policy): number {
  const curve = curves.find((c) => c.phase === anchor.phase && c.family.isobarPa === anchor.table.isobarPa);
  const own = curve === undefined || curve.sources.every((s) => s === anchor.table.source);
  if (own) return anchor.table.basis === 'evaluated' ? datum.uRounding : datum.u;
  if (datum.origin !== 'printed digits' || datum.uRounding === 0) return datum.u;
  return Math.hypot(datum.u, defaultU(key, datum.value, policy));
}

/** B diag(rows) B^T: what the tables' own errors do, each curve at each temperature once. */
function addRows(q: Float64Array, conditions: readonly Condition[]): void {
  const m = conditions.length;
  const curves: UncertainCurve[] = [];
  const atK: number[] = [];
  const states = conditions.map((c) =>
    c.sum.rows.map((row) => {
      for (let s = 0; s < curves.length; s++) if (curves[s] === row.curve && atK[s] === row.atK) return s;
      curves.push(row.curve);
      atK.push(row.atK);
      return curves.length - 1;
    }),
  );
  const n = curves.length;
  const known: ([number, number, number, number] | undefined)[] = new Array(n * n);
  const between = (a: number, b: number): [number, number, number, number] => {
    const at = a * n + b;
    let found = known[at];
    if (found === undefined) {
      found = crossCovariance(curves[a], atK[a], atK[b]);
      known[at] = found;
    }
    return found;
  };
  for (let i = 0; i < m; i++) {
    const one = conditions[i];
    for (let k = 0; k <= i; k++) {
      const other = conditions[k];
      let v = one.gas * other.gas + (i === k ? one.variance : 0);
      for (let a = 0; a < states[i].length; a++) {
        const x = one.sum.rows[a];
        for (let b = 0; b < states[k].length; b++) {
          const z = other.sum.rows[b];
          if (x.curve !== z.curve) continue;
          const [hh, hs, sh, ss] = between(states[i][a], states[k][b]);
          v += x.h * z.h * hh + x.h * z.s * hs + x.s * z.h * sh + x.s * z.s * ss;
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
  const directions = new Map<string | Float64Array, { u: number; direction: Float64Array }>();
  conditions.forEach(({ sum }, i) => {
    for (const { key, by, u } of sum.data) {
      let found = directions.get(key);
      if (found === undefined) {
        found = { u, direction: new Float64Array(m) };
        directions.set(key, found);
      }
      found.direction[i] += by;
    }
  });
  const data: ConditionDatum[] = [];
  const unseen: StatedDatum[] = [];
  for (const one of stated) {
    const found = directions.get(one.key);
    if (found === undefined || isNegligible(found.direction, conditions)) {
      unseen.push(one);
      continue;
    }
    found.u = one.u;
    const within = conditions.every((c, i) => c.within || found.direction[i] === 0);
    data.push({ ...one, direction: found.direction, within });
  }
  for (const { u, direction } of directions.values()) {
    if (u === 0) continue;
    const u2 = u * u;
    for (let i = 0; i < m; i++) {
      if (direction[i] === 0) continue;
      for (let k = 0; k < m; k++) q[i * m + k] += direction[i] * u2 * direction[k];
    }
  }
  return { data, unseen };
}

/** What phases share cancels, but for the rounding of the sum. */
function isNegligible(direction: Float64Array, conditions: readonly Condition[]): boolean {
  for (let i = 0; i < direction.length; i++) {
    const size = conditions[i].kind === 'gap' || conditions[i].kind === 'saturation' ? 1e-6 : 1e-9;
    if (Math.abs(direction[i]) > size) return false;
  }
  return true;
}

function defaultU(key: string, value: number, { defaultUncertainty: u }: Policy): number {
  switch (key.split(' ')[0]) {
    case 'H':
      return u.enthalpyOfFormationJPerMol;
    case 'S':
      return u.entropyRelative * Math.abs(value);
    case 'H0':
      return u.enthalpyIncrementRelative * Math.abs(value);
    case 'Cp':
      return u.heatCapacityRelative * Math.abs(value);
    default:
      return 0;
  }
}
