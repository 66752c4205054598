/**
 * Closed forms on one cubic p(x) = c0 + c1 x + c2 x^2 + c3 x^3, x = T - low.
 */

/** p(x). */
export function cubicValue(c0: number, c1: number, c2: number, c3: number, x: number): number {
  return c0 + x * (c1 + x * (c2 + x * c3));
}

/** The integral of p from 0 to x. */
export function cubicIntegral(c0: number, c1: number, c2: number, c3: number, x: number): number {
  return x * (c0 + x * (c1 / 2 + x * (c2 / 3 + (x * c3) / 4)));
}

/**
 * The integral of p(x')/(low + x') from 0 to x, to rounding.
 *
 * M_k = integral of x^k/(low + x) obeys M_k = x^k/k - low M_{k-1}. Upwards that cancels where x << low, so there M_3 comes
 * from its series x^4/low sum (-z)^j/(4 + j), z = x/low, and the others from the recurrence run downwards, which is stable.
 * At low = 0 the result is finite only when c0 = 0; the caller sees to that (third law: Cp(0) = 0).
 */
export function cubicIntegralOverT(c0: number, c1: number, c2: number, c3: number, low: number, x: number): number {
  if (x === 0) return 0;
  if (low === 0) return x * (c1 + x * (c2 / 2 + (x * c3) / 3));
  const z = x / low;
  const m0 = Math.log1p(z);
  let m1: number;
  let m2: number;
  let m3: number;
  if (Math.abs(z) < 0.5) {
    let term = 1;
    let sum = 0.25;
    for (let j = 1; j < 60; j++) {
      term *= -z;
      const add = term / (4 + j);
      sum += add;
      if (Math.abs(add) < 1e-17) break;
    }
    m3 = ((x * x * x * x) / low) * sum;
    m2 = ((x * x * x) / 3 - m3) / low;
    m1 = ((x * x) / 2 - m2) / low;
  } else {
    m1 = x - low * m0;
    m2 = (x * x) / 2 - low * m1;
    m3 = (x * x * x) / 3 - low * m2;
  }
  return c0 * m0 + c1 * m1 + c2 * m2 + c3 * m3;
}
