import { FreeData, whitened } from '../core/physics/adjustment.js';
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
 * Sets one suspect free at a time, the rest tested again, until the conditions close at `threshold` or nothing explains
 * them.
 */
export function suspectGroups(system: ConditionSystem, threshold: number): SuspectGroup[] {
  const groups: SuspectGroup[] = [];
  const whole = whitened(system.y, system.q, system.m);
  if (whole === null) return groups;
  const free = new FreeData(whole);
  let y = system.y;
  const removed = new Set<ConditionDatum>();
  while (groups.length < Math.min(MOST_ERRORS, system.m)) {
    const before = free.chiSquareOf(y);
    const ranked: RankedDatum[] = [];
    for (const d of system.data) {
      const one = removed.has(d) ? null : rank(free, y, before, system.y, d);
      if (one !== null) ranked.push(one);
    }
    ranked.sort((a, b) => Math.abs(b.w) - Math.abs(a.w));
    const best = ranked[0];
    if (best === undefined || Math.abs(best.w) <= threshold) break;
    const near = (r: RankedDatum): boolean =>
      best.w * best.w - r.w * r.w < ONE_GROUP + ROUNDING * best.w * best.w && Math.abs(r.w) > threshold / 2;
    groups.push({ members: ranked.filter(near), before, after: before - best.w * best.w });
    removed.add(best.of);
    // Every condition of a transition whose temperature is wrong is taken at the crossing from here on.
    if (best.of.resolved !== null) y = merged(y, system.y, best.of.resolved.y);
    free.free(best.of.direction);
  }
  return groups;
}

/** Of a very large chi square, differences below this share are rounding. */
const ROUNDING = 1e-10;

function rank(
  free: FreeData,
  y: Float64Array,
  before: number,
  original: Float64Array,
  d: ConditionDatum,
): RankedDatum | null {
  const test = free.test(y, d.direction, d.u);
  if (test === null) return null;
  let { w } = test;
  let proposed = d.datum.value - test.error;
  if (d.resolved !== null && Math.abs(d.resolved.value - d.datum.value) > 5) {
    const left = free.chiSquareOf(merged(y, original, d.resolved.y));
    w = Math.sign(test.w || 1) * Math.sqrt(Math.max(0, before - left));
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
