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

/** H with the real gas's departure: from the pressure term by Gibbs and Helmholtz, H = G - T dG/dT. */
function enthalpyOf(phase: PlacedPhase, temperatureK: number): number {
  const h = enthalpyAt(phase.curve, temperatureK);
  if (phase.shift === null) return h / phase.formulaUnits;
  return (h + phase.shift(temperatureK) - temperatureK * slope(phase.shift, temperatureK)) / phase.formulaUnits;
}

function entropyOf(phase: PlacedPhase, temperatureK: number): number {
  const s = entropyAt(phase.curve, temperatureK);
  return (phase.shift === null ? s : s - slope(phase.shift, temperatureK)) / phase.formulaUnits;
}

function slope(f: (t: number) => number, temperatureK: number): number {
  const step = 1e-3 * temperatureK;
  return (f(temperatureK + step) - f(temperatureK - step)) / (2 * step);
}
