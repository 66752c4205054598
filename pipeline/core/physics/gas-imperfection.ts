import { R_J_PER_MOL_K } from '../constants.js';

/** What is known of a gas for its second virial coefficient; null where it is not. */
export interface GasIdentity {
  readonly criticalTemperatureK: number | null;
  readonly criticalPressurePa: number | null;
  readonly acentricFactor: number | null;
  readonly polarA: number | null;
  readonly polarB: number | null;
  readonly class: 'metal' | 'molecular' | 'ionic' | 'network' | null;
}

export interface SecondVirial {
  /** B [m3/mol]. */
  readonly value: number;
  readonly u: number;
}

/**
 * The second virial coefficient by the correlation of C. Tsonopoulos, AIChE J. 20 (1974) 263, eqs. 4 to 6 and, for polar
 * substances, the term a/Tr^6 - b/Tr^8 (eq. 13):
 *   B pc/(R Tc) = f0(Tr) + omega f1(Tr) + f2(Tr).
 * Holds for vapours below about 2 bar at Tr > 0.5; drops third and higher virials, below 0.1 % of G there.
 *
 * Without critical constants B is taken as zero and its uncertainty as the magnitude of a simple fluid's (omega = 0,
 * Tc = 1.6 boiling temperature; pc = 4 MPa for molecular substances, 50 MPa for metals and salts): common practice, no source.
 * u(B): 20 % where polar constants are given (0 for a nonpolar substance), 40 % where nothing says how polar it is (judgement).
 */
export function secondVirial(gas: GasIdentity, temperatureK: number, boilingK: number): SecondVirial {
  const { criticalTemperatureK: tc, criticalPressurePa: pc } = gas;
  if (tc !== null && pc !== null) {
    const value =
      ((R_J_PER_MOL_K * tc) / pc) *
      reduced(temperatureK / tc, gas.acentricFactor ?? 0, gas.polarA ?? 0, gas.polarB ?? 0);
    const share = gas.polarA !== null ? 0.2 : 0.4;
    return { value, u: share * Math.abs(value) };
  }
  const estimateTc = 1.6 * boilingK;
  const estimatePc = gas.class === 'metal' || gas.class === 'ionic' || gas.class === 'network' ? 50e6 : 4e6;
  const scale = (R_J_PER_MOL_K * estimateTc) / estimatePc;
  return { value: 0, u: Math.abs(scale * reduced(temperatureK / estimateTc, 0, 0, 0)) };
}

/** Below this reduced temperature the 1/Tr^8 terms run away; the coefficient is held there (a vapour so cold is never stable near 1 bar). */
const LOWEST_REDUCED = 0.45;

function reduced(tr: number, omega: number, a: number, b: number): number {
  const r = 1 / Math.max(tr, LOWEST_REDUCED);
  const r2 = r * r;
  const r3 = r2 * r;
  const r6 = r3 * r3;
  const r8 = r6 * r2;
  const f0 = 0.1445 - 0.33 * r - 0.1385 * r2 - 0.0121 * r3 - 0.000607 * r8; // eq. 5
  const f1 = 0.0637 + 0.331 * r2 - 0.423 * r3 - 0.008 * r8; // eq. 6
  return f0 + omega * f1 + a * r6 - b * r8;
}
