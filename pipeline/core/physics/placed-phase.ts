import { gibbsDifferenceUncertainty, type UncertainCurve } from './curve-uncertainty.js';
import type { DiagramPhase } from './diagram.js';
import type { GasIdentity } from './gas-imperfection.js';
import { condensedTermUncertainty, gasTerm, type PressureTerm } from './pressure-terms.js';

/** At which pressure a diagram is drawn, and how its gas is taken. */
export interface DiagramSetting {
  readonly pressurePa: number;
  readonly gas: 'real' | 'ideal';
}

export interface PhaseInFamily extends UncertainCurve {
  readonly phase: string;
  readonly family: { readonly isobarPa: number | null };
}

/** A phase in a diagram, with what its place there adds to the uncertainty of G. */
export interface PlacedPhase<Curve extends PhaseInFamily = PhaseInFamily> extends DiagramPhase {
  readonly source: Curve;
  readonly term: PressureTerm | null;
  readonly gas: boolean;
}

export function isGas(phase: string): boolean {
  return phase === 'g' || phase.startsWith('g-');
}

/** The stated boiling or sublimation temperature [K], for the simple-fluid estimate; 500 K where none is stated. */
export function boilingTemperature(
  transitions: readonly { readonly to: string; readonly temperature: { readonly value: number } }[],
): number {
  for (const t of transitions) if (isGas(t.to)) return t.temperature.value;
  return 500;
}

/** A gas on the standard state gets its pressure term; a real fluid's isobar has it in its values already. */
export function placePhase<Curve extends PhaseInFamily>(
  curve: Curve,
  identity: GasIdentity & { readonly vapourSpecies: { readonly formulaUnits: number } | null },
  setting: DiagramSetting,
  boilingK: number,
): PlacedPhase<Curve> {
  const gas = isGas(curve.phase);
  const term =
    gas && curve.family.isobarPa === null ? gasTerm(identity, setting.gas, setting.pressurePa, boilingK) : null;
  return {
    curve,
    source: curve,
    lowK: Math.max(curve.knotK[0], 1e-3),
    highK: curve.knotK[curve.knotK.length - 1],
    shift: term === null ? null : term.shift,
    term,
    gas,
    formulaUnits: gas ? (identity.vapourSpecies?.formulaUnits ?? 1) : 1,
  };
}

/** u(dG) at T [J/mol]: both curves less what they share, the gas term, and the unknown volumes of condensed phases off the standard pressure. */
export function gapUncertainty(a: PlacedPhase, b: PlacedPhase, temperatureK: number, pressurePa: number): number {
  const curves = gibbsDifferenceUncertainty(a.source, 1 / a.formulaUnits, b.source, 1 / b.formulaUnits, temperatureK);
  const gas = (p: PlacedPhase): number => (p.term === null ? 0 : p.term.u(temperatureK) / p.formulaUnits);
  const volume = a.source.family.isobarPa === null ? condensedTermUncertainty(pressurePa) : 0;
  return Math.hypot(curves, gas(a), gas(b), volume);
}

/** Signed standard uncertainty of the gas terms in G(to) - G(from) [J/mol]: one second virial coefficient is behind both. */
export function gasTermUncertainty(from: PlacedPhase, to: PlacedPhase, temperatureK: number): number {
  const gas = (p: PlacedPhase): number => (p.term === null ? 0 : p.term.u(temperatureK) / p.formulaUnits);
  return gas(to) - gas(from);
}
