import type { Anchor, SeriesQuantity } from '../../../schemas/harmonised.js';
import type { Substance } from '../../../schemas/substances.js';
import {
  R_J_PER_MOL_K,
  REFERENCE_TEMPERATURE_K,
  STANDARD_ATMOSPHERE_PA,
  STANDARD_PRESSURE_PA,
} from '../../core/constants.js';
import { enthalpyAtReference } from './closing.js';
import {
  type ColumnChange,
  type RowRun,
  scaledBy,
  shiftedBy,
  statesUApart,
  type TableColumn,
} from './column-change.js';
import { type RatioLaw, ratioLaws, temperatureLaws, UNEXPLAINED_WEIGHT } from './column-laws.js';
import type { Residuals } from './residuals.js';
import { type Ratio, type RatioPairs, robustRatio } from './robust-ratio.js';
import { cellU, type TableRows } from './table-rows.js';

/** What else is known of the substance whose table is looked at. */
export interface TableContext {
  readonly substance: Substance;
  readonly anchors: readonly Anchor[];
}

/** One law for whole columns of one table, not yet tried. */
export interface ColumnHypothesis {
  readonly changes: readonly ColumnChange[];
  readonly explanation: string | null;
  /** Natural logarithm of how usual it is. */
  readonly prior: number;
  /** Standard uncertainty of its factor, relative, and of its shift; 0 where the law fixes them. */
  readonly uFactor: number;
  readonly uShift: number;
  /** Relative: an unexplained factor this near a usual slip's is no other one. Few digits of Cp are wrong alike along a table. */
  readonly loose: number;
  /** What this table alone cannot tell from it: the other columns by the inverse factor, another column by the inverse shift. */
  readonly equal: readonly ColumnHypothesis[];
}

/** How usual it is that several columns go wrong together, by how many. */
const TOGETHER = [1, 0.4, 0.2, 0.1];
/** A law is tried where it lies within so many standard uncertainties of the factor seen, or within this share of it. */
const NEAR = 8;
const NEAR_SHARE = 2e-3;
/** Two ways to the same factor. */
const SAME_FACTOR = 1e-7;
/** S(1 bar) - S(1 atm) [J/(mol K)]. */
const ATMOSPHERE_STEP = R_J_PER_MOL_K * Math.log(STANDARD_ATMOSPHERE_PA / STANDARD_PRESSURE_PA);

/**
 * All that is worth trying on the rows of `run`, or on all.
 * @param uToo false where uncertainties stated apart are in the right unit, though their column is not: they then say nothing
 *   of its scatter
 */
export function columnHypotheses(
  given: TableRows,
  res: Residuals,
  run: RowRun,
  within: (i: number) => boolean,
  context: TableContext,
  uToo: boolean,
): ColumnHypothesis[] {
  const rows = uToo ? given : { ...given, s: bare(given, given.s), h: bare(given, given.h), f: bare(given, given.f) };
  const out: ColumnHypothesis[] = [];
  const columns = scalable(rows, res);
  for (const set of splits(columns)) {
    const others = columns.filter((column) => !set.includes(column));
    const factors = new Set<number>();
    const uOf = new Map<number, number>();
    for (const pairs of pairsOf(rows, res, new Set(set), within)) {
      const ratio = robustRatio(pairs);
      if (ratio === null) continue;
      const inverse = { value: 1 / ratio.value, u: ratio.u / ratio.value ** 2 };
      for (const law of lawsNear(rows, set, ratio, context.substance)) factors.add(law.factor);
      for (const law of lawsNear(rows, others, inverse, context.substance)) factors.add(1 / law.factor);
      if (Math.abs(ratio.value - 1) <= NEAR * ratio.u) continue;
      factors.add(ratio.value);
      uOf.set(ratio.value, Math.abs(ratio.u / ratio.value));
    }
    for (const factor of factors) {
      const uFactor = uOf.get(factor) ?? 0;
      const one = scaled(rows, set, factor, uFactor, context.substance);
      const other = scaled(rows, others, 1 / factor, uFactor, context.substance);
      out.push({ ...one, equal: [other] }, { ...other, equal: [one] });
    }
  }
  out.push(...shifts(rows, res, within, context.anchors));
  if (run === null) {
    for (const { code, change, weight } of temperatureLaws(rows.series)) {
      out.push({
        changes: [change],
        explanation: code,
        prior: Math.log(weight),
        uFactor: 0,
        uShift: 0,
        loose: 0,
        equal: [],
      });
    }
  }
  return out;
}

