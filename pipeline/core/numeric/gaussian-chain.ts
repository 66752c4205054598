import { numbers } from './room.js';

/**
 * A chain of two-component states x_k = (H_k, S_k) with known steps and Gaussian step errors, observed through printed
 * values of H, S and S - H/T: Kalman filter forwards (R. E. Kalman, J. Basic Eng. 82 (1960) 35) and the smoother of
 * Rauch, Tung and Striebel backwards (AIAA J. 3 (1965) 1445). Exact for this linear system, in time proportional to n.
 *
 * `step*` belong to the step k -> k + 1; a step with no variance at all is an identity (two rows at one temperature).
 * An observation's variance of 0 is an exact constraint; Infinity or an absent flag means none.
 */
export interface ChainInput {
  readonly n: number;
  readonly temperatureK: Float64Array;
  readonly stepH: Float64Array;
  readonly stepS: Float64Array;
  readonly stepVarH: Float64Array;
  readonly stepCovHS: Float64Array;
  readonly stepVarS: Float64Array;
  /** Observed value and variance of H, S and S - H/T at each knot; variance Infinity where there is none. */
  readonly observedH: Float64Array;
  readonly observedHVar: Float64Array;
  readonly observedS: Float64Array;
  readonly observedSVar: Float64Array;
  readonly observedF: Float64Array;
  readonly observedFVar: Float64Array;
  readonly startH: number;
  readonly startHVar: number;
  readonly startS: number;
  readonly startSVar: number;
}

export interface ChainResult {
  readonly h: Float64Array;
  readonly s: Float64Array;
  readonly varH: Float64Array;
  readonly covHS: Float64Array;
  readonly varS: Float64Array;
  /** Smoother gains, 4 a knot, row-major; Cov(x_k, x_j) = gain_k Cov(x_{k+1}, x_j) for k < j. */
  readonly gain: Float64Array;
}

export function smoothChain(input: ChainInput): ChainResult {
  const { n, temperatureK, stepH, stepS, stepVarH, stepCovHS, stepVarS } = input;
  const h = numbers(n);
  const s = numbers(n);
  const varH = numbers(n);
  const covHS = numbers(n);
  const varS = numbers(n);
  const gain = numbers(4 * n);

  let xh = input.startH;
  let xs = input.startS;
  let ph = input.startHVar;
  let pc = 0;
  let ps = input.startSVar;
  for (let k = 0; k < n; k++) {
    if (k > 0) {
      xh += stepH[k - 1];
      xs += stepS[k - 1];
      ph += stepVarH[k - 1];
      pc += stepCovHS[k - 1];
      ps += stepVarS[k - 1];
    }
    for (let o = 0; o < 3; o++) {
      const variance = o === 0 ? input.observedHVar[k] : o === 1 ? input.observedSVar[k] : input.observedFVar[k];
      if (variance === Number.POSITIVE_INFINITY) continue;
      const value = o === 0 ? input.observedH[k] : o === 1 ? input.observedS[k] : input.observedF[k];
      const mh = o === 0 ? 1 : o === 1 ? 0 : -1 / temperatureK[k];
      const ms = o === 0 ? 0 : 1;
      const gh = ph * mh + pc * ms;
      const gs = pc * mh + ps * ms;
      const total = mh * gh + ms * gs + variance;
      if (!(total > 0)) continue;
      const innovation = (value - mh * xh - ms * xs) / total;
      xh += gh * innovation;
      xs += gs * innovation;
      ph -= (gh * gh) / total;
      pc -= (gh * gs) / total;
      ps -= (gs * gs) / total;
      if (variance === 0 && o === 0) {
        ph = 0;
        pc = 0;
      } else if (variance === 0 && o === 1) {
        ps = 0;
        pc = 0;
      }
    }
    h[k] = xh;
    s[k] = xs;
    varH[k] = ph;
    covHS[k] = pc;
    varS[k] = ps;
  }

  for (let k = n - 2; k >= 0; k--) {
    const qh = stepVarH[k];
    const qc = stepCovHS[k];
    const qs = stepVarS[k];
    const g = 4 * k;
    if (qh === 0 && qs === 0) {
      gain[g] = 1;
      gain[g + 3] = 1;
      h[k] = h[k + 1] - stepH[k];
      s[k] = s[k + 1] - stepS[k];
      varH[k] = varH[k + 1];
      covHS[k] = covHS[k + 1];
      varS[k] = varS[k + 1];
      continue;
    }
    const fh = varH[k];
    const fc = covHS[k];
    const fs = varS[k];
    // P (P + Q)^-1, from the inverse of the predicted covariance.
    const ah = fh + qh;
    const ac = fc + qc;
    const as = fs + qs;
    const det = ah * as - ac * ac;
    const g00 = (fh * as - fc * ac) / det;
    const g01 = (fc * ah - fh * ac) / det;
    const g10 = (fc * as - fs * ac) / det;
    const g11 = (fs * ah - fc * ac) / det;
    gain[g] = g00;
    gain[g + 1] = g01;
    gain[g + 2] = g10;
    gain[g + 3] = g11;
    const dh = h[k + 1] - (h[k] + stepH[k]);
    const ds = s[k + 1] - (s[k] + stepS[k]);
    h[k] += g00 * dh + g01 * ds;
    s[k] += g10 * dh + g11 * ds;
    const eh = varH[k + 1] - ah;
    const ec = covHS[k + 1] - ac;
    const es = varS[k + 1] - as;
    const t00 = g00 * eh + g01 * ec;
    const t01 = g00 * ec + g01 * es;
    const t10 = g10 * eh + g11 * ec;
    const t11 = g10 * ec + g11 * es;
    varH[k] = Math.max(0, fh + t00 * g00 + t01 * g01);
    covHS[k] = fc + t00 * g10 + t01 * g11;
    varS[k] = Math.max(0, fs + t10 * g10 + t11 * g11);
  }
  return { h, s, varH, covHS, varS, gain };
}
