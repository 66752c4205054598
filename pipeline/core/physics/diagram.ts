import { cubicValue } from '../numeric/cubic.js';
import { numbers } from '../numeric/room.js';
import { rootBetween } from '../numeric/root.js';
import { type CurveArrays, enthalpyAt, entropyAt, gibbsAt, intervalOf } from './curve.js';

/** One phase in a diagram at one pressure: its curve and what the pressure adds to G [J/mol] at T. */
export interface DiagramPhase {
  readonly curve: CurveArrays;
  readonly lowK: number;
  readonly highK: number;
  /** Added to G° at T; its slope is small against S. */
  readonly shift: ((temperatureK: number) => number) | null;
  /** Formula units in one mole of this phase's table (S8 vapour: 8); 1 for all others. */
  readonly formulaUnits: number;
}

/** `interval`: where T lies in the curve, for a caller that knows it. */
export function gibbsInDiagram(phase: DiagramPhase, temperatureK: number, interval?: number): number {
  const g = gibbsAt(phase.curve, temperatureK, interval) + (phase.shift === null ? 0 : phase.shift(temperatureK));
  return phase.formulaUnits === 1 ? g : g / phase.formulaUnits;
}

/**
 * All temperatures at which two phases have the same G within the range that both reach, rising, to 1e-9 relative.
 *
 * Looked for between the knots of both curves. S rises with T, so the ends of an interval bound dS inside it: where dS
 * cannot vanish there is one crossing or none, by the sign of dG; where dG is too large to close there is none. What is
 * left is cut at the turning points of dS and then of dG, so that no crossing inside one interval is missed.
 */
export function crossingsOf(a: DiagramPhase, b: DiagramPhase): number[] {
  const low = Math.max(a.lowK, b.lowK);
  const high = Math.min(a.highK, b.highK);
  const found: number[] = [];
  if (!(high > low)) return found;
  const gap = (t: number): number => gibbsInDiagram(a, t) - gibbsInDiagram(b, t);
  const ts = merged(a.curve.knotK, b.curve.knotK, low, high);
  let ia = intervalOf(a.curve, low);
  let ib = intervalOf(b.curve, low);
  let t0 = ts[0];
  stateAt(a, t0, ia, inA);
  stateAt(b, t0, ib, inB);
  let g0 = inA.g - inB.g;
  let a0 = inA.s;
  let b0 = inB.s;
  if (g0 === 0) found.push(t0);
  for (let i = 1; i < ts.length; i++) {
    const t1 = ts[i];
    ia = walk(a.curve, ia, t1);
    ib = walk(b.curve, ib, t1);
    stateAt(a, t1, ia, inA);
    stateAt(b, t1, ib, inB);
    const g1 = inA.g - inB.g;
    const a1 = inA.s;
    const b1 = inB.s;
    const changed = g0 !== 0 && g1 !== 0 && g0 > 0 !== g1 > 0;
    const least = a0 - b1;
    const most = a1 - b0;
    if (least > 0 || most < 0) {
      if (changed) found.push(rootBetween(gap, t0, t1, 1e-9 * t1));
    } else if (changed || Math.abs(g0) + Math.abs(g1) <= Math.max(-least, most) * (t1 - t0)) {
      const slope = (t: number): number => slopeOf(b, t) - slopeOf(a, t);
      const turns = changesOf(slope, [t0, ...heatCapacityTurns(a, b, t0, t1), t1]);
      found.push(...changesOf(gap, [t0, ...turns, t1]));
    }
    if (g1 === 0) found.push(t1);
    t0 = t1;
    g0 = g1;
    a0 = a1;
    b0 = b1;
  }
  return found;
}

const inA = { g: 0, s: 0 };
const inB = { g: 0, s: 0 };

/** G and S of a phase in its diagram, per formula unit, T lying in interval i of its curve. */
function stateAt(phase: DiagramPhase, temperatureK: number, i: number, out: { g: number; s: number }): void {
  const { curve, shift, formulaUnits } = phase;
  const atKnot = curve.knotK[i] === temperatureK;
  const h = atKnot ? curve.enthalpyJPerMol[i] : enthalpyAt(curve, temperatureK, i);
  let s = atKnot ? curve.entropyJPerMolK[i] : entropyAt(curve, temperatureK, i);
  let g = h - temperatureK * s;
  if (shift !== null) {
    const step = 1e-3 * temperatureK;
    g += shift(temperatureK);
    s -= (shift(temperatureK + step) - shift(temperatureK - step)) / (2 * step);
  }
  out.g = g / formulaUnits;
  out.s = s / formulaUnits;
}

