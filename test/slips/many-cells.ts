/** Slips that touch two cells of a row, a whole row, or a whole column. */
import type { Random } from './random.js';
import type { Rewrite } from './rewrites.js';
import * as rewrites from './rewrites.js';
import type { Change, Draft, SlipKind } from './slip-kinds.js';
import type { SlipSubstance } from './slip-library.js';
import { unitOf } from './slip-library.js';
import type { SourceCell, SourceRow } from './source-cells.js';

const ENERGETIC = ['heat-capacity', 'entropy', 'gibbs-function', 'enthalpy-increment', 'enthalpy'];
const FEWEST_ROWS = 6;
const REFERENCE_K = 298.15;

const firstOrder = ({ transitions }: SlipSubstance) => transitions.filter(({ order }) => order === 'first');
const cellIn = (row: SourceRow, quantity: string, { cells }: SlipSubstance) =>
  cells.find((cell) => cell.row === row && cell.quantity === quantity);

const heatAndEntropyExchanged: SlipKind = {
  name: 'ΔH and ΔS exchanged',
  family: 'datum',
  meant: 'ΔH and ΔS exchanged',
  sharp: true,
  draft: (substance, random) => {
    const pairs = firstOrder(substance).flatMap((row) => {
      const [h, s] = ['transition-enthalpy', 'transition-entropy'].map((quantity) => cellIn(row, quantity, substance));
      return h === undefined || s === undefined || h.text === s.text ? [] : [[h, s] as const];
    });
    if (pairs.length === 0) return null;
    const [h, s] = random.pick(pairs);
    return [
      { cell: h, printed: s.text },
      { cell: s, printed: h.text },
    ];
  },
};

const fromAndToExchanged: SlipKind = {
  name: 'from and to exchanged',
  family: 'datum',
  meant: 'from and to exchanged',
  sharp: true,
  draft: (substance, random) => {
    const rows = firstOrder(substance).filter(({ words }) => words['from-phase'] && words['to-phase']);
    if (rows.length === 0) return null;
    const row = random.pick(rows);
    return [
      { row, word: 'from-phase', printed: row.words['to-phase']!.cell.text },
      { row, word: 'to-phase', printed: row.words['from-phase']!.cell.text },
    ];
  },
};

const transitionLeftOut: SlipKind = {
  name: 'transition left out',
  family: 'many',
  meant: 'transition left out',
  sharp: true,
  draft: (substance, random) => {
    const rows = firstOrder(substance).filter(
      (row) => substance.transitions.filter(({ place }) => place === row.place).length === 1,
    );
    return rows.length === 0 ? null : [{ row: random.pick(rows), leftOut: true }];
  },
};

/** The formation enthalpy of one phase counts from another phase, the rest from the elements. */
const formationsFromDifferentScales: SlipKind = {
  name: 'formation enthalpies of two phases from different scales',
  family: 'datum',
  meant: 'different scales',
  sharp: true,
  draft: (substance, random) => {
    const anchors = substance.cells.filter((cell) => cell.quantity === 'enthalpy-of-formation');
    const pairs = anchors.flatMap((cell) =>
      anchors
        .filter((other) => other.file === cell.file && other.value !== 0 && other.value !== cell.value)
        .map((other) => [cell, other] as const),
    );
    if (pairs.length === 0) return null;
    const [cell, other] = random.pick(pairs);
    return [{ cell, printed: rewrites.like(cell, cell.value - other.value) }];
  },
};

/** Columns of one substance's phase in one file, by quantity. */
function columnsOf({ cells }: SlipSubstance, holds = 'thermal-functions'): Map<string, SourceCell[]>[] {
  const tables = new Map<string, Map<string, SourceCell[]>>();
  for (const cell of cells) {
    if (cell.holds !== holds) continue;
    const key = `${cell.source} ${cell.file} ${cell.place}`;
    const table = tables.get(key) ?? new Map<string, SourceCell[]>();
    tables.set(key, table);
    table.set(cell.quantity, [...(table.get(cell.quantity) ?? []), cell]);
  }
  return [...tables.values()].filter((table) => (table.get('temperature')?.length ?? 0) >= FEWEST_ROWS);
}

function rewriteAll(cells: readonly SourceCell[], rewrite: Rewrite, substance: SlipSubstance, random: Random) {
  const changes: Change[] = [];
  for (const cell of cells) {
    const printed =
      cell.value === 0 && cell.quantity !== 'temperature' ? cell.text : rewrite(cell, substance, random, 0);
    if (printed === null) return null;
    if (printed !== cell.text) changes.push({ cell, printed });
  }
  return changes.length < FEWEST_ROWS / 2 ? null : changes;
}

/** @param which picks the columns that are rewritten; null: the table cannot hold the slip */
function ofColumns(
  name: string,
  meant: string,
  rewrite: Rewrite,
  which: (table: Map<string, SourceCell[]>, random: Random, substance: SlipSubstance) => readonly SourceCell[] | null,
  holds = 'thermal-functions',
): SlipKind {
  const draft: Draft = (substance, random) => {
    const tables = columnsOf(substance, holds);
    for (let attempt = 0; attempt < 6 && tables.length > 0; attempt++) {
      const cells = which(random.pick(tables), random, substance);
      const changes = cells === null ? null : rewriteAll(cells, rewrite, substance, random);
      if (changes !== null) return changes;
    }
    return null;
  };
  return { name, family: 'many', meant, sharp: true, draft };
}

