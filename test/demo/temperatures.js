/** The temperatures that a compilation tabulates. */
import { REFERENCE_K } from './laws.js';

/**
 * Every `fine` kelvin up to 400 K, 50 to 1000 K, 100 above; 298.15 K, the range's own ends and the transitions that
 * concern the phase, rising.
 * @param {readonly [number, number]} rangeK
 * @param {readonly number[]} transitionsK
 */
export function tabulated([low, high], transitionsK, fine = 20, middle = 50) {
  const all = new Set([low, high]);
  for (let T = 100; T <= 400; T += fine) all.add(T);
  for (let T = 400; T <= 1000; T += middle) all.add(T);
  for (let T = 1100; T <= 1500; T += 100) all.add(T);
  for (const T of [REFERENCE_K, ...transitionsK]) all.add(T);
  return [...all].filter((T) => T >= low && T <= high).sort((a, b) => a - b);
}
