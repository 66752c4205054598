/** A series while it is being brought to SI: arrays that belong to this stage and may be written to. */
import type { Series, SeriesQuantity, UncertaintyOrigin } from '../../schemas/harmonised.js';
import type { NumberQuantity } from '../../schemas/quantities.js';
import type { RawSeries } from '../../schemas/raw.js';

export interface DraftQuantity {
  readonly is: NumberQuantity;
  readonly column: number;
  values: Float64Array;
  /** False while `values` is still the raw array. */
  owned: boolean;
  /** May be shared with other series: replaced, never written to. */
  present: Uint8Array;
  /** May be shared with other series: replaced, never written to. */
  halfUnit: Float64Array;
  /** May be shared with other series: replaced, never written to. */
  uOwn: Float64Array;
  readonly uSharedRelative: number;
  readonly origin: UncertaintyOrigin;
}

export interface Draft {
  readonly raw: RawSeries;
  readonly rank: number;
  readonly temperatureK: Float64Array;
  readonly scaleDoubtK: number;
  readonly temperatureHalfUnitK: number;
  readonly temperatureColumn: number;
  readonly quantities: Partial<Record<NumberQuantity, DraftQuantity>>;
}

/** The values, as an array that may be written to. */
export function writable(quantity: DraftQuantity): Float64Array {
  if (!quantity.owned) {
    quantity.values = quantity.values.slice();
    quantity.owned = true;
  }
  return quantity.values;
}

export function finished(draft: Draft): Series {
  const { raw, quantities } = draft;
  const of = (is: NumberQuantity): SeriesQuantity | null => {
    const quantity = quantities[is];
    if (quantity === undefined) return null;
    const { column, values, present, halfUnit, uOwn, uSharedRelative, origin } = quantity;
    return { is, column, values, present, halfUnit, uOwn, uSharedRelative, origin };
  };
  return {
    table: raw.table,
    phase: raw.phase,
    series: raw.series,
    rank: draft.rank,
    incrementsFrom: raw.incrementsFrom,
    rows: raw.rows,
    line: raw.line,
    temperatureK: draft.temperatureK,
    scaleDoubtK: draft.scaleDoubtK,
    temperatureHalfUnitK: draft.temperatureHalfUnitK,
    temperatureColumn: draft.temperatureColumn,
    heatCapacity: of('heat-capacity'),
    entropy: of('entropy'),
    enthalpyIncrement: of('enthalpy-increment'),
    gibbsFunction: of('gibbs-function'),
    enthalpy: of('enthalpy'),
    gibbsEnergy: of('gibbs-energy'),
    notes: raw.notes,
    corrections: correctionsIn(raw),
    text: raw.text,
  };
}

function correctionsIn(raw: RawSeries): number {
  let count = 0;
  for (const { corrected } of raw.columns) {
    if (corrected !== null) for (const cell of corrected) count += cell;
  }
  return count;
}
