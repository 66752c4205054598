/** A sources folder as the slip maker sees it: its cells and rows by substance. */

import { listCells, type SourceCell, type SourceRow } from './source-cells.js';
import { molarMasses, readUnit, type Unit } from './units.js';

export interface SlipLibrary {
  readonly dir: string;
  readonly substances: readonly SlipSubstance[];
}

export interface SlipSubstance {
  readonly id: string;
  readonly molarMassGPerMol: number;
  readonly cells: readonly SourceCell[];
  /** Rows that state a transition. */
  readonly transitions: readonly SourceRow[];
}

export function readLibrary(sourcesDir: string): SlipLibrary {
  const masses = molarMasses(sourcesDir);
  const bySubstance = new Map<string, SourceCell[]>();
  for (const cell of listCells(sourcesDir)) {
    const own = bySubstance.get(cell.substance);
    if (own === undefined) bySubstance.set(cell.substance, [cell]);
    else own.push(cell);
  }
  const substances = [...bySubstance].map(([id, cells]) => ({
    id,
    molarMassGPerMol: masses.get(id) ?? Number.NaN,
    cells,
    transitions: [...new Set(cells.filter((cell) => cell.holds === 'transitions').map((cell) => cell.row))],
  }));
  return { dir: sourcesDir, substances };
}

/** Throws for a unit that the sets do not use. */
export function unitOf(cell: SourceCell, { molarMassGPerMol }: SlipSubstance): Unit {
  const unit = readUnit(cell.unit, molarMassGPerMol);
  if (unit === null)
    throw new Error(`${cell.file}, ${cell.column}: the slip maker does not know the unit ${cell.unit}`);
  return unit;
}
