import type { PhaseCurve } from '../../schemas/curves.js';
import type { Address, Anchor, Datum, HarmonisedCase, Series, SeriesQuantity } from '../../schemas/harmonised.js';
import type { NumberQuantity } from '../../schemas/quantities.js';
import { NO_CELL, type RawCase, type RawCell, type RawColumn } from '../../schemas/raw.js';
import type { TableMeaning } from '../../schemas/table-meaning.js';

/** One raw cell that can be moved, with where its value stands after harmonising. */
export interface RawNumber {
  readonly address: Address;
  readonly printed: string;
  readonly quantity: NumberQuantity;
  /** `cr`, or `cr>l` for a transition. */
  readonly place: string;
  /** Temperature of its row [K]; null for anchors, transitions and vapour pressures. */
  readonly temperatureK: number | null;
  /** Own standard uncertainty as the curve takes it, and the relative one that it shares with its series; SI. */
  readonly u: number;
  readonly uSharedRelative: number;
  /** Names the series that it shares that with. */
  readonly series: string;
  /** A quarter of a unit of its last place, or a ten-millionth of it, in the printed unit. */
  readonly step: number;
  /** Sets the cell to what it was and `by` more. */
  readonly move: (by: number) => void;
  readonly read: (harmonised: HarmonisedCase) => number;
}

type SeriesField = 'heatCapacity' | 'entropy' | 'enthalpyIncrement' | 'gibbsFunction' | 'enthalpy' | 'gibbsEnergy';
const SERIES_FIELDS: readonly SeriesField[] = [
  'heatCapacity',
  'entropy',
  'enthalpyIncrement',
  'gibbsFunction',
  'enthalpy',
  'gibbsEnergy',
];

/**
 * A copy of the raw tables whose cells can be moved, and the list of them: tables' cells but temperatures, anchors,
 * transitions and vapour pressures. A cell that several tables of one file read is one number. Cells that harmonising left out are none.
 */
export function movable(
  raw: RawCase,
  harmonised: HarmonisedCase,
  curves: readonly PhaseCurve[],
): { readonly raw: RawCase; readonly numbers: readonly RawNumber[] } {
  const copy = ownCopy(raw);
  const movers = moversOf(copy);
  const numbers = new Map<string, RawNumber>();
  const add = (number: Omit<RawNumber, 'move' | 'step'>): void => {
    const key = keyOf(number.address);
    const mover = movers.get(key);
    if (mover === undefined || numbers.has(key)) return;
    const move = (by: number): void => {
      for (const one of mover.moves) one(by);
    };
    numbers.set(key, { ...number, step: mover.step, move });
  };
  for (const [index, series] of harmonised.series.entries()) addSeries(index, series, add);
  for (const [index, anchor] of harmonised.anchors.entries()) addAnchor(index, anchor, curves, add);
  for (const [index, { from, to, temperature, enthalpy, entropy, pressure }] of harmonised.transitions.entries()) {
    const place = `${from}>${to}`;
    addDatum(temperature, 'transition-temperature', place, null, (h) => h.transitions[index]!.temperature, add);
    addDatum(enthalpy, 'transition-enthalpy', place, null, (h) => h.transitions[index]!.enthalpy, add);
    addDatum(entropy, 'transition-entropy', place, null, (h) => h.transitions[index]!.entropy, add);
    addDatum(pressure, 'pressure', place, null, (h) => h.transitions[index]!.pressure, add);
  }
  for (const [index, { phase, temperature, pressure }] of harmonised.vapourPressures.entries()) {
    addDatum(temperature, 'temperature', phase, null, (h) => h.vapourPressures[index]!.temperature, add);
    addDatum(pressure, 'pressure', phase, null, (h) => h.vapourPressures[index]!.pressure, add);
  }
  return { raw: copy, numbers: [...numbers.values()] };
}

type Add = (number: Omit<RawNumber, 'move' | 'step'>) => void;

function addSeries(index: number, series: Series, add: Add): void {
  const { table, phase } = series;
  for (const field of SERIES_FIELDS) {
    const quantity = series[field];
    const column = quantity === null ? undefined : table.columns[quantity.column];
    if (quantity === null || column === undefined) continue;
    for (let row = 0; row < series.rows; row++) {
      if (quantity.present[row] !== 1) continue;
      add({
        address: { source: table.source, file: table.file, line: series.line[row]!, column: column.header },
        printed: series.text(row, quantity.column),
        quantity: quantity.is,
        place: phase,
        temperatureK: series.temperatureK[row]!,
        u: uOfCell(quantity, row),
        uSharedRelative: quantity.uSharedRelative,
        series: `${index} ${field}`,
        read: (h) => h.series[index]![field]!.values[row]!,
      });
    }
  }
}

