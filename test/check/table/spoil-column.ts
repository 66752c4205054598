/** A copy of the published sets with one or more whole columns of a table rewritten, and what the pipeline says of it. */
import { cpSync, mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { openLibrary } from '../../../pipeline/shell/library.js';
import type { Log } from '../../../pipeline/shell/log.js';
import { judge } from '../../../pipeline/shell/night-work.js';
import type { ReconciledCase } from '../../../schemas/checked.js';

/** A table of one phase: columns by their headers. */
export interface SpoiltTable {
  readonly substance: string;
  readonly source: string;
  readonly file: string;
  /** The phase as the file calls it; null where the file holds one alone. */
  readonly phase: string | null;
  readonly columns: Readonly<Record<'T' | 'Cp' | 'S' | 'F' | 'H', string>>;
}

/** How a cell is printed anew; its own text to leave it, `row` as numbers by header. */
export type Rewrite = (value: number, decimals: number, row: ReadonlyMap<string, number>) => string;

/** Multiplied, with as many decimals as the cell had, or `decimals`. */
export const times =
  (factor: number, decimals?: number): Rewrite =>
  (value, own) =>
    (value * factor).toFixed(decimals ?? own);

export const plus =
  (shift: number, decimals?: number): Rewrite =>
  (value, own) =>
    (value + shift).toFixed(decimals ?? own);

const quiet: Log = { begin: () => {}, advance: () => {}, end: () => {}, tell: () => {}, fail: () => {} };

/** Rewrites columns in a copy of `from`, judges the one substance, and removes the copy. */
export function spoilt(
  from: string,
  table: SpoiltTable,
  rewrites: Readonly<Record<string, Rewrite>>,
  lines: (line: number) => boolean = () => true,
): ReconciledCase {
  const scratch = mkdtempSync(join(tmpdir(), 'columns-'));
  try {
    const sources = join(scratch, 'sources');
    cpSync(from, sources, { recursive: true });
    rewrite(join(sources, table.source, table.file), table, rewrites, lines);
    return judgedIn(sources, table.substance);
  } finally {
    rmSync(scratch, { recursive: true });
  }
}

/** In place: only for a copy. */
export function rewrite(
  path: string,
  table: SpoiltTable,
  rewrites: Readonly<Record<string, Rewrite>>,
  lines: (line: number) => boolean = () => true,
): void {
  const text = readFileSync(path, 'utf8');
  const all = text.split('\n');
  const top = all.findIndex((line) => line !== '' && !line.startsWith('#'));
  const delimiter = ['\t', ';', ','].find((one) => all[top]!.includes(one))!;
  const header = all[top]!.replace(/\r$/, '').replaceAll('"', '').split(delimiter);
  for (let i = top + 1; i < all.length; i++) {
    const cells = all[i]!.replace(/\r$/, '').split(delimiter);
    if (cells.length < 3 || all[i]!.startsWith('#') || !lines(i + 1)) continue;
    if (table.phase !== null && !cells.includes(table.phase)) continue;
    const row = new Map(header.map((name, k) => [name, Number(cells[k])]));
    const out = cells.map((cell, k) => {
      const change = rewrites[header[k]!];
      if (change === undefined || !/^-?\d+\.?\d*$/.test(cell)) return cell;
      return change(Number(cell), cell.split('.')[1]?.length ?? 0, row);
    });
    all[i] = out.join(delimiter);
  }
  writeFileSync(path, all.join('\n'));
}

export function judgedIn(sources: string, substance: string): ReconciledCase {
  const library = openLibrary({ sources, policy: null, date: '2024-01-01', only: [substance] }, quiet);
  const at = library.substances.findIndex(({ id }) => id === substance);
  return judge(library, library.parts, at, at + 1).cases[0]!;
}
