/** What assemble hands on: one Cp curve a phase, H and S its exact integrals, with covariances at the knots. */
import type { ExaminedCase } from './examined.js';

/** Which curves may be compared with each other: same zeros, same pressure convention. */
export interface CurveFamily {
  readonly enthalpyZero: string | null;
  readonly entropyZero: string | null;
  /** null: standard state; else the isobar that the tables state. */
  readonly isobarPa: number | null;
}

/** Where a stretch of a curve came from. */
export interface CurveOrigin {
  readonly lowK: number;
  readonly highK: number;
  readonly source: string;
  readonly file: string;
  readonly firstLine: number;
  readonly lastLine: number;
  readonly corrections: number;
  /** Cp of this stretch minus Cp of the preferred one at the join [J/(mol K)]; null where it joins nothing. */
  readonly stepHeatCapacityJPerMolK: number | null;
}

/** Where the level of H or of S comes from, for what two phases share to cancel between them. */
export interface LevelOrigin {
  /** The curve that it was carried from through a transition, at `atK`; null where it is a datum itself. */
  readonly from: PhaseCurve | null;
  readonly atK: number;
  /** How many of its units make one of this curve's (S8 vapour: 8); 1 for all others. */
  readonly scale: number;
  /** By datum: its standard uncertainty, and by how much the level moves with it. */
  readonly errors: readonly LevelError[];
}

/** `key` names the datum: `H of anchor 2`, `dS of transition 0`; what two curves owe to one key cancels between them. */
export interface LevelError {
  readonly key: string;
  readonly by: number;
  readonly u: number;
}

/**
 * Cp(T) = c0 + c1 x + c2 x^2 + c3 x^3 with x = T - knotK[i] in interval i; n knots, n - 1 intervals.
 * H and S at the knots are on the family's zeros where `hasEnthalpyLevel` / `hasEntropyLevel`, else from a zero of the family's own, which its `family` names.
 */
export interface PhaseCurve {
  readonly phase: string;
  readonly family: CurveFamily;
  readonly knotK: Float64Array;
  readonly c0: Float64Array;
  readonly c1: Float64Array;
  readonly c2: Float64Array;
  readonly c3: Float64Array;
  readonly enthalpyJPerMol: Float64Array;
  readonly entropyJPerMolK: Float64Array;
  /** 0 measured knot (a printed row), 1 inserted (298.15 K, joins, tail), 2 continuation. */
  readonly knotKind: Uint8Array;
  readonly measuredFromK: number;
  readonly measuredToK: number;
  readonly hasEnthalpyLevel: boolean;
  readonly hasEntropyLevel: boolean;
  /** How the levels are known; `transition`: carried through the one that `enthalpyThrough` or `entropyThrough` names. */
  readonly enthalpyLevelFrom: 'anchor' | 'table' | 'transition' | 'none';
  readonly entropyLevelFrom: 'anchor' | 'table' | 'third-law' | 'transition' | 'none';
  /** Standard uncertainty of Cp at the knots [J/(mol K)]; calibration and continuation come on top. */
  readonly uHeatCapacityJPerMolK: Float64Array;
  /** State covariance of (H, S) at each knot, rows' errors only (levels apart): var H, cov HS, var S. */
  readonly varH: Float64Array;
  readonly covHS: Float64Array;
  readonly varS: Float64Array;
  /** Smoother gains knot k <- k + 1, 2x2 row-major, 4 a knot: Cov(x_k, x_j) = G_k Cov(x_{k+1}, x_j), k < j. */
  readonly gain: Float64Array;
  /** Standard uncertainty of the bend inside each interval that neither of its ends sees [J/mol]; absent: none. */
  readonly uBendJPerMol?: Float64Array | undefined;
  readonly uEnthalpyLevelJPerMol: number;
  readonly uEntropyLevelJPerMolK: number;
  /** Which data the levels owe their errors to; absent where they are the curve's own. */
  readonly enthalpyLevel?: LevelOrigin | undefined;
  readonly entropyLevel?: LevelOrigin | undefined;
  /** Relative standard uncertainty of a calibration common to the whole curve, acting on H counted from `referenceK`. */
  readonly uCalibrationRelative: number;
  readonly referenceK: number;
  /** The same for S: 0 K where it counts by the third law, else `referenceK`. */
  readonly entropyReferenceK: number;
  /** Sources whose numbers fix the curve and its levels, preferred first. */
  readonly sources: readonly string[];
  /** Index of the anchor (among the substance's) that fixes the level of H and of S; -1 where none does. */
  readonly enthalpyAnchor: number;
  readonly entropyAnchor: number;
  /** Index of the stated transition that the level of H, and of S, was carried through, or -1. */
  readonly enthalpyThrough: number;
  readonly entropyThrough: number;
  /** Growth of u(Cp) beyond the measured range: this share of Cp per kelvin. */
  readonly continuationGrowthPerK: number;
  readonly origins: readonly CurveOrigin[];
}

/** A temperature where G of two phases of one family is equal, at one pressure. */
export interface Crossing {
  readonly family: CurveFamily;
  /** Phase of lower G below the crossing. */
  readonly from: string;
  /** Phase of lower G above it. */
  readonly to: string;
  readonly pressurePa: number;
  /** `real`: gas imperfection included; `ideal`: fugacity equals the pressure; null: no gas in it. */
  readonly gas: 'real' | 'ideal' | null;
  readonly temperatureK: number;
  readonly uK: number;
  readonly enthalpyJPerMol: number;
  readonly entropyJPerMolK: number;
  /** True where both are the lowest of all phases there. */
  readonly stable: boolean;
  /** True where both phases' own data reach the crossing (no continuation). */
  readonly measured: boolean;
}

/** Values at the published temperatures of one phase; columns. */
export interface FunctionRows {
  readonly phase: string;
  readonly family: CurveFamily;
  readonly rows: number;
  readonly temperatureK: Float64Array;
  readonly heatCapacityJPerMolK: Float64Array;
  readonly entropyJPerMolK: Float64Array;
  readonly enthalpyJPerMol: Float64Array;
  readonly gibbsEnergyJPerMol: Float64Array;
  readonly uHeatCapacityJPerMolK: Float64Array;
  readonly uEntropyJPerMolK: Float64Array;
  readonly uEnthalpyJPerMol: Float64Array;
  readonly uGibbsEnergyJPerMol: Float64Array;
  readonly stable: Uint8Array;
  /** 0 measured, 1 interpolated, 2 extrapolated. */
  readonly basis: Uint8Array;
  /** 0 none, 1 below, 2 above (a two-sided row). */
  readonly side: Uint8Array;
}

export interface AssembledCase {
  readonly examined: ExaminedCase;
  readonly curves: readonly PhaseCurve[];
  /** At the policy's pressure and at every stated transition's own. */
  readonly crossings: readonly Crossing[];
  readonly functions: readonly FunctionRows[];
}
