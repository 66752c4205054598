import type { Series, SeriesQuantity } from '../../../schemas/harmonised.js';
import { REFERENCE_TEMPERATURE_K } from '../../core/constants.js';
import { type Closing, closing, enthalpyAtReference } from './closing.js';
import { type ColumnChange, changed, quantityIn, type RowRun, statesUApart } from './column-change.js';
import { type ColumnHypothesis, columnHypotheses, type TableContext } from './column-hypotheses.js';
import { withOwnDigits } from './own-digits.js';
import { residuals } from './residuals.js';
import { cellU, type TableRows, tableRows } from './table-rows.js';

/** One cause that puts one or more whole columns of a table wrong, by one law. */
export interface WholeColumns {
  readonly changes: readonly ColumnChange[];
  readonly run: RowRun;
  /** Uncertainties stated apart from the column were in its unit too. */
  readonly uToo: boolean;
  readonly explanation: string | null;
  readonly uFactor: number;
  readonly uShift: number;
  /** Root of what the sum of squared residuals falls by. */
  readonly w: number;
  /** Other columns by other laws that the table cannot tell from these, best first. */
  readonly rivals: readonly ColumnHypothesis[];
}

const COLUMNS = ['heatCapacity', 'entropy', 'enthalpy', 'gibbsFunction'] as const;
/** Fewer rows tell no law. */
const FEWEST_ROWS = 5;
const FEWEST_FAILING = 5;
/** Of the conditions that failed, so many may still fail: other slips, real steps. */
const LEFT_SHARE = 0.15;
/** A first law of several must put right at least this share of what fails. */
const FIRST_SHARE = 0.25;
const MOST_LAWS = 3;
/** Laws that leave so much more failing than the best one are not weighed against it. */
const SLACK = 0.02;
/** In standard uncertainties. */
const DROWNED = 5;
/** Hypotheses whose chi squared lies within this of the best cannot be told apart. */
const ALIKE = 9;

interface Tried {
  readonly hypothesis: ColumnHypothesis;
  readonly closing: Closing;
  readonly score: number;
}

/**
 * Whether the rows where something does not close are many enough to look for a whole column.
 * @param hot rows around which something does not close
 */
export function worthTrying(rows: TableRows, hot: number): boolean {
  if (rows.n < FEWEST_ROWS) return false;
  return hot >= Math.min(Math.max(FEWEST_FAILING, 0.3 * rows.n), 9) || countsFromElsewhere(rows);
}

/** H - H(Tr) is not 0 at Tr, and not just there: its neighbours agree with it. */
export function countsFromElsewhere(rows: TableRows): boolean {
  const zero = enthalpyAtReference(rows);
  return zero !== null && Math.abs(zero.enthalpy) > Math.max(6 * zero.u, 1);
}

/**
 * The laws that make a table close where many single cells would be needed: one, or up to three that each put right a
 * good part. Empty where none does; then single cells are looked for.
 */
export function wholeColumns(printed: Series, context: TableContext): WholeColumns[] {
  const series = withOwnDigits(printed);
  const apart = COLUMNS.some((column) => {
    const q = quantityIn(series, column);
    return q !== null && statesUApart(series, q);
  });
  for (const uToo of apart ? [true, false] : [true]) {
    const whole = searched(series, context, uToo);
    if (whole.length > 0) return whole;
  }
  return runOfRows(series, context);
}

function searched(series: Series, context: TableContext, uToo: boolean): WholeColumns[] {
  const found: WholeColumns[] = [];
  let current = series;
  let rows = tableRows(current);
  if (rows === null) return [];
  let now = closing(rows, residuals(rows, true));
  const first = now;
  const allowed = Math.floor(LEFT_SHARE * first.failing);
  while (found.length < MOST_LAWS) {
    const tried = withoutNeedless(tryAll(current, rows, null, now, context, uToo), now);
    const best = tried[0];
    if (best === undefined) return [];
    const closes = best.closing.failing <= allowed;
    // Laws that only help one another are believed where each is a usual slip.
    if ((!closes || found.length > 0) && best.hypothesis.explanation === null) return [];
    if (!closes && now.failing - best.closing.failing < Math.max(FEWEST_FAILING, FIRST_SHARE * now.failing)) return [];
    found.push(described(best, closes && found.length === 0 ? tried : [], null, now, uToo));
    if (closes) return found;
    current = changed(current, best.hypothesis.changes, null, uToo);
    const next = tableRows(current);
    if (next === null) return [];
    rows = next;
    now = best.closing;
  }
  return [];
}

