/**
 * The integral of f over [low, high] by Gauss-Legendre rules of 24 points on panels that widen geometrically away from
 * `pole` (a point outside the range), summed with compensation (Neumaier, Z. Angew. Math. Mech. 54 (1974) 39). Nodes from
 * Newton's method on the Legendre polynomials, so that no table is copied.
 */
export function integral(f: (x: number) => number, low: number, high: number, pole = Number.NEGATIVE_INFINITY): number {
  const edges = [low];
  for (let x = low; x < high; ) {
    const next = Number.isFinite(pole) ? pole + (x - pole) * 1.5 : x + (high - low) / 64;
    x = next >= high || next <= x ? high : next;
    edges.push(x);
  }
  let sum = 0;
  let carry = 0;
  for (let i = 0; i + 1 < edges.length; i++) {
    const half = (edges[i + 1] - edges[i]) / 2;
    for (let k = 0; k < NODES.length; k++) {
      const term = WEIGHTS[k] * half * f(edges[i] + half * (1 + NODES[k]));
      const next = sum + term;
      carry += Math.abs(sum) >= Math.abs(term) ? sum - next + term : term - next + sum;
      sum = next;
    }
  }
  return sum + carry;
}

const ORDER = 24;
const NODES: number[] = [];
const WEIGHTS: number[] = [];
for (let k = 1; k <= ORDER; k++) {
  let x = Math.cos((Math.PI * (k - 0.25)) / (ORDER + 0.5));
  let slope = 1;
  for (let turn = 0; turn < 50; turn++) {
    let before = 1;
    let value = x;
    for (let n = 2; n <= ORDER; n++) [before, value] = [value, ((2 * n - 1) * x * value - (n - 1) * before) / n];
    slope = (ORDER * (before - x * value)) / (1 - x * x);
    const step = value / slope;
    x -= step;
    if (Math.abs(step) < 1e-16) break;
  }
  NODES.push(x);
  WEIGHTS.push(2 / ((1 - x * x) * slope * slope));
}
