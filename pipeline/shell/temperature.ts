import { conversionTo } from '../core/units/ucum.js';
import { EXIT, Stop } from './exit-status.js';

/** Kelvin from `600`, `600 K`, `25 Cel`, `77 [degF]`: a number, then a UCUM code, or none for K. */
export function readTemperature(text: string): number {
  const plain = text.replace('−', '-').replace(/°C$/, 'Cel');
  const match = /^\s*([+-]?\d+(?:\.\d+)?(?:[eE][+-]?\d+)?)\s*(\S*)\s*$/.exec(plain);
  const unit = match?.[2] === '' ? 'K' : match?.[2];
  if (match === null || unit === undefined) {
    throw new Stop(
      `The temperature is "${text}"; a number, with a unit where it is not kelvin, was expected.`,
      'Write 600, "600 K" or "25 Cel".',
      EXIT.usage,
    );
  }
  const conversion = conversionTo('K', unit, { molarMassGPerMol: Number.NaN, atomsPerFormula: null, per: null });
  if (!conversion.ok) {
    throw new Stop(
      `The temperature is in "${unit}", which is no temperature that is known here: ${conversion.fault}.`,
      'Leave the unit out for K, or write Cel for degrees Celsius.',
      EXIT.usage,
    );
  }
  const temperatureK = Number((Number(match[1]) * conversion.factor + conversion.offset).toPrecision(12));
  if (temperatureK >= 0) return temperatureK;
  throw new Stop(`${text} lies below 0 K.`, 'Write 600, "600 K" or "25 Cel".', EXIT.usage);
}
