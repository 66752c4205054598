import { chiSquareOf, testDatum, type Whitened, whitened } from '../core/physics/adjustment.js';
import type { ConditionDatum } from './condition-data.js';
import type { ConditionSystem } from './conditions.js';

/** One datum under suspicion, with what the conditions say of it. */
export interface RankedDatum {
  readonly of: ConditionDatum;
  readonly w: number;
  readonly redundancy: number;
  readonly smallestDetectable: number;
  readonly proposed: number;
  readonly uProposed: number;
}

/** The suspects of one error: the best, and those whose chi square lies within 9 of it. */
export interface SuspectGroup {
  readonly members: readonly RankedDatum[];
  readonly before: number;
  readonly after: number;
}

const MOST_ERRORS = 4;
const ONE_GROUP = 9;

/**
 * Removes one suspect at a time, the rest tested again, until the conditions close at `threshold` or nothing explains them.
 * A removed datum stays in with a variance that lets it be anything.
 */
export function suspectGroups(system: ConditionSystem, threshold: number): SuspectGroup[] {
  const groups: SuspectGroup[] = [];
  const { m } = system;
  let q = system.q;
  let y = system.y;
  const removed = new Set<ConditionDatum>();
  while (groups.length < Math.min(MOST_ERRORS, m)) {
    const now = whitened(y, q, m);
    if (now === null) break;
    const ranked: RankedDatum[] = [];
    for (const d of system.data) {
      if (removed.has(d)) continue;
      const one = rank(now, d);
      if (one !== null) ranked.push(one);
    }
    ranked.sort((a, b) => Math.abs(b.w) - Math.abs(a.w));
    const best = ranked[0];
    if (best === undefined || Math.abs(best.w) <= threshold) break;
    const members = ranked.filter((r) => best.w * best.w - r.w * r.w < ONE_GROUP && Math.abs(r.w) > threshold / 2);
    groups.push({ members, before: now.chiSquare, after: now.chiSquare - best.w * best.w });
    removed.add(best.of);
    if (best.of.resolved !== null && best.of.kind === 'temperature') {
      // Every condition of this transition is taken at the crossing from here on.
      y = merged(y, system.y, best.of.resolved.y);
    }
    q = freed(q, m, best.of.direction, best.uProposed);
  }
  return groups;
}

function rank(now: Whitened, d: ConditionDatum): RankedDatum | null {
  const test = testDatum(now, d.direction, d.u);
  if (test === null) return null;
  let { w } = test;
  let proposed = d.datum.value - test.error;
  if (d.kind === 'temperature' && d.resolved !== null && Math.abs(d.resolved.value - d.datum.value) > 5) {
    const left = chiSquareOf(now, d.resolved.y);
    w = Math.sign(test.w || 1) * Math.sqrt(Math.max(0, now.chiSquare - left));
    proposed = d.resolved.value;
  }
  return {
    of: d,
    w,
    redundancy: test.redundancy,
    smallestDetectable: test.smallestDetectable,
    proposed,
    uProposed: test.uError,
  };
}

function merged(current: Float64Array, original: Float64Array, resolved: Float64Array): Float64Array {
  return current.map((v, i) => (resolved[i] !== original[i] ? resolved[i] : v));
}

function freed(q: Float64Array, m: number, d: Float64Array, u: number): Float64Array {
  const big = (1e4 * u) ** 2;
  const out = q.slice();
  for (let i = 0; i < m; i++) for (let j = 0; j < m; j++) out[i * m + j] += big * d[i] * d[j];
  return out;
}
