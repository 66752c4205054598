/** Every kind of slip that is planted, and where it may befall a library. */
import type { Random } from './random.js';
import type { Rewrite } from './rewrites.js';
import * as rewrites from './rewrites.js';
import type { SlipSubstance } from './slip-library.js';
import type { SourceCell, SourceRow } from './source-cells.js';

/**
 * Where a slip sits, which decides what is asked of its detection: a cell of S, H or -[G - H]/T in a table, a heat capacity
 * inside its stretch, an anchor or a figure of a transition, or many cells at once.
 */
export type Family = 'table' | 'heat-capacity' | 'datum' | 'many';

export type Change =
  | { readonly cell: SourceCell; readonly printed: string }
  /** A word of the row exchanged. */
  | { readonly row: SourceRow; readonly word: 'from-phase' | 'to-phase'; readonly printed: string }
  /** The row is left out; an empty line stays, so that no other line moves. */
  | { readonly row: SourceRow; readonly leftOut: true };

export interface SlipKind {
  readonly name: string;
  readonly family: Family;
  /** What an explanation should say, in a word of our own; null where the size is drawn and nothing explains it. */
  readonly meant: string | null;
  /** Of unit, sign or exchange: the cell is to be named first even where the data leave several. */
  readonly sharp: boolean;
  readonly draft: Draft;
}

/** @param least the smallest error in a cell that is said to show [SI]; Infinity where none would */
export type Draft = (
  substance: SlipSubstance,
  random: Random,
  least: (cell: SourceCell) => number,
) => readonly Change[] | null;

const TABLE = ['entropy', 'enthalpy-increment', 'enthalpy', 'gibbs-function'];
const DATUM: Readonly<Record<string, readonly string[]>> = {
  anchors: ['enthalpy-of-formation', 'entropy', 'enthalpy-from-zero'],
  transitions: ['transition-temperature', 'transition-enthalpy', 'transition-entropy', 'pressure'],
  'vapour-pressures': ['temperature', 'pressure'],
};
const LEAST_UNITS = 5;
const LEAST_SHARE_OF_HEAT_CAPACITY = 0.01;

/** Cells of a family: not zero, off 0 K, heat capacities inside their stretch, transitions of first order. */
export function cellsOf(family: Family, { cells }: SlipSubstance): readonly SourceCell[] {
  return cells.filter((cell) => {
    if (cell.value === 0) return false;
    if (family === 'datum') return isDatum(cell);
    if (cell.holds !== 'thermal-functions' || !(cell.temperatureK > 0)) return false;
    return family === 'table' ? TABLE.includes(cell.quantity) : cell.quantity === 'heat-capacity' && cell.depth >= 1;
  });
}

/** The pressure of a transition between condensed phases moves it too little to be known for wrong. */
function isDatum(cell: SourceCell): boolean {
  if (!(DATUM[cell.holds] ?? []).includes(cell.quantity) || cell.order !== 'first') return false;
  return cell.holds !== 'transitions' || cell.quantity !== 'pressure' || cell.place.endsWith('>g');
}

/** Below this a change is no slip that anybody would have to find. */
function isWorthFinding(family: Family, cell: SourceCell, printed: string): boolean {
  const change = Math.abs(Number(printed) - cell.value);
  if (!Number.isFinite(change) || change < (LEAST_UNITS - 1e-6) * 10 ** -cell.decimals) return false;
  return family !== 'heat-capacity' || change >= LEAST_SHARE_OF_HEAT_CAPACITY * Math.abs(cell.value);
}

interface Naming {
  readonly meant?: string | null;
  readonly sharp?: boolean;
  readonly quantities?: readonly string[];
}

const TRIES = 40;

