/** A whole table that its own rows cannot tell of: every entropy of a gas at 1 atm, heat capacities in another unit. */
import type { PhaseCurve } from '../../../schemas/curves.js';
import type { Series, SeriesQuantity } from '../../../schemas/harmonised.js';
import { ICE_POINT_K, R_J_PER_MOL_K, STANDARD_ATMOSPHERE_PA, STANDARD_PRESSURE_PA } from '../../core/constants.js';
import { printedLike, printedNumber } from '../../core/numeric/printed-like.js';
import { enthalpyAt, entropyAt, heatCapacityAt } from '../../core/physics/curve.js';
import { isGas } from '../../core/physics/placed-phase.js';
import { t90MinusT48, t90MinusT68 } from '../../core/units/temperature-scale.js';
import type { ConditionDatum, ConditionSystem } from '../system/system.js';
import { addTo } from './exchanged.js';
import { unitRatios } from './unit-ratios.js';
import type { WholeSlip } from './whole-slips.js';

/** 0.1094 J/(mol K). */
const ONE_ATMOSPHERE = R_J_PER_MOL_K * Math.log(STANDARD_ATMOSPHERE_PA / STANDARD_PRESSURE_PA);

type Column = Pick<SeriesQuantity, 'values' | 'present' | 'column' | 'halfUnit' | 'uOwn' | 'origin'>;

export function seriesSlips(system: ConditionSystem): WholeSlip[] {
  const slips: WholeSlip[] = [];
  const used = new Set(system.conditions.flatMap((c) => c.sum.rows.map((row) => row.curve)));
  for (const curve of system.curves) {
    if (!used.has(curve)) continue;
    const series = system.substance.series.find(
      (s) =>
        s.phase === curve.phase && s.table.isobarPa === curve.family.isobarPa && curve.sources[0] === s.table.source,
    );
    if (series === undefined) continue;
    if (isGas(curve.phase) && curve.entropyLevelFrom === 'table' && series.entropy !== null) {
      // The table alone, or with the anchors of its own source.
      const anchors = system.data.filter(
        (d) =>
          d.kind === 'anchor-entropy' && d.phases[0] === curve.phase && d.datum.address.source === series.table.source,
      );
      for (const by of [ONE_ATMOSPHERE, -ONE_ATMOSPHERE]) {
        const cells = filled(series.entropy) + filled(series.gibbsFunction);
        const table = slipOf(
          'atmosphere-for-bar',
          system,
          curve,
          series,
          series.entropy,
          cells,
          (v) => v + by,
          (row) => row.s * by,
        );
        slips.push(table);
        if (anchors.length === 0) continue;
        const change = table.change.slice();
        for (const d of anchors) addTo(change, d.direction, by);
        slips.push({ ...table, change, cells: cells + anchors.length, data: [...table.data, ...anchors] });
      }
    }
    slips.push(...oldScales(system, curve, series));
    if (series.heatCapacity === null) continue;
    const columns = [series.heatCapacity, series.entropy, series.enthalpyIncrement, series.gibbsFunction];
    const cells = columns.reduce((sum, q) => sum + filled(q), 0);
    const alone = series.entropy === null && series.enthalpyIncrement === null && series.enthalpy === null;
    const zeroH = enthalpyAt(curve, curve.referenceK);
    const zeroS = curve.entropyLevelFrom === 'table' ? 0 : entropyAt(curve, curve.entropyReferenceK);
    for (const { code, ratio } of unitRatios(system.substance.substance.molarMassGPerMol, alone)) {
      slips.push(
        slipOf(
          code,
          system,
          curve,
          series,
          series.heatCapacity,
          cells,
          (v) => v * ratio,
          (row) =>
            (ratio - 1) * (row.h * (enthalpyAt(curve, row.atK) - zeroH) + row.s * (entropyAt(curve, row.atK) - zeroS)),
        ),
      );
    }
  }
  return slips;
}

/**
 * A table whose temperatures stand on an old scale though they are not said to: its H and S at T are those of
 * T - (t90 - told), which counts from the reference temperature where their level does.
 */
