import { R_J_PER_MOL_K, STANDARD_PRESSURE_PA } from '../constants.js';
import { type GasIdentity, secondVirial } from './gas-imperfection.js';

/** What a pressure adds to G°, and how uncertain that is [J/mol]. */
export interface PressureTerm {
  /** Null where the pressure adds nothing at any temperature. */
  readonly shift: ((temperatureK: number) => number) | null;
  readonly u: (temperatureK: number) => number;
}

/**
 * RT ln(p/p°), and for a real gas RT ln phi = B(T) p (virial equation cut after B; J. M. Prausnitz et al., Molecular
 * Thermodynamics of Fluid-Phase Equilibria, 3rd ed. 1999, eq. 5-25, at low p). `ideal` takes phi = 1 at the stated fugacity.
 *
 * Above `HIGH_PA` the virial equation says less than that there is an equilibrium: the vapour over a condensed phase has its
 * least ln phi at the critical point, -0.41 by the equation of G. Soave, Chem. Eng. Sci. 27 (1972) 1197, whatever the
 * substance. Without that bound a wrong unit of pressure would hide behind its own imperfection.
 */
export function gasTerm(gas: GasIdentity, kind: 'real' | 'ideal', pressurePa: number, boilingK: number): PressureTerm {
  const log = R_J_PER_MOL_K * Math.log(pressurePa / STANDARD_PRESSURE_PA);
  const ideal = log === 0 ? null : (t: number): number => log * t;
  if (kind === 'ideal') return { shift: ideal, u: () => 0 };
  const correlated = gas.criticalTemperatureK !== null && gas.criticalPressurePa !== null;
  const bounded = pressurePa > HIGH_PA;
  const imperfection = (t: number): number => {
    const known = secondVirial(gas, t, boilingK).value * pressurePa;
    return bounded ? Math.max(known, LEAST_LN_PHI * R_J_PER_MOL_K * t) : known;
  };
  return {
    shift: correlated ? (t) => log * t + imperfection(t) : ideal,
    u: (t) => {
      const known = secondVirial(gas, t, boilingK).u * pressurePa;
      return bounded ? Math.min(known, U_LN_PHI * R_J_PER_MOL_K * t) : known;
    },
  };
}

const HIGH_PA = 1e6;
const LEAST_LN_PHI = -0.41;
/** Half of that, and a little: the middle of the range is not known either. */
const U_LN_PHI = 0.25;

/**
 * A condensed phase without a known molar volume: V_m (p - p°) is bounded by V_m <= 1e-4 m3/mol, and the difference between
 * two of them by that as well; as a standard uncertainty the bound over sqrt(3) (JCGM 100:2008, 4.3.7).
 */
export function condensedTermUncertainty(pressurePa: number): number {
  return (1e-4 * Math.abs(pressurePa - STANDARD_PRESSURE_PA)) / Math.sqrt(3);
}
