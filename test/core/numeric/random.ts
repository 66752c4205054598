/** Seeded uniform and normal numbers (mulberry32; Box and Muller, Ann. Math. Stat. 29 (1958) 610). */
export function seeded(seed: number): { unit: () => number; normal: () => number } {
  let state = seed >>> 0;
  const unit = (): number => {
    state = (state + 0x6d2b79f5) >>> 0;
    let z = Math.imul(state ^ (state >>> 15), state | 1);
    z ^= z + Math.imul(z ^ (z >>> 7), z | 61);
    return (((z ^ (z >>> 14)) >>> 0) + 0.5) / 4294967296;
  };
  const normal = (): number => Math.sqrt(-2 * Math.log(unit())) * Math.cos(2 * Math.PI * unit());
  return { unit, normal };
}
