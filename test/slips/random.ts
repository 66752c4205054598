/** Seeded random numbers for the slips: a 32-bit mixing generator (mulberry32). */
export interface Random {
  /** Uniform in [0, 1). */
  unit(): number;
  pick<T>(list: readonly T[]): T;
  /** Log-uniform between two positive numbers. */
  logBetween(low: number, high: number): number;
}

export function seededRandom(seed: number): Random {
  let state = Math.imul(seed ^ 0x5bf03635, 0x9e3779b1) >>> 0;
  const unit = () => {
    state = (state + 0x6d2b79f5) >>> 0;
    let z = Math.imul(state ^ (state >>> 15), state | 1);
    z ^= z + Math.imul(z ^ (z >>> 7), z | 61);
    return ((z ^ (z >>> 14)) >>> 0) / 4294967296;
  };
  return {
    unit,
    pick: (list) => {
      if (list.length === 0) throw new Error('nothing to pick from');
      return list[Math.floor(unit() * list.length)]!;
    },
    logBetween: (low, high) => low * (high / low) ** unit(),
  };
}
