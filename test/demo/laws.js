/**
 * The stated heat-capacity law of one phase and its exact integrals:
 * Cp(T) = a + b T + c / T^2 + d T^2   [J/(mol K)], T in K.
 * @typedef {readonly [a: number, b: number, c: number, d?: number]} Law
 */

export const R = 8.31446261815324;
export const STANDARD_PRESSURE_PA = 100000;
export const ATMOSPHERE_PA = 101325;
export const REFERENCE_K = 298.15;

/** Cp at T [J/(mol K)]. */
export function heatCapacity([a, b, c, d = 0], T) {
  return a + b * T + c / (T * T) + d * T * T;
}

/** H(T2) - H(T1) = the integral of Cp dT [J/mol]. */
export function enthalpyChange([a, b, c, d = 0], T1, T2) {
  const primitive = (T) => a * T + (b * T * T) / 2 - c / T + (d * T * T * T) / 3;
  return primitive(T2) - primitive(T1);
}

/** S(T2) - S(T1) = the integral of Cp/T dT [J/(mol K)]. */
export function entropyChange([a, b, c, d = 0], T1, T2) {
  const rest = (T) => b * T - c / (2 * T * T) + (d * T * T) / 2;
  return a * Math.log(T2 / T1) + rest(T2) - rest(T1);
}

/**
 * Second virial coefficient B [m3/mol] and dB/dT, nonpolar: Tsonopoulos, AIChE J. 20 (1974) 263.
 * B pc / (R Tc) = f0(Tr) + w f1(Tr).
 */
export function secondVirial({ temperatureK: Tc, pressurePa: pc, acentricFactor: w }, T) {
  const x = Tc / T;
  const x2 = x * x;
  const x3 = x2 * x;
  const x8 = x2 * x3 * x3;
  const f0 = 0.1445 - 0.33 * x - 0.1385 * x2 - 0.0121 * x3 - 0.000607 * x8;
  const f1 = 0.0637 + 0.331 * x2 - 0.423 * x3 - 0.008 * x8;
  // T df/dT, since T d(x^n)/dT = -n x^n
  const g0 = 0.33 * x + 0.277 * x2 + 0.0363 * x3 + 0.004856 * x8;
  const g1 = -0.662 * x2 + 1.269 * x3 + 0.064 * x8;
  const scale = (R * Tc) / pc;
  return { B: scale * (f0 + w * f1), dBdT: (scale * (g0 + w * g1)) / T };
}

/** t90 - t68 [K] at t in deg C, -200 to 630.6 deg C: Preston-Thomas, Metrologia 27 (1990) 3. */
const SCALE_68 = [-0.148759, -0.267408, 1.08076, 1.269056, -4.089591, -1.871251, 7.438081, -3.536296];

/** What a thermometer on IPTS-68 shows at T on ITS-90, and dT90/dT68 there. */
export function onScale68(T90) {
  const x = (T90 - 273.15) / 630;
  let difference = 0;
  let slope = 0;
  for (let i = SCALE_68.length; i >= 1; i--) {
    difference = (difference + SCALE_68[i - 1]) * x;
    slope = slope * x + (i * SCALE_68[i - 1]) / 630;
  }
  return { T68: T90 - difference, dT90dT68: 1 + slope };
}
