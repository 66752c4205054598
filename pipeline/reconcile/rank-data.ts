import type { Policy } from '../../schemas/policy.js';
import { FreeData, type Whitened, whitened } from '../core/physics/adjustment.js';
import { orderedByExplanation } from './order-in-group.js';
import { inPressure, isPressure } from './system/stated-data.js';
import { type ConditionDatum, type ConditionSystem, resolvedAt, restsOn } from './system/system.js';
import { toldApartBy } from './told-apart.js';
import { type WholeSlip, wholeSlips } from './whole/whole-slips.js';

/** One datum under suspicion, with what the conditions say of it. */
export interface RankedDatum {
  readonly of: ConditionDatum;
  /** Null for a single number; else the slip that touches several at once, `of` being the first of them. */
  readonly whole: WholeSlip | null;
  readonly w: number;
  readonly redundancy: number;
  readonly smallestDetectable: number;
  readonly proposed: number;
  readonly uProposed: number;
}

/** The suspects of one error: the best, and those whose chi square lies within 9 of it. */
export interface SuspectGroup {
  readonly members: readonly RankedDatum[];
  /** Phases that the first of them bears on, through levels that rest on it too. */
  readonly phases: readonly string[];
  /** Transitions whose conditions its error shows in: indices among the substance's. */
  readonly reaches: ReadonlySet<number>;
  readonly before: number;
  readonly after: number;
  /** The measurement that would tell the first two apart. */
  readonly toldApartBy: string | null;
}

/** @param alone it explains more than any other, by more than a group's width */
type ScoreOf = (one: RankedDatum, alone?: boolean) => number | null;

const MOST_ERRORS = 4;
const ONE_GROUP = 9;

/**
 * Sets one suspect free at a time, the rest tested again, until the conditions close at `threshold` or nothing explains
 * them. A slip that touches many numbers at once is one suspect beside the single ones: it has nothing left to choose.
 * `scoreOf` is the log prior of the usual slip that leads to a suspect's proposed value, null where there is none. Nobody
 * gets the pressure wrong that a transition is stated at but by a usual slip: without one it is no suspect.
 */
export function suspectGroups(
  system: ConditionSystem,
  threshold: number,
  whole: Whitened = whitened(system.y, system.q, system.m),
  scoreOf: ScoreOf = () => null,
  policy: Policy | null = null,
): SuspectGroup[] {
  const groups: Omit<SuspectGroup, 'toldApartBy'>[] = [];
  const slips = { made: null as readonly WholeSlip[] | null };
  while (groups.length < Math.min(MOST_ERRORS, system.m)) {
    const found = nextGroup(system, threshold, whole, groups, scoreOf, slips);
    if (found === null) break;
    groups.push(found);
  }
  // What was said of one error before the others were known is said again with all of them set free.
  return groups.map((group, k) => {
    const others = groups.filter((_, other) => other !== k);
    const again = others.length === 0 ? null : nextGroup(system, threshold, whole, others, scoreOf, slips);
    const said = again ?? group;
    return { ...said, toldApartBy: policy === null ? null : toldApartBy(said.members, system, policy) };
  });
}

