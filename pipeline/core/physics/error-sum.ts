import { crossCovariance, type RowsUncertainty } from './rows-covariance.js';

/** A standard error that a level owes to one datum; what two curves owe to the same one cancels between them. */
export interface LevelError {
  readonly key: string;
  /** By how much the level moves with the datum. */
  readonly by: number;
  /** Standard uncertainty of the datum. */
  readonly u: number;
}

/** Where the level of H or of S is from. */
export interface LevelOrigin {
  /** The curve that it was carried from, at `atK`; null where it is a datum itself. */
  readonly from: UncertainCurve | null;
  readonly atK: number;
  /** How many of its units make one of this curve's. */
  readonly scale: number;
  readonly errors: readonly LevelError[];
}

/** What a curve's uncertainty is made of. */
export interface UncertainCurve extends RowsUncertainty {
  /** Of the levels alone, as a whole; zero leaves the rows' part only. */
  readonly uEnthalpyLevelJPerMol: number;
  readonly uEntropyLevelJPerMolK: number;
  /** Absent: the level's error is the curve's own. */
  readonly enthalpyLevel?: LevelOrigin | undefined;
  readonly entropyLevel?: LevelOrigin | undefined;
}

/** h H(T) + s S(T) of a curve's rows, its level apart. */
export interface RowsTerm {
  readonly curve: UncertainCurve;
  readonly atK: number;
  readonly h: number;
  readonly s: number;
}

/** The part of a sum that moves with one datum. */
export interface DatumTerm {
  /** A level without an origin goes by its curve's own array. */
  readonly key: string | Float64Array;
  readonly u: number;
  readonly by: number;
}

/** A linear combination of independent errors: of curves' rows at temperatures, and of data that fix levels. */
export class ErrorSum {
  readonly rows: RowsTerm[] = [];
  readonly data: DatumTerm[] = [];

  /** h H(T) + s S(T) of the curve. A carried level is the other curve's state less this one's own rows at the transition. */
  add(curve: UncertainCurve, temperatureK: number, h: number, s: number): this {
    this.rows.push({ curve, atK: temperatureK, h, s });
    if (h !== 0) this.addLevel(curve, curve.enthalpyLevel, curve.uEnthalpyLevelJPerMol, curve.varH, h, 0);
    if (s !== 0) this.addLevel(curve, curve.entropyLevel, curve.uEntropyLevelJPerMolK, curve.varS, 0, s);
    return this;
  }

  /** What one datum adds; a datum may stand in the sum more than once. */
  addDatum(key: string | Float64Array, by: number, u: number): this {
    this.data.push({ key, by, u });
    return this;
  }

  covariance(other: ErrorSum): number {
    let sum = 0;
    for (const a of this.rows) {
      for (const b of other.rows) {
        if (a.curve !== b.curve) continue;
        const [hh, hs, sh, ss] = crossCovariance(a.curve, a.atK, b.atK);
        sum += a.h * b.h * hh + a.h * b.s * hs + a.s * b.h * sh + a.s * b.s * ss;
      }
    }
    for (const a of this.data) {
      for (const b of other.data) if (a.key === b.key) sum += a.by * a.u * b.by * b.u;
    }
    return sum;
  }

  private addLevel(
    curve: UncertainCurve,
    origin: LevelOrigin | undefined,
    u: number,
    own: Float64Array,
    h: number,
    s: number,
  ): void {
    if (origin === undefined) {
      this.addDatum(own, h + s, u);
      return;
    }
    for (const error of origin.errors) this.addDatum(error.key, (h + s) * error.by, error.u);
    if (origin.from === null) return;
    this.rows.push({ curve, atK: origin.atK, h: -h, s: -s });
    this.add(origin.from, origin.atK, h * origin.scale, s * origin.scale);
  }
}
