/**
 * Plants one wrong cell in a copy of a sources folder, as people make them: a figure misread by some units of its last
 * place, an anchor left in kilocalories, a melting point in degrees Celsius. Edits the raw text; shares no code with the
 * pipeline, nor its opinion of what is wrong.
 */
import { join } from 'node:path';
import { replaceCell } from './delimited.js';
import type { Random } from './random.js';
import { listCells, type SourceCell } from './source-cells.js';

export const SLIP_KINDS = [
  'entropy',
  'enthalpy-increment',
  'gibbs-function',
  'heat-capacity',
  'formation-in-kcal',
  'transition-in-celsius',
  'transition-heat-in-kcal',
] as const;
export type SlipKind = (typeof SLIP_KINDS)[number];

export interface Slip {
  readonly kind: SlipKind;
  readonly substance: string;
  readonly source: string;
  readonly file: string;
  /** 1-based, header included. */
  readonly line: number;
  readonly column: string;
  /** What the file says now. */
  readonly printed: string;
  /** What it said. */
  readonly clean: string;
  readonly place: string;
  /** Of the row, for a cell of a table [K]. */
  readonly temperatureK: number | null;
  /** Printed minus clean, in the column's unit. */
  readonly change: number;
  /** |change| over the smallest change that `least` allows. */
  readonly timesLeast: number;
}

export interface SlipWish {
  readonly kind: SlipKind;
  /** Any substance where left out. */
  readonly substance?: string;
  readonly random: Random;
  /** Times the least change; for cells of tables. Default: log-uniform from 1 to 20, at most half of the figure. */
  readonly size?: number;
  /** Least change of a cell in its own unit; Infinity where none is ever seen. Default `materialLimit`. */
  readonly least?: (cell: SourceCell) => number;
}

const CAL = 4.184;
const QUANTITIES: Readonly<Record<SlipKind, readonly string[]>> = {
  entropy: ['entropy'],
  'enthalpy-increment': ['enthalpy-increment', 'enthalpy'],
  'gibbs-function': ['gibbs-function'],
  'heat-capacity': ['heat-capacity'],
  'formation-in-kcal': ['enthalpy-of-formation'],
  'transition-in-celsius': ['transition-temperature'],
  'transition-heat-in-kcal': ['transition-enthalpy'],
};
const TABLE_KINDS: readonly SlipKind[] = ['entropy', 'enthalpy-increment', 'gibbs-function', 'heat-capacity'];
const LARGEST_TIMES_LEAST = 20;
/** … and no more than this share of the figure, unless the least change is larger. */
const LARGEST_SHARE = 0.5;

/**
 * Plants a slip in `sourcesDir`, which must be a copy. Returns null where no cell of that kind can hold one large enough.
 * @param known cells of the folder as it is now, or of the folder that it is a fresh copy of
 */
export function plantSlip(sourcesDir: string, wish: SlipWish, known?: readonly SourceCell[]): Slip | null {
  const { kind, random } = wish;
  const least = wish.least ?? materialLimit;
  const cells = known ?? listCells(sourcesDir);
  const candidates = cells.filter(
    (cell) => (wish.substance === undefined || cell.substance === wish.substance) && canHold(kind, cell, cells),
  );
  const bySubstance = groups(candidates);
  while (bySubstance.size > 0) {
    const substance = random.pick([...bySubstance.keys()]);
    const left = bySubstance.get(substance)!;
    const cell = random.pick(left);
    const needed = least(cell);
    const printed = Number.isFinite(needed) ? spoilt(kind, cell, needed, random, wish.size) : null;
    if (printed === null || Math.abs(Number(printed) - cell.value) < needed) {
      const rest = left.filter((other) => other !== cell);
      if (rest.length === 0) bySubstance.delete(substance);
      else bySubstance.set(substance, rest);
      continue;
    }
    replaceCell(join(sourcesDir, cell.source, cell.file), cell.contents, cell.cell, printed);
    const change = Number(printed) - cell.value;
    const { source, file, line, column, place } = cell;
    return {
      kind,
      ...{ substance, source, file, line, column, printed, clean: cell.cell.text, place },
      temperatureK: Number.isNaN(cell.temperatureK) ? null : cell.temperatureK,
      change,
      timesLeast: Math.abs(change) / needed,
    };
  }
  return null;
}

