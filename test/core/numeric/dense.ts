/** Small dense linear algebra for checks by another route: rows of numbers, Gauss elimination, Jacobi rotations. */
export type Matrix = number[][];

export const zeros = (rows: number, columns: number): Matrix =>
  Array.from({ length: rows }, () => new Array<number>(columns).fill(0));

export const transposed = (a: Matrix): Matrix => a[0].map((_, j) => a.map((row) => row[j]));

export function product(a: Matrix, b: Matrix): Matrix {
  const out = zeros(a.length, b[0].length);
  for (let i = 0; i < a.length; i++)
    for (let k = 0; k < b.length; k++) for (let j = 0; j < b[0].length; j++) out[i][j] += a[i][k] * b[k][j];
  return out;
}

/** A^-1 B by elimination with partial pivoting. */
export function solved(a: Matrix, b: Matrix): Matrix {
  const n = a.length;
  const m = a.map((row, i) => [...row, ...b[i]]);
  for (let c = 0; c < n; c++) {
    let pivot = c;
    for (let r = c + 1; r < n; r++) if (Math.abs(m[r][c]) > Math.abs(m[pivot][c])) pivot = r;
    [m[c], m[pivot]] = [m[pivot], m[c]];
    for (let r = c + 1; r < n; r++) {
      const factor = m[r][c] / m[c][c];
      if (factor !== 0) for (let k = c; k < m[r].length; k++) m[r][k] -= factor * m[c][k];
    }
  }
  for (let c = n - 1; c >= 0; c--) {
    for (let k = n; k < m[c].length; k++) {
      let value = m[c][k];
      for (let j = c + 1; j < n; j++) value -= m[c][j] * m[j][k];
      m[c][k] = value / m[c][c];
    }
  }
  return m.map((row) => row.slice(n));
}

export const column = (v: ArrayLike<number>): Matrix => Array.from(v, (x) => [x]);

/** Eigenvalues of a symmetric matrix by cyclic Jacobi rotations (Golub and Van Loan, section 8.5). */
export function eigenvalues(symmetric: Matrix): number[] {
  const a = symmetric.map((row) => [...row]);
  const n = a.length;
  for (let sweep = 0; sweep < 30; sweep++) {
    let off = 0;
    let diagonal = 0;
    for (let i = 0; i < n; i++) {
      diagonal += a[i][i] ** 2;
      for (let j = 0; j < i; j++) off += a[i][j] ** 2;
    }
    if (off <= 1e-30 * diagonal) break;
    for (let p = 0; p < n; p++) {
      for (let q = p + 1; q < n; q++) {
        if (a[p][q] === 0) continue;
        const theta = (a[q][q] - a[p][p]) / (2 * a[p][q]);
        const t = (theta >= 0 ? 1 : -1) / (Math.abs(theta) + Math.sqrt(theta * theta + 1));
        const c = 1 / Math.sqrt(t * t + 1);
        const s = t * c;
        for (let k = 0; k < n; k++) [a[k][p], a[k][q]] = [c * a[k][p] - s * a[k][q], s * a[k][p] + c * a[k][q]];
        for (let k = 0; k < n; k++) [a[p][k], a[q][k]] = [c * a[p][k] - s * a[q][k], s * a[p][k] + c * a[q][k]];
      }
    }
  }
  return a.map((row, i) => row[i]).sort((x, y) => x - y);
}
