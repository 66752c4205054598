import type { Anchor } from '../../../schemas/harmonised.js';
import {
  R_J_PER_MOL_K,
  REFERENCE_TEMPERATURE_K,
  STANDARD_ATMOSPHERE_PA,
  STANDARD_PRESSURE_PA,
} from '../../core/constants.js';
import { enthalpyAtReference } from './closing.js';
import { type ColumnChange, shiftedBy, type TableColumn } from './column-change.js';
import type { ColumnHypothesis } from './column-hypothesis.js';
import { UNEXPLAINED_WEIGHT } from './column-laws.js';
import { add, noPairs } from './column-pairs.js';
import type { Residuals } from './residuals.js';
import { type Ratio, robustRatio } from './robust-ratio.js';
import { cellU, type TableRows } from './table-rows.js';

/** Seen where it is so many of its standard uncertainties. */
const NEAR = 8;
/** Two columns that go wrong together. */
const TOGETHER = 0.4;
const FROM_ZERO_WEIGHT = 0.03;
/** S(1 bar) - S(1 atm) [J/(mol K)]. */
const ATMOSPHERE_STEP = R_J_PER_MOL_K * Math.log(STANDARD_ATMOSPHERE_PA / STANDARD_PRESSURE_PA);

/** H, S or -[G - H]/T off by a constant; -[G - H]/T by one over T. */
export function columnShifts(
  rows: TableRows,
  res: Residuals,
  within: (i: number) => boolean,
  anchors: readonly Anchor[],
): ColumnHypothesis[] {
  const { n, h, s, f, t } = rows;
  const overT = noPairs();
  const plain = noPairs();
  for (let i = 0; i < n; i++) {
    if (res.hasClosure[i] !== 1 || !within(i) || s === null || h === null || f === null) continue;
    const r = rows.row[i];
    const u = Math.hypot(cellU(s, r), cellU(f, r), cellU(h, r) / t[i]);
    add(overT, true, 1 / t[i], 0, res.closure[i], u);
    add(plain, true, 1, 0, res.closure[i], u);
  }
  const slope = robustRatio(overT);
  const step = robustRatio(plain);
  const zero = enthalpyAtReference(rows);
  const seen = ({ value, u }: Ratio): boolean => Math.abs(value) > NEAR * u;
  return [
    ...(slope !== null && seen(slope) ? enthalpyShifts(rows, slope, anchors) : []),
    ...(step !== null && seen(step) ? entropyShifts(rows, step) : []),
    ...(zero !== null && within(zero.at) && seen({ value: zero.enthalpy, u: zero.u })
      ? [bothShifted(rows, res, { value: zero.enthalpy, u: zero.u }, anchors)]
      : []),
  ];
}

/** S - F - H/T = value/T: H lies too low by it, or -[G - H]/T; a row at Tr tells which. */
function enthalpyShifts(rows: TableRows, { value, u }: Ratio, anchors: readonly Anchor[]): ColumnHypothesis[] {
  const inH = zeroCode(rows, -value, 0, anchors);
  const inF = zeroCode(rows, value, -value, anchors);
  return [
    shifted([shiftedBy('enthalpy', value)], inH, weightOf(inH), u),
    shifted([gibbsOverT(value)], inF, 0.5 * weightOf(inF), u),
  ];
}

/** S - F - H/T = value: S lies too high by it, or -[G - H]/T too low. What is printed at 1 atm lacks R ln 1.01325. */
function entropyShifts({ series }: TableRows, { value, u }: Ratio): ColumnHypothesis[] {
  const gas = series.phase === 'g' || series.phase.startsWith('g-');
  const near = gas && Math.abs(Math.abs(value) - ATMOSPHERE_STEP) <= Math.max(NEAR * u, 1e-3);
  const exact = near ? Math.sign(value) * ATMOSPHERE_STEP : value;
  const code = near ? 'atmosphere-for-bar' : null;
  const one = (column: TableColumn, added: number): ColumnHypothesis =>
    shifted([shiftedBy(column, added)], code, near ? (added > 0 ? 0.035 : 0.015) : UNEXPLAINED_WEIGHT, near ? 0 : u);
  return [one('entropy', -exact), one('gibbsFunction', exact)];
}

/** H at Tr is `value`: H counts from elsewhere, and -[G - H]/T with it where there is one. */
function bothShifted(
  rows: TableRows,
  res: Residuals,
  { value, u }: Ratio,
  anchors: readonly Anchor[],
): ColumnHypothesis {
  const code = zeroCode(rows, value, 0, anchors);
  const inH = shiftedBy('enthalpy', -value);
  return res.hasClosure.includes(1)
    ? shifted([inH, gibbsOverT(value)], code, TOGETHER * weightOf(code), u)
    : shifted([inH], code, weightOf(code), u);
}

function gibbsOverT(shiftOverT: number): ColumnChange {
  return { column: 'gibbsFunction', factor: 1, shift: 0, shiftOverT };
}

const weightOf = (code: string | null): number => (code === null ? UNEXPLAINED_WEIGHT : FROM_ZERO_WEIGHT);

function shifted(
  changes: readonly ColumnChange[],
  explanation: string | null,
  weight: number,
  uShift: number,
): ColumnHypothesis {
  return { changes, explanation, prior: Math.log(weight), uFactor: 0, uShift, loose: 0 };
}

/** H(Tr) - H(0) is some such share of Cp(Tr) Tr, from stiff crystals to gases. */
const ZERO_SHARE = [0.15, 1.1] as const;

/**
 * Whether what is off is H(Tr) - H(0) [J/mol]: as an anchor or the row at 0 K has it, else where it could be.
 * @param atZero what H prints at 0 K then [J/mol]
 */
function zeroCode(rows: TableRows, off: number, atZero: number, anchors: readonly Anchor[]): string | null {
  const code = 'counted-from-zero-kelvin';
  const { series, h, t, cp, n } = rows;
  const own = anchors.filter(({ phase, enthalpyFromZero }) => phase === series.phase && enthalpyFromZero !== null);
  const anchor = own.find(({ table }) => table.source === series.table.source) ?? own[0];
  const stated = anchor?.enthalpyFromZero ?? null;
  if (stated !== null)
    return Math.abs(Math.abs(off) - stated.value) <= 0.005 * stated.value + 6 * stated.u ? code : null;
  if (h === null || off <= 0) return null;
  const first = rows.row[0];
  if (t[0] === 0 && h.present[first] === 1)
    return Math.abs(h.values[first] - atZero) <= 4 * cellU(h, first) + 0.005 * Math.abs(atZero) ? code : null;
  const way = (i: number): number => Math.abs(t[i] - REFERENCE_TEMPERATURE_K);
  let nearest = 0;
  for (let i = 1; i < n; i++) if (way(i) < way(nearest)) nearest = i;
  const share = off / (cp[nearest] * REFERENCE_TEMPERATURE_K);
  return share > ZERO_SHARE[0] && share < ZERO_SHARE[1] ? code : null;
}
