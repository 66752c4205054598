/** The smallest error that the run on the clean library says it would reveal, cell by cell. */

import type { Seen, SeenOutcome } from './seen.js';
import type { SlipLibrary } from './slip-library.js';
import type { PlantedCell, Slip } from './slip-maker.js';
import type { SourceCell } from './source-cells.js';
import { R_J_PER_MOL_K, readUnit } from './units.js';

/** A slip of fewer times the smallest detectable error is not asked for. */
export const TIMES_DETECTABLE = 1.5;

/** Rules that test a quantity of a table and speak in its own SI unit; of several the sharpest counts. */
const TABLE_RULES: Readonly<Record<string, readonly string[]>> = {
  entropy: ['entropy-follows-heat-capacity', 'functions-close'],
  'gibbs-function': ['functions-close'],
  enthalpy: ['enthalpy-follows-heat-capacity'],
  'enthalpy-increment': ['enthalpy-follows-heat-capacity'],
  'heat-capacity': ['heat-capacity-smooth'],
};
/** In the unit of an entropy: an error in H shows as H/T. */
const TABLE_RULES_TIMES_T: Readonly<Record<string, readonly string[]>> = { 'enthalpy-increment': ['functions-close'] };

/** How the adjustment's own outcomes name a datum: `T cr>l`, `dfH l`, `p over l`. */
const DATUM_NAMES: Readonly<Record<string, string>> = {
  'enthalpy-of-formation': 'dfH',
  entropy: 'S',
  'enthalpy-from-zero': 'H-H(0)',
  'transition-temperature': 'T',
  temperature: 'T',
  'transition-enthalpy': 'dH',
  'transition-entropy': 'dS',
  pressure: 'p',
};
/** Where the adjustment does not say: the rule of the datum's own transition. */
const TRANSITION_RULES: Readonly<Record<string, string>> = {
  'enthalpy-of-formation': 'gibbs-continuous',
  'transition-temperature': 'crossing-agrees',
  'transition-enthalpy': 'transition-entropy-closes',
};
const TROUTON_J_PER_MOL_K = 90;
const BOILING_K = 500;
const ADJUSTMENT = 'adjustment-closes';

export class Detectable {
  readonly #bySubstance = new Map<string, SeenOutcome[]>();
  readonly #boilingK = new Map<string, number>();
  readonly #cells = new Map<string, readonly SourceCell[]>();

  constructor(clean: Seen, library: Pick<SlipLibrary, 'substances'> = { substances: [] }) {
    for (const { id, cells } of library.substances) {
      this.#cells.set(id, cells);
      const boiling = cells.find((cell) => cell.quantity === 'transition-temperature' && cell.place.endsWith('>g'));
      if (boiling !== undefined) this.#boilingK.set(id, boiling.value);
    }
    for (const row of clean.coverage) {
      const own = this.#bySubstance.get(row.substance);
      if (own === undefined) this.#bySubstance.set(row.substance, [row]);
      else own.push(row);
    }
  }

  /** SI; Infinity where nothing tests the cell, 0 where a rule tests it and prints no figure. */
  leastOf(cell: SourceCell): number {
    const rows = this.#rows(cell.substance).filter(({ outcome }) => outcome !== 'untestable');
    if (cell.holds === 'thermal-functions') {
      const own = rows.filter((row) => row.place === cell.place && TABLE_RULES[cell.quantity]?.includes(row.rule));
      const timesT = rows.filter(
        (row) => row.place === cell.place && TABLE_RULES_TIMES_T[cell.quantity]?.includes(row.rule),
      );
      return sharpest([...own.map(printed), ...timesT.map((row) => printed(row) * cell.temperatureK)]);
    }
    const name = DATUM_NAMES[cell.quantity];
    if (cell.holds === 'transitions' && cell.quantity === 'pressure') return this.#leastPressure(cell, rows);
    const adjusted = this.#rows(cell.substance).filter(({ rule, place }) => rule === ADJUSTMENT && place.includes(' '));
    if (adjusted.length > 0) {
      const place = `${name} ${cell.holds === 'vapour-pressures' ? 'over ' : ''}${cell.place}`;
      return sharpest(adjusted.filter((row) => row.place === place && row.outcome !== 'untestable').map(printed));
    }
    const rule = TRANSITION_RULES[cell.quantity] ?? 'gibbs-continuous';
    if (cell.holds === 'vapour-pressures' || cell.quantity === 'enthalpy-from-zero') return Number.POSITIVE_INFINITY;
    const concerned = rows.filter((row) => row.rule === rule && concerns(row.place, cell));
    if (concerned.length === 0) return Number.POSITIVE_INFINITY;
    return TRANSITION_RULES[cell.quantity] === undefined ? 0 : sharpest(concerned.map(printed));
  }

  /** Whether the run says that it would see the slip. */
  isTestable(slip: Slip): boolean {
    if (slip.family === 'many') return this.#isManyTestable(slip);
    return slip.cells.some((cell) => this.#shows(cell, slip));
  }

  /** dp = p (dS / RT) dT along the boiling line, from what shows in the temperature; usual values do for dS and T. */
  #leastPressure(cell: SourceCell, rows: readonly SeenOutcome[]): number {
    const crossing = rows.filter((row) => row.rule === 'crossing-agrees' && base(row.place) === cell.place);
    const pascal = cell.value * (readUnit(cell.unit, Number.NaN)?.factor ?? Number.NaN);
    return (pascal * TROUTON_J_PER_MOL_K * sharpest(crossing.map(printed))) / (R_J_PER_MOL_K * BOILING_K);
  }

