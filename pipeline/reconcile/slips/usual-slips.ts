/** Every slip of a single cell that is tried. */
import { calorieReadAsJoule, jouleReadAsCalorie } from './calorie.js';
import { celsiusReadAsKelvin, kelvinReadAsCelsius } from './celsius.js';
import { decimalPointMoved } from './decimal-point.js';
import { differentEnthalpyScales } from './enthalpy-scales.js';
import { digitsExchanged } from './exchanged-digits.js';
import { enthalpyAndEntropyExchanged } from './exchanged-pair.js';
import { fahrenheitNotConverted, readAsFahrenheit } from './fahrenheit.js';
import { countedFromZeroKelvin } from './from-zero-kelvin.js';
import { kiloAdded, kiloDropped } from './kilo.js';
import {
  calorieReadAsKilojoule,
  jouleReadAsKilocalorie,
  kilocalorieReadAsJoule,
  kilojouleReadAsCalorie,
} from './kilocalorie.js';
import { log10TakenForLn } from './logarithm.js';
import { otherFormulaMolarMass } from './molar-mass.js';
import { oldTemperatureScale } from './old-scale.js';
import { oneDigitWrong } from './one-digit.js';
import { perGramReadAsPerMole, perMoleReadAsPerGram } from './per-gram.js';
import {
  caloriePerGramReadAsJoulePerMole,
  caloriePerMoleReadAsJoulePerGram,
  kiloPerMoleReadAsPerGram,
  perGramReadAsKiloPerMole,
} from './per-gram-compound.js';
import { barReadAsPascal, pascalReadAsBar } from './pressure-units.js';
import { copiedFromRowAbove } from './row-above.js';
import { signLost } from './sign.js';
import type { Slip } from './slip.js';
import { atmosphereForBar } from './standard-pressure.js';
import { pascalReadAsTorr, torrReadAsPascal } from './torr.js';
import { transitionLeftOut } from './transition-left-out.js';
import { unitsOfR } from './units-of-r.js';

export const USUAL_SLIPS: readonly Slip[] = [
  oneDigitWrong,
  digitsExchanged,
  decimalPointMoved,
  copiedFromRowAbove,
  signLost,
  calorieReadAsJoule,
  jouleReadAsCalorie,
  kiloDropped,
  kiloAdded,
  perGramReadAsPerMole,
  perMoleReadAsPerGram,
  celsiusReadAsKelvin,
  kelvinReadAsCelsius,
  fahrenheitNotConverted,
  readAsFahrenheit,
  atmosphereForBar,
  enthalpyAndEntropyExchanged,
  unitsOfR,
  log10TakenForLn,
  torrReadAsPascal,
  pascalReadAsTorr,
  barReadAsPascal,
  pascalReadAsBar,
  kilocalorieReadAsJoule,
  calorieReadAsKilojoule,
  kilojouleReadAsCalorie,
  jouleReadAsKilocalorie,
  kiloPerMoleReadAsPerGram,
  perGramReadAsKiloPerMole,
  caloriePerGramReadAsJoulePerMole,
  caloriePerMoleReadAsJoulePerGram,
  otherFormulaMolarMass,
  oldTemperatureScale,
  countedFromZeroKelvin,
  differentEnthalpyScales,
  transitionLeftOut,
];

/**
 * What befalls the pressure that a transition is stated at, a nominal one: its unit, its decimal point, a digit. An atmosphere
 * for a bar is within what the temperature and the enthalpies explain just as well.
 */
export const NOMINAL_PRESSURE_SLIPS: readonly Slip[] = [
  decimalPointMoved,
  kiloDropped,
  kiloAdded,
  log10TakenForLn,
  torrReadAsPascal,
  pascalReadAsTorr,
  barReadAsPascal,
  pascalReadAsBar,
  oneDigitWrong,
];
