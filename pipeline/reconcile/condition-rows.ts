import type { JudgedTransition } from '../../schemas/checked.js';
import type { PhaseCurve } from '../../schemas/curves.js';
import type { Anchor } from '../../schemas/harmonised.js';
import type { Equilibrium } from '../core/physics/equilibrium.js';
import type { PlacedPhase } from '../core/physics/placed-phase.js';

/** One condition: a value that should vanish. `transition` counts among the joined ones, or among the anchors. */
export interface Row {
  readonly kind: 'gap' | 'enthalpy' | 'entropy' | 'anchor' | 'closure';
  readonly transition: number;
  readonly value: number;
}

/** A stated transition whose two curves can be compared. */
export interface Joined {
  readonly judged: JudgedTransition;
  readonly from: PlacedPhase<PhaseCurve>;
  readonly to: PlacedPhase<PhaseCurve>;
  readonly atK: number;
  readonly at: Equilibrium;
  readonly within: boolean;
}

/** A phase whose table has an entropy of its own beside an anchor's. */
export interface Anchored {
  readonly curve: PhaseCurve;
  readonly anchor: Anchor;
}

/** How a curve's H and S at a row's temperature enter the row: signs for (H, S) of `to` and, opposite, of `from`. */
function weights(row: Row, j: Joined): [number, number] {
  if (row.kind === 'gap') return [1, -j.atK];
  if (row.kind === 'enthalpy') return [1, 0];
  return [0, 1];
}

/** H and S of a curve at a temperature, with the signs that they have in a row. */
export interface Use {
  readonly curve: PhaseCurve;
  readonly atK: number;
  readonly h: number;
  readonly s: number;
}

export function usesOf(row: Row, joined: readonly Joined[], anchored: readonly Anchored[]): Use[] {
  if (row.kind === 'closure') return [];
  if (row.kind === 'anchor') {
    const { curve, anchor } = anchored[row.transition];
    return [{ curve, atK: anchor.referenceTemperatureK, h: 0, s: -1 }];
  }
  const j = joined[row.transition];
  const [h, s] = weights(row, j);
  return [
    { curve: j.to.source, atK: j.atK, h: h / j.to.formulaUnits, s: s / j.to.formulaUnits },
    { curve: j.from.source, atK: j.atK, h: -h / j.from.formulaUnits, s: -s / j.from.formulaUnits },
  ];
}
