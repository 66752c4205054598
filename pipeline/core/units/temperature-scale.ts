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
  const difference = scale === 'IPTS-68' ? from68 : scale === 'IPTS-48' ? from48 : null;
  if (difference === null) return { temperatureK, slope: 1, converted: true };
  const oldCelsius = temperatureK - ICE_POINT_K;
  let there = difference(oldCelsius);
  // The differences are published as functions of t90; they vary by less than 0.7 % of a kelvin per kelvin.
  for (let pass = 0; pass < 4 && there !== null; pass++) there = difference(oldCelsius + there.shift);
  if (there === null) return { temperatureK, slope: 1, converted: false };
  return { temperatureK: temperatureK + there.shift, slope: 1 - there.rate, converted: true };
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

/** a0...a8 of a power series in t/630; a0 is 0. */
const A = [0, -0.148759, -0.267408, 1.08076, 1.269056, -4.089591, -1.871251, 7.438081, -3.536296] as const;
/** b0...b5 of a power series in t. */
const B = [78.687209, -0.47135991, 1.0954715e-3, -1.2357884e-6, 6.7736583e-10, -1.4458081e-13] as const;
const GOLD_POINT_CELSIUS = 1064.18;

/** A difference t90 - t_old [K] and its rate of change with t90. */
interface Difference {
  readonly shift: number;
  readonly rate: number;
}

/**
 * t90 - t68 [K] at t90 [degrees Celsius]; null below -200. To 630.6: Preston-Thomas, Metrologia 27 (1990) 3;
 * to 1064.18: Rusby et al., Metrologia 31 (1994) 149; above: -0.25 (T/1337.33 K)^2, quoted from memory, it meets the
 * polynomial at 1064.18 degrees Celsius to 0.0002 K.
 */
export function t90MinusT68(celsius: number): number | null {
  return from68(celsius)?.shift ?? null;
}

function from68(celsius: number): Difference | null {
  if (!(celsius >= -200)) return null;
  if (celsius > GOLD_POINT_CELSIUS) {
    const shift = -0.25 * ((celsius + ICE_POINT_K) / 1337.33) ** 2;
    return { shift, rate: (2 * shift) / (celsius + ICE_POINT_K) };
  }
  const low = celsius <= 630.6;
  const coefficients = low ? A : B;
  const unit = low ? 630 : 1;
  const x = celsius / unit;
  let shift = 0;
  let rate = 0;
  for (let i = coefficients.length - 1; i >= 0; i--) {
    rate = rate * x + shift;
    shift = shift * x + coefficients[i];
  }
  return { shift, rate: rate / unit };
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
  return from48(celsius)?.shift ?? null;
}

function from48(celsius: number): Difference | null {
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
  const c2 = 3 * rise - 2 * left - right;
  const c3 = left + right - 2 * rise;
  return {
    shift: table[i][1] + x * (left + x * (c2 + x * c3)),
    rate: (left + x * (2 * c2 + x * 3 * c3)) / h,
  };
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

const GRID_K = 5;
const GRID_TOP_K = 2000;
const grids = new Map<TemperatureScaleName, Float64Array>();

/** The largest of `possibleDifferenceK` between two temperatures [K], looked up every 5 K from below the one to above the other. */
export function largestPossibleDifferenceK(lowK: number, highK: number, scale: TemperatureScaleName): number {
  if (scale === 'ITS-90' || scale === 'thermodynamic') return 0;
  let grid = grids.get(scale);
  if (grid === undefined) {
    grid = Float64Array.from({ length: GRID_TOP_K / GRID_K + 1 }, (_, i) => possibleDifferenceK(i * GRID_K, scale));
    grids.set(scale, grid);
  }
  // Above the grid the bound only rises.
  let largest = highK > GRID_TOP_K ? possibleDifferenceK(highK, scale) : 0;
  const last = Math.min(Math.ceil(highK / GRID_K), grid.length - 1);
  for (let i = Math.max(Math.floor(lowK / GRID_K), 0); i <= last; i++) if (grid[i] > largest) largest = grid[i];
  return largest;
}