/** Each hypothesis that makes fewer conditions fail, with what it leaves. */
function tryAll(
  series: Series,
  rows: TableRows,
  run: RowRun,
  now: Closing,
  context: TableContext,
  uToo: boolean,
): Tried[] {
  const inRun = run === null ? null : new Set(run.rows);
  const within = (i: number): boolean => inRun === null || inRun.has(rows.row[i]);
  return columnHypotheses(rows, residuals(rows, true), run, within, context, uToo).flatMap(
    (hypothesis) => tryOne(series, rows, hypothesis, run, now, context, uToo) ?? [],
  );
}

function tryOne(
  series: Series,
  rows: TableRows,
  hypothesis: ColumnHypothesis,
  run: RowRun,
  now: Closing,
  context: TableContext,
  uToo: boolean,
): Tried | null {
  const after = changed(series, hypothesis.changes, run, uToo);
  const next = tableRows(after);
  if (next === null || next.n < rows.n) return null;
  if (!uToo && hypothesis.changes.some(({ column }) => saysNothing(quantityIn(after, column)))) return null;
  const left = closing(next, residuals(next, true));
  // A law that leaves less to be tested would close by that alone.
  if (left.tested < 0.8 * now.tested || left.failing >= now.failing) return null;
  return { hypothesis, closing: left, score: 2 * (hypothesis.prior + standing(next, context)) - left.capped };
}

/** Half of the figures or more drown in their uncertainty: they would close with anything. */
function saysNothing(q: SeriesQuantity | null): boolean {
  if (q === null) return false;
  let cells = 0;
  let drowned = 0;
  for (let row = 0; row < q.values.length; row++) {
    if (q.present[row] === 0 || q.values[row] === 0) continue;
    cells++;
    if (Math.abs(q.values[row]) < DROWNED * q.uOwn[row]) drowned++;
  }
  return 2 * drowned >= cells;
}

/** Those that close about as well as any, an unexplained factor only where no usual slip lies near it. */
function withoutNeedless(tried: readonly Tried[], now: Closing): Tried[] {
  const least = Math.min(...tried.map(({ closing: { failing } }) => failing));
  const slack = Math.max(1, SLACK * now.failing);
  const close = tried.filter(({ closing: { failing } }) => failing <= least + slack);
  const usual = close.filter(({ hypothesis: { explanation } }) => explanation !== null);
  return close
    .filter(
      ({ hypothesis }) => hypothesis.explanation !== null || !usual.some((one) => isNear(hypothesis, one.hypothesis)),
    )
    .sort((a, b) => b.score - a.score);
}

/** The same columns by nearly the same factors. */
function isNear(one: ColumnHypothesis, other: ColumnHypothesis): boolean {
  return (
    columnsOf(one) === columnsOf(other) &&
    one.changes.every(({ factor, shift, shiftOverT }, i) => {
      const beside = other.changes[i];
      const plain = shift === 0 && shiftOverT === 0 && beside.shift === 0 && beside.shiftOverT === 0;
      return plain && Math.abs(factor / beside.factor - 1) <= one.loose;
    })
  );
}

function described(best: Tried, tried: readonly Tried[], run: RowRun, before: Closing, uToo: boolean): WholeColumns {
  const { changes, explanation, uFactor, uShift } = best.hypothesis;
  const own = columnsOf(best.hypothesis);
  const seen = new Set([own]);
  const rivals: ColumnHypothesis[] = [];
  for (const other of tried) {
    if (best.score - other.score >= ALIKE || seen.has(columnsOf(other.hypothesis))) continue;
    seen.add(columnsOf(other.hypothesis));
    rivals.push(other.hypothesis);
  }
  return {
    changes,
    run,
    uToo,
    explanation,
    uFactor,
    uShift,
    w: Math.sqrt(Math.max(0, before.squares - best.closing.squares)),
    rivals,
  };
}

const columnsOf = ({ changes }: ColumnHypothesis): string => changes.map(({ column }) => column).join(' ');

/**
 * How well the table as changed fits what stands beside it, as a logarithm: the anchors of its phase, a gas's least heat
 * capacity (5/2 R), and about 3 R an atom elsewhere. It only counts between hypotheses that this table cannot tell apart.
 */