/**
 * The least change in the cell's own unit that is to be found where nothing else is printed: five units of the last place
 * and what a user would notice (0.1 % and 0.05 J/(mol K) of S and -[G - H]/T, 0.05 kJ/mol of H, 1 % of Cp).
 */
export function materialLimit(cell: SourceCell): number {
  const lastPlaces = 5 * 10 ** -cell.decimals;
  switch (cell.quantity) {
    case 'entropy':
    case 'gibbs-function':
      return Math.max(lastPlaces, 0.05 / unitIn(cell, 'J/(mol.K)'), 0.001 * Math.abs(cell.value));
    case 'enthalpy':
    case 'enthalpy-increment':
      return Math.max(lastPlaces, 50 / unitIn(cell, 'J/mol'));
    case 'heat-capacity':
      return Math.max(lastPlaces, 0.01 * Math.abs(cell.value));
    case 'transition-temperature':
      return 0.5;
    default:
      return 10 * lastPlaces;
  }
}

/** What can hold a slip of a kind: figures that are not zero, off 0 K; Cp inside its stretch; anchors that a transition ties. */
function canHold(kind: SlipKind, cell: SourceCell, cells: readonly SourceCell[]): boolean {
  if (!QUANTITIES[kind].includes(cell.quantity) || cell.value === 0) return false;
  if (kind === 'heat-capacity') return cell.depth >= 1;
  if (TABLE_KINDS.includes(kind)) return cell.temperatureK > 0;
  if (kind === 'formation-in-kcal') {
    return cells.some(
      (other) =>
        other.holds === 'transitions' &&
        other.order === 'first' &&
        other.substance === cell.substance &&
        other.source === cell.source &&
        other.place.split('>').includes(cell.place),
    );
  }
  return cell.order === 'first';
}

function spoilt(kind: SlipKind, cell: SourceCell, needed: number, random: Random, size: number | undefined) {
  switch (kind) {
    case 'formation-in-kcal':
    case 'transition-heat-in-kcal':
      return (cell.value / CAL).toFixed(cell.decimals);
    case 'transition-in-celsius':
      return (cell.value - 273.15).toFixed(cell.decimals);
    default: {
      const lastPlace = 10 ** -cell.decimals;
      const largest = Math.min(LARGEST_TIMES_LEAST, (LARGEST_SHARE * Math.abs(cell.value)) / needed);
      const times = size ?? random.logBetween(1, Math.max(1, largest));
      const places = Math.ceil((needed * times) / lastPlace - 1e-9);
      const change = (random.unit() < 0.5 ? -1 : 1) * places * lastPlace;
      // A heat capacity or an entropy keeps its sign: a negative one would be another kind of slip.
      const up = cell.value > 0 && cell.value + change <= 0;
      return (cell.value + (up ? -change : change)).toFixed(cell.decimals);
    }
  }
}

/** SI units in one unit of the cell's column. */
function unitIn(cell: SourceCell, si: string): number {
  if (cell.unit === si) return 1;
  if (cell.unit === `k${si}`) return 1000;
  throw new Error(`${cell.file}, ${cell.column}: the slip maker does not know the unit ${cell.unit}`);
}

function groups(cells: readonly SourceCell[]): Map<string, SourceCell[]> {
  const gathered = new Map<string, SourceCell[]>();
  for (const cell of cells) gathered.set(cell.substance, [...(gathered.get(cell.substance) ?? []), cell]);
  return gathered;
}
