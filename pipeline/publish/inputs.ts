/** The table of inputs, from the shell's list of the files it read. */
import type { ColumnTable } from '../../schemas/columns.js';
import type { InputFile } from '../../schemas/contents.js';
import { RELEASE_TABLES } from '../../schemas/release-tables.js';
import { buildersFor, finishTable } from './builders.js';

/** Rows by source and file, whatever the order of the list. */
export function inputsTable(files: readonly InputFile[]): ColumnTable {
  const to = buildersFor(RELEASE_TABLES.inputs);
  for (const input of [...files].sort(bySourceAndFile)) {
    to.source.push(input.source);
    to.file.push(input.file);
    to.bytes.push(input.bytes);
    to.sha256.push(input.sha256);
    to.citation.push(input.citation);
    to.licence.push(input.licence);
    to.basis.push(input.basis);
  }
  return finishTable(to);
}

export function bySourceAndFile(a: InputFile, b: InputFile): number {
  if (a.source !== b.source) return a.source < b.source ? -1 : 1;
  return a.file < b.file ? -1 : a.file > b.file ? 1 : 0;
}
