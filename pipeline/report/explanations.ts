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
  'bar-or-atmosphere-read-as-pascal': 'bar or atmospheres where another unit of pressure is declared',
  'pascal-read-as-bar-or-atmosphere': 'pascal or kilopascal where bar or atmospheres are declared',
  'kilocalorie-read-as-joule': 'kilocalories where joules are declared',
  'calorie-read-as-kilojoule': 'calories where kilojoules are declared',
  'kilojoule-read-as-calorie': 'kilojoules where calories are declared',
  'joule-read-as-kilocalorie': 'joules where kilocalories are declared',
  'kilo-per-mole-read-as-per-gram': 'kilojoules or kilocalories per mole where per gram is declared',
  'per-gram-read-as-kilo-per-mole': 'per gram where kilojoules or kilocalories per mole are declared',
  'calorie-per-gram-read-as-joule-per-mole': 'calories per gram where joules per mole are declared',
  'calorie-per-mole-read-as-joule-per-gram': 'calories per mole where joules per gram are declared',
  'other-formula-molar-mass': 'the molar mass of a hydrate or of another formula unit',
  'old-temperature-scale': 'an old temperature scale not converted, or one converted twice',
  'counted-from-zero-kelvin': 'counted from 0 K instead of 298.15 K, or the reverse',
  'different-enthalpy-scales': 'enthalpies of two phases or sources from different scales',
  'transition-left-out': 'a transition left out, or counted in',
};

/** A usual slip in words, from its code. */
export function sayExplanation(code: string): string {
  return EXPLANATIONS[code] ?? code.replaceAll('-', ' ');
}
