import { Stretch, splitAt } from './stretch.js';

export interface Extended {
  readonly stretch: Stretch;
  /** Cp(other) - Cp(base) at the join [J/(mol K)]; null where nothing was added, or a gap lies between. */
  readonly lowStep: number | null;
  readonly highStep: number | null;
}

/**
 * Adds what `other` has below and above `base`, H and S running on; null where it reaches no further. A gap between the two
 * of at most `reach` of its near end (a share of T) is bridged, a wider one is not.
 */
export function extend(base: Stretch, other: Stretch, reach: number): Extended | null {
  const first = base.temperatureK[0];
  const last = base.temperatureK[base.n - 1];
  const lowest = other.temperatureK[0];
  const highest = other.temperatureK[other.n - 1];
  let stretch = base;
  let lowStep: number | null = null;
  let highStep: number | null = null;
  if (lowest < first && highest >= first) {
    const cut = splitAt(other, first);
    const part = cut.slice(0, indexOf(cut, first));
    lowStep = (part.n === cut.n ? heatCapacityAtEnd(part) : cut.c0[part.n - 1]) - base.c0[0];
    stretch = part.joinedTo(stretch, false);
  } else if (highest < first && first - highest <= reach * first) {
    stretch = other.joinedTo(bridge(other, base), true).joinedTo(stretch, false);
  }
  if (highest > last && lowest <= last) {
    const cut = splitAt(other, last);
    const part = cut.slice(indexOf(cut, last), cut.n - 1);
    highStep = part.c0[0] - heatCapacityAtEnd(base);
    stretch = stretch.joinedTo(part, true);
  } else if (lowest > last && lowest - last <= reach * last) {
    stretch = stretch.joinedTo(bridge(base, other), true).joinedTo(other, true);
  }
  return stretch === base ? null : { stretch, lowStep, highStep };
}

function indexOf(stretch: Stretch, temperatureK: number): number {
  let at = 0;
  for (let i = 0; i < stretch.n; i++) if (stretch.temperatureK[i] <= temperatureK) at = i;
  return at;
}

function heatCapacityAtEnd({ n, temperatureK, c0, c1, c2, c3 }: Stretch): number {
  const i = n - 2;
  const w = temperatureK[i + 1] - temperatureK[i];
  return c0[i] + w * (c1[i] + w * (c2[i] + w * c3[i]));
}

/** Errors of Cp grow from both ends of a gap by this share of Cp per kelvin: common practice, no source. */
const GAP_GROWTH_PER_K = 0.001;

/** Cp straight across a gap. Its error: a tenth of the change, as between two lone points, and the growth from both ends. */
function bridge(below: Stretch, above: Stretch): Stretch {
  const low = below.temperatureK[below.n - 1];
  const high = above.temperatureK[0];
  const w = high - low;
  const start = heatCapacityAtEnd(below);
  const end = above.c0[0];
  const two = (a: number, b: number): Float64Array => Float64Array.of(a, b);
  const one = (a: number): Float64Array => Float64Array.of(a);
  const none = Number.POSITIVE_INFINITY;
  return new Stretch(
    2,
    two(low, high),
    two(start, end),
    two(below.uHeatCapacity[below.n - 1], above.uHeatCapacity[0]),
    one(start),
    one((end - start) / w),
    one(0),
    one(0),
    one((Math.abs(end - start) * w) / 10 + (GAP_GROWTH_PER_K * Math.max(start, end) * w * w) / 4),
    one(0),
    one(0),
    one(0),
    two(0, 0),
    two(none, none),
    two(0, 0),
    two(none, none),
    two(0, 0),
    two(none, none),
    new Uint8Array(2),
    new Uint8Array(2),
    false,
    false,
    false,
    below.series,
  );
}
