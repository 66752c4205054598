import type { Series } from '../../schemas/harmonised.js';
import { numbers } from '../core/numeric/room.js';
import type { BaseCurve } from './base-curve.js';
import type { Knots } from './knots.js';

/** Of an interval's integral, per kelvin [J/(mol K)]: no interpolation is surer than that. */
export const LEAST_ERROR = 0.001;

/** Knots, cubics, step errors and observations of one stretch; what the chain runs over. n knots, n - 1 intervals. */
export class Stretch {
  constructor(
    readonly n: number,
    readonly temperatureK: Float64Array,
    /** Cp as printed at the knots. */
    readonly heatCapacity: Float64Array,
    readonly uHeatCapacity: Float64Array,
    readonly c0: Float64Array,
    readonly c1: Float64Array,
    readonly c2: Float64Array,
    readonly c3: Float64Array,
    readonly errorJPerMol: Float64Array,
    /** What the points' own scatter adds to var H, cov(H, S) and var S over the interval: see `Scatter`. */
    readonly ownVarH: Float64Array,
    readonly ownCovHS: Float64Array,
    readonly ownVarS: Float64Array,
    readonly h: Float64Array,
    readonly hVar: Float64Array,
    readonly s: Float64Array,
    readonly sVar: Float64Array,
    readonly f: Float64Array,
    readonly fVar: Float64Array,
    readonly jump: Uint8Array,
    /** 0 a printed row, 1 inserted. */
    readonly kind: Uint8Array,
    readonly absoluteH: boolean,
    readonly hasH: boolean,
    readonly hasS: boolean,
    /** Whose printed H and S these are; the preferred series where nothing but Cp is printed. */
    readonly series: Series,
  ) {}

  get referenceK(): number {
    return this.series.table.referenceTemperatureK;
  }

  /** H(Tr) of this very phase is the zero of the printed increments. */
  get countsFromItself(): boolean {
    return this.series.incrementsFrom === null || this.series.incrementsFrom === this.series.phase;
  }

  /** Knots `from` to `to` inclusive. */
  slice(from: number, to: number): Stretch {
    const knots = <A extends Float64Array | Uint8Array>(a: A): A => a.slice(from, to + 1) as A;
    const intervals = (a: Float64Array): Float64Array => a.slice(from, to);
    const printed = (variance: Float64Array): boolean => {
      for (let i = from; i <= to; i++) if (variance[i] !== Number.POSITIVE_INFINITY) return true;
      return false;
    };
    return new Stretch(
      to - from + 1,
      knots(this.temperatureK),
      knots(this.heatCapacity),
      knots(this.uHeatCapacity),
      intervals(this.c0),
      intervals(this.c1),
      intervals(this.c2),
      intervals(this.c3),
      intervals(this.errorJPerMol),
      intervals(this.ownVarH),
      intervals(this.ownCovHS),
      intervals(this.ownVarS),
      knots(this.h),
      knots(this.hVar),
      knots(this.s),
      knots(this.sVar),
      knots(this.f),
      knots(this.fVar),
      knots(this.jump),
      knots(this.kind),
      this.absoluteH,
      this.hasH && printed(this.hVar),
      this.hasS && printed(this.sVar),
      this.series,
    );
  }

  /**
   * This stretch, then `next`, which starts where this one ends. Printed H and S are kept of one of the two alone, the
   * preferred one where it has any: on the other's zero they would bend the curve at the join.
   */
  joinedTo(next: Stretch, preferFirst: boolean): Stretch {
    const firstPrints = this.hasH || this.hasS;
    const nextPrints = next.hasH || next.hasS;
    const keepFirst = preferFirst ? firstPrints || !nextPrints : firstPrints && !nextPrints;
    const knots = (a: Float64Array, b: Float64Array): Float64Array => {
      const out = new Float64Array(this.n + next.n - 1);
      out.set(a.subarray(0, this.n - 1), 0);
      out.set(b, this.n - 1);
      if (preferFirst) out[this.n - 1] = a[this.n - 1];
      return out;
    };
    const observed = (a: Float64Array, b: Float64Array, blank: number): Float64Array => {
      const out = new Float64Array(this.n + next.n - 1).fill(blank);
      if (keepFirst) out.set(a, 0);
      else out.set(b, this.n - 1);
      return out;
    };
    const bytes = (a: Uint8Array, b: Uint8Array): Uint8Array => {
      const out = new Uint8Array(this.n + next.n - 1);
      out.set(a, 0);
      out.set(b.subarray(1), this.n);
      return out;
    };
    // The join is a printed row where it is one of either.
    const kind = bytes(this.kind, next.kind);
    kind[this.n - 1] = Math.min(this.kind[this.n - 1], next.kind[0]);
    const intervals = (a: Float64Array, b: Float64Array): Float64Array => {
      const out = new Float64Array(a.length + b.length);
      out.set(a, 0);
      out.set(b, a.length);
      return out;
    };
    const keeper = keepFirst ? this : next;
    return new Stretch(
      this.n + next.n - 1,
      knots(this.temperatureK, next.temperatureK),
      knots(this.heatCapacity, next.heatCapacity),
      knots(this.uHeatCapacity, next.uHeatCapacity),
      intervals(this.c0, next.c0),
      intervals(this.c1, next.c1),
      intervals(this.c2, next.c2),
      intervals(this.c3, next.c3),
      intervals(this.errorJPerMol, next.errorJPerMol),
      intervals(this.ownVarH, next.ownVarH),
      intervals(this.ownCovHS, next.ownCovHS),
      intervals(this.ownVarS, next.ownVarS),
      observed(this.h, next.h, 0),
      observed(this.hVar, next.hVar, Number.POSITIVE_INFINITY),
      observed(this.s, next.s, 0),
      observed(this.sVar, next.sVar, Number.POSITIVE_INFINITY),
      observed(this.f, next.f, 0),
      observed(this.fVar, next.fVar, Number.POSITIVE_INFINITY),
      bytes(this.jump, next.jump),
      kind,
      keeper.absoluteH,
      keeper.hasH,
      keeper.hasS,
      keeper.series,
    );
  }
}

