/**
 * Refuses a table whose rows are too far apart: a cubic spline through the clean heat capacities must give the
 * integrals between rows to within a stated share of what the table prints.
 */
import { enthalpyChange, entropyChange, heatCapacity } from './laws.js';

/**
 * Largest error of the spline's integral of Cp [J/mol] and of Cp/T [J/(mol K)] over one interval.
 * @param {import('./laws.js').Law} law
 * @param {readonly number[]} T rising
 */
export function splineErrors(law, T) {
  const y = T.map((t) => heatCapacity(law, t));
  const M = secondDerivatives(T, y);
  let enthalpy = 0;
  let entropy = 0;
  for (let i = 0; i + 1 < T.length; i++) {
    const h = T[i + 1] - T[i];
    const Cp = (t) => {
      const a = (T[i + 1] - t) / h;
      const b = 1 - a;
      return a * y[i] + b * y[i + 1] + ((a * a * a - a) * M[i] + (b * b * b - b) * M[i + 1]) * ((h * h) / 6);
    };
    const dH = gauss(Cp, T[i], T[i + 1]);
    const dS = gauss((t) => Cp(t) / t, T[i], T[i + 1]);
    enthalpy = Math.max(enthalpy, Math.abs(dH - enthalpyChange(law, T[i], T[i + 1])));
    entropy = Math.max(entropy, Math.abs(dS - entropyChange(law, T[i], T[i + 1])));
  }
  return { enthalpy, entropy };
}

export function assertDense(medium, phase, T, enthalpyLimit, entropyLimit) {
  const worst = splineErrors(medium.phases[phase].law, T);
  if (worst.enthalpy > enthalpyLimit || worst.entropy > entropyLimit) {
    throw new Error(`${medium.id} ${phase}: rows too far apart, ${worst.enthalpy} J/mol, ${worst.entropy} J/(mol K)`);
  }
}

/** Second derivatives of the not-a-knot cubic spline, by plain elimination (tables have some thirty rows). */
function secondDerivatives(T, y) {
  const n = T.length;
  const A = Array.from({ length: n }, () => new Array(n + 1).fill(0));
  const h = (i) => T[i + 1] - T[i];
  for (let i = 1; i + 1 < n; i++) {
    A[i][i - 1] = h(i - 1) / 6;
    A[i][i] = (h(i - 1) + h(i)) / 3;
    A[i][i + 1] = h(i) / 6;
    A[i][n] = (y[i + 1] - y[i]) / h(i) - (y[i] - y[i - 1]) / h(i - 1);
  }
  [A[0][0], A[0][1], A[0][2]] = [h(1), -(h(0) + h(1)), h(0)];
  [A[n - 1][n - 3], A[n - 1][n - 2], A[n - 1][n - 1]] = [h(n - 2), -(h(n - 3) + h(n - 2)), h(n - 3)];
  for (let k = 0; k < n; k++) {
    let pivot = k;
    for (let i = k + 1; i < n; i++) if (Math.abs(A[i][k]) > Math.abs(A[pivot][k])) pivot = i;
    [A[k], A[pivot]] = [A[pivot], A[k]];
    for (let i = k + 1; i < n; i++) {
      const f = A[i][k] / A[k][k];
      if (f !== 0) for (let j = k; j <= n; j++) A[i][j] -= f * A[k][j];
    }
  }
  const M = new Array(n).fill(0);
  for (let k = n - 1; k >= 0; k--) {
    let sum = A[k][n];
    for (let j = k + 1; j < n; j++) sum -= A[k][j] * M[j];
    M[k] = sum / A[k][k];
  }
  return M;
}

/** Gauss-Legendre, five points. */
const NODES = [0, 0.5384693101056831, 0.906179845938664];
const WEIGHTS = [0.5688888888888889, 0.47862867049936647, 0.23692688505618908];
export function gauss(f, from, to) {
  const middle = (from + to) / 2;
  const half = (to - from) / 2;
  let sum = WEIGHTS[0] * f(middle);
  for (let k = 1; k < 3; k++) sum += WEIGHTS[k] * (f(middle - half * NODES[k]) + f(middle + half * NODES[k]));
  return sum * half;
}
