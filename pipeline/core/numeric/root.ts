/**
 * The root of f in [low, high], where f changes sign, by the ITP method
 * (Oliveira and Takahashi, ACM Trans. Math. Softw. 47 (2021) 5), to `tolerance` in x.
 *
 * Never needs more evaluations than bisection plus one. Returns NaN where f does not change sign: that is a broken call.
 */
export function rootBetween(f: (x: number) => number, low: number, high: number, tolerance: number): number {
  let a = low;
  let b = high;
  let fa = f(a);
  let fb = f(b);
  if (fa === 0) return a;
  if (fb === 0) return b;
  if (fa > 0 === fb > 0) return Number.NaN;
  const rising = fb > 0;
  const k1 = 0.2 / (b - a);
  const most = Math.ceil(Math.log2(Math.max((b - a) / (2 * tolerance), 1))) + 1;
  // Rounding may leave the bracket a last bit wider than 2 tolerance after the promised steps: that is near enough.
  for (let j = 0; j < Math.min(most, 200) && b - a > 2 * tolerance; j++) {
    const half = (a + b) / 2;
    const r = Math.max(tolerance * 2 ** (most - j) - (b - a) / 2, 0);
    const delta = k1 * (b - a) * (b - a);
    const falsi = (fb * a - fa * b) / (fb - fa);
    const sign = Math.sign(half - falsi);
    const pushed = delta <= Math.abs(half - falsi) ? falsi + sign * delta : half;
    let x = Math.abs(pushed - half) <= r ? pushed : half - sign * r;
    if (!(x > a && x < b)) x = half;
    const fx = f(x);
    if (fx === 0) return x;
    if (fx > 0 === rising) {
      b = x;
      fb = fx;
    } else {
      a = x;
      fa = fx;
    }
  }
  return (a + b) / 2;
}
