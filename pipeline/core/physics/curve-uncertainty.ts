import { crossCovariance, type RowsUncertainty, rowsCovariance, type StateCovariance } from './rows-covariance.js';

export { crossCovariance, type StateCovariance } from './rows-covariance.js';

/** A standard error that a level owes to one datum; what two curves owe to the same one cancels between them. */
export interface LevelError {
  readonly key: string;
  /** Signed: by how much the level moves with the datum. */
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

/** The covariance of (H, S) at T, levels included. A level carried from another curve brings that curve's errors with it. */
export function stateCovariance(curve: UncertainCurve, temperatureK: number): StateCovariance {
  const { uEnthalpyLevelJPerMol: uH, uEntropyLevelJPerMolK: uS } = curve;
  if (!isCarried(curve) || (uH === 0 && uS === 0)) {
    const { hh, hs, ss } = rowsCovariance(curve, temperatureK);
    return { hh: hh + uH * uH, hs, ss: ss + uS * uS };
  }
  const h = new ErrorSum().add(curve, temperatureK, 1, 0);
  const s = new ErrorSum().add(curve, temperatureK, 0, 1);
  return { hh: h.covariance(h), hs: h.covariance(s), ss: s.covariance(s) };
}

/** u(G) at T [J/mol]. */
export function gibbsUncertainty(curve: UncertainCurve, temperatureK: number): number {
  const { hh, hs, ss } = stateCovariance(curve, temperatureK);
  return Math.sqrt(Math.max(0, hh - 2 * temperatureK * hs + temperatureK * temperatureK * ss));
}

/** u(a G_a - b G_b) at T [J/mol]: what the two owe to one anchor, one transition or one curve cancels. */
export function gibbsDifferenceUncertainty(
  first: UncertainCurve,
  a: number,
  second: UncertainCurve,
  b: number,
  temperatureK: number,
): number {
  if (!isCarried(first) && !isCarried(second) && !shareDatum(first, second)) {
    return Math.hypot(a * gibbsUncertainty(first, temperatureK), b * gibbsUncertainty(second, temperatureK));
  }
  const sum = new ErrorSum();
  sum.add(first, temperatureK, a, -a * temperatureK);
  sum.add(second, temperatureK, -b, b * temperatureK);
  return Math.sqrt(Math.max(0, sum.covariance(sum)));
}

function isCarried(curve: UncertainCurve): boolean {
  return (curve.enthalpyLevel?.from ?? null) !== null || (curve.entropyLevel?.from ?? null) !== null;
}

function shareDatum(a: UncertainCurve, b: UncertainCurve): boolean {
  for (const x of [a.enthalpyLevel, a.entropyLevel]) {
    for (const y of [b.enthalpyLevel, b.entropyLevel]) {
      if (x?.errors.some((one) => y?.errors.some((other) => one.key === other.key))) return true;
    }
  }
  return false;
}

/** A linear combination of independent errors: of curves' rows at temperatures, and of data that fix levels. */
class ErrorSum {
  private readonly rows: { curve: UncertainCurve; atK: number; h: number; s: number }[] = [];
  /** Weighted standard errors by datum; a level without an origin goes by its curve's own array. */
  private readonly data = new Map<string | Float64Array, number>();

  /** h H(T) + s S(T) of the curve. A carried level is the other curve's state less this one's own rows at the transition. */
  add(curve: UncertainCurve, temperatureK: number, h: number, s: number): this {
    this.rows.push({ curve, atK: temperatureK, h, s });
    if (h !== 0) this.addLevel(curve, curve.enthalpyLevel, curve.uEnthalpyLevelJPerMol, curve.varH, h, 0);
    if (s !== 0) this.addLevel(curve, curve.entropyLevel, curve.uEntropyLevelJPerMolK, curve.varS, 0, s);
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
    for (const [key, u] of this.data) sum += u * (other.data.get(key) ?? 0);
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
      this.addDatum(own, (h + s) * u);
      return;
    }
    for (const error of origin.errors) this.addDatum(error.key, (h + s) * error.u);
    if (origin.from === null) return;
    this.rows.push({ curve, atK: origin.atK, h: -h, s: -s });
    this.add(origin.from, origin.atK, h * origin.scale, s * origin.scale);
  }

  private addDatum(key: string | Float64Array, u: number): void {
    this.data.set(key, (this.data.get(key) ?? 0) + u);
  }
}