/** The best suspects with the first ones of `known` set free or undone; null where nothing is beyond the threshold. */
function nextGroup(
  system: ConditionSystem,
  threshold: number,
  whole: Whitened,
  known: readonly Pick<SuspectGroup, 'members'>[],
  scoreOf: ScoreOf,
  slips: { made: readonly WholeSlip[] | null },
): Omit<SuspectGroup, 'toldApartBy'> | null {
  const free = new FreeData(whole);
  const removed = new Set<ConditionDatum>();
  let y = system.y;
  for (const { members } of known) {
    const [first] = members;
    if (first.whole !== null) {
      for (const d of first.whole.data) removed.add(d);
      if (first.whole.open) free.free(first.whole.change);
      else y = moved(y, first.whole.change);
      continue;
    }
    removed.add(first.of);
    // Every condition of a transition whose temperature is wrong is taken at the crossing from here on.
    const resolved = isFar(first) ? resolvedAt(system, first.of) : null;
    if (resolved !== null) y = merged(y, system.y, resolved.y);
    free.free(resolved?.direction ?? first.of.direction);
  }
  const before = free.chiSquareOf(y);
  const ranked: RankedDatum[] = [];
  for (const d of system.data) {
    const one = removed.has(d) ? null : rank(free, y, before, system, d);
    if (one !== null) ranked.push(one);
  }
  if (!ranked.some((one) => Math.abs(one.w) > threshold && !isNominal(one))) return null;
  slips.made ??= wholeSlips(system);
  for (const slip of slips.made) {
    const one = slip.data.some((d) => removed.has(d)) ? null : rankWhole(free, y, before, system, slip);
    if (one !== null) ranked.push(one);
  }
  ranked.sort((a, b) => Math.abs(b.w) - Math.abs(a.w));
  const alone = ranked.length === 1 || !isNear(ranked[1], ranked[0]);
  const suspected = ranked.filter(
    (one, k) => !isDefinition(one, system) && (!isNominal(one) || scoreOf(one, alone && k === 0) !== null),
  );
  const [best] = suspected;
  if (best === undefined) return null;
  const near = (r: RankedDatum): boolean =>
    r === best || (isNear(r, best) && Math.abs(r.w) > threshold / 2 && pointsAlike(free, r, best));
  const members = ordered(suspected.filter(near), scoreOf);
  const [first] = members;
  return {
    members,
    phases: [...new Set((first.whole?.data ?? [first.of]).flatMap((d) => bearing(system, d)))],
    reaches: reached(system, first),
    before,
    after: before - best.w * best.w,
  };
}

function isNear({ w }: RankedDatum, best: RankedDatum): boolean {
  return best.w * best.w - w * w < ONE_GROUP + ROUNDING * best.w * best.w;
}

/** Two numbers that the conditions cannot tell apart move them in nearly the same way. */
function pointsAlike(free: FreeData, one: RankedDatum, other: RankedDatum): boolean {
  if (one.whole !== null || other.whole !== null) return true;
  const a = free.reduced(one.of.direction);
  const b = free.reduced(other.of.direction);
  let ab = 0;
  let aa = 0;
  let bb = 0;
  for (let i = 0; i < a.length; i++) {
    ab += a[i] * b[i];
    aa += a[i] * a[i];
    bb += b[i] * b[i];
  }
  return ab * ab > LEAST_ALIKE * aa * bb;
}

/** An element's reference state has no formation enthalpy, by definition. */
function isDefinition({ of, whole }: RankedDatum, { substance }: ConditionSystem): boolean {
  const { value, halfUnit } = of.datum;
  const element = /^[A-Z][a-z]?[0-9]*$/.test(substance.substance.formula ?? '');
  return whole === null && of.kind === 'formation-enthalpy' && value === 0 && halfUnit === 0 && element;
}

/** Transitions in whose conditions the error is more than their own uncertainty. */
function reached({ conditions, q, m }: ConditionSystem, { of, whole, proposed }: RankedDatum): Set<number> {
  const found = new Set<number>();
  const error = isPressure(of) ? Math.log(proposed / of.datum.value) : proposed - of.datum.value;
  conditions.forEach(({ transition }, i) => {
    const shows = whole === null ? of.direction[i] * error : whole.change[i];
    if (transition >= 0 && Math.abs(shows) > Math.sqrt(q[i * m + i])) found.add(transition);
  });
  return found;
}

/** The pressure that a transition is stated at: a number that nobody measured. */
function isNominal({ of, whole }: RankedDatum): boolean {
  return whole === null && of.kind === 'transition-pressure';
}

function bearing({ curves }: ConditionSystem, { key, phases }: ConditionDatum): readonly string[] {
  return [...new Set([...phases, ...curves.filter((c) => restsOn(c, key)).map((c) => c.phase)])];
}