const energetic = (table: Map<string, SourceCell[]>) => ENERGETIC.filter((quantity) => table.has(quantity));
/** One column of several, so that the others show it. */
const oneColumn = (table: Map<string, SourceCell[]>, random: Random) =>
  energetic(table).length < 2 ? null : table.get(random.pick(energetic(table)))!;
const oneEnthalpy = (table: Map<string, SourceCell[]>) =>
  table.get('enthalpy-increment') ?? table.get('enthalpy') ?? null;
const allColumns = (table: Map<string, SourceCell[]>) => energetic(table).flatMap((quantity) => table.get(quantity)!);
const pressures = (table: Map<string, SourceCell[]>) => table.get('pressure') ?? null;
const temperatures = (table: Map<string, SourceCell[]>) => table.get('temperature') ?? null;
const gasEntropies = (table: Map<string, SourceCell[]>) => {
  const cells = [...(table.get('entropy') ?? []), ...(table.get('gibbs-function') ?? [])].filter(
    (cell) => cell.temperatureK > 0,
  );
  return cells.length > 0 && cells[0]!.place === 'g' ? cells : null;
};

/** H(T) - H(0) where H(T) - H(Tr) is declared. */
const incrementsFromZero: SlipKind = {
  name: 'increments from 0 K',
  family: 'many',
  meant: 'increments from 0 K',
  sharp: true,
  draft: (substance, random) => {
    const tables = columnsOf(substance).flatMap((table) => {
      const column = table.get('enthalpy-increment') ?? [];
      const shift = column.length === 0 ? 0 : aboveZero(column, table.get('heat-capacity') ?? [], substance);
      return shift > 0 ? [{ column, shift }] : [];
    });
    if (tables.length === 0) return null;
    const { column, shift } = random.pick(tables);
    return column.map((cell) => ({ cell, printed: rewrites.like(cell, cell.value + shift) }));
  },
};

/** H(Tr) - H(0) in the column's unit: from its row at 0 K, an anchor, or 0.6 of Cp(Tr) Tr, as crystals have it. */
function aboveZero(column: readonly SourceCell[], heat: readonly SourceCell[], substance: SlipSubstance): number {
  const [first] = column as [SourceCell];
  const { factor } = unitOf(first, substance);
  const zero = column.find((cell) => cell.temperatureK === 0);
  if (zero !== undefined) return -zero.value;
  const anchor = substance.cells.find(
    (cell) => cell.quantity === 'enthalpy-from-zero' && cell.place === first.place && cell.source === first.source,
  );
  if (anchor !== undefined) return (anchor.value * unitOf(anchor, substance).factor) / factor;
  const near = heat.find((cell) => Math.abs(cell.temperatureK - REFERENCE_K) < 10);
  return near === undefined ? 0 : (0.6 * near.value * unitOf(near, substance).factor * REFERENCE_K) / factor;
}

/** All of a gas: its table and its anchor. */
const allGasAtOneAtmosphere: SlipKind = {
  name: 'every gas entropy at 1 atm, anchor too',
  family: 'many',
  meant: '1 atm for 1 bar',
  sharp: true,
  draft: (substance, random) => {
    const anchors = substance.cells.filter(
      (cell) => cell.holds === 'anchors' && cell.place === 'g' && cell.quantity === 'entropy',
    );
    const tables = columnsOf(substance).flatMap((table) => gasEntropies(table) ?? []);
    return anchors.length === 0
      ? null
      : rewriteAll([...tables, ...anchors], rewrites.atOneAtmosphere, substance, random);
  },
};

export const MANY_CELL_KINDS: readonly SlipKind[] = [
  heatAndEntropyExchanged,
  fromAndToExchanged,
  formationsFromDifferentScales,
  ofColumns('column in calories', 'in calories', rewrites.inThermochemicalCalories, oneColumn),
  ofColumns('table in calories', 'in calories', rewrites.inThermochemicalCalories, allColumns),
  ofColumns('enthalpies with or without kilo', 'kilo dropped or added', rewrites.otherKilo, oneEnthalpy),
  ofColumns('column per gram', 'per gram', rewrites.perOtherAmount, oneColumn),
  ofColumns('column in units of R', 'in units of R', rewrites.inUnitsOfR, (table, random) => {
    const columns = energetic(table).filter((quantity) => !quantity.startsWith('enthalpy'));
    return energetic(table).length < 2 || columns.length === 0 ? null : table.get(random.pick(columns))!;
  }),
  ofColumns(
    'table by the molar mass of another formula',
    'molar mass of another formula',
    rewrites.withMassOfOther(2, 1),
    allColumns,
  ),
  ofColumns('table in degrees Celsius', 'Celsius and kelvin', rewrites.celsiusForKelvin, temperatures),
  ofColumns('table on the scale of 1968', 'old temperature scale', rewrites.onScale68, temperatures),
  ofColumns('gas table at 1 atm', '1 atm for 1 bar', rewrites.atOneAtmosphere, gasEntropies),
  ofColumns('vapour pressures in torr', 'torr for pascal', rewrites.inTorr, pressures, 'vapour-pressures'),
  ofColumns(
    'vapour pressures at degrees Celsius',
    'Celsius and kelvin',
    rewrites.celsiusForKelvin,
    temperatures,
    'vapour-pressures',
  ),
  allGasAtOneAtmosphere,
  incrementsFromZero,
  transitionLeftOut,
];