function oneCell(family: Family, name: string, rewrite: Rewrite, naming: Naming = {}): SlipKind {
  const draft: Draft = (substance, random, least) => {
    const { quantities } = naming;
    const left = cellsOf(family, substance).filter((cell) => quantities?.includes(cell.quantity) ?? true);
    for (let attempt = 0; attempt < TRIES && left.length > 0; attempt++) {
      // The quantity first, lest the many rows of one drown the few of another.
      const quantity = random.pick([...new Set(left.map((one) => one.quantity))]);
      const cell = random.pick(left.filter((one) => one.quantity === quantity));
      const printed = rewrite(cell, substance, random, least(cell));
      if (printed !== null && isWorthFinding(family, cell, printed)) return [{ cell, printed }];
      left.splice(left.indexOf(cell), 1);
    }
    return null;
  };
  return { name, family, meant: naming.meant === undefined ? name : naming.meant, sharp: naming.sharp ?? false, draft };
}

const sharp = true;
const UNIT_SLIPS: readonly (readonly [string, Rewrite])[] = [
  ['in calories', rewrites.inThermochemicalCalories],
  ['in calories of the International Table', rewrites.inTableCalories],
  ['kilo dropped or added', rewrites.otherKilo],
  ['per gram', rewrites.perOtherAmount],
  ['in units of R', rewrites.inUnitsOfR],
];
const TYPING_SLIPS: readonly (readonly [string, Rewrite])[] = [
  ['decimal point moved', rewrites.pointMoved],
  ['two digits exchanged', rewrites.digitsExchanged],
  ['one digit wrong', rewrites.oneDigitWrong],
];

const everywhere = (['table', 'heat-capacity', 'datum'] as const).flatMap((family) => [
  ...UNIT_SLIPS.map(([name, rewrite]) => oneCell(family, name, rewrite, { sharp })),
  ...TYPING_SLIPS.map(([name, rewrite]) => oneCell(family, name, rewrite)),
]);

const off = { meant: null } as const;
const inTables = [
  oneCell('table', 'S off', rewrites.off, { ...off, quantities: ['entropy'] }),
  oneCell('table', 'H off', rewrites.off, {
    ...off,
    quantities: ['enthalpy', 'enthalpy-increment'],
  }),
  oneCell('table', '-[G-H]/T off', rewrites.off, { ...off, quantities: ['gibbs-function'] }),
  oneCell('heat-capacity', 'Cp off', rewrites.off, off),
  oneCell('table', 'copied from the row above', rewrites.asInRowAbove),
  oneCell('heat-capacity', 'copied from the row above', rewrites.asInRowAbove),
  oneCell('table', 'sign lost', rewrites.withoutSign, { sharp }),
  oneCell('table', '1 atm for 1 bar', rewrites.atOneAtmosphere, { sharp }),
];

const TEMPERATURE = ['transition-temperature', 'temperature'];
const ENERGIES = [
  'enthalpy-of-formation',
  'enthalpy-from-zero',
  'entropy',
  'transition-enthalpy',
  'transition-entropy',
];
const ofData = [
  oneCell('datum', 'T off', rewrites.off, { ...off, quantities: TEMPERATURE }),
  oneCell('datum', 'H or S off', rewrites.off, { ...off, quantities: ENERGIES }),
  oneCell('datum', 'p off', rewrites.off, { ...off, quantities: ['pressure'] }),
  oneCell('datum', 'Celsius and kelvin', rewrites.celsiusForKelvin, { sharp }),
  oneCell('datum', 'Fahrenheit', rewrites.inFahrenheit, { sharp }),
  oneCell('datum', 'scale of 1968', rewrites.onScale68, { meant: 'old temperature scale', sharp }),
  oneCell('datum', 'scale of 1948', rewrites.onScale48, { meant: 'old temperature scale', sharp }),
  oneCell('datum', '1 atm for 1 bar', rewrites.atOneAtmosphere, { sharp }),
  oneCell('datum', 'sign lost', rewrites.withoutSign, { sharp }),
  oneCell('datum', 'torr for pascal', rewrites.inTorr, { sharp }),
  oneCell('datum', 'log10 for ln', rewrites.naturalReadAsDecimal, { sharp }),
  oneCell('datum', 'molar mass of another formula', rewrites.withMassOfSomeOther, { sharp }),
];

export const ONE_CELL_KINDS: readonly SlipKind[] = [...everywhere, ...inTables, ...ofData];
