/**
 * Cp = gamma T + beta T^3 below the lowest point, fitted to the points at or below `reachK` (least squares of Cp/T against
 * T^2): the lattice term of P. Debye (Ann. Phys. 344 (1912) 789) and, for metals, the electronic term of A. Sommerfeld
 * (Z. Phys. 47 (1928) 1). Holds below about Theta_D/50; higher terms are dropped, a few per cent of Cp at 20 K.
 *
 * Returns null where no point lies that low, or the fit gives a negative coefficient.
 */
export interface DebyeTail {
  readonly gamma: number;
  readonly beta: number;
}

export const TAIL_REACH_K = 20;

export function debyeTail(temperatureK: Float64Array, heatCapacity: Float64Array, metal: boolean): DebyeTail | null {
  let n = 0;
  while (n < temperatureK.length && n < 6 && temperatureK[n] <= TAIL_REACH_K) n++;
  if (n === 0 || temperatureK[0] <= 0) return null;
  if (!metal || n < 2) {
    let num = 0;
    let den = 0;
    for (let i = 0; i < n; i++) {
      const t2 = temperatureK[i] * temperatureK[i];
      num += (heatCapacity[i] / temperatureK[i]) * t2;
      den += t2 * t2;
    }
    const beta = num / den;
    return beta > 0 ? { gamma: 0, beta } : null;
  }
  let sx = 0;
  let sy = 0;
  let sxx = 0;
  let sxy = 0;
  for (let i = 0; i < n; i++) {
    const x = temperatureK[i] * temperatureK[i];
    const y = heatCapacity[i] / temperatureK[i];
    sx += x;
    sy += y;
    sxx += x * x;
    sxy += x * y;
  }
  const beta = (n * sxy - sx * sy) / (n * sxx - sx * sx);
  const gamma = (sy - beta * sx) / n;
  return beta > 0 && gamma >= 0 ? { gamma, beta } : null;
}
