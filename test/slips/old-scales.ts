/**
 * Temperatures as the practical scales of 1968 and 1948 had them, by published differences in degrees Celsius:
 * t90 - t68 by the polynomials of Preston-Thomas (Metrologia 27 (1990) 3) and Rusby et al. (Metrologia 31 (1994) 149),
 * t90 - t48 by a handbook's table, linear in between.
 */
const BELOW_630 = [-0.148759, -0.267408, 1.08076, 1.269056, -4.089591, -1.871251, 7.438081, -3.536296];
const BELOW_1064 = [78.687209, -0.47135991, 1.0954715e-3, -1.2357884e-6, 6.7736583e-10, -1.4458081e-13];
const T48: readonly (readonly [number, number])[] = [
  [-180, 0.02],
  [-150, 0],
  [-100, 0.035],
  [-50, 0.038],
  [-20, 0.016],
  [0, 0],
  [20, -0.012],
  [50, -0.023],
  [80, -0.027],
  [100, -0.026],
  [120, -0.023],
  [150, -0.016],
  [180, -0.005],
  [200, 0.003],
  [230, 0.014],
  [250, 0.021],
  [260, 0.024],
]; // prettier-ignore

/** Kelvin on the old scale; NaN where the difference is not known. */
export function onScaleOf1968(t90K: number): number {
  const t = t90K - 273.15;
  if (t < -200) return Number.NaN;
  if (t > 1064.18) return t90K + 0.25 * (t90K / 1337.33) ** 2;
  const difference =
    t <= 630.6
      ? BELOW_630.reduce((sum, a, i) => sum + a * (t / 630) ** (i + 1), 0)
      : BELOW_1064.reduce((sum, b, i) => sum + b * t ** i, 0);
  return t90K - difference;
}

export function onScaleOf1948(t90K: number): number {
  const t = t90K - 273.15;
  const above = T48.findIndex(([at]) => at >= t);
  if (above <= 0) return Number.NaN;
  const [[t1, d1], [t2, d2]] = [T48[above - 1]!, T48[above]!];
  return t90K - (d1 + ((d2 - d1) * (t - t1)) / (t2 - t1));
}