/** With its rounding alone where its uncertainties are stated apart. */
function bare({ series }: TableRows, q: SeriesQuantity | null): SeriesQuantity | null {
  return q !== null && statesUApart(series, q) ? { ...q, uOwn: q.uOwn.map(() => 0) } : q;
}

/** The set multiplied by `factor`, with the usual slip that has this factor, if there is one. */
function scaled(
  rows: TableRows,
  set: readonly TableColumn[],
  factor: number,
  uFactor: number,
  substance: Substance,
): ColumnHypothesis {
  const laws = ratioLaws(rows.series, set[0], substance).filter(
    (law) => Math.abs(law.factor / factor - 1) < SAME_FACTOR,
  );
  const law = laws.sort((a, b) => b.weight - a.weight)[0] ?? { code: null, weight: UNEXPLAINED_WEIGHT };
  return {
    changes: set.map((column) => scaledBy(column, factor)),
    explanation: law.code,
    prior: Math.log(law.weight * TOGETHER[set.length - 1]),
    uFactor: law.code === null ? uFactor : 0,
    uShift: 0,
    loose: NEAR * uFactor + roundingOf(rows),
    equal: [],
  };
}

/** Half a unit of the last place of Cp over Cp, in the middle of the table. */
function roundingOf({ series, cp, row, n }: TableRows): number {
  const middle = n >> 1;
  return series.heatCapacity === null ? 0 : series.heatCapacity.halfUnit[row[middle]] / Math.abs(cp[middle]);
}

/** The usual slips of a set whose factor lies near the one seen. */
function lawsNear(rows: TableRows, set: readonly TableColumn[], { value, u }: Ratio, substance: Substance): RatioLaw[] {
  const near = Math.max(NEAR * u, Math.max(NEAR_SHARE, roundingOf(rows)) * Math.abs(value));
  return ratioLaws(rows.series, set[0], substance).filter(({ factor }) => Math.abs(factor - value) <= near);
}

/** The columns that a common factor can be seen in; -[G - H]/T only where a row's three functions are held together. */
function scalable(rows: TableRows, res: Residuals): TableColumn[] {
  const columns: TableColumn[] = [];
  if (rows.s !== null) columns.push('entropy');
  if (rows.h !== null) columns.push('enthalpy');
  if (rows.f !== null && res.hasClosure.includes(1)) columns.push('gibbsFunction');
  columns.push('heatCapacity');
  return columns;
}

/** Each way to part the columns in two, told by its smaller half: its inverse acts on the other one alike. */
function splits(columns: readonly TableColumn[]): TableColumn[][] {
  const out: TableColumn[][] = [];
  const all = 2 ** columns.length - 1;
  for (let bits = 1; bits < all; bits++) {
    const set = columns.filter((_, i) => (bits >> i) % 2 === 1);
    const size = 2 * set.length - columns.length;
    if (size < 0 || (size === 0 && set.includes(columns[0]))) out.push(set);
  }
  return out;
}

/**
 * The conditions that hold a column of the set against one outside it, factor * x = y: those of dH, of dS, and of the three
 * functions of a row, each by itself, since another column that is wrong too spoils only some of them.
 */
