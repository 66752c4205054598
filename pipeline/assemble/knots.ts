import type { NamedCell } from '../../schemas/checked.js';
import type { Series, SeriesQuantity } from '../../schemas/harmonised.js';
import { integers, numbers } from '../core/numeric/room.js';

/**
 * The rows of one series as knots in rising temperature: Cp, and the printed H, S and -[G - H]/T as observations with
 * their variances (Infinity where nothing is printed). `row` points back into the series.
 */
export interface Knots {
  readonly n: number;
  readonly temperatureK: Float64Array;
  readonly heatCapacity: Float64Array;
  /** Own standard uncertainty of Cp, rounding included. */
  readonly uHeatCapacity: Float64Array;
  readonly h: Float64Array;
  readonly hVar: Float64Array;
  readonly s: Float64Array;
  readonly sVar: Float64Array;
  readonly f: Float64Array;
  readonly fVar: Float64Array;
  readonly row: Int32Array;
  /** 1 where knot i stands at the temperature of knot i - 1: the spline is split there. */
  readonly twin: Uint8Array;
  /** 1 where the twin's H or S differ as well: a jump inside the phase. */
  readonly jump: Uint8Array;
  /** H counts from the declared zero, not from H(Tr). */
  readonly absoluteH: boolean;
  readonly hasH: boolean;
  readonly hasS: boolean;
}

/** `named` holds this series' named cells only; they are left out, a row without Cp or temperature too. */
export function knotsOf(series: Series, named: readonly NamedCell[]): Knots | null {
  const cp = series.heatCapacity;
  if (cp === null) return null;
  const order = rising(series);
  const absoluteH = series.enthalpyIncrement === null && (series.enthalpy !== null || series.gibbsEnergy !== null);
  const H = absoluteH ? series.enthalpy : series.enthalpyIncrement;
  const S = series.entropy;
  const F = absoluteH ? series.gibbsEnergy : series.gibbsFunction;
  const isNamed = (row: number, is: string): boolean => {
    for (let i = 0; i < named.length; i++) if (named[i].row === row && named[i].quantity === is) return true;
    return false;
  };

  const size = order.length;
  const knots = {
    temperatureK: numbers(size),
    heatCapacity: numbers(size),
    uHeatCapacity: numbers(size),
    h: numbers(size),
    hVar: numbers(size).fill(Number.POSITIVE_INFINITY),
    s: numbers(size),
    sVar: numbers(size).fill(Number.POSITIVE_INFINITY),
    f: numbers(size),
    fVar: numbers(size).fill(Number.POSITIVE_INFINITY),
    row: integers(size),
    twin: new Uint8Array(size),
    jump: new Uint8Array(size),
  };
  const measured = series.table.basis === 'measured';
  let n = 0;
  let hasH = false;
  let hasS = false;
  for (const row of order) {
    if (cp.present[row] === 0) continue;
    if (named.length > 0 && (isNamed(row, cp.is) || isNamed(row, 'temperature'))) continue;
    const t = series.temperatureK[row];
    const u = uncertainty(cp, row);
    if (n > 0 && t === knots.temperatureK[n - 1]) {
      const previous = n - 1;
      if (measured) {
        // A run that returned to this temperature: the weighted mean of the two.
        const w1 = weight(knots.uHeatCapacity[previous]);
        const w2 = weight(u);
        knots.heatCapacity[previous] = (knots.heatCapacity[previous] * w1 + cp.values[row] * w2) / (w1 + w2);
        knots.uHeatCapacity[previous] = u === 0 ? 0 : 1 / Math.sqrt(w1 + w2);
        continue;
      }
      // Of three rows at one temperature the last is the upper side; the one between repeats the lower, with a note.
      if (n > 1 && knots.temperatureK[n - 2] === t) {
        n--;
        knots.hVar[n] = Number.POSITIVE_INFINITY;
        knots.sVar[n] = Number.POSITIVE_INFINITY;
        knots.fVar[n] = Number.POSITIVE_INFINITY;
      }
      const apart = differs(H, row, knots.row[n - 1]) || differs(S, row, knots.row[n - 1]);
      knots.twin[n] = 1;
      knots.jump[n] = apart ? 1 : 0;
    }
    knots.temperatureK[n] = t;
    knots.heatCapacity[n] = cp.values[row];
    knots.uHeatCapacity[n] = u;
    knots.row[n] = row;
    if (H !== null && H.present[row] === 1 && !(named.length > 0 && isNamed(row, H.is))) {
      knots.h[n] = H.values[row];
      knots.hVar[n] = uncertainty(H, row) ** 2;
      hasH = true;
    }
    if (S !== null && S.present[row] === 1 && !(named.length > 0 && isNamed(row, S.is))) {
      knots.s[n] = S.values[row];
      knots.sVar[n] = uncertainty(S, row) ** 2;
      hasS = true;
    }
    if (F !== null && F.present[row] === 1 && t > 0 && !(named.length > 0 && isNamed(row, F.is))) {
      knots.f[n] = absoluteH ? -F.values[row] / t : F.values[row];
      knots.fVar[n] = (absoluteH ? uncertainty(F, row) / t : uncertainty(F, row)) ** 2;
    }
    n++;
  }
  if (n < 2) return null;
  if (!hasS && (!absoluteH || named.length > 0))
    hasS = entropyByGibbs(knots, n, absoluteH ? Number.NaN : ownReferenceK(series));
  // A gas has no limit row: its Cp and S at 0 K are conventions of the table.
  const from = series.phase.startsWith('g') && knots.temperatureK[0] === 0 ? 1 : 0;
  if (n - from < 2) return null;
  const cut = <A extends Float64Array | Int32Array | Uint8Array>(a: A): A => a.subarray(from, n) as A;
  return {
    n: n - from,
    temperatureK: cut(knots.temperatureK),
    heatCapacity: cut(knots.heatCapacity),
    uHeatCapacity: cut(knots.uHeatCapacity),
    h: cut(knots.h),
    hVar: cut(knots.hVar),
    s: cut(knots.s),
    sVar: cut(knots.sVar),
    f: cut(knots.f),
    fVar: cut(knots.fVar),
    row: cut(knots.row),
    twin: cut(knots.twin),
    jump: cut(knots.jump),
    absoluteH,
    hasH,
    hasS,
  };
}

