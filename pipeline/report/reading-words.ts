/** What reading a file stumbled over, in words: the cell's text stands quoted in the sentence. */
import type { ReadingProblem } from '../../schemas/finding.js';

export const READING: Readonly<Record<ReadingProblem, (quoted: string, read: string) => string>> = {
  'cell-not-a-number': (read) => `${read} is not a number`,
  'cell-not-finite': (read) => `${read} is no finite number`,
  'row-too-short': (read) => `The row has too few cells: ${read}`,
  'row-too-long': (read) => `The row has too many cells: ${read}`,
  'column-missing': (read) => `The header says ${read}`,
  'column-unknown': (read) => `The descriptor does not say what column ${read} is`,
  'unit-unknown': (read) => `${read} is no unit that is known here`,
  'unit-unfit': (read) => `The unit ${read} does not fit the quantity`,
  'name-unmapped': (read) => `No substance is called ${read}`,
  'phase-unmapped': (read) => `No phase is called ${read}`,
  'substance-unknown': (read) => `${read} is no substance of substances.csv`,
  'substance-twice': (read) => `The substance ${read} is listed twice`,
  'file-missing': (read) => `There is no file: ${read}`,
  'file-unreadable': (read) => `The file cannot be read: ${read}`,
  'encoding-converted': (read) => `The file is not UTF-8 and was read as ${read}`,
  'descriptor-unreadable': (read) => `The descriptor is not JSON that can be read: ${read}`,
  'descriptor-invalid': (read) => `The descriptor says ${read}`,
  'correction-out-of-date': (read) => `A correction is out of date, the file says ${read}`,
  'required-missing': (quoted, read) => missing(quoted, read),
  'kind-not-yet-read': (read) => `${read} is not read yet`,
  'key-without-row': (read) => `Nothing was read for ${read}`,
  'molar-mass-unknown': (read) => `No molar mass follows from ${read}`,
  'acceptance-lapsed': (read) => `An acceptance no longer holds: ${read}`,
};

/** What is missing may be named by its maker, or shown by what stands in its place. */
function missing(quoted: string, read: string): string {
  if (read === '' || read === 'nothing') return 'A value is missing';
  return /^(The|A|An) /.test(read) ? `${read} is missing` : `A value is missing where the file says ${quoted}`;
}
