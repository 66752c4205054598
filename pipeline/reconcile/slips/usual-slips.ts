/** Every slip of a single cell that is tried. */
import { calorieReadAsJoule, jouleReadAsCalorie } from './calorie.js';
import { celsiusReadAsKelvin, kelvinReadAsCelsius } from './celsius.js';
import { decimalPointMoved } from './decimal-point.js';
import { digitsExchanged } from './exchanged-digits.js';
import { enthalpyAndEntropyExchanged } from './exchanged-pair.js';
import { fahrenheitNotConverted, readAsFahrenheit } from './fahrenheit.js';
import { kiloAdded, kiloDropped } from './kilo.js';
import { log10TakenForLn } from './logarithm.js';
import { oneDigitWrong } from './one-digit.js';
import { perGramReadAsPerMole, perMoleReadAsPerGram } from './per-gram.js';
import { copiedFromRowAbove } from './row-above.js';
import { signLost } from './sign.js';
import type { Slip } from './slip.js';
import { atmosphereForBar } from './standard-pressure.js';
import { pascalReadAsTorr, torrReadAsPascal } from './torr.js';
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
];
