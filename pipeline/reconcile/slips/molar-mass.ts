/** Another formula's molar mass: of a hydrate or of the anhydrous substance, of two formula units or of half of one. */
import { isPerMass } from './column-unit.js';
import { isMolar } from './quantity-kinds.js';
import { times } from './ratio.js';
import type { Candidate, Slip, SuspectCell } from './slip.js';

/** H2O, from the abridged standard atomic weights (IUPAC/CIAAW 2021) [g/mol]. */
const WATER = 18.015;
/** [molecules of water, share of the hydrates] */
const WATERS = [
  [0.5, 0.08],
  [1, 0.2],
  [1.5, 0.03],
  [2, 0.18],
  [3, 0.1],
  [4, 0.08],
  [5, 0.08],
  [6, 0.12],
  [7, 0.05],
  [8, 0.02],
  [9, 0.02],
  [10, 0.04],
] as const;
/** Nothing that forms a hydrate is lighter [g/mol]. */
const LIGHTEST = 20;

/**
 * In a column per mass the cell is x/M' for x/M, so that M'/M is lacking; or the sample was taken for the other formula,
 * which makes it M/M'. In one per mole, twice or half the formula unit was meant.
 */
export const otherFormulaMolarMass: Slip = {
  code: 'other-formula-molar-mass',
  weight: 0.03,
  propose: (cell) => {
    if (!isMolar(cell.quantity)) return [];
    return isPerMass(cell) ? perMass(cell) : [times(cell, 2, 0.5), times(cell, 0.5, 0.5)];
  },
};

function perMass(cell: SuspectCell): Candidate[] {
  const { molarMassGPerMol: mass } = cell;
  const candidates = [times(cell, 2, 0.15), times(cell, 0.5, 0.15)];
  for (const [n, share] of WATERS) {
    const ratio = (mass + n * WATER) / mass;
    candidates.push(times(cell, ratio, 0.35 * share), times(cell, 1 / ratio, 0.25 * share));
    const anhydrous = mass - n * WATER;
    if (anhydrous >= LIGHTEST) candidates.push(times(cell, anhydrous / mass, 0.1 * share));
  }
  return candidates;
}
