/** Quantities and stated numbers by the names that a chemist gives them. */

const SYMBOLS: Readonly<Record<string, string>> = {
  temperature: 'T',
  'heat-capacity': 'Cp',
  entropy: 'S',
  'enthalpy-increment': 'H − H(Tr)',
  'gibbs-function': '−[G − H(Tr)]/T',
  enthalpy: 'H',
  'gibbs-energy': 'G',
  'enthalpy-of-formation': 'ΔfH',
  'gibbs-energy-of-formation': 'ΔfG',
  'enthalpy-from-zero': 'H(Tr) − H(0)',
  'transition-temperature': 'the transition temperature',
  'transition-enthalpy': 'ΔH',
  'transition-entropy': 'ΔS',
  pressure: 'p',
};

/** The quantity as a chemist writes it; an unknown name stands for itself. */
export function symbol(quantity: string): string {
  return SYMBOLS[quantity] ?? quantity;
}

/** `T cr>l` becomes `the temperature of cr>l`. */
export function statedPlace(place: string): string {
  const gap = place.indexOf(' ');
  const over = place.startsWith('over ', gap + 1);
  const name = PLACES[place.slice(0, over ? gap + 5 : gap)] ?? PLACES[place.slice(0, gap)] ?? place.slice(0, gap);
  return `${name}${place
    .slice(gap)
    .replace(/^ over /, ' over ')
    .replace(/^ (?!over )/, ' of ')}`;
}

const PLACES: Readonly<Record<string, string>> = {
  T: 'the temperature',
  dH: 'the enthalpy',
  dS: 'the entropy',
  from: 'the first phase',
  dfH: 'the formation enthalpy',
  dfG: 'the Gibbs energy of formation',
  S: 'the entropy',
  Cp: 'the heat capacity',
  'H-H(0)': 'H − H(0)',
  p: 'the pressure',
  'p over': 'the vapour pressure',
};
