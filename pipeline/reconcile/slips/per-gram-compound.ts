/** Per gram and per mole exchanged and the unit of energy beside: kJ/mol in a column of J/g, cal/g in one of J/mol. */
import { CALORIES_J } from '../../core/units/calories.js';
import { isInCalories, isKiloPerMole, isPerMass, joulesOfUnit } from './column-unit.js';
import { isEnergetic, isPerKelvin } from './quantity-kinds.js';
import { readAs } from './ratio.js';
import type { Candidate, Slip, SuspectCell } from './slip.js';

const isEnergy = ({ quantity }: SuspectCell): boolean => isEnergetic(quantity) && !isPerKelvin(quantity);

/** The cell holds kJ/mol where J/g (kJ/kg) is declared, or kcal/mol where cal/g is. */
export const kiloPerMoleReadAsPerGram: Slip = {
  code: 'kilo-per-mole-read-as-per-gram',
  weight: 0.02,
  propose: (cell) => (isEnergy(cell) && isPerMass(cell) ? [readAs(cell, 1000 * joulesOfUnit(cell))] : []),
};

/** The cell holds J/g where kJ/mol is declared, or cal/g where kcal/mol is. */
export const perGramReadAsKiloPerMole: Slip = {
  code: 'per-gram-read-as-kilo-per-mole',
  weight: 0.02,
  propose: (cell) =>
    isEnergy(cell) && isKiloPerMole(cell) && cell.molarMassGPerMol > 0
      ? [readAs(cell, cell.molarMassGPerMol * joulesOfUnit(cell))]
      : [],
};

/** The cell holds cal/g where J/mol or kJ/mol is declared. */
export const caloriePerGramReadAsJoulePerMole: Slip = {
  code: 'calorie-per-gram-read-as-joule-per-mole',
  weight: 0.01,
  propose: (cell) => {
    if (!isEnergetic(cell.quantity) || isInCalories(cell) || isPerMass(cell) || !(cell.molarMassGPerMol > 0)) return [];
    return CALORIES_J.map(([joules, share]) => readAs(cell, joules * cell.molarMassGPerMol, 0, share));
  },
};

/** The cell holds cal/mol or kcal/mol where J/g is declared. */
export const caloriePerMoleReadAsJoulePerGram: Slip = {
  code: 'calorie-per-mole-read-as-joule-per-gram',
  weight: 0.01,
  propose: (cell) => {
    if (!isEnergetic(cell.quantity) || isInCalories(cell) || !isPerMass(cell)) return [];
    const plain = isPerKelvin(cell.quantity) ? 1 : 0.5;
    const candidates: Candidate[] = [];
    for (const [joules, share] of CALORIES_J) {
      candidates.push(readAs(cell, joules, 0, plain * share));
      if (plain < 1) candidates.push(readAs(cell, 1000 * joules, 0, (1 - plain) * share));
    }
    return candidates;
  },
};
