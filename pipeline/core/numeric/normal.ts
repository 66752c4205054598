/**
 * The upper quantile of the standard normal law: z with P(Z > z) = p, 0 < p < 1, to about 1e-9 relative
 * (P. J. Acklam's rational approximation, 2003, refined by two steps of Halley's method on the tail).
 */
export function normalQuantile(p: number): number {
  let x = -acklam(p);
  for (let k = 0; k < 2; k++) {
    // Relative to the density, so that tails below the rounding of 1 keep their digits.
    const u = (p - upperTail(x)) * Math.sqrt(2 * Math.PI) * Math.exp((x * x) / 2);
    x -= u / (1 + (x * u) / 2);
  }
  return x;
}

/** The two-sided critical value when `alpha` is shared over `tests` (Z. Sidak, J. Am. Stat. Assoc. 62 (1967) 626). */
export function sidakThreshold(alpha: number, tests: number): number {
  if (alpha !== known.alpha[0] && alpha !== known.alpha[1]) {
    known.alpha = [alpha, known.alpha[0]];
    known.values = [[], known.values[0]];
  }
  const values = known.values[known.alpha[0] === alpha ? 0 : 1];
  values[tests] ??= thresholdOf(alpha, tests);
  return values[tests];
}

/** Every substance asks for the same few: the last two alphas are kept, by the number of tests. */
const known: { alpha: [number, number]; values: [number[], number[]] } = { alpha: [-1, -1], values: [[], []] };

function thresholdOf(alpha: number, tests: number): number {
  const each = -Math.expm1(Math.log1p(-alpha) / Math.max(1, tests));
  return normalQuantile(each / 2);
}

/** P(Z > z) by the continued fraction (Abramowitz and Stegun 26.2.14) for large z, by the series 26.2.10 for small. */
export function upperTail(z: number): number {
  if (z < 0) return 1 - upperTail(-z);
  const density = Math.exp((-z * z) / 2) / Math.sqrt(2 * Math.PI);
  if (z < 2.5) {
    let term = z;
    let sum = z;
    for (let k = 1; k < 200; k++) {
      term *= (z * z) / (2 * k + 1);
      sum += term;
      if (term < 1e-17 * sum) break;
    }
    return 0.5 - density * sum;
  }
  let fraction = 0;
  for (let k = 120; k > 0; k--) fraction = k / (z + fraction);
  return density / (z + fraction);
}

function acklam(q: number): number {
  const a = [
    -39.69683028665376, 220.9460984245205, -275.9285104469687, 138.357751867269, -30.66479806614716, 2.506628277459239,
  ];
  const b = [-54.47609879822406, 161.5858368580409, -155.6989798598866, 66.80131188771972, -13.28068155288572];
  const c = [
    -0.007784894002430293, -0.3223964580411365, -2.400758277161838, -2.549732539343734, 4.374664141464968,
    2.938163982698783,
  ];
  const d = [0.007784695709041462, 0.3224671290700398, 2.445134137142996, 3.754408661907416];
  if (q < 0.02425) {
    const r = Math.sqrt(-2 * Math.log(q));
    return (
      (((((c[0] * r + c[1]) * r + c[2]) * r + c[3]) * r + c[4]) * r + c[5]) /
      ((((d[0] * r + d[1]) * r + d[2]) * r + d[3]) * r + 1)
    );
  }
  if (q > 1 - 0.02425) return -acklam(1 - q);
  const u = q - 0.5;
  const r = u * u;
  return (
    ((((((a[0] * r + a[1]) * r + a[2]) * r + a[3]) * r + a[4]) * r + a[5]) * u) /
    (((((b[0] * r + b[1]) * r + b[2]) * r + b[3]) * r + b[4]) * r + 1)
  );
}
