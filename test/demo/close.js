/**
 * Closes one medium: from its laws, its transitions and the levels of one phase, the levels of every phase at 298.15 K
 * such that G is equal on both sides of each transition, at that transition's own pressure, before any rounding.
 */
import {
  enthalpyChange,
  entropyChange,
  heatCapacity,
  R,
  REFERENCE_K,
  STANDARD_PRESSURE_PA,
  secondVirial,
} from './laws.js';

/**
 * @typedef {object} ClosedPhase
 * @property {number} enthalpyOfFormation J/mol at 298.15 K
 * @property {number} entropy S(298.15 K), standard state 1 bar [J/(mol K)]
 * @property {(T: number) => number} Cp
 * @property {(T: number) => number} S
 * @property {(T: number) => number} H from the elements at 298.15 K
 * @property {(T: number) => number} G = H - T S
 *
 * @param {import('./media.js').Medium} medium
 * @returns {{ phases: Record<string, ClosedPhase>, steps: (import('./media.js').Step & { enthalpy: number })[] }}
 */
export function close(medium) {
  const phases = {};
  const { origin } = medium;
  phases[origin.phase] = phaseFrom(medium.phases[origin.phase].law, REFERENCE_K, origin.enthalpy, origin.entropy);
  const steps = medium.steps.map((step) => ({ ...step, enthalpy: step.temperatureK * step.entropy }));
  for (const step of [...steps, ...steps.toReversed()]) {
    const { from, to, temperatureK: T } = step;
    const gas = gasTerms(medium, step);
    if (phases[from] && !phases[to]) {
      const H = phases[from].H(T) + step.enthalpy - gas.H;
      phases[to] = phaseFrom(medium.phases[to].law, T, H, phases[from].S(T) + step.entropy - gas.S);
    } else if (phases[to] && !phases[from]) {
      const H = phases[to].H(T) + gas.H - step.enthalpy;
      phases[from] = phaseFrom(medium.phases[from].law, T, H, phases[to].S(T) + gas.S - step.entropy);
    }
  }
  for (const label of Object.keys(medium.phases)) {
    if (!phases[label]) throw new Error(`${medium.id}: no transition reaches ${label}`);
  }
  return { phases, steps };
}

/** A phase whose H and S are known at one temperature. */
function phaseFrom(law, T0, H0, S0) {
  const H = (T) => H0 + enthalpyChange(law, T0, T);
  const S = (T) => S0 + entropyChange(law, T0, T);
  return {
    enthalpyOfFormation: H(REFERENCE_K),
    entropy: S(REFERENCE_K),
    Cp: (T) => heatCapacity(law, T),
    S,
    H,
    G: (T) => H(T) - T * S(T),
  };
}

/** What the gas of a step differs from its standard state at the step's pressure; zero where no gas is in it. */
function gasTerms(medium, { temperatureK: T, gas, pressurePa: p }) {
  if (!gas) return { H: 0, S: 0 };
  const ideal = -R * Math.log(p / STANDARD_PRESSURE_PA);
  if (gas === 'ideal') return { H: 0, S: ideal };
  const { B, dBdT } = secondVirial(medium.critical, T);
  return { H: p * (B - T * dBdT), S: ideal - p * dBdT };
}

/** G of a phase at a pressure [J/mol]; condensed phases are taken as incompressible and small. */
export function gibbsAt(medium, closed, label, T, pressurePa, gas) {
  const G = closed.phases[label].G(T);
  if (label !== 'g') return G;
  const ideal = G + R * T * Math.log(pressurePa / STANDARD_PRESSURE_PA);
  return gas === 'real' && medium.critical ? ideal + secondVirial(medium.critical, T).B * pressurePa : ideal;
}
