import { LEAST_ROWS, localFit, MOST_ROWS } from './local-fit.js';
import type { TableRows } from './table-rows.js';

/** How the Cp of the row beside an end of its stretch stands off from what all other rows give, the end row among them. */
export interface SecondRow {
  readonly difference: number;
  readonly u: number;
}

/** The rows beyond must put the second row this many u off without the end row's help. */
const LEAST_W = 5;
/** Chi square within which two hypotheses are not told apart. */
const TOLD_APART = 9;

/**
 * "This Cp" for the second row of a stretch (or the last but one), against "the end row's Cp" and against a real bend: the
 * rows beyond both give the Cp of either. If the second row is wrong, the end row lies on their curve and the second does
 * not; if the end row is wrong, it is the other way round; a bend that steepens towards the end leaves the end row further
 * off than the second. Null unless the first is the case, where there are fewer than four rows beyond, and where the end is a
 * limit row at 0 K, whose neighbours no polynomial follows.
 */
export function secondRow(rows: TableRows, k: number): SecondRow | null {
  if (!isSecondTested(rows, k)) return null;
  const step = k === rows.from[k] + 1 ? 1 : -1;
  const end = k - step;
  const beyond = Math.min(MOST_ROWS, step === 1 ? rows.to[k] - k : k - rows.from[k]);
  const among = new Int32Array(beyond + 1);
  among[0] = end;
  for (let j = 1; j <= beyond; j++) among[j] = k + step * j;
  const second = localFit(rows, among.subarray(1), k);
  const last = localFit(rows, among.subarray(1), end);
  const w = (rows.cp[k] - second.value) / second.u;
  const wEnd = (rows.cp[end] - last.value) / last.u;
  if (Math.abs(w) < LEAST_W || w * w - wEnd * wEnd < TOLD_APART) return null;
  const share = Math.abs((rows.cp[end] - last.value) / (rows.cp[k] - second.value));
  // On 17 000 stretches of handbook tables real bends gave shares of 0.67 and more.
  if (share >= 0.5 && !(share < 0.75 && Math.abs(wEnd) < 3)) return null;
  const between = localFit(rows, among, k);
  return { difference: rows.cp[k] - between.value, u: between.u };
}

/** Whether row k is beside an end of its stretch and has what the test needs. */
export function isSecondTested(rows: TableRows, k: number): boolean {
  const from = rows.from[k];
  const to = rows.to[k];
  if (to - from < LEAST_ROWS + 1) return false;
  if (k === from + 1) return rows.t[from] !== 0;
  return k === to - 1 && rows.t[to] !== 0;
}