function oldScales(system: ConditionSystem, curve: PhaseCurve, series: Series): WholeSlip[] {
  const { table, temperatureK: temperatures } = series;
  if (table.temperatureScale === 'IPTS-68' || table.temperatureScale === 'IPTS-48') return [];
  const at = curve.referenceK;
  const slips: WholeSlip[] = [];
  for (const difference of [t90MinusT68, t90MinusT48]) {
    const shift = (t: number): number => difference(t - ICE_POINT_K) ?? 0;
    const first = temperatures.findIndex((t) => shift(t) !== 0);
    if (first < 0) continue;
    const homeH = curve.enthalpyLevelFrom === 'table' ? 0 : heatCapacityAt(curve, at) * shift(at);
    const homeS = curve.entropyLevelFrom === 'table' ? 0 : (heatCapacityAt(curve, at) / at) * shift(at);
    const quantity = {
      values: temperatures,
      present: new Uint8Array(series.rows).fill(1),
      column: series.temperatureColumn,
      halfUnit: new Float64Array(series.rows).fill(series.temperatureHalfUnitK),
      uOwn: new Float64Array(series.rows),
      origin: 'printed digits' as const,
    };
    const moves = (row: { readonly atK: number; readonly h: number; readonly s: number }): number => {
      const cp = heatCapacityAt(curve, row.atK) * shift(row.atK);
      return row.h * (homeH - cp) + row.s * (homeS - cp / row.atK);
    };
    slips.push(
      slipOf('old-temperature-scale', system, curve, series, quantity, series.rows, (t) => t + shift(t), moves),
    );
  }
  return slips;
}

function slipOf(
  code: string,
  system: ConditionSystem,
  curve: PhaseCurve,
  series: Series,
  quantity: Column,
  cells: number,
  meant: (value: number) => number,
  moves: (row: { readonly atK: number; readonly h: number; readonly s: number }) => number,
): WholeSlip {
  const change = Float64Array.from(system.conditions, (c) => {
    let v = 0;
    for (const row of c.sum.rows) if (row.curve === curve) v += moves(row);
    return v;
  });
  const row = firstFilled(quantity);
  const value = quantity.values[row];
  const corrected = meant(value);
  const printed = series.text(row, quantity.column);
  const number = printedNumber(printed);
  const u = Math.hypot(quantity.uOwn[row], quantity.halfUnit[row] / Math.sqrt(3));
  return {
    code,
    cells,
    data: [standIn(series, quantity, row, printed, system.m)],
    corrected,
    uCorrected: u * Math.abs(value === 0 ? 1 : corrected / value),
    correctedPrinted: Number.isFinite(number) && value !== 0 ? printedLike(printed, (corrected * number) / value) : '',
    change,
    open: false,
    weight: 0.02,
  };
}

/** The column's first cell as a suspect. */
function standIn(series: Series, quantity: Column, row: number, printed: string, m: number): ConditionDatum {
  const { source, file, columns } = series.table;
  const rounding = quantity.halfUnit[row] / Math.sqrt(3);
  return {
    key: `column ${quantity.column} of ${series.phase}`,
    kind: 'column',
    datum: {
      value: quantity.values[row],
      u: Math.hypot(quantity.uOwn[row], rounding),
      uRounding: rounding,
      halfUnit: quantity.halfUnit[row],
      origin: quantity.origin,
      address: { source, file, line: series.line[row], column: columns[quantity.column].header },
      printed,
      unit: columns[quantity.column].unit ?? '',
      factor: 1,
      offset: 0,
    },
    u: 0,
    transition: -1,
    phases: [series.phase],
    place: series.phase,
    direction: new Float64Array(m),
    within: false,
  };
}

function filled(quantity: SeriesQuantity | null): number {
  if (quantity === null) return 0;
  let n = 0;
  for (const one of quantity.present) n += one;
  return n;
}

/** The first cell that is not zero. */
function firstFilled(quantity: Column): number {
  for (let i = 0; i < quantity.present.length; i++) {
    if (quantity.present[i] === 1 && quantity.values[i] !== 0) return i;
  }
  return 0;
}
