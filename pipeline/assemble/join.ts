import { type Stretch, splitAt } from './stretch.js';

/** Adds what `other` has below and above `base`; returns Cp(other) - Cp(base) at each join. */
export function extend(base: Stretch, other: Stretch): { stretch: Stretch; low: number | null; high: number | null } {
  let stretch = base;
  let low: number | null = null;
  let high: number | null = null;
  const first = base.temperatureK[0];
  const last = base.temperatureK[base.n - 1];
  if (other.temperatureK[0] < first && other.temperatureK[other.n - 1] >= first && first > 0) {
    const cut = splitAt(other, first);
    const upTo = indexOf(cut, first);
    low = cut.c0[Math.min(upTo, cut.n - 2)] - base.c0[0];
    stretch = cut.slice(0, upTo).joinedTo(stretch);
  }
  if (other.temperatureK[other.n - 1] > last && other.temperatureK[0] <= last) {
    const cut = splitAt(other, last);
    const from = indexOf(cut, last);
    const i = base.n - 2;
    const w = last - base.temperatureK[i];
    high = cut.c0[from] - (base.c0[i] + w * (base.c1[i] + w * (base.c2[i] + w * base.c3[i])));
    stretch = stretch.joinedTo(cut.slice(from, cut.n - 1));
  }
  return { stretch, low, high };
}

function indexOf(stretch: Stretch, temperatureK: number): number {
  let at = 0;
  for (let i = 0; i < stretch.n; i++) if (stretch.temperatureK[i] <= temperatureK) at = i;
  return at;
}
