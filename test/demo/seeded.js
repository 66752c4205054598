/**
 * Seeded pseudo-random numbers: the same seed gives the same stream on every machine (integer arithmetic only).
 * The generator is "mulberry32"; good enough for scatter in a demo, for nothing else.
 * @param {string} seed any words
 * @returns {{ uniform(): number, within(limit: number): number, scatter(u: number, limit: number): number }}
 */
export function seeded(seed) {
  let state = hashWords(seed);
  const uniform = () => {
    state = (state + 0x6d2b79f5) | 0;
    let t = Math.imul(state ^ (state >>> 15), 1 | state);
    t = (t + Math.imul(t ^ (t >>> 7), 61 | t)) ^ t;
    return ((t ^ (t >>> 14)) >>> 0) / 4294967296;
  };
  /** Even between -limit and +limit. */
  const within = (limit) => (2 * uniform() - 1) * limit;
  /** Roughly normal with standard deviation u (sum of twelve), never beyond limit. */
  const scatter = (u, limit) => {
    for (;;) {
      let sum = -6;
      for (let i = 0; i < 12; i++) sum += uniform();
      if (Math.abs(sum * u) <= limit) return sum * u;
    }
  };
  return { uniform, within, scatter };
}

/** FNV-1a, 32 bits. */
function hashWords(words) {
  let hash = 0x811c9dc5;
  for (let i = 0; i < words.length; i++) hash = Math.imul(hash ^ words.charCodeAt(i), 0x01000193);
  return hash | 0;
}
