/** Pairs of numbers that a common factor should carry from `x` to `y`, with their standard uncertainties. */
export interface RatioPairs {
  readonly x: number[];
  readonly y: number[];
  readonly ux: number[];
  readonly uy: number[];
}

export interface Ratio {
  readonly value: number;
  readonly u: number;
}

/** Pairs further off the line than this many standard uncertainties do not count. */
const FAR = 4;
const ROUNDS = 3;

/**
 * The factor f of y = f x: the weighted median of y/x, then least squares over the pairs that lie near it, so that up to
 * half of the weight may be wrong. Its u is that of least squares, or of the scatter about the median where that is larger. Null where fewer than three pairs say anything.
 */
export function robustRatio({ x, y, ux, uy }: RatioPairs): Ratio | null {
  const ratios: { readonly ratio: number; readonly weight: number }[] = [];
  for (let i = 0; i < x.length; i++) {
    if (x[i] === 0 || y[i] === 0) continue;
    const ratio = y[i] / x[i];
    const relative = Math.hypot(ux[i] / x[i], uy[i] / y[i]);
    if (Number.isFinite(ratio) && relative < 0.5) ratios.push({ ratio, weight: 1 / (relative + 1e-4) });
  }
  if (ratios.length < 3) return null;
  let value = weightedMedian(ratios);
  const median = value;
  const apart = ratios.map(({ ratio, weight }) => ({ ratio: Math.abs(ratio - median), weight }));
  // The pairs may scatter by more than their uncertainties say.
  const scatter = (1.4826 * weightedMedian(apart)) / Math.sqrt(ratios.length);
  let u = Number.POSITIVE_INFINITY;
  for (let round = 0; round < ROUNDS; round++) {
    let xx = 0;
    let xy = 0;
    for (let i = 0; i < x.length; i++) {
      const variance = uy[i] * uy[i] + value * value * ux[i] * ux[i];
      if (!(variance > 0) || Math.abs(y[i] - value * x[i]) > FAR * Math.sqrt(variance) + 1e-3 * Math.abs(y[i]))
        continue;
      xx += (x[i] * x[i]) / variance;
      xy += (x[i] * y[i]) / variance;
    }
    if (!(xx > 0)) return null;
    value = xy / xx;
    u = 1 / Math.sqrt(xx);
  }
  return Number.isFinite(value) && value !== 0 ? { value, u: Math.max(u, scatter) } : null;
}

/** Half of the weight lies on either side of it. */
function weightedMedian(pairs: { readonly ratio: number; readonly weight: number }[]): number {
  pairs.sort((a, b) => a.ratio - b.ratio);
  const half = pairs.reduce((sum, { weight }) => sum + weight, 0) / 2;
  let below = 0;
  for (const { ratio, weight } of pairs) {
    below += weight;
    if (below >= half) return ratio;
  }
  return pairs[pairs.length - 1].ratio;
}
