import { upperTail } from './normal.js';

/**
 * P(chi^2 > x) with `freedom` degrees, a whole number above 0: the finite sums of Abramowitz and Stegun 26.4.4 (odd) and
 * 26.4.5 (even).
 */
export function chiSquareTail(x: number, freedom: number): number {
  if (!(x > 0)) return 1;
  const odd = freedom % 2 === 1;
  const root = Math.sqrt(x);
  // Odd: 2 Q(root) + 2 Z(root) sum x^(r - 1/2)/(1 3 ... (2r - 1)); even: exp(-x/2) (1 + sum (x/2)^r / r!).
  let term = odd ? 2 * root * (Math.exp(-x / 2) / Math.sqrt(2 * Math.PI)) : Math.exp(-x / 2);
  let sum = odd ? 2 * upperTail(root) : term;
  for (let r = 1; r <= Math.floor((freedom - 1) / 2); r++) {
    if (!odd) term *= x / (2 * r);
    else if (r > 1) term *= x / (2 * r - 1);
    sum += term;
  }
  return sum;
}
