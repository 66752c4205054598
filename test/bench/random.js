/**
 * Seeded random numbers: the same seed gives the same library on every machine.
 * sfc32 (Doty-Humphrey, PractRand), seeded through splitmix32.
 */

/**
 * @typedef {object} Random
 * @property {() => number} unit uniform in [0, 1)
 * @property {(low: number, high: number) => number} between uniform in [low, high)
 * @property {(low: number, high: number) => number} integer uniform in low … high, both included
 * @property {<T>(list: readonly T[]) => T} pick
 */

/**
 * @param {number} seed a whole number
 * @param {number} [stream] numbers of different streams are independent
 * @returns {Random}
 */
export function seededRandom(seed, stream = 0) {
  let state = (seed ^ Math.imul(stream + 1, 0x9e3779b9)) >>> 0;
  const split = () => {
    state = (state + 0x9e3779b9) >>> 0;
    let z = state;
    z = Math.imul(z ^ (z >>> 16), 0x21f0aaad);
    z = Math.imul(z ^ (z >>> 15), 0x735a2d97);
    return (z ^ (z >>> 15)) >>> 0;
  };
  let a = split();
  let b = split();
  let c = split();
  let counter = 1;
  const unit = () => {
    const sum = (a + b + counter) | 0;
    counter = (counter + 1) | 0;
    a = b ^ (b >>> 9);
    b = (c + (c << 3)) | 0;
    c = (c << 21) | (c >>> 11);
    c = (c + sum) | 0;
    return (sum >>> 0) / 4294967296;
  };
  for (let i = 0; i < 12; i++) unit();
  const between = (low, high) => low + (high - low) * unit();
  const integer = (low, high) => low + Math.floor((high - low + 1) * unit());
  return { unit, between, integer, pick: (list) => list[integer(0, list.length - 1)] };
}
