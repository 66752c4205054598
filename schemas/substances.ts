/** `substances.csv`, one row a substance. */
export interface Substance {
  readonly id: string;
  readonly name: string;
  readonly formula: string;
  readonly molarMassGPerMol: number;
  readonly atomsPerFormula: number | null;
  readonly criticalTemperatureK: number | null;
  readonly criticalPressurePa: number | null;
  readonly acentricFactor: number | null;
  readonly polarA: number | null;
  readonly polarB: number | null;
  readonly class: 'metal' | 'molecular' | 'ionic' | 'network' | null;
  /** The vapour's species when it is not the formula unit (S8), with formula units per molecule. */
  readonly vapourSpecies: { readonly formula: string; readonly formulaUnits: number } | null;
  readonly residualEntropyJPerMolK: number;
}