export function stretchOf(knots: Knots, base: BaseCurve, series: Series): Stretch {
  const n = knots.n;
  const { scatter } = base;
  return new Stretch(
    n,
    knots.temperatureK,
    knots.heatCapacity,
    scatter?.uHeatCapacity ?? knots.uHeatCapacity,
    base.c0,
    base.c1,
    base.c2,
    base.c3,
    base.errorJPerMol,
    scatter?.varH ?? numbers(n - 1),
    scatter?.covHS ?? numbers(n - 1),
    scatter?.varS ?? numbers(n - 1),
    knots.h,
    knots.hVar,
    knots.s,
    knots.sVar,
    knots.f,
    knots.fVar,
    knots.jump,
    new Uint8Array(n),
    knots.absoluteH,
    knots.hasH,
    knots.hasS,
    series,
  );
}

/** The stretch with a knot at T: the interval's cubic is written anew from T, its error shared by width. */
export function splitAt(stretch: Stretch, temperatureK: number): Stretch {
  const t = stretch.temperatureK;
  if (temperatureK <= t[0] || temperatureK >= t[stretch.n - 1]) return stretch;
  let i = 0;
  while (t[i + 1] <= temperatureK) i++;
  if (t[i] === temperatureK) return stretch;
  const x = temperatureK - t[i];
  const share = x / (t[i + 1] - t[i]);
  const { c0, c1, c2, c3 } = stretch;
  const d0 = c0[i] + x * (c1[i] + x * (c2[i] + x * c3[i]));
  const d1 = c1[i] + x * (2 * c2[i] + 3 * x * c3[i]);
  const d2 = c2[i] + 3 * x * c3[i];
  const put = (a: Float64Array, at: number, value: number): Float64Array => {
    const out = numbers(a.length + 1);
    out.set(a.subarray(0, at), 0);
    out[at] = value;
    out.set(a.subarray(at), at + 1);
    return out;
  };
  const bytes = (a: Uint8Array, at: number, value: number): Uint8Array => {
    const out = new Uint8Array(a.length + 1);
    out.set(a.subarray(0, at), 0);
    out[at] = value;
    out.set(a.subarray(at), at + 1);
    return out;
  };
  const error = put(stretch.errorJPerMol, i + 1, stretch.errorJPerMol[i] * (1 - share));
  error[i] *= share;
  // Within an interval the points' errors are as good as common to both parts.
  const shared = (a: Float64Array): Float64Array => {
    const out = put(a, i + 1, a[i] * (1 - share) ** 2);
    out[i] *= share * share;
    return out;
  };
  const u = stretch.uHeatCapacity[i] * (1 - share) + stretch.uHeatCapacity[i + 1] * share;
  return new Stretch(
    stretch.n + 1,
    put(t, i + 1, temperatureK),
    put(stretch.heatCapacity, i + 1, d0),
    put(stretch.uHeatCapacity, i + 1, u),
    put(c0, i + 1, d0),
    put(c1, i + 1, d1),
    put(c2, i + 1, d2),
    put(c3, i + 1, c3[i]),
    error,
    shared(stretch.ownVarH),
    shared(stretch.ownCovHS),
    shared(stretch.ownVarS),
    put(stretch.h, i + 1, 0),
    put(stretch.hVar, i + 1, Number.POSITIVE_INFINITY),
    put(stretch.s, i + 1, 0),
    put(stretch.sVar, i + 1, Number.POSITIVE_INFINITY),
    put(stretch.f, i + 1, 0),
    put(stretch.fVar, i + 1, Number.POSITIVE_INFINITY),
    bytes(stretch.jump, i + 1, 0),
    bytes(stretch.kind, i + 1, 1),
    stretch.absoluteH,
    stretch.hasH,
    stretch.hasS,
    stretch.series,
  );
}