function pairsOf(
  rows: TableRows,
  res: Residuals,
  set: ReadonlySet<TableColumn>,
  within: (i: number) => boolean,
): RatioPairs[] {
  const heats = noPairs();
  const entropies = noPairs();
  const functions = noPairs();
  const { n, h, s, f, t } = rows;
  const hasCp = set.has('heatCapacity');
  const hasH = set.has('enthalpy');
  const hasS = set.has('entropy');
  const hasF = set.has('gibbsFunction');
  for (let i = 0; i < n; i++) {
    if (!within(i)) continue;
    const r = rows.row[i];
    if (res.hasClosure[i] === 1 && s !== null && h !== null && f !== null) {
      // S - F - H/T = 0, parted into what the factor acts on and the rest.
      let x = 0;
      let y = 0;
      let vx = 0;
      let vy = 0;
      for (const [inSet, value, u] of [
        [hasS, s.values[r], cellU(s, r)],
        [hasF, -f.values[r], cellU(f, r)],
        [hasH, -h.values[r] / t[i], cellU(h, r) / t[i]],
      ] as const) {
        if (inSet) {
          x += value;
          vx += u * u;
        } else {
          y -= value;
          vy += u * u;
        }
      }
      if (vx > 0 && vy > 0) add(functions, true, x, Math.sqrt(vx), y, Math.sqrt(vy));
    }
    if (i === n - 1 || res.usable[i] !== 1 || !within(i + 1)) continue;
    const next = rows.row[i + 1];
    const e = Math.sqrt(res.e[i] * res.e[i] + res.own[i]);
    if (hasH !== hasCp && h !== null && h.present[r] === 1 && h.present[next] === 1) {
      add(heats, hasH, h.values[next] - h.values[r], Math.hypot(cellU(h, r), cellU(h, next)), res.q[i], e);
    }
    if (hasS !== hasCp && s !== null && s.present[r] === 1 && s.present[next] === 1) {
      const u = e * Math.hypot(res.c[i], res.open[i]);
      add(entropies, hasS, s.values[next] - s.values[r], Math.hypot(cellU(s, r), cellU(s, next)), res.p[i], u);
    }
  }
  return [heats, entropies, functions].filter(({ x }) => x.length > 0);
}

function noPairs(): RatioPairs {
  return { x: [], y: [], ux: [], uy: [] };
}

/** The factor acts on `a` where that is in the set, else on `b`. */
function add(to: RatioPairs, inSet: boolean, a: number, ua: number, b: number, ub: number): void {
  to.x.push(inSet ? a : b);
  to.ux.push(inSet ? ua : ub);
  to.y.push(inSet ? b : a);
  to.uy.push(inSet ? ub : ua);
}