const ROOT_3 = Math.sqrt(3);

function uncertainty(q: SeriesQuantity, row: number): number {
  const rounding = q.halfUnit[row] / ROOT_3;
  const own = q.uOwn[row];
  return own === 0 ? rounding : Math.sqrt(own * own + rounding * rounding);
}

function weight(u: number): number {
  return u > 0 ? 1 / (u * u) : 1;
}

function differs(q: SeriesQuantity | null, a: number, b: number): boolean {
  if (q === null || q.present[a] === 0 || q.present[b] === 0) return false;
  return Math.abs(q.values[a] - q.values[b]) > 1.01 * (q.halfUnit[a] + q.halfUnit[b]);
}

/** Row indices in rising temperature, file order kept among equals; the common case is already sorted. */
function rising(series: Series): ArrayLike<number> & Iterable<number> {
  const t = series.temperatureK;
  const order = integers(series.rows);
  let sorted = true;
  for (let i = 0; i < series.rows; i++) {
    order[i] = i;
    if (i > 0 && !(t[i] >= t[i - 1])) sorted = false;
  }
  if (sorted) return order;
  return Int32Array.from(Array.from(order).sort((a, b) => t[a] - t[b] || a - b));
}

/** Where H - H(Tr) is zero by definition; NaN where the increments count from another phase. */
function ownReferenceK({ incrementsFrom, phase, table }: Series): number {
  return incrementsFrom === null || incrementsFrom === phase ? table.referenceTemperatureK : Number.NaN;
}

/**
 * Where no S is printed, or its whole column is left out, S = -[G - H]/T + H/T stands in its place, and -[G - H]/T is spent
 * on it. What the two share through H is left: it is the rounding of H over T. Without any S, -[G - H]/T says nothing.
 */
function entropyByGibbs(
  {
    temperatureK: t,
    h,
    hVar,
    s,
    sVar,
    f,
    fVar,
  }: Pick<Knots, 'temperatureK' | 'h' | 'hVar' | 's' | 'sVar' | 'f' | 'fVar'>,
  n: number,
  zeroK: number,
): boolean {
  let any = false;
  for (let i = 0; i < n; i++) {
    const isZero = t[i] === zeroK;
    if (fVar[i] === Number.POSITIVE_INFINITY || (hVar[i] === Number.POSITIVE_INFINITY && !isZero)) continue;
    s[i] = isZero ? f[i] : f[i] + h[i] / t[i];
    sVar[i] = isZero ? fVar[i] : fVar[i] + hVar[i] / (t[i] * t[i]);
    fVar[i] = Number.POSITIVE_INFINITY;
    any = true;
  }
  if (!any) fVar.fill(Number.POSITIVE_INFINITY);
  return any;
}
