/** Another formula's molar mass: of a hydrate or of the anhydrous substance, of two formula units or of half of one. */
import { WATER_G_PER_MOL } from '../../core/constants.js';
import { isPerMass } from './column-unit.js';
import { isMolar } from './quantity-kinds.js';
import { times } from './ratio.js';
import type { Candidate, Slip, SuspectCell } from './slip.js';

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
 * In a column per mass the cell is x/M' for x/M, so that M'/M is lacking; in one per mole it came from a value per mass
 * by M', so that M/M' is; or the sample was taken for the other formula, which is the reverse.
 */
export const otherFormulaMolarMass: Slip = {
  code: 'other-formula-molar-mass',
  weight: 0.03,
  propose: (cell) => {
    const { quantity, molarMassGPerMol: mass } = cell;
    if (!isMolar(quantity)) return [];
    if (!(mass > 0)) return [times(cell, 2, 0.5), times(cell, 0.5, 0.5)];
    const sense = isPerMass(cell) ? 1 : -1;
    const candidates: Candidate[] = [times(cell, 2, 0.15), times(cell, 0.5, 0.15)];
    for (const [n, share] of WATERS) {
      const ratio = ((mass + n * WATER_G_PER_MOL) / mass) ** sense;
      candidates.push(byMass(cell, ratio, 0.4 * share), byMass(cell, 1 / ratio, 0.2 * share));
      const anhydrous = mass - n * WATER_G_PER_MOL;
      if (anhydrous >= LIGHTEST) candidates.push(byMass(cell, (anhydrous / mass) ** sense, 0.1 * share));
    }
    return candidates;
  },
};

/** Two tables of atomic weights differ by this share in a formula's mass. */
const MASS_DOUBT = 3e-5;

function byMass(cell: SuspectCell, ratio: number, share: number): Candidate {
  const candidate = times(cell, ratio, share);
  return { ...candidate, step: Math.hypot(candidate.step, Math.sqrt(12) * MASS_DOUBT * candidate.value) };
}
