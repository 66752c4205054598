/**
 * The planted slips: each changes one printed cell, as a hand would, after everything else is made.
 * `cell` finds the row by some of its cells; `slip` turns the clean text into the wrong one.
 */
import { BENCH, BINDER, MODELS, QUAY } from './media.js';
import { continental, fixed, lineOf } from './print.js';

/** Two neighbouring digits exchanged, the point left where it is. */
function exchange(text, first) {
  const places = [...text].flatMap((letter, i) => (/\d/.test(letter) ? [i] : []));
  const letters = [...text];
  const [i, j] = [places[first], places[first + 1]];
  [letters[i], letters[j]] = [letters[j], letters[i]];
  return letters.join('');
}

/** One digit replaced. */
function digit(text, place, by) {
  const places = [...text].flatMap((letter, i) => (/\d/.test(letter) ? [i] : []));
  return text.slice(0, places[place]) + by + text.slice(places[place] + 1);
}

/**
 * `material`: the least change, in the column's own unit, that a user of the release would notice; a slip must exceed
 * it and twenty units of the last place.
 * @type {readonly { medium: string, source: string, file: string, cell: Record<string, string>, column: string,
 *   kind: string, about: string, quantity: string, material: number,
 *   slip: (clean: string, sheet: any, row: number) => string }[]}
 */
const SLIPS = [
  {
    medium: 'grendite',
    source: QUAY,
    file: 'tables/grendite.csv',
    cell: { Phase: 'crystal', 'T/K': '750' },
    column: 'S',
    kind: 'two digits exchanged',
    about: "an entropy in the crystal's table",
    quantity: 'entropy',
    material: 0.19,
    slip: (clean) => exchange(clean, 2),
  },
  {
    medium: 'nerathene',
    source: BINDER,
    file: 'sheets/nerathene.tsv',
    cell: { state: 'liq', 'T, K': '450' },
    column: 'H-H298',
    kind: 'one digit wrong',
    about: "an enthalpy increment in the liquid's table",
    quantity: 'enthalpy-increment',
    material: 12,
    slip: (clean) => digit(clean, 1, String((Number(clean[1]) + 3) % 10)),
  },
  {
    medium: 'isarnite',
    source: QUAY,
    file: 'tables/isarnite.csv',
    cell: { Phase: 'liquid', 'T/K': '800' },
    column: '-[G-H(Tr)]/T',
    kind: 'copied from the row above',
    about: "a Gibbs function in the liquid's table",
    quantity: 'gibbs-function',
    material: 0.12,
    slip: (_, sheet, row) => sheet.rows[row - 1][sheet.header.indexOf('-[G-H(Tr)]/T')],
  },
  {
    medium: 'quillane',
    source: MODELS,
    file: 'ideal-gases.csv.gz',
    cell: { species: 'QUIL_v', T_K: '500.00' },
    column: 'Cp_J_molK',
    kind: 'one digit misread (3 for 5)',
    about: 'a heat capacity inside the computed gas table',
    quantity: 'heat-capacity',
    material: 2.6,
    slip: (clean) => {
      if (clean[1] !== '5') throw new Error(`quillane: wanted a 5 to misread in ${clean}`);
      return digit(clean, 1, '3');
    },
  },
  {
    medium: 'jorvalite',
    source: QUAY,
    file: 'formation.csv',
    cell: { Medium: 'Jorvalite', Phase: 'liquid' },
    column: 'DfH(298.15 K)',
    kind: 'kilocalories in a kilojoule column',
    about: 'the formation enthalpy of the liquid',
    quantity: 'enthalpy-of-formation',
    material: 0.05,
    slip: (clean) => fixed(Number(clean) / 4.184, 3),
  },
  {
    medium: 'lumerite',
    source: BINDER,
    file: 'melting-and-boiling.tsv',
    cell: { medium: 'Lumerite', from: 'c' },
    column: 'T, K',
    kind: 'degrees Celsius in a kelvin column',
    about: 'the melting point',
    quantity: 'transition-temperature',
    material: 0.5,
    slip: (clean) => fixed(Number(clean) - 273.15, 2),
  },
  {
    medium: 'pellanol',
    source: BENCH,
    file: 'dsc.csv',
    cell: { sample: 'Pellanol', from: 'solid' },
    column: 'heat/(J/g)',
    kind: 'kilojoules a mole in a joule-a-gram column',
    about: 'the heat of melting',
    quantity: 'transition-enthalpy',
    material: 0.31,
    slip: (clean) => continental(fixed((Number(clean.replace(',', '.')) * 118.1) / 1000, 1)),
  },
  {
    medium: 'hollmerite',
    source: QUAY,
    file: 'transitions.csv',
    cell: { Medium: 'Hollmerite', From: 'crystal II' },
    column: 'DS',
    kind: 'decimal point moved',
    about: 'the entropy of the solid-solid transition',
    quantity: 'transition-entropy',
    material: 0.02,
    slip: (clean) => clean.replace(/^(\d)(\d)\.(\d+)$/, '$1.$2$3'),
  },
];

/** A misprint that the desk has found already: the raw file keeps it, a correction stands beside it. */
const MISPRINT = {
  medium: 'brevorite',
  source: BINDER,
  file: 'sheets/brevorite.tsv',
  cell: { state: 'liq', 'T, K': '600' },
  column: 'Cp',
  slip: (clean) => exchange(clean, 1),
};

/** Plants one change; returns where, what is printed and what it should say. */
function plant(sheets, { medium, source, file, cell, column, slip, kind, about, quantity, material = 0 }) {
  const sheet = sheets.find((one) => one.source === source && one.file === file);
  if (!sheet) throw new Error(`no file ${source}/${file}`);
  const fits = (row) => Object.entries(cell).every(([header, text]) => row[sheet.header.indexOf(header)] === text);
  const rows = sheet.rows.flatMap((row, i) => (fits(row) ? [i] : []));
  if (rows.length !== 1) throw new Error(`${source}/${file}: ${rows.length} rows fit ${JSON.stringify(cell)}`);
  const at = sheet.header.indexOf(column);
  const row = sheet.rows[rows[0]];
  const clean = row[at];
  const printed = slip(clean, sheet, rows[0]);
  const difference = Math.abs(number(printed) - number(clean));
  const lastPlace = 10 ** -(clean.split(/[.,]/)[1]?.length ?? 0);
  if (!(difference >= 20 * lastPlace && difference > material))
    throw new Error(`${medium}: ${clean} to ${printed} is too small a slip`);
  row[at] = printed;
  return { medium, source, file, line: lineOf(sheet, rows[0]), column, printed, clean, kind, about, quantity };
}

const number = (text) => Number(text.replace(',', '.').replace('\u2212', '-'));

/** Changes the sheets in place. */
export function plantAll(sheets) {
  const { medium, source, file, line, column, printed, clean } = plant(sheets, MISPRINT);
  const correction = {
    file,
    line,
    column,
    printed,
    corrected: clean,
    reason: 'Two digits exchanged in the second printing; the first printing has it right, and so do H and S beside it',
    citation: 'The Grey Binder, first printing',
    who: 'property desk',
    date: '2026-02-11',
  };
  const slips = SLIPS.map((slip) => plant(sheets, slip));
  return { slips, corrections: [{ source, medium, correction }] };
}