function uOfCell({ uOwn, halfUnit }: SeriesQuantity, row: number): number {
  return Math.hypot(uOwn[row]!, halfUnit[row]! / Math.sqrt(3));
}

function addAnchor(index: number, anchor: Anchor, curves: readonly PhaseCurve[], add: Add): void {
  const fields = [
    ['enthalpyOfFormation', 'enthalpy-of-formation', levelU(curves, 'enthalpy', index)],
    ['entropy', 'entropy', levelU(curves, 'entropy', index)],
    ['gibbsEnergyOfFormation', 'gibbs-energy-of-formation', null],
    ['enthalpyFromZero', 'enthalpy-from-zero', null],
    ['heatCapacity', 'heat-capacity', null],
  ] as const;
  for (const [field, quantity, u] of fields) {
    addDatum(anchor[field], quantity, anchor.phase, u, (h) => h.anchors[index]![field], add);
  }
}

/** An anchor's error as the curve that rests on it takes it: within one compiled source the rounding alone. */
function levelU(curves: readonly PhaseCurve[], what: 'enthalpy' | 'entropy', anchor: number): number | null {
  for (const curve of curves) {
    if ((what === 'enthalpy' ? curve.enthalpyAnchor : curve.entropyAnchor) !== anchor) continue;
    const level = what === 'enthalpy' ? curve.enthalpyLevel : curve.entropyLevel;
    const own = level?.errors.find(({ key }) => key.includes(' of anchor '));
    if (own !== undefined) return Math.abs(own.u);
  }
  return null;
}

function addDatum(
  datum: Datum | null,
  quantity: NumberQuantity,
  place: string,
  u: number | null,
  of: (harmonised: HarmonisedCase) => Datum | null,
  add: Add,
): void {
  if (datum === null || datum.address.line < 1) return;
  const { address, printed } = datum;
  add({
    address,
    printed,
    quantity,
    place,
    temperatureK: null,
    u: u ?? datum.u,
    uSharedRelative: 0,
    series: '',
    read: (h) => of(h)!.value,
  });
}

interface Mover {
  readonly step: number;
  readonly moves: ((by: number) => void)[];
}

/** What moves each cell of the copied tables, by its address. */
function moversOf(raw: RawCase): Map<string, Mover> {
  const movers = new Map<string, Mover>();
  const add = (table: TableMeaning, line: number, column: number, step: number, move: (by: number) => void): void => {
    const header = table.columns[column]?.header;
    if (header === undefined) return;
    const key = keyOf({ source: table.source, file: table.file, line, column: header });
    const known = movers.get(key);
    if (known === undefined) movers.set(key, { step, moves: [move] });
    else known.moves.push(move);
  };
  for (const { table, columns, line, rows } of raw.series) {
    for (const { is, column, values, decimals, usualDecimals } of columns) {
      if (is === 'temperature') continue;
      for (let row = 0; row < rows; row++) {
        if (decimals[row] === NO_CELL) continue;
        const value = values[row]!;
        add(table, line[row]!, column, stepOf(value, usualDecimals), (by) => {
          values[row] = value + by;
        });
      }
    }
  }
  for (const { table, line, cells } of [...raw.anchors, ...raw.transitions, ...raw.vapourPressures]) {
    for (const cell of Object.values(cells) as { -readonly [Key in keyof RawCell]: RawCell[Key] }[]) {
      const { value } = cell;
      add(table, line, cell.column, stepOf(value, cell.decimals), (by) => {
        cell.value = value + by;
      });
    }
  }
  return movers;
}

/** Shorter than what would tell two equal rows apart, longer than what a double loses. */
function stepOf(value: number, decimals: number): number {
  return Math.max(0.25 * 10 ** -decimals, 1e-7 * Math.abs(value));
}

function ownCopy(raw: RawCase): RawCase {
  const column = (one: RawColumn): RawColumn => ({ ...one, values: one.values.slice() });
  const row = <Row extends RawCase['anchors'][number]>(one: Row): Row => ({
    ...one,
    cells: Object.fromEntries(Object.entries(one.cells).map(([is, cell]) => [is, { ...cell }])),
  });
  return {
    ...raw,
    series: raw.series.map((series) => ({ ...series, columns: series.columns.map(column) })),
    anchors: raw.anchors.map(row),
    transitions: raw.transitions.map(row),
    vapourPressures: raw.vapourPressures.map(row),
  };
}

function keyOf({ source, file, line, column }: Address): string {
  return `${source}\n${file}\n${line}\n${column}`;
}
