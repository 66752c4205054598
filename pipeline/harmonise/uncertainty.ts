/** Standard uncertainties (k = 1) apart from rounding: stated on the row, by the descriptor, or by the policy. */
import type { UncertaintyOrigin } from '../../schemas/harmonised.js';
import type { Policy } from '../../schemas/policy.js';
import type { NumberQuantity } from '../../schemas/quantities.js';
import { NO_CELL, type RawSeries } from '../../schemas/raw.js';
import type { Basis, StatedUncertainty, TableMeaning } from '../../schemas/table-meaning.js';
import { constant, numbers } from '../core/numeric/room.js';
import type { UnitBook } from './unit-book.js';

export interface OwnUncertainty {
  /** SI. */
  readonly uOwn: Float64Array;
  readonly uSharedRelative: number;
  readonly origin: UncertaintyOrigin;
}

/** A printed or declared uncertainty as `relative * |value| + absolute`, both k = 1; one of them is 0. */
export interface Part {
  readonly relative: number;
  readonly absolute: number;
}

const NOTHING: Part = { relative: 0, absolute: 0 };

/**
 * Uncertainties of one column of a series. A row's own figure goes before the descriptor's, that before the policy's
 * (for measured and estimated tables only; evaluated and computed ones speak through their digits). What is shared by
 * the series is kept apart, as a share of the values; a shared figure in absolute terms counts as its share of the
 * values' root mean square.
 */
export function seriesUncertainty(
  raw: RawSeries,
  quantity: NumberQuantity,
  column: number,
  values: Float64Array,
  present: Uint8Array,
  factor: number,
  book: UnitBook,
  policy: Policy,
): OwnUncertainty {
  const { table } = raw;
  const declared = column < 0 ? [] : table.columns[column].uncertainty;
  const printed = raw.uncertainties.filter((entry) => entry.of === quantity);
  if (declared.length === 0 && printed.length === 0 && !takesDefault(table.basis)) {
    return { uOwn: constant(values.length, 0), uSharedRelative: 0, origin: 'printed digits' };
  }
  const uOwn = numbers(values.length);
  let sharedVariance = 0;

  const own = declared.filter((entry) => !entry.shared).map((entry) => partOf(entry, factor));
  for (const entry of declared) {
    if (!entry.shared) continue;
    const part = partOf(entry, factor);
    const size = part.absolute === 0 ? 0 : rootMeanSquare(values, present);
    sharedVariance += (part.relative + (size === 0 ? 0 : part.absolute / size)) ** 2;
  }

  const said = declared.length > 0 || printed.some((entry) => table.columns[entry.column].shared);
  const fallback = said || !takesDefault(table.basis) ? own : [policyPart(policy, quantity)];
  let stated = false;
  let filled = 0;
  for (const entry of printed) {
    const meaning = table.columns[entry.column];
    const scale = book.uncertainty(table, entry.column, quantity, column);
    if (scale === null) continue;
    stated = true;
    const perCell = scale.factor / meaning.coverage;
    if (meaning.shared) {
      const share = sharedOf(entry.values, entry.decimals, values, present, perCell, scale.relative);
      sharedVariance += share ** 2;
      continue;
    }
    for (let i = 0; i < values.length; i++) {
      if (entry.decimals[i] === NO_CELL || present[i] === 0) continue;
      const u = entry.values[i] * perCell * (scale.relative ? Math.abs(values[i]) : 1);
      uOwn[i] = filled === 0 ? Math.abs(u) : Math.hypot(uOwn[i], u);
    }
    filled++;
  }
  const statedOwn = printed.filter((entry) => !table.columns[entry.column].shared);
  if (fallback.length > 0) {
    for (let i = 0; i < values.length; i++) {
      if (present[i] === 0) continue;
      if (filled > 0 && statedOwn.some((entry) => entry.decimals[i] !== NO_CELL)) continue;
      let variance = 0;
      for (const part of fallback) variance += (part.relative * values[i]) ** 2 + part.absolute ** 2;
      uOwn[i] = Math.sqrt(variance);
    }
  }
  return { uOwn, uSharedRelative: Math.sqrt(sharedVariance), origin: originOf(stated, declared.length > 0, table) };
}

/** Where an uncertainty comes from when the row, the descriptor or nobody states one. */
export function originOf(stated: boolean, declared: boolean, table: TableMeaning): UncertaintyOrigin {
  if (stated) return 'stated';
  if (declared) return 'source default';
  return takesDefault(table.basis) ? 'policy default' : 'printed digits';
}

export function takesDefault(basis: Basis): boolean {
  return basis === 'measured' || basis === 'estimated';
}

/** A declared uncertainty with its coverage factor taken out; the absolute part to SI. */
export function partOf(stated: StatedUncertainty, factor: number): Part {
  return {
    relative: (stated.relative ?? 0) / stated.coverage,
    absolute: ((stated.absolute ?? 0) * Math.abs(factor)) / stated.coverage,
  };
}

/** What the policy takes where a measured source states nothing. */
export function policyPart(policy: Policy, quantity: NumberQuantity): Part {
  const defaults = policy.defaultUncertainty;
  const relative = (share: number): Part => ({ relative: share, absolute: 0 });
  switch (quantity) {
    case 'heat-capacity':
      return relative(defaults.heatCapacityRelative);
    case 'entropy':
    case 'gibbs-function':
      return relative(defaults.entropyRelative);
    case 'enthalpy-increment':
    case 'enthalpy':
    case 'gibbs-energy':
    case 'enthalpy-from-zero':
      return relative(defaults.enthalpyIncrementRelative);
    case 'enthalpy-of-formation':
    case 'gibbs-energy-of-formation':
      return { relative: 0, absolute: defaults.enthalpyOfFormationJPerMol };
    case 'temperature':
    case 'transition-temperature':
      return relative(defaults.transitionTemperatureRelative);
    case 'transition-enthalpy':
      return relative(defaults.transitionEnthalpyRelative);
    case 'transition-entropy':
      return relative(defaults.transitionEntropyRelative);
    case 'pressure':
      return relative(defaults.pressureRelative);
    default:
      return NOTHING;
  }
}

function rootMeanSquare(values: Float64Array, present: Uint8Array): number {
  let sum = 0;
  let cells = 0;
  for (let i = 0; i < values.length; i++) {
    if (present[i] === 0) continue;
    sum += values[i] * values[i];
    cells++;
  }
  return cells === 0 ? 0 : Math.sqrt(sum / cells);
}

/** Printed shared uncertainties as one share of the values: root mean square over root mean square. */
function sharedOf(
  printed: Float64Array,
  decimals: Int8Array,
  values: Float64Array,
  present: Uint8Array,
  perCell: number,
  relative: boolean,
): number {
  let sumU = 0;
  let sumValue = 0;
  for (let i = 0; i < values.length; i++) {
    if (present[i] === 0 || decimals[i] === NO_CELL) continue;
    sumU += (printed[i] * perCell * (relative ? values[i] : 1)) ** 2;
    sumValue += values[i] ** 2;
  }
  return sumValue === 0 ? 0 : Math.sqrt(sumU / sumValue);
}
