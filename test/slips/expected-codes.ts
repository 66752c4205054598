/** Which published codes of an explanation say what a planted slip meant. The one place where both vocabularies meet. */
const CODES: Readonly<Record<string, readonly string[]>> = {
  'in calories': ['calorie-read-as-joule', 'joule-read-as-calorie'],
  'in calories of the International Table': ['calorie-read-as-joule', 'joule-read-as-calorie'],
  'kilo dropped or added': ['kilo-dropped', 'kilo-added'],
  'per gram': ['per-gram-read-as-per-mole', 'per-mole-read-as-per-gram'],
  'in units of R': ['in-units-of-r'],
  'decimal point moved': ['decimal-point-moved'],
  'two digits exchanged': ['digits-exchanged'],
  'one digit wrong': ['one-digit-wrong'],
  'copied from the row above': ['copied-from-row-above'],
  'sign lost': ['sign-lost'],
  '1 atm for 1 bar': ['atmosphere-for-bar'],
  'Celsius and kelvin': ['celsius-read-as-kelvin', 'kelvin-read-as-celsius'],
  Fahrenheit: ['fahrenheit-not-converted'],
  'old temperature scale': ['old-temperature-scale'],
  'torr for pascal': ['torr-read-as-pascal'],
  'log10 for ln': ['log10-taken-for-ln'],
  'molar mass of another formula': ['other-formula-molar-mass'],
  'ΔH and ΔS exchanged': ['enthalpy-and-entropy-exchanged'],
  'from and to exchanged': ['from-and-to-exchanged'],
  'different scales': ['different-enthalpy-scales', 'formation-enthalpies-from-different-scales'],
  'transition left out': ['transition-left-out'],
  'increments from 0 K': ['counted-from-zero-kelvin'],
};

export function expectedCodes(meant: string): readonly string[] {
  const codes = CODES[meant];
  if (codes === undefined) throw new Error(`no code is known for "${meant}"`);
  return codes;
}
