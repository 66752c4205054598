/**
 * An invented crystal, liquid or gas with Cp, S and H in closed form: Einstein functions (A. Einstein, Ann. Phys. 327 (1907)
 * 180) and a term linear in T. S and H count from 0 K.
 */
export interface Model {
  readonly cp: (t: number) => number;
  readonly s: (t: number) => number;
  readonly h: (t: number) => number;
}

const R = 8.31446261815324;

export function einstein(modes: readonly { readonly weight: number; readonly thetaK: number }[], linear = 0): Model {
  const sum = (f: (x: number, weight: number, theta: number) => number): number =>
    modes.reduce((total, m) => total + f(m.thetaK, m.weight, m.thetaK), 0);
  return {
    cp: (t) =>
      linear * t +
      sum((theta, weight) => {
        const x = theta / t;
        return (3 * R * weight * x * x * Math.exp(-x)) / Math.expm1(-x) ** 2;
      }),
    s: (t) =>
      linear * t +
      sum((theta, weight) => {
        const x = theta / t;
        return 3 * R * weight * (x / Math.expm1(x) - Math.log(-Math.expm1(-x)));
      }),
    h: (t) => (linear * t * t) / 2 + sum((theta, weight) => (3 * R * weight * theta) / Math.expm1(theta / t)),
  };
}

export const TR = 298.15;

export const steps = (low: number, high: number, step: number): number[] => {
  const out: number[] = [];
  for (let k = 0; low + k * step <= high + 1e-9; k++) out.push(Number((low + k * step).toFixed(6)));
  return out;
};

/** With 298.15 K among them. */
export const withReference = (temperatures: readonly number[]): number[] =>
  [...new Set([...temperatures, TR])].sort((a, b) => a - b);
