import { conversionTo } from '../core/units/ucum.js';
import { EXIT, Stop } from './exit-status.js';

/** Pascal from `101325`, `1 atm`, `50 kPa`, `760 mm[Hg]`: a number, then a UCUM code, or none for Pa. */
export function readPressure(text: string): number {
  const match = /^\s*([+]?\d+(?:\.\d+)?(?:[eE][+-]?\d+)?)\s*(\S*)\s*$/.exec(text);
  const number = match === null ? Number.NaN : Number(match[1]);
  if (!(number > 0)) {
    throw new Stop(
      `The pressure is "${text}"; a number above 0 with a unit was expected.`,
      'Write --pressure 101325, --pressure "1 atm" or --pressure "50 kPa".',
      EXIT.usage,
    );
  }
  const unit = match![2]! === '' ? 'Pa' : match![2]!;
  const conversion = conversionTo('Pa', unit, { molarMassGPerMol: Number.NaN, atomsPerFormula: null, per: null });
  if (!conversion.ok) {
    throw new Stop(
      `The pressure is in "${unit}", which is no pressure that is known here: ${conversion.fault}.`,
      `Write one of ${conversion.suggestions.slice(0, 4).join(', ')}, or leave the unit out for Pa.`,
      EXIT.usage,
    );
  }
  return number * conversion.factor + conversion.offset;
}
