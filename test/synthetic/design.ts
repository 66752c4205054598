/** What a way of keeping data is: its sources with their descriptors, and how it writes one substance into them. */
import type { Chance } from './normal.js';
import type { Pen } from './pen.js';
import type { Truth } from './truth.js';

export interface TableDesign {
  readonly file: string;
  readonly holds: string;
  /** In the order of the file's columns: header and what the descriptor says of it. */
  readonly columns: Readonly<Record<string, object>>;
  /** Further keys of the descriptor's table. */
  readonly more?: object;
}

export interface SourceDesign {
  readonly id: string;
  readonly title: string;
  readonly basis: 'measured' | 'evaluated' | 'computed';
  readonly rank: number;
  readonly tables: readonly TableDesign[];
}

export interface Task {
  readonly id: string;
  readonly truth: Truth;
  readonly pen: Pen;
  /** For what the design itself draws, as uneven temperatures: the same whatever the errors are. */
  readonly layout: Chance;
  /** Adds a row to a table of one of the design's sources. */
  readonly write: (source: string, file: string, row: readonly string[]) => void;
}

export interface Design {
  readonly name: string;
  readonly sources: readonly SourceDesign[];
  /** How many crystal phases its substances have. */
  readonly crystals: (random: Chance) => number;
  readonly fill: (task: Task) => void;
}

/** Columns that name the substance and the phase. */
export const WHICH = { substance: { is: 'substance' }, phase: { is: 'phase' } };

export function temperatureColumn(uncertainty?: object): Record<string, object> {
  return { 'T/K': { is: 'temperature', unit: 'K', ...(uncertainty === undefined ? {} : { uncertainty }) } };
}
