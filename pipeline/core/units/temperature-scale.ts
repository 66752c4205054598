/** From the practical temperature scales of 1968 and 1948 to the one of 1990. */
import { ICE_POINT_K } from '../constants.js';

export type TemperatureScaleName = 'ITS-90' | 'IPTS-68' | 'IPTS-48' | 'thermodynamic' | 'not-stated';

export interface ScaledTemperature {
  readonly temperatureK: number;
  /** d(t on the old scale)/d(t90): what a heat capacity on the old scale is multiplied by. */
  readonly slope: number;
  /** False where the difference to ITS-90 is not known there and nothing was done. */
  readonly converted: boolean;
}

/**
 * A temperature [K] on `scale` as one on ITS-90. Unchanged where the scale is ITS-90, thermodynamic or not stated (what
 * it may differ by is `possibleDifferenceK`), and outside the range in which the difference is published.
 */
export function toIts90(temperatureK: number, scale: TemperatureScaleName): ScaledTemperature {
  const difference = scale === 'IPTS-68' ? t90MinusT68 : scale === 'IPTS-48' ? t90MinusT48 : null;
  if (difference === null) return { temperatureK, slope: 1, converted: true };
  const oldCelsius = temperatureK - ICE_POINT_K;
  let t90 = oldCelsius;
  let shift = 0;
  // The differences are published as functions of t90; they vary by less than 0.7 % of a kelvin per kelvin.
  for (let pass = 0; pass < 4; pass++) {
    const next = difference(t90);
    if (next === null) return { temperatureK, slope: 1, converted: false };
    shift = next;
    t90 = oldCelsius + shift;
  }
  return { temperatureK: temperatureK + shift, slope: slopeAt(difference, t90), converted: true };
}

/**
 * Largest difference to ITS-90 that a temperature [K] left unconverted may have [K]; 0 for ITS-90 and thermodynamic.
 * Bounds: on IPTS-68 below 73.15 K 0.01 K (Preston-Thomas 1990, fig. 1); on IPTS-48 outside the published table 0.05 K
 * below it (judgement), 0.15 K to the antimony point, 1.2 K to the gold point (1063 against 1064.18 degrees Celsius),
 * above it as T squared. A scale not stated may be any of them.
 */
export function possibleDifferenceK(temperatureK: number, scale: TemperatureScaleName): number {
  switch (scale) {
    case 'ITS-90':
    case 'thermodynamic':
      return 0;
    case 'IPTS-68':
      return bound68(temperatureK);
    case 'IPTS-48':
      return bound48(temperatureK);
    case 'not-stated':
      return Math.max(bound68(temperatureK), bound48(temperatureK));
  }
}

const A = [-0.148759, -0.267408, 1.08076, 1.269056, -4.089591, -1.871251, 7.438081, -3.536296] as const;
const B = [78.687209, -0.47135991, 1.0954715e-3, -1.2357884e-6, 6.7736583e-10, -1.4458081e-13] as const;
const GOLD_POINT_CELSIUS = 1064.18;

/**
 * t90 - t68 [K] at t90 [degrees Celsius]; null below -200. To 630.6: Preston-Thomas, Metrologia 27 (1990) 3, eq. (22);
 * to 1064.18: Rusby et al., Metrologia 31 (1994) 149; above: -0.25 (T/1337.33 K)^2, quoted from memory, it meets the
 * polynomial at 1064.18 degrees Celsius to 0.0001 K.
 */
export function t90MinusT68(celsius: number): number | null {
  if (!(celsius >= -200)) return null;
  if (celsius <= 630.6) {
    const x = celsius / 630;
    let sum = 0;
    for (let i = A.length - 1; i >= 0; i--) sum = (sum + A[i]) * x;
    return sum;
  }
  if (celsius <= GOLD_POINT_CELSIUS) {
    let sum = 0;
    for (let i = B.length - 1; i >= 0; i--) sum = sum * celsius + B[i];
    return sum;
  }
  return -0.25 * ((celsius + ICE_POINT_K) / 1337.33) ** 2;
}

/** [degrees Celsius, t90 - t48 in K], a published handbook table. */
const T90_MINUS_T48: readonly (readonly [number, number])[] = [
  [-180, 0.02],
  [-150, 0.0],
  [-100, 0.035],
  [-50, 0.038],
  [-20, 0.016],
  [0, 0.0],
  [20, -0.012],
  [50, -0.023],
  [80, -0.027],
  [100, -0.026],
  [120, -0.023],
  [150, -0.016],
  [180, -0.005],
  [200, 0.003],
  [230, 0.014],
  [250, 0.021],
  [260, 0.024],
];

/**
 * t90 - t48 [K] at t90 [degrees Celsius]; null outside -180...260. Between the table's rows a cubic with the slopes of
 * the parabolas through neighbouring rows (Bessel), so that heat capacities get no steps; the rows are met exactly.
 */
export function t90MinusT48(celsius: number): number | null {
  const table = T90_MINUS_T48;
  const last = table.length - 1;
  if (!(celsius >= table[0][0] && celsius <= table[last][0])) return null;
  let i = 0;
  while (i < last - 1 && celsius > table[i + 1][0]) i++;
  const h = table[i + 1][0] - table[i][0];
  const x = (celsius - table[i][0]) / h;
  const left = tableSlope(i) * h;
  const right = tableSlope(i + 1) * h;
  const rise = table[i + 1][1] - table[i][1];
  return table[i][1] + x * (left + x * (3 * rise - 2 * left - right + x * (left + right - 2 * rise)));
}

function tableSlope(i: number): number {
  const middle = Math.min(Math.max(i, 1), T90_MINUS_T48.length - 2);
  const [t0, d0] = T90_MINUS_T48[middle - 1];
  const [t1, d1] = T90_MINUS_T48[middle];
  const [t2, d2] = T90_MINUS_T48[middle + 1];
  const before = (d1 - d0) / (t1 - t0);
  const after = (d2 - d1) / (t2 - t1);
  const bend = (after - before) / (t2 - t0);
  return before + bend * (2 * T90_MINUS_T48[i][0] - t0 - t1);
}

/** dt(old)/dt90 = 1 - d(t90 - t_old)/dt90, by differences over 0.1 K, one-sided at the ends of the range. */
function slopeAt(difference: (celsius: number) => number | null, t90: number): number {
  const here = difference(t90);
  const below = difference(t90 - 0.05);
  const above = difference(t90 + 0.05);
  const low = below ?? here;
  const high = above ?? here;
  if (low === null || high === null) return 1;
  const width = (below === null ? 0 : 0.05) + (above === null ? 0 : 0.05);
  return 1 - (high - low) / width;
}

function bound68(temperatureK: number): number {
  const shift = t90MinusT68(temperatureK - ICE_POINT_K);
  return shift === null ? 0.01 : Math.abs(shift);
}

function bound48(temperatureK: number): number {
  const celsius = temperatureK - ICE_POINT_K;
  const shift = t90MinusT48(celsius);
  if (shift !== null) return Math.abs(shift);
  if (celsius < 0) return 0.05;
  if (celsius <= 630.5) return 0.15;
  return 1.2 * Math.max(1, temperatureK / 1337.33) ** 2;
}
