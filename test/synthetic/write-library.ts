/** Writes a sources folder of synthetic substances: the list of substances and, for each source, its descriptor and tables. */
import { mkdirSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import type { Design } from './design.js';
import { DESIGN_NAMES, type DesignName, designNamed } from './designs.js';
import { KINDS } from './kinds.js';
import { chance, mixedSeed } from './normal.js';
import { Pen } from './pen.js';
import { drawTruth, type Truth } from './truth.js';

export interface SyntheticOptions {
  readonly seed: number;
  /** How many; the designs take turns. */
  readonly substances: number;
  readonly designs?: readonly DesignName[];
  /**
   * `stated`: whatever states an uncertainty has a normal error of just that; what speaks by its digits is rounded.
   * `none`: every printed number is the true one, rounded. Default `stated`.
   */
  readonly errors?: 'stated' | 'none';
  /** Whether the design of that name has its table of vapour pressures; default true. */
  readonly vapourPressures?: boolean;
}

export interface SyntheticSubstance {
  readonly id: string;
  readonly design: string;
  readonly truth: Truth;
}

/** The same options give the same bytes. */
export function writeSyntheticLibrary(dir: string, options: SyntheticOptions): SyntheticSubstance[] {
  const { seed, substances, designs = DESIGN_NAMES, errors = 'stated', vapourPressures = true } = options;
  const known = designs.map((name) => designNamed(name, vapourPressures));
  const entries = Array.from({ length: substances }, (_, i): LibraryEntry => {
    const random = chance(mixedSeed(seed, i));
    const design = known[i % known.length]!;
    const kind = KINDS[Math.floor(i / known.length) % KINDS.length]!;
    // Three crystals do not fit below the melting point of a molecular substance.
    const crystals = design.crystals(random);
    const truth = drawTruth(
      mixedSeed(seed, i) ^ 0x51ed270b,
      crystals === 3 && kind === 'molecular' ? 'ionic' : kind,
      crystals,
    );
    return { id: `${design.name}-${String(i + 1).padStart(4, '0')}`, design, truth, seed: mixedSeed(seed + 1, i) };
  });
  writeLibrary(dir, entries, errors);
  return entries.map(({ id, design, truth }) => ({ id, design: design.name, truth }));
}

export interface LibraryEntry {
  readonly id: string;
  readonly design: Design;
  readonly truth: Truth;
  /** Of the errors. */
  readonly seed: number;
  /** Of what the design draws itself; entries that are draws of one experiment share it. Default `seed`. */
  readonly layoutSeed?: number;
}

/** Entries of one design object share its files. */
export function writeLibrary(dir: string, entries: readonly LibraryEntry[], errors: 'stated' | 'none'): void {
  mkdirSync(dir, { recursive: true });
  writeFileSync(join(dir, 'substances.csv'), substanceList(entries));
  const lines = new Map<string, string[]>();
  for (const design of new Set(entries.map((entry) => entry.design))) {
    for (const { id, title, basis, rank, tables } of design.sources) {
      mkdirSync(join(dir, id), { recursive: true });
      const descriptor = { title, citation: 'Invented figures', ...COMMON, basis, rank, tables: tables.map(describe) };
      writeFileSync(join(dir, id, 'source.json'), `${JSON.stringify(descriptor, null, 2)}\n`);
      for (const { file, columns } of tables) lines.set(join(id, file), [Object.keys(columns).join(',')]);
    }
  }
  for (const { id, design, truth, seed, layoutSeed } of entries) {
    const pen = new Pen(errors === 'none' ? null : chance(seed));
    const layout = chance(mixedSeed(layoutSeed ?? seed, 0x1a70));
    const write = (source: string, file: string, row: readonly string[]): void => {
      const table = lines.get(join(source, file));
      if (table === undefined) throw new Error(`${design.name} has no table ${file} in ${source}`);
      table.push(row.join(','));
    };
    design.fill({ id, truth, pen, layout, write });
  }
  for (const [file, rows] of lines) writeFileSync(join(dir, file), `${rows.join('\n')}\n`);
}

const COMMON = {
  licence: 'invented figures, free to copy (CC0-1.0)',
  temperatureScale: 'ITS-90',
  standardPressure: { value: 1, unit: 'bar' },
  referenceTemperature: 298.15,
  enthalpyZero: 'elements-298.15',
  entropyZero: 'absolute',
};

function describe({ file, holds, columns, more }: Design['sources'][number]['tables'][number]): object {
  const phase = 'phase' in columns ? { phase: { column: 'phase' } } : {};
  return { file, holds, substance: { column: 'substance' }, ...phase, ...more, columns };
}

function substanceList(entries: readonly LibraryEntry[]): string {
  const rows = entries.map(({ id, truth }) => `${id},${id},,${truth.molarMass},${truth.kind}`);
  return `${['substance,name,formula,molar_mass,class', ...rows].join('\n')}\n`;
}
