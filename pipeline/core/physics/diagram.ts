import { rootBetween } from '../numeric/root.js';
import { type CurveArrays, entropyAt, gibbsAt } from './curve.js';

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
 * Looked for between the knots of both curves; where dG does not change sign between two knots but its slope -dS does,
 * the extremum in between is looked at as well, so that a pair of crossings inside one interval is not missed.
 */
export function crossingsOf(a: DiagramPhase, b: DiagramPhase): number[] {
  const low = Math.max(a.lowK, b.lowK);
  const high = Math.min(a.highK, b.highK);
  const found: number[] = [];
  if (!(high > low)) return found;
  const gap = (t: number): number => gibbsInDiagram(a, t) - gibbsInDiagram(b, t);
  const slope = (t: number): number => -slopeOf(a, t) + slopeOf(b, t);
  const ts = merged(a.curve.knotK, b.curve.knotK, low, high);
  let t0 = ts[0];
  let g0 = gap(t0);
  for (let i = 1; i < ts.length; i++) {
    const t1 = ts[i];
    const g1 = gap(t1);
    if (g0 === 0 && i === 1) found.push(t0);
    if (g1 === 0) found.push(t1);
    else if (g0 !== 0 && g0 > 0 !== g1 > 0) found.push(rootBetween(gap, t0, t1, 1e-9 * t1));
    else if (g0 !== 0 && Math.abs(g0) + Math.abs(g1) < near(t0, t1, a, b)) {
      const d0 = slope(t0);
      const d1 = slope(t1);
      if (d0 > 0 !== d1 > 0 && d0 !== 0 && d1 !== 0) {
        const turn = rootBetween(slope, t0, t1, 1e-9 * t1);
        const gt = gap(turn);
        if (gt > 0 !== g0 > 0) {
          found.push(rootBetween(gap, t0, turn, 1e-9 * t1), rootBetween(gap, turn, t1, 1e-9 * t1));
        }
      }
    }
    t0 = t1;
    g0 = g1;
  }
  return found;
}

/** dG cannot turn over within an interval when it is larger than the entropies there could close: |dS| below 200 J/(mol K). */
function near(t0: number, t1: number, a: DiagramPhase, b: DiagramPhase): number {
  const most = Math.abs(slopeOf(a, t0) - slopeOf(b, t0)) + Math.abs(slopeOf(a, t1) - slopeOf(b, t1));
  return most * (t1 - t0);
}

function slopeOf(phase: DiagramPhase, temperatureK: number): number {
  const s = entropyAt(phase.curve, temperatureK);
  if (phase.shift === null) return s / phase.formulaUnits;
  const step = 1e-3 * temperatureK;
  const d = (phase.shift(temperatureK + step) - phase.shift(temperatureK - step)) / (2 * step);
  return (s - d) / phase.formulaUnits;
}

function merged(a: Float64Array, b: Float64Array, low: number, high: number): Float64Array {
  const out = new Float64Array(a.length + b.length + 2);
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
