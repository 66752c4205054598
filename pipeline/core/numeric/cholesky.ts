/**
 * Cholesky factor of a symmetric positive definite matrix, row-major n x n, in place (lower triangle); false where a pivot
 * is not positive (G. H. Golub and C. F. Van Loan, Matrix Computations, 4th ed. 2013, algorithm 4.2.1).
 */
export function factorise(a: Float64Array, n: number): boolean {
  for (let j = 0; j < n; j++) {
    let d = a[j * n + j];
    for (let k = 0; k < j; k++) d -= a[j * n + k] * a[j * n + k];
    if (!(d > 0)) return false;
    const root = Math.sqrt(d);
    a[j * n + j] = root;
    for (let i = j + 1; i < n; i++) {
      let v = a[i * n + j];
      for (let k = 0; k < j; k++) v -= a[i * n + k] * a[j * n + k];
      a[i * n + j] = v / root;
    }
  }
  return true;
}

/**
 * The same of a matrix that may be singular: a row whose own part is below `share` of its diagonal repeats those before it
 * and is taken out (its pivot is Infinity, so that `whiten` gives 0 there). Returns the rank.
 */
export function factoriseRanked(a: Float64Array, n: number, share: number): number {
  let rank = 0;
  for (let j = 0; j < n; j++) {
    const whole = a[j * n + j];
    let d = whole;
    for (let k = 0; k < j; k++) d -= a[j * n + k] * a[j * n + k];
    const repeats = !(d > share * whole);
    const root = repeats ? Number.POSITIVE_INFINITY : Math.sqrt(d);
    if (!repeats) rank++;
    a[j * n + j] = root;
    for (let i = j + 1; i < n; i++) {
      let v = a[i * n + j];
      for (let k = 0; k < j; k++) v -= a[i * n + k] * a[j * n + k];
      a[i * n + j] = v / root;
    }
  }
  return rank;
}

/** Solves L z = b in place: the whitened vector. */
export function whiten(l: Float64Array, n: number, b: Float64Array): void {
  for (let i = 0; i < n; i++) {
    let v = b[i];
    for (let k = 0; k < i; k++) v -= l[i * n + k] * b[k];
    b[i] = v / l[i * n + i];
  }
}
