/** Per gram and per mole exchanged. */
import { isPerMass } from './column-unit.js';
import { isMolar } from './quantity-kinds.js';
import { times } from './ratio.js';
import type { Candidate, Slip, SuspectCell } from './slip.js';

/** The cell holds a value per gram where one per mole is declared. */
export const perGramReadAsPerMole: Slip = {
  code: 'per-gram-read-as-per-mole',
  weight: 0.02,
  propose: (cell) => (isPerMass(cell) ? [] : scaled(cell, cell.molarMassGPerMol)),
};

/** The cell holds a value per mole where one per gram is declared. */
export const perMoleReadAsPerGram: Slip = {
  code: 'per-mole-read-as-per-gram',
  weight: 0.02,
  propose: (cell) => (isPerMass(cell) ? scaled(cell, 1 / cell.molarMassGPerMol) : []),
};

function scaled(cell: SuspectCell, ratio: number): readonly Candidate[] {
  return isMolar(cell.quantity) && Number.isFinite(ratio) && ratio > 0 ? [times(cell, ratio)] : [];
}
