import type { Series } from '../../../schemas/harmonised.js';
import { closing } from './closing.js';
import { described, type WholeColumns } from './column-cause.js';
import type { RowRun } from './column-change.js';
import type { TableContext } from './column-hypothesis.js';
import { residuals } from './residuals.js';
import { type TableRows, tableRows } from './table-rows.js';
import { type Tried, tryAll, tryOne } from './try-columns.js';

const FEWEST_ROWS = 5;
const FEWEST_FAILING = 5;
/** Laws whose ends are looked for. */
const MOST_RUNS = 4;
const RUN_LEFT_SHARE = 0.05;
/** A run may end so many rows from where its conditions begin to fail. */
const AROUND = 3;

interface TriedRun {
  readonly tried: Tried;
  readonly run: RowRun;
}

/** One law for a run of rows, from an end of the table or from a break on: its ends are where it closes best. */
export function runOfRows(series: Series, context: TableContext): WholeColumns[] {
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
