/**
 * A heat capacity in closed form with its exact integrals: a constant, a term linear in T and Einstein functions
 * (A. Einstein, Ann. Phys. 327 (1907) 180).
 */
export const R = 8.31446261815324;

export interface Mode {
  /** Oscillators per formula unit. */
  readonly count: number;
  readonly thetaK: number;
}

export interface Law {
  /** J/(mol K). */
  readonly constant: number;
  /** J/(mol K2). */
  readonly linear: number;
  readonly modes: readonly Mode[];
}

/** Cp [J/(mol K)] at T. */
export function heatCapacity({ constant, linear, modes }: Law, t: number): number {
  let sum = constant + linear * t;
  for (const { count, thetaK } of modes) {
    const x = thetaK / t;
    sum += (count * R * x * x * Math.exp(-x)) / Math.expm1(-x) ** 2;
  }
  return sum;
}

/** Integral of Cp from T1 to T2 [J/mol]. */
export function enthalpyBetween(law: Law, t1: number, t2: number): number {
  let sum = law.constant * (t2 - t1) + (law.linear * (t2 - t1) * (t2 + t1)) / 2;
  for (const { count, thetaK } of law.modes) {
    sum += count * R * thetaK * (1 / Math.expm1(thetaK / t2) - 1 / Math.expm1(thetaK / t1));
  }
  return sum;
}

/** Integral of Cp/T from T1 to T2 [J/(mol K)]. */
export function entropyBetween(law: Law, t1: number, t2: number): number {
  let sum = law.constant * Math.log(t2 / t1) + law.linear * (t2 - t1);
  for (const mode of law.modes) sum += oscillatorEntropy(mode, t2) - oscillatorEntropy(mode, t1);
  return sum;
}

/** S of the oscillators and of the linear term, from 0 K; only of a law without a constant. */
export function entropyFromZero(law: Law, t: number): number {
  if (law.constant !== 0) throw new Error('S diverges at 0 K');
  return law.linear * t + law.modes.reduce((sum, mode) => sum + oscillatorEntropy(mode, t), 0);
}

function oscillatorEntropy({ count, thetaK }: Mode, t: number): number {
  const x = thetaK / t;
  return count * R * (x / Math.expm1(x) - Math.log(-Math.expm1(-x)));
}