/** H, S or -[G - H]/T off by a constant; -[G - H]/T by one over T. */
function shifts(
  rows: TableRows,
  res: Residuals,
  within: (i: number) => boolean,
  anchors: readonly Anchor[],
): ColumnHypothesis[] {
  const out: ColumnHypothesis[] = [];
  const { n, h, s, f, t, series } = rows;
  const overT = noPairs();
  const plain = noPairs();
  for (let i = 0; i < n; i++) {
    if (res.hasClosure[i] !== 1 || !within(i) || s === null || h === null || f === null) continue;
    const r = rows.row[i];
    const u = Math.hypot(cellU(s, r), cellU(f, r), cellU(h, r) / t[i]);
    add(overT, true, 1 / t[i], 0, res.closure[i], u);
    add(plain, true, 1, 0, res.closure[i], u);
  }
  const alone = (change: ColumnChange, explanation: string | null, weight: number, u: number): ColumnHypothesis => ({
    changes: [change],
    explanation,
    prior: Math.log(weight),
    uFactor: 0,
    uShift: u,
    loose: 0,
    equal: [],
  });
  const zero = enthalpyAtReference(rows);
  const slope = robustRatio(overT);
  if (slope !== null && Math.abs(slope.value) > NEAR * slope.u) {
    const { value, u } = slope;
    // S - F - H/T = value/T: H lies too low by it, or -[G - H]/T.
    const code = zeroCode(rows, -value, anchors);
    const inH = alone(shiftedBy('enthalpy', value), code, code === null ? UNEXPLAINED_WEIGHT : 0.03, u);
    const change = { column: 'gibbsFunction', factor: 1, shift: 0, shiftOverT: value } as const;
    const fCode = zeroCode(rows, value, anchors);
    const inF = alone(change, fCode, (fCode === null ? UNEXPLAINED_WEIGHT : 0.03) * 0.5, u);
    // A row at Tr tells them apart.
    const equal = zero === null;
    out.push({ ...inH, equal: equal ? [inF] : [] }, { ...inF, equal: equal ? [inH] : [] });
  }
  const step = robustRatio(plain);
  if (step !== null && Math.abs(step.value) > NEAR * step.u) {
    const gas = series.phase === 'g' || series.phase.startsWith('g-');
    const { value, u } = step;
    const near = Math.abs(Math.abs(value) - ATMOSPHERE_STEP) <= Math.max(NEAR * u, 1e-3);
    const exact = near ? Math.sign(value) * ATMOSPHERE_STEP : value;
    // What is printed at 1 atm lacks the step; the reverse is rarer.
    const weightOf = (added: number): number =>
      near && gas ? (added > 0 ? 0.035 : 0.015) : near ? 2 * UNEXPLAINED_WEIGHT : UNEXPLAINED_WEIGHT;
    const code = near && gas ? 'atmosphere-for-bar' : null;
    const inS = alone(shiftedBy('entropy', -exact), code, weightOf(-exact), near ? 0 : u);
    const inF = alone(shiftedBy('gibbsFunction', exact), code, weightOf(exact), near ? 0 : u);
    out.push({ ...inS, equal: [inF] }, { ...inF, equal: [inS] });
  }
  if (zero !== null && within(zero.at) && Math.abs(zero.enthalpy) > NEAR * zero.u) {
    const { enthalpy, u } = zero;
    const code = zeroCode(rows, enthalpy, anchors);
    const weight = code === null ? UNEXPLAINED_WEIGHT : 0.03;
    const inH = shiftedBy('enthalpy', -enthalpy);
    if (!res.hasClosure.includes(1)) out.push(alone(inH, code, weight, u));
    else {
      const inF = { column: 'gibbsFunction', factor: 1, shift: 0, shiftOverT: enthalpy } as const;
      out.push({ ...alone(inH, code, weight * TOGETHER[1], u), changes: [inH, inF] });
    }
  }
  return out;
}

/** H(Tr) - H(0) is some such share of Cp(Tr) Tr, from stiff crystals to gases. */
const ZERO_SHARE = [0.15, 1.1] as const;

/**
 * Whether H - H(Tr) is off by H(Tr) - H(0) [J/mol]: as an anchor or the row at 0 K has it, else where it could be.
 */
function zeroCode(rows: TableRows, off: number, anchors: readonly Anchor[]): string | null {
  const code = 'counted-from-zero-kelvin';
  const own = anchors.filter(({ phase, enthalpyFromZero }) => phase === rows.series.phase && enthalpyFromZero !== null);
  const anchor = own.find(({ table }) => table.source === rows.series.table.source) ?? own[0];
  const stated = anchor?.enthalpyFromZero ?? null;
  if (stated !== null)
    return Math.abs(Math.abs(off) - stated.value) <= 0.005 * stated.value + 6 * stated.u ? code : null;
  if (rows.h === null || off <= 0) return null;
  if (rows.t[0] === 0) return Math.abs(rows.h.values[rows.row[0]]) <= 4 * cellU(rows.h, rows.row[0]) ? code : null;
  let nearest = 0;
  for (let i = 1; i < rows.n; i++) {
    const way = (k: number): number => Math.abs(rows.t[k] - REFERENCE_TEMPERATURE_K);
    if (way(i) < way(nearest)) nearest = i;
  }
  const share = off / (rows.cp[nearest] * REFERENCE_TEMPERATURE_K);
  return share > ZERO_SHARE[0] && share < ZERO_SHARE[1] ? code : null;
}
