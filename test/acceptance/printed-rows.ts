/** The rows that the published sets print, by the tests' own reading of the descriptors. */
import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { listCells, type SourceCell } from '../slips/source-cells.js';
import { curveName } from './curves.js';
import { ROOT } from './release.js';

export const SOURCES = join(ROOT, 'test/published');

export const printed = listCells(SOURCES).filter(({ holds }) => holds === 'thermal-functions');

interface Descriptor {
  readonly tables: readonly {
    readonly file: string;
    readonly pressure?: { readonly value: number };
    readonly incrementsFrom?: string;
  }[];
}
const descriptors = new Map<string, Descriptor>();
export function tableOf({ source, file }: SourceCell): Descriptor['tables'][number] | undefined {
  if (!descriptors.has(source)) {
    descriptors.set(source, JSON.parse(readFileSync(join(SOURCES, source, 'source.json'), 'utf8')));
  }
  return descriptors.get(source)!.tables.find((table) => table.file === file);
}

/** A place on an isobar reads `l at 101325 Pa`; the curve goes by the phase and the pressure. */
export function nameOf(cell: SourceCell, phase = cell.place): string {
  return curveName(cell.substance, phase.replace(/ at \S+ Pa$/, ''), tableOf(cell)?.pressure?.value ?? null);
}

/** The last printed place of the column; the steam tables print eight significant digits, and their largest figure counts. */
export function lastPlace(cell: SourceCell): number {
  if (cell.source !== 'iapws-water') return 10 ** -cell.decimals;
  const column = printed.filter((one) => one.file === cell.file && one.quantity === cell.quantity);
  return 10 ** (Math.floor(Math.log10(Math.max(...column.map(({ value }) => Math.abs(value))))) - 7);
}

/** A gas at 0 K is a limit of no real substance and the gas curves begin at their first row above it. */
export const isLimitOfGas = ({ place, temperatureK }: SourceCell): boolean => place === 'g' && temperatureK === 0;
