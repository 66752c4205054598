/**
 * Not-a-knot cubic spline through n points, as one cubic in x - x_i an interval
 * (C. de Boor, A Practical Guide to Splines, 1978, chapter IV).
 *
 * Writes the n - 1 intervals' coefficients into c0..c3 from `at` on. x rises strictly. One point gives nothing; two a
 * straight line; three a parabola.
 */
export function notAKnotSpline(
  x: Float64Array,
  y: Float64Array,
  n: number,
  c0: Float64Array,
  c1: Float64Array,
  c2: Float64Array,
  c3: Float64Array,
): void {
  if (n < 2) return;
  if (n === 2) {
    c0[0] = y[0];
    c1[0] = (y[1] - y[0]) / (x[1] - x[0]);
    c2[0] = 0;
    c3[0] = 0;
    return;
  }
  if (n === 3) {
    parabola(x, y, c0, c1, c2, c3);
    return;
  }
  const slope = slopes(x, y, n);
  for (let i = 0; i < n - 1; i++) {
    const h = x[i + 1] - x[i];
    const d = (y[i + 1] - y[i]) / h;
    c0[i] = y[i];
    c1[i] = slope[i];
    c2[i] = (3 * d - 2 * slope[i] - slope[i + 1]) / h;
    c3[i] = (slope[i] + slope[i + 1] - 2 * d) / (h * h);
  }
}

let diagonal = new Float64Array(256);
let upper = new Float64Array(256);
let right = new Float64Array(256);

/** First derivatives at the points; the returned buffer is reused by the next call. */
function slopes(x: Float64Array, y: Float64Array, n: number): Float64Array {
  if (n > right.length) {
    diagonal = new Float64Array(2 * n);
    upper = new Float64Array(2 * n);
    right = new Float64Array(2 * n);
  }
  const b = diagonal;
  const c = upper;
  const r = right;
  // First row: third derivative continuous at x_1.
  const h0 = x[1] - x[0];
  const h1 = x[2] - x[1];
  const d0 = (y[1] - y[0]) / h0;
  const d1 = (y[2] - y[1]) / h1;
  b[0] = h1;
  c[0] = h0 + h1;
  r[0] = ((h0 + 2 * c[0]) * h1 * d0 + h0 * h0 * d1) / c[0];
  for (let i = 1; i < n - 1; i++) {
    const hl = x[i] - x[i - 1];
    const hr = x[i + 1] - x[i];
    const dl = (y[i] - y[i - 1]) / hl;
    const dr = (y[i + 1] - y[i]) / hr;
    const w = -hr / b[i - 1];
    b[i] = w * c[i - 1] + 2 * (hl + hr);
    c[i] = hl;
    r[i] = w * r[i - 1] + 3 * (hr * dl + hl * dr);
  }
  const hm = x[n - 2] - x[n - 3];
  const hn = x[n - 1] - x[n - 2];
  const dm = (y[n - 2] - y[n - 3]) / hm;
  const dn = (y[n - 1] - y[n - 2]) / hn;
  const sum = hm + hn;
  const w = -sum / b[n - 2];
  b[n - 1] = w * c[n - 2] + hm;
  r[n - 1] = w * r[n - 2] + (hn * hn * dm + (2 * sum + hn) * hm * dn) / sum;
  r[n - 1] /= b[n - 1];
  for (let i = n - 2; i >= 0; i--) r[i] = (r[i] - c[i] * r[i + 1]) / b[i];
  return r;
}

function parabola(
  x: Float64Array,
  y: Float64Array,
  c0: Float64Array,
  c1: Float64Array,
  c2: Float64Array,
  c3: Float64Array,
): void {
  const h0 = x[1] - x[0];
  const h1 = x[2] - x[1];
  const d0 = (y[1] - y[0]) / h0;
  const d1 = (y[2] - y[1]) / h1;
  const q = (d1 - d0) / (h0 + h1);
  c0[0] = y[0];
  c1[0] = d0 - q * h0;
  c2[0] = q;
  c3[0] = 0;
  c0[1] = y[1];
  c1[1] = d0 + q * h0;
  c2[1] = q;
  c3[1] = 0;
}
