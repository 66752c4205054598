/**
 * The interval from 0 K to the first row of a crystal whose table starts with a limit row. One cubic that meets Cp, H and S
 * of the first row may dip below zero near 0 K; then two pieces do: beta T^3 (Debye, Ann. Phys. 344 (1912) 789) up to theta
 * and a cubic above it, joined with equal Cp and slope, with the same Cp, H and S at `highK`.
 *
 * Cp(highK), H(highK) - H(0) and S(highK) - S(0) fix beta and the cubic for each theta; the smallest theta that keeps Cp from
 * falling below zero is taken. Returns null where none does.
 */
export interface LimitPieces {
  readonly thetaK: number;
  readonly beta: number;
  /** The upper piece in x = T - theta. */
  readonly c0: number;
  readonly c1: number;
  readonly c2: number;
  readonly c3: number;
}

export function limitPieces(
  highK: number,
  heatCapacity: number,
  enthalpyRise: number,
  entropyRise: number,
): LimitPieces | null {
  for (let share = 0.02; share < 0.9; share += 0.02) {
    const pieces = solve(share * highK, highK, heatCapacity, enthalpyRise, entropyRise);
    if (pieces !== null && pieces.beta >= 0 && staysPositive(pieces, highK)) return pieces;
  }
  return null;
}

function solve(theta: number, high: number, cp: number, dH: number, dS: number): LimitPieces | null {
  const w = high - theta;
  const l = Math.log(high / theta);
  // Integrals of x^k/(theta + x) over the upper piece.
  const m1 = w - theta * l;
  const m2 = (w * w) / 2 - theta * m1;
  const m3 = (w * w * w) / 3 - theta * m2;
  const t3 = theta ** 3;
  // c0 = beta t^3, c1 = 3 beta t^2: three equations for beta, c2, c3.
  const a = [
    [t3 + 3 * theta * theta * w, w * w, w ** 3],
    [(t3 * theta) / 4 + t3 * w + (3 * theta * theta * w * w) / 2, w ** 3 / 3, w ** 4 / 4],
    [t3 / 3 + t3 * l + 3 * theta * theta * m1, m2, m3],
  ];
  const det = det3(a[0], a[1], a[2]);
  if (det === 0) return null;
  const r = [cp, dH, dS];
  const column = (j: number): number =>
    det3(
      a[0].map((v, k) => (k === j ? r[0] : v)),
      a[1].map((v, k) => (k === j ? r[1] : v)),
      a[2].map((v, k) => (k === j ? r[2] : v)),
    ) / det;
  const beta = column(0);
  return { thetaK: theta, beta, c0: beta * t3, c1: 3 * beta * theta * theta, c2: column(1), c3: column(2) };
}

function staysPositive(p: LimitPieces, high: number): boolean {
  for (let j = 1; j <= 40; j++) {
    const x = ((high - p.thetaK) * j) / 40;
    if (p.c0 + x * (p.c1 + x * (p.c2 + x * p.c3)) < 0) return false;
  }
  return true;
}

function det3(a: readonly number[], b: readonly number[], c: readonly number[]): number {
  return a[0] * (b[1] * c[2] - b[2] * c[1]) - a[1] * (b[0] * c[2] - b[2] * c[0]) + a[2] * (b[0] * c[1] - b[1] * c[0]);
}