  #shows({ cell, changeSi }: PlantedCell, slip: Slip): boolean {
    if (cell === null || changeSi === null) return this.#isTransitionTested(slip.substance, slip.place);
    return Math.abs(changeSi) >= TIMES_DETECTABLE * this.leastOf(cell);
  }

  /**
   * A whole column is held against the columns beside it, against its phase's anchors, or through the transitions. A slip
   * of a scale is small: its largest change of S has to show.
   */
  #isManyTestable(slip: Slip): boolean {
    // A row that is not there speaks of nothing: vapours of salts and metastable crystals have none by right, and a rule
    // that asked for it accused three of nine published sets and three of sixteen held out.
    if (slip.cells.some(({ cell }) => cell === null)) return false;
    const rows = this.#rows(slip.substance).filter(({ outcome }) => outcome !== 'untestable');
    const tied = rows.some(({ rule, place }) => rule === 'gibbs-continuous' && sides(place).includes(slip.place));
    const checked = (rule: string) => rows.some((row) => row.rule === rule && row.place === slip.place);
    const tables = checked('entropy-follows-heat-capacity') || checked('enthalpy-follows-heat-capacity');
    if (slip.kind === 'table in degrees Celsius' && !tables) return this.#celsiusShows(slip, rows);
    if (slip.meant === 'old temperature scale') return slip.cells.some((cell) => this.#scaleShows(cell, rows));
    if (slip.kind.startsWith('vapour pressures')) return slip.cells.some((cell) => this.#shows(cell, slip));
    if (slip.meant === '1 atm for 1 bar') {
      const step = Math.abs(slip.cells[0]!.changeSi!);
      const anchor = rows.find(({ rule, place }) => rule === ADJUSTMENT && place === 'S g');
      const table = anchor !== undefined && step >= TIMES_DETECTABLE * printed(anchor);
      // Where the anchor is at 1 atm too, the gap at the boiling point alone tells.
      const gap = rows.find(({ rule, place }) => rule === 'gibbs-continuous' && base(place).endsWith('>g'));
      const boilingK = this.#boilingK.get(slip.substance) ?? 0;
      const boiling = gap !== undefined && step * boilingK >= TIMES_DETECTABLE * printed(gap);
      return slip.kind.includes('anchor') ? boiling : table || boiling;
    }
    return tables || tied;
  }

  /**
   * Heat capacities alone show it where a temperature falls below 0 K, or through the transitions: the Gibbs energy is off by
   * about half of T dS, dS the integral of [Cp(T + 273.15 K) - Cp(T)]/T from 298.15 K on.
   */
  #celsiusShows(slip: Slip, rows: readonly SeenOutcome[]): boolean {
    if (slip.cells.some(({ printed: now }) => Number(now) < 0)) return true;
    const gaps = rows.filter(({ rule, place }) => rule === 'gibbs-continuous' && sides(place).includes(slip.place));
    const cp = (this.#cells.get(slip.substance) ?? [])
      .filter((cell) => cell.quantity === 'heat-capacity' && cell.place === slip.place && cell.temperatureK > 0)
      .sort((a, b) => a.temperatureK - b.temperatureK);
    const at = (kelvin: number) => cp.findLast((cell) => cell.temperatureK <= kelvin)?.value ?? cp[0]?.value ?? 0;
    let change = 0;
    let highK = 0;
    for (let i = 1; i < cp.length; i++) {
      const [low, high] = [cp[i - 1]!.temperatureK, cp[i]!.temperatureK];
      if (low < 298 || high + 273.15 > cp.at(-1)!.temperatureK) continue;
      change += ((at(low + 273.15) - at(low)) * (high - low)) / low;
      highK = high;
    }
    return Math.abs(change) * 0.5 * highK >= TIMES_DETECTABLE * sharpest(gaps.map(printed));
  }

  #scaleShows({ cell, changeSi }: PlantedCell, rows: readonly SeenOutcome[]): boolean {
    const { row, temperatureK } = cell!;
    const rule = rows.find((one) => one.rule === 'entropy-follows-heat-capacity' && one.place === row.place);
    // dS = Cp dT/T; Cp of about 30 J/(mol K) will do for saying what shows.
    return rule !== undefined && (30 * Math.abs(changeSi!)) / temperatureK >= TIMES_DETECTABLE * printed(rule);
  }

  #isTransitionTested(substance: string, place: string): boolean {
    return this.#rows(substance).some(
      (row) => row.rule === 'gibbs-continuous' && row.outcome !== 'untestable' && base(row.place) === place,
    );
  }

  #rows(substance: string): readonly SeenOutcome[] {
    return this.#bySubstance.get(substance) ?? [];
  }
}

const printed = (row: SeenOutcome): number => row.smallestDetectable ?? 0;
const sharpest = (list: readonly number[]): number => Math.min(Number.POSITIVE_INFINITY, ...list);
/** Without ` at 101325 Pa`. */
const base = (place: string): string => place.split(' at ')[0]!;
const sides = (place: string): readonly string[] => base(place).split('>');

/** Coverage speaks of a phase or of a transition `from>to`; an anchor is tested through its phase's transitions. */
function concerns(place: string, cell: SourceCell): boolean {
  return base(place) === cell.place || (cell.holds === 'anchors' && sides(place).includes(cell.place));
}
