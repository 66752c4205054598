import type { Anchor } from '../../../schemas/harmonised.js';
import type { Substance } from '../../../schemas/substances.js';
import type { ColumnChange } from './column-change.js';

/** What else is known of the substance whose table is looked at. */
export interface TableContext {
  readonly substance: Substance;
  readonly anchors: readonly Anchor[];
}

/** One law for whole columns of one table, not yet tried. */
export interface ColumnHypothesis {
  readonly changes: readonly ColumnChange[];
  readonly explanation: string | null;
  /** Natural logarithm of how usual it is. */
  readonly prior: number;
  /** Standard uncertainty of its factor, relative, and of its shift; 0 where the law fixes them. */
  readonly uFactor: number;
  readonly uShift: number;
  /** Relative: an unexplained factor this near a usual slip's is no other one. Few digits of Cp are wrong alike along a table. */
  readonly loose: number;
}
