/**
 * Plants wrong cells in a copy of a sources folder, as people make them: a figure misread by some units of its last place, an
 * anchor left in kilocalories, a table in degrees Celsius. Edits the raw text; shares no code with the pipeline, nor its
 * opinion of what is wrong.
 */
import { join } from 'node:path';
import { applyEdits } from './delimited.js';
import { MANY_CELL_KINDS } from './many-cells.js';
import type { Random } from './random.js';
import { type Change, type Family, ONE_CELL_KINDS, type SlipKind } from './slip-kinds.js';
import { type SlipSubstance, unitOf } from './slip-library.js';
import type { SourceCell } from './source-cells.js';

export const SLIP_KINDS: readonly SlipKind[] = [...ONE_CELL_KINDS, ...MANY_CELL_KINDS];

export interface PlantedCell {
  readonly source: string;
  readonly file: string;
  /** 1-based, header included. */
  readonly line: number;
  /** '' where a whole row was left out. */
  readonly column: string;
  /** What the file says now. */
  readonly printed: string;
  /** What it said. */
  readonly clean: string;
  /** The cell as it was; null for words and rows. */
  readonly cell: SourceCell | null;
  /** Printed minus clean in SI; null for words and rows. */
  readonly changeSi: number | null;
}

export interface Slip {
  readonly kind: string;
  readonly family: Family;
  readonly meant: string | null;
  readonly sharp: boolean;
  readonly substance: string;
  /** A phase, `cr>l` for a transition. */
  readonly place: string;
  readonly cells: readonly PlantedCell[];
  readonly changes: readonly Change[];
}

/**
 * A slip of this kind in this substance, not yet written; null where no cell can hold one.
 * @param least the smallest error in a cell that is said to show [SI]; Infinity where none would
 */
export function draftSlip(
  kind: SlipKind,
  substance: SlipSubstance,
  random: Random,
  least: (cell: SourceCell) => number = () => 0,
): Slip | null {
  const changes = kind.draft(substance, random, least);
  const [first] = changes ?? [];
  if (changes === null || first === undefined) return null;
  const { name, family, meant, sharp } = kind;
  const { place } = 'cell' in first ? first.cell : first.row;
  const cells = changes.map((change) => planted(change, substance));
  return { kind: name, family, meant, sharp, substance: substance.id, place, cells, changes };
}

/** Writes slips into `sourcesDir`, a copy of the folder that they were drafted for. No two may touch one cell. */
export function plantSlips(sourcesDir: string, slips: readonly Slip[]): void {
  applyEdits(
    slips.flatMap(({ changes }) =>
      changes.map((change) => {
        const { source, file, contents } = 'cell' in change ? change.cell : change.row;
        const path = join(sourcesDir, source, file);
        if ('cell' in change) {
          const { from, to } = change.cell.cell;
          return { path, contents, from, to, text: change.printed };
        }
        if ('leftOut' in change) {
          const { from, to } = change.row.text;
          return { path, contents, from, to, text: '' };
        }
        const { from, to } = change.row.words[change.word]!.cell;
        return { path, contents, from, to, text: change.printed };
      }),
    ),
  );
}

function planted(change: Change, substance: SlipSubstance): PlantedCell {
  const { source, file, line } = 'cell' in change ? change.cell : change.row;
  if ('cell' in change) {
    const { cell, printed } = change;
    const changeSi = (Number(printed) - cell.value) * unitOf(cell, substance).factor;
    return { source, file, line, column: cell.column, printed, clean: cell.text, cell, changeSi };
  }
  const none = { cell: null, changeSi: null };
  if ('leftOut' in change) {
    const { from, to } = change.row.text;
    return { source, file, line, column: '', printed: '', clean: change.row.contents.text.slice(from, to), ...none };
  }
  const word = change.row.words[change.word]!;
  return { source, file, line, column: word.column, printed: change.printed, clean: word.cell.text, ...none };
}
