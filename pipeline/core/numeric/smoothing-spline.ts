/**
 * Smoothing spline of C. H. Reinsch (Numer. Math. 10 (1967) 177): the smoothest natural cubic spline g with
 * sum ((g(x_i) - y_i)/u_i)^2 <= n. Returns g(x_i); where the points themselves are smooth within u nothing is left to bend,
 * and the result is the weighted straight line.
 *
 * x rises strictly, u > 0, n >= 3 (fewer points come back as they are).
 */
export function smoothedOrdinates(x: Float64Array, y: Float64Array, u: Float64Array, n: number): Float64Array {
  if (n < 3) return y.slice(0, n);
  const m = n - 2;
  const h = new Float64Array(n - 1);
  for (let i = 0; i < n - 1; i++) h[i] = x[i + 1] - x[i];
  // R = Q' D^2 Q (five diagonals), T (three diagonals), and Q'y; names as in the paper.
  const q0 = new Float64Array(m);
  const q1 = new Float64Array(m);
  const q2 = new Float64Array(m);
  const qy = new Float64Array(m);
  for (let j = 0; j < m; j++) {
    q0[j] = 1 / h[j];
    q2[j] = 1 / h[j + 1];
    q1[j] = -q0[j] - q2[j];
    qy[j] = q0[j] * y[j] + q1[j] * y[j + 1] + q2[j] * y[j + 2];
  }
  const r0 = new Float64Array(m);
  const r1 = new Float64Array(m);
  const r2 = new Float64Array(m);
  const t0 = new Float64Array(m);
  const t1 = new Float64Array(m);
  for (let j = 0; j < m; j++) {
    const a = u[j] * u[j];
    const b = u[j + 1] * u[j + 1];
    const c = u[j + 2] * u[j + 2];
    r0[j] = q0[j] * q0[j] * a + q1[j] * q1[j] * b + q2[j] * q2[j] * c;
    if (j + 1 < m) r1[j] = q1[j] * b * q0[j + 1] + q2[j] * c * q1[j + 1];
    if (j + 2 < m) r2[j] = q2[j] * c * q0[j + 2];
    t0[j] = (2 * (h[j] + h[j + 1])) / 3;
    if (j + 1 < m) t1[j] = h[j + 1] / 3;
  }
  const residual = (p: number): { v: Float64Array; sum: number } => {
    const z = solveFiveDiagonal(r0, r1, r2, t0, t1, p, qy, m);
    const v = new Float64Array(n);
    for (let j = 0; j < m; j++) {
      v[j] += q0[j] * z[j];
      v[j + 1] += q1[j] * z[j];
      v[j + 2] += q2[j] * z[j];
    }
    let sum = 0;
    for (let i = 0; i < n; i++) {
      v[i] *= u[i];
      sum += v[i] * v[i];
      v[i] *= u[i];
    }
    return { v, sum };
  };
  const line = residual(0);
  let best = line.v;
  if (line.sum > n) {
    // The sum falls as p rises; bisect on log p.
    let low = -40;
    let high = 40;
    for (let k = 0; k < 80; k++) {
      const middle = (low + high) / 2;
      const trial = residual(Math.exp(middle));
      if (trial.sum > n) low = middle;
      else {
        high = middle;
        best = trial.v;
      }
      if (high - low < 1e-6) break;
    }
  }
  const out = new Float64Array(n);
  for (let i = 0; i < n; i++) out[i] = y[i] - best[i];
  return out;
}

/** Solves (R + p T) z = q by Cholesky in five diagonals (R^T D R). */
function solveFiveDiagonal(
  r0: Float64Array,
  r1: Float64Array,
  r2: Float64Array,
  t0: Float64Array,
  t1: Float64Array,
  p: number,
  q: Float64Array,
  m: number,
): Float64Array {
  const d = new Float64Array(m);
  const e = new Float64Array(m);
  const f = new Float64Array(m);
  const z = new Float64Array(m);
  for (let j = 0; j < m; j++) {
    let diagonal = r0[j] + p * t0[j];
    let first = r1[j] + p * t1[j];
    if (j >= 1) {
      diagonal -= d[j - 1] * e[j - 1] * e[j - 1];
      first -= d[j - 1] * e[j - 1] * f[j - 1];
    }
    if (j >= 2) diagonal -= d[j - 2] * f[j - 2] * f[j - 2];
    d[j] = diagonal;
    e[j] = first / diagonal;
    f[j] = r2[j] / diagonal;
    z[j] = q[j] - (j >= 1 ? e[j - 1] * z[j - 1] : 0) - (j >= 2 ? f[j - 2] * z[j - 2] : 0);
  }
  for (let j = 0; j < m; j++) z[j] /= d[j];
  for (let j = m - 2; j >= 0; j--) z[j] -= e[j] * z[j + 1] + (j + 2 < m ? f[j] * z[j + 2] : 0);
  return z;
}