/** The interval that holds T, from one at or below it on. */
export function walk(curve: CurveArrays, from: number, temperatureK: number): number {
  const { knotK } = curve;
  let i = from;
  while (i < knotK.length - 2 && knotK[i + 1] <= temperatureK) i++;
  return i;
}

/** Where f changes sign or vanishes strictly inside the edges, f monotone between each two of them. */
function changesOf(f: (t: number) => number, edges: readonly number[]): number[] {
  const found: number[] = [];
  let before = f(edges[0]);
  for (let k = 1; k < edges.length; k++) {
    const after = f(edges[k]);
    if (before !== 0 && after !== 0 && before > 0 !== after > 0)
      found.push(rootBetween(f, edges[k - 1], edges[k], 1e-9 * edges[k]));
    if (after === 0 && k < edges.length - 1) found.push(edges[k]);
    before = after;
  }
  return found;
}

/** Where Cp of two phases is equal inside one interval of both, so that dS turns: the roots of one cubic, rising. */
function heatCapacityTurns(a: DiagramPhase, b: DiagramPhase, t0: number, t1: number): number[] {
  const p = cubicFrom(a, t0, t1);
  const q = cubicFrom(b, t0, t1);
  const [c0, c1, c2, c3] = p.map((v, k) => v - q[k]);
  const edges = [0, ...quadraticRoots(c1, 2 * c2, 3 * c3).filter((x) => x > 0 && x < t1 - t0), t1 - t0];
  return changesOf((x) => cubicValue(c0, c1, c2, c3, x), edges).map((x) => t0 + x);
}

/** Cp per formula unit as a cubic in T - t0, in the interval of the curve that holds t0 to t1. */
function cubicFrom({ curve, formulaUnits }: DiagramPhase, t0: number, t1: number): number[] {
  const i = intervalOf(curve, (t0 + t1) / 2);
  const x = t0 - curve.knotK[i];
  const { c0, c1, c2, c3 } = curve;
  const shifted = [
    cubicValue(c0[i], c1[i], c2[i], c3[i], x),
    c1[i] + x * (2 * c2[i] + 3 * x * c3[i]),
    c2[i] + 3 * x * c3[i],
    c3[i],
  ];
  return shifted.map((v) => v / formulaUnits);
}

/** Real roots of c + bx + ax^2, rising (common practice: the form without cancellation). */
function quadraticRoots(c: number, b: number, a: number): number[] {
  if (a === 0) return b === 0 ? [] : [-c / b];
  const square = b * b - 4 * a * c;
  if (square < 0) return [];
  const h = -(b + (b < 0 ? -1 : 1) * Math.sqrt(square)) / 2;
  const roots = h === 0 ? [0] : [h / a, c / h];
  return roots.sort((x, y) => x - y);
}

/** S in the diagram [J/(mol K)]: minus the slope of G, pressure term included. */
function slopeOf(phase: DiagramPhase, temperatureK: number): number {
  const s = entropyAt(phase.curve, temperatureK);
  if (phase.shift === null) return s / phase.formulaUnits;
  const step = 1e-3 * temperatureK;
  const d = (phase.shift(temperatureK + step) - phase.shift(temperatureK - step)) / (2 * step);
  return (s - d) / phase.formulaUnits;
}

function merged(a: Float64Array, b: Float64Array, low: number, high: number): Float64Array {
  const out = numbers(a.length + b.length + 2);
  let n = 0;
  out[n++] = low;
  let i = 0;
  let j = 0;
  while (i < a.length || j < b.length) {
    const next = j >= b.length || (i < a.length && a[i] <= b[j]) ? a[i++] : b[j++];
    if (next > out[n - 1] && next < high) out[n++] = next;
  }
  out[n++] = high;
  return out.subarray(0, n);
}
