/**
 * Cubic smoothing spline of points with known standard uncertainties: of all curves the one that makes
 * sum ((g(x_i) - y_i)/u_i)^2 + (1/p) integral of g''^2/2 least (C. H. Reinsch, Numer. Math. 10 (1967) 177; names as in the
 * paper). p is how much the curve may bend: 0 is the weighted straight line, infinity the natural spline through the points.
 *
 * x rises strictly, u > 0, n >= 3.
 */
export class SmoothingSpline {
  private readonly m: number;
  // Q (three diagonals), R = Q' D^2 Q (five) and T (three).
  private readonly q0: Float64Array;
  private readonly q1: Float64Array;
  private readonly q2: Float64Array;
  private readonly r0: Float64Array;
  private readonly r1: Float64Array;
  private readonly r2: Float64Array;
  private readonly t0: Float64Array;
  private readonly t1: Float64Array;
  // R + p T = L d L', with the two diagonals of L below the first.
  private readonly d: Float64Array;
  private readonly e: Float64Array;
  private readonly f: Float64Array;
  private readonly z: Float64Array;
  private readonly width: number;

  constructor(
    x: Float64Array,
    private readonly u: Float64Array,
    private readonly n: number,
  ) {
    const m = n - 2;
    this.m = m;
    this.width = x[n - 1] - x[0];
    const [q0, q1, q2, r0, r1, r2, t0, t1, d, e, f, z] = Array.from({ length: 12 }, () => new Float64Array(m));
    this.q0 = q0;
    this.q1 = q1;
    this.q2 = q2;
    this.r0 = r0;
    this.r1 = r1;
    this.r2 = r2;
    this.t0 = t0;
    this.t1 = t1;
    this.d = d;
    this.e = e;
    this.f = f;
    this.z = z;
    for (let j = 0; j < m; j++) {
      q0[j] = 1 / (x[j + 1] - x[j]);
      q2[j] = 1 / (x[j + 2] - x[j + 1]);
      q1[j] = -q0[j] - q2[j];
    }
    for (let j = 0; j < m; j++) {
      const a = u[j] * u[j];
      const b = u[j + 1] * u[j + 1];
      const c = u[j + 2] * u[j + 2];
      r0[j] = q0[j] * q0[j] * a + q1[j] * q1[j] * b + q2[j] * q2[j] * c;
      if (j + 1 < m) r1[j] = q1[j] * b * q0[j + 1] + q2[j] * c * q1[j + 1];
      if (j + 2 < m) r2[j] = q2[j] * c * q0[j + 2];
      t0[j] = (2 * (x[j + 2] - x[j])) / 3;
      if (j + 1 < m) t1[j] = (x[j + 2] - x[j + 1]) / 3;
    }
  }

  /**
   * The p under which the points are likeliest, g'' taken for white noise: their second differences are then normal with
   * covariance R + p T (G. Wahba, Ann. Stat. 13 (1985) 1378). Within a factor of two, which the curve does not feel.
   */
  likeliest(y: Float64Array): number {
    const { n, m, q0, q1, q2 } = this;
    const differences = new Float64Array(m);
    for (let j = 0; j < m; j++) differences[j] = q0[j] * y[j] + q1[j] * y[j + 1] + q2[j] * y[j + 2];
    // From a curve that bends once over all points to one that follows each of them, first coarsely.
    const lowest = Math.log(this.bendingWithin(n)) - 4 * Math.log(n);
    const highest = lowest + 4 * Math.log(n) + 12;
    const costAt = (logP: number): number => this.cost(Math.exp(logP), differences);
    let best = lowest;
    let middle = costAt(best);
    for (let logP = lowest + 2; logP < highest; logP += 2) {
      const trial = costAt(logP);
      if (trial < middle) {
        best = logP;
        middle = trial;
      }
    }
    let below = costAt(best - 1);
    let above = costAt(best + 1);
    if (below < middle) {
      [best, middle, above, below] = [best - 1, below, middle, costAt(best - 2)];
    } else if (above < middle) {
      [best, middle, below, above] = [best + 1, above, middle, costAt(best + 2)];
    }
    // The vertex of the parabola through the lowest and its neighbours; at the ends of the range there is none.
    const bend = below - 2 * middle + above;
    return Math.exp(bend > 0 ? best + Math.min(1, Math.max(-1, (below - above) / (2 * bend))) : best);
  }

  /**
   * The p with which the curve has about `parameters` free parameters, were all points alike: equally far apart and equally
   * uncertain. The spline is then a filter 1/(1 + (omega/omega_0)^4), and they are width omega_0/sqrt(8).
   */
  bendingWithin(parameters: number): number {
    const { n, u, width } = this;
    let variance = 0;
    for (let i = 0; i < n; i++) variance += u[i] * u[i];
    const omega = (Math.sqrt(8) * parameters) / width;
    return ((variance / n) * (width / (n - 1)) * omega ** 4) / 2;
  }

  /** Fixes p for `ordinates`. */
  bend(p: number): this {
    this.factorise(p);
    return this;
  }

  /** g(x_i) into `out`, linear in y; p is the one that was fixed last. */
  ordinates(y: Float64Array, out: Float64Array): void {
    const { n, m, q0, q1, q2, u, z } = this;
    for (let j = 0; j < m; j++) z[j] = q0[j] * y[j] + q1[j] * y[j + 1] + q2[j] * y[j + 2];
    this.forward(z);
    for (let j = 0; j < m; j++) z[j] /= this.d[j];
    this.backward(z);
    for (let i = 0; i < n; i++) {
      let pull = 0;
      if (i < m) pull += q0[i] * z[i];
      if (i >= 1 && i <= m) pull += q1[i - 1] * z[i - 1];
      if (i >= 2) pull += q2[i - 2] * z[i - 2];
      out[i] = y[i] - u[i] * u[i] * pull;
    }
  }

  /** -2 ln of the likelihood of the second differences, but for a constant. */
  private cost(p: number, differences: Float64Array): number {
    const { m, d, z } = this;
    this.factorise(p);
    z.set(differences);
    this.forward(z);
    let sum = 0;
    for (let j = 0; j < m; j++) sum += (z[j] * z[j]) / d[j] + Math.log(d[j]);
    return sum;
  }

  private factorise(p: number): void {
    const { m, r0, r1, r2, t0, t1, d, e, f } = this;
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
    }
  }

  private forward(z: Float64Array): void {
    const { m, e, f } = this;
    if (m > 1) z[1] -= e[0] * z[0];
    for (let j = 2; j < m; j++) z[j] -= e[j - 1] * z[j - 1] + f[j - 2] * z[j - 2];
  }

  private backward(z: Float64Array): void {
    const { m, e, f } = this;
    if (m > 1) z[m - 2] -= e[m - 2] * z[m - 1];
    for (let j = m - 3; j >= 0; j--) z[j] -= e[j] * z[j + 1] + f[j] * z[j + 2];
  }
}
