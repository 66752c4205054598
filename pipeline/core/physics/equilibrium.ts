import { enthalpyAt, entropyAt, heatCapacityAt } from './curve.js';
import { gibbsInDiagram } from './diagram.js';
import type { PlacedPhase } from './placed-phase.js';

/** Two phases at one temperature: differences `to` minus `from`, per formula unit, pressure terms included. */
export interface Equilibrium {
  /** G(from) - G(to) [J/mol]: positive where `to` is the stabler. */
  readonly gapJPerMol: number;
  readonly enthalpyJPerMol: number;
  readonly entropyJPerMolK: number;
  readonly heatCapacityJPerMolK: number;
}

export function equilibrium(from: PlacedPhase, to: PlacedPhase, temperatureK: number): Equilibrium {
  return {
    gapJPerMol: gibbsInDiagram(from, temperatureK) - gibbsInDiagram(to, temperatureK),
    enthalpyJPerMol: enthalpyOf(to, temperatureK) - enthalpyOf(from, temperatureK),
    entropyJPerMolK: entropyOf(to, temperatureK) - entropyOf(from, temperatureK),
    heatCapacityJPerMolK:
      heatCapacityAt(to.curve, temperatureK) / to.formulaUnits -
      heatCapacityAt(from.curve, temperatureK) / from.formulaUnits,
  };
}

function enthalpyOf(phase: PlacedPhase, temperatureK: number): number {
  return (enthalpyAt(phase.curve, temperatureK) + departure(phase.shift, temperatureK).enthalpy) / phase.formulaUnits;
}

function entropyOf(phase: PlacedPhase, temperatureK: number): number {
  return (entropyAt(phase.curve, temperatureK) + departure(phase.shift, temperatureK).entropy) / phase.formulaUnits;
}

/** What a pressure term adds to H and S, by Gibbs and Helmholtz: H = G - T dG/dT, S = -dG/dT. */
export function departure(
  shift: ((temperatureK: number) => number) | null,
  temperatureK: number,
): { readonly enthalpy: number; readonly entropy: number } {
  if (shift === null) return { enthalpy: 0, entropy: 0 };
  const step = 1e-3 * temperatureK;
  const slope = (shift(temperatureK + step) - shift(temperatureK - step)) / (2 * step);
  return { enthalpy: shift(temperatureK) - temperatureK * slope, entropy: -slope };
}