/** Square of the cosine between two directions from which they count as alike; judgement. */
const LEAST_ALIKE = 0.3;
/** Of a very large chi square, differences below this share are rounding. */
const ROUNDING = 1e-10;
/** What a slip of many numbers may leave: this share of chi square, or so much a condition. */
const WELL_LEFT = 0.02;
const WELL_FIT = 4;
/** A temperature that would move by more than this is re-solved [K]. */
const FAR_K = 5;

function rank(
  free: FreeData,
  y: Float64Array,
  before: number,
  system: ConditionSystem,
  d: ConditionDatum,
): RankedDatum | null {
  const test = free.test(y, d.direction, d.u);
  if (test === null) return null;
  let { w } = test;
  const { value } = d.datum;
  const logarithmic = isPressure(d);
  let proposed = logarithmic ? value * Math.exp(-test.error) : value - test.error;
  let { uError } = test;
  const resolved = Math.abs(test.error) > FAR_K || Math.abs(w) > 10 ? resolvedAt(system, d) : null;
  if (resolved !== null && Math.abs(resolved.value - value) > FAR_K) {
    // One step of Gauss and Newton from the crossing: what the transition's enthalpy and entropy add to it.
    const there = merged(y, system.y, resolved.y);
    const step = free.test(there, resolved.direction, d.u);
    if (step === null) return null;
    const left = free.chiSquareOf(there) - step.w * step.w;
    w = Math.sign(test.w || 1) * Math.sqrt(Math.max(0, before - left));
    proposed = resolved.value - step.error;
    uError = step.uError;
  }
  const scale = logarithmic ? proposed : 1;
  return {
    of: d,
    whole: null,
    w,
    redundancy: test.redundancy,
    smallestDetectable: logarithmic ? inPressure(value, test.smallestDetectable) : test.smallestDetectable,
    proposed,
    uProposed: uError * scale,
  };
}

function isFar({ of, proposed }: RankedDatum): boolean {
  return of.kind === 'temperature' && Math.abs(proposed - of.datum.value) > FAR_K;
}

/** A slip with nothing to choose: what it would leave of chi square counts. */
function rankWhole(
  free: FreeData,
  y: Float64Array,
  before: number,
  system: ConditionSystem,
  slip: WholeSlip,
): RankedDatum | null {
  const [first] = slip.data;
  const common = { of: first, whole: slip, redundancy: 1, uProposed: slip.uCorrected };
  if (slip.open) {
    const test = free.test(y, slip.change, 0);
    if (test === null) return null;
    const { w, error, uError, smallestDetectable } = test;
    return { ...common, w, smallestDetectable, proposed: first.datum.value - error, uProposed: uError };
  }
  const left = free.chiSquareOf(moved(y, slip.change));
  // Near is not enough where nothing is left to choose: another law would leave less.
  if (!(left < WELL_LEFT * before || left < WELL_FIT * system.m)) return null;
  const size = Math.abs(slip.corrected - first.datum.value);
  return { ...common, w: Math.sqrt(before - left), smallestDetectable: size, proposed: slip.corrected };
}

/**
 * The most probable first: a usual slip that leads to what is needed counts, for one number as for many. Of the slips of many
 * numbers the best alone is kept.
 */
function ordered(members: readonly RankedDatum[], scoreOf: ScoreOf): RankedDatum[] {
  const best = members.find((one) => one.whole !== null);
  // One cell is one suspect, whether a law or its own number says so.
  const same = (one: RankedDatum): boolean => best?.whole?.cells === 1 && one.of.key === best.of.key;
  const kept = members.filter((one) => one === best || (one.whole === null && !same(one)));
  if (kept.length < 2) return kept;
  const weighed = kept.map((one) => ({
    wSquared: one.w * one.w,
    score: one.whole === null ? scoreOf(one) : one.whole.open ? null : Math.log(one.whole.weight),
  }));
  return orderedByExplanation(weighed).map((place) => kept[place]);
}

function moved(y: Float64Array, change: Float64Array): Float64Array {
  return y.map((v, i) => v + change[i]);
}

function merged(current: Float64Array, original: Float64Array, resolved: Float64Array): Float64Array {
  return current.map((v, i) => (resolved[i] !== original[i] ? resolved[i] : v));
}