function standing(rows: TableRows, { substance, anchors }: TableContext): number {
  const { series, s, h, t, cp, n } = rows;
  let sum = 0;
  const held = (difference: number, u: number): void => {
    sum -= 0.5 * Math.min(12, (difference / u) ** 2);
  };
  for (const anchor of anchors) {
    if (anchor.phase !== series.phase || Math.abs(anchor.referenceTemperatureK - REFERENCE_TEMPERATURE_K) > 0.02)
      continue;
    for (let i = 0; i < n; i++) {
      const r = rows.row[i];
      if (
        anchor.entropy !== null &&
        s !== null &&
        s.present[r] === 1 &&
        Math.abs(t[i] - REFERENCE_TEMPERATURE_K) < 0.02
      ) {
        const size = 1e-3 * Math.abs(anchor.entropy.value);
        held(s.values[r] - anchor.entropy.value, Math.hypot(anchor.entropy.u, cellU(s, r), 0.02 * size));
      }
      if (
        anchor.enthalpyFromZero !== null &&
        h !== null &&
        t[i] === 0 &&
        h.present[r] === 1 &&
        series.incrementsFrom === null
      ) {
        const size = 1e-2 * Math.abs(anchor.enthalpyFromZero.value);
        held(h.values[r] + anchor.enthalpyFromZero.value, Math.hypot(anchor.enthalpyFromZero.u, cellU(h, r), size));
      }
    }
  }
  const gas = series.phase === 'g' || series.phase.startsWith('g-');
  const last = cp[n - 1];
  const atoms = substance.atomsPerFormula;
  if (gas && last < 20.7) sum -= 6;
  if (atoms !== null && atoms > 0 && t[n - 1] > 250) {
    const each = last / atoms;
    if (each < (gas ? 5 : 8) || each > 60) sum -= 6;
  }
  return sum;
}

interface TriedRun {
  readonly tried: Tried;
  readonly run: RowRun;
}

/** Laws whose ends are looked for. */
const MOST_RUNS = 4;
const RUN_LEFT_SHARE = 0.05;
/** A run may end so many rows from where its conditions begin to fail. */
const AROUND = 3;

/** One law for a run of rows, from an end of the table or from a break on: its ends are where it closes best. */
function runOfRows(series: Series, context: TableContext): WholeColumns[] {
  const rows = tableRows(series) as TableRows;
  const now = closing(rows, residuals(rows, true));
  const last = rows.n - 1;
  const low = now.bad.indexOf(1);
  const high = now.bad.lastIndexOf(1);
  if (low < 0 || high - low < FEWEST_ROWS - AROUND || now.failing < FEWEST_FAILING) return [];
  const runFrom = (a: number, b: number) => ({ rows: Array.from(rows.row.subarray(a, b + 1)) });
  // A run's first condition is that between it and the row before.
  const from = low === 0 ? 0 : low + 1;
  const to = high >= last - 1 ? last : high;
  const guesses = tryAll(series, rows, runFrom(from, to), now, context, true)
    .sort((a, b) => a.closing.failing - b.closing.failing || b.score - a.score)
    .slice(0, MOST_RUNS);
  let best: TriedRun | null = null;
  for (const { hypothesis } of guesses) {
    let own: TriedRun | null = null;
    for (let a = Math.max(0, from - AROUND); a <= Math.min(from + AROUND, last); a++) {
      for (let b = Math.max(0, to - AROUND); b <= Math.min(to + AROUND, last); b++) {
        const reaches = a === rows.from[a] || b === rows.to[b];
        if (b - a + 1 < FEWEST_ROWS || (a === 0 && b === last) || !reaches) continue;
        const run = runFrom(a, b);
        const tried = tryOne(series, rows, hypothesis, run, now, context, true);
        if (tried !== null && (own === null || endsBetter(tried, own.tried))) own = { tried, run };
      }
    }
    if (own !== null && (best === null || isBetter(own.tried, best.tried))) best = own;
  }
  if (best === null || best.tried.closing.failing > RUN_LEFT_SHARE * now.failing) return [];
  return [described(best.tried, [], best.run, now, true)];
}

function isBetter(one: Tried, other: Tried): boolean {
  const fewer = other.closing.failing - one.closing.failing;
  return fewer > 0 || (fewer === 0 && one.score > other.score);
}

/** A wrong Cp at an end of the run hides in the interpolation error that it makes. */
function endsBetter(one: Tried, other: Tried): boolean {
  const hasCp = one.hypothesis.changes.some(({ column }) => column === 'heatCapacity');
  return hasCp ? one.closing.roughness < other.closing.roughness : isBetter(one, other);
}
