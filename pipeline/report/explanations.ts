/** What probably happened to a cell, in words, by the code of the usual slip. */
export const EXPLANATIONS: Readonly<Record<string, string>> = {
  'one-digit-wrong': 'one digit wrong',
  'digits-exchanged': 'two digits exchanged',
  'decimal-point-moved': 'decimal point moved',
  'copied-from-row-above': 'copied from the row above',
  'sign-lost': 'sign lost',
  'calorie-read-as-joule': 'calories where joules are declared',
  'joule-read-as-calorie': 'joules where calories are declared',
  'kilo-dropped': 'a thousand times too small: kilo dropped',
  'kilo-added': 'a thousand times too large: kilo added',
  'per-gram-read-as-per-mole': 'per gram where per mole is declared',
  'per-mole-read-as-per-gram': 'per mole where per gram is declared',
  'celsius-read-as-kelvin': 'degrees Celsius read as kelvin',
  'kelvin-read-as-celsius': 'kelvin read as degrees Celsius',
  'fahrenheit-not-converted': 'degrees Fahrenheit not converted',
  'read-as-fahrenheit': 'kelvin or degrees Celsius read as degrees Fahrenheit',
  'atmosphere-for-bar': 'an entropy at 1 atm taken for 1 bar, or the reverse',
  'enthalpy-and-entropy-exchanged': 'ΔH and ΔS of the transition exchanged',
  'in-units-of-r': 'given in units of R',
  'log10-taken-for-ln': 'decimal logarithm taken for the natural one, or the reverse',
  'torr-read-as-pascal': 'torr read as pascal',
  'pascal-read-as-torr': 'pascal read as torr',
};

/** A usual slip in words, from its code. */
export function sayExplanation(code: string): string {
  return EXPLANATIONS[code] ?? code.replaceAll('-', ' ');
}
