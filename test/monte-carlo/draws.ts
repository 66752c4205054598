/** Many draws of one experiment through the pipeline, and how what comes out scatters beside the uncertainty that it states. */
import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { emptyRoom } from '../../pipeline/core/numeric/room.js';
import { selectRuns } from '../../pipeline/ingest/ingest.js';
import { openLibrary } from '../../pipeline/shell/library.js';
import type { Log } from '../../pipeline/shell/log.js';
import { STAGES, type Stage } from '../../pipeline/shell/stages.js';
import type { ReconciledCase } from '../../schemas/checked.js';
import type { AssembledCase } from '../../schemas/curves.js';
import type { Design } from '../synthetic/design.js';
import { mixedSeed } from '../synthetic/normal.js';
import type { Truth } from '../synthetic/truth.js';
import { writeLibrary } from '../synthetic/write-library.js';

const quiet: Log = { begin: () => {}, advance: () => {}, end: () => {}, tell: () => {}, fail: () => {} };
const BATCH = 64;

export interface Experiment {
  readonly design: Design;
  readonly truth: Truth;
  readonly draws: number;
  readonly seed: number;
}

/** Draws one substance's data over and over, each time with errors of their own, and shows each assembled case to `see`. */
export function assembleDraws(experiment: Experiment, see: (one: AssembledCase) => void): void {
  runDraws(experiment, 'assemble', see as (one: unknown) => void);
}

/** The same through all stages. */
export function reconcileDraws(experiment: Experiment, see: (one: ReconciledCase) => void): void {
  runDraws(experiment, 'reconcile', see as (one: unknown) => void);
}

function runDraws({ design, truth, draws, seed }: Experiment, last: string, see: (one: unknown) => void): void {
  const dir = mkdtempSync(join(tmpdir(), 'cuspline-draws-'));
  try {
    const entries = Array.from({ length: draws }, (_, i) => ({
      id: `draw-${i}`,
      design,
      truth,
      seed: mixedSeed(seed, i),
      layoutSeed: seed,
    }));
    writeLibrary(dir, entries, 'stated');
    const library = openLibrary({ sources: dir, policy: null, date: '2024-01-01', only: null }, quiet);
    const stages = STAGES.slice(0, STAGES.findIndex(({ name }) => name === last) + 1) as readonly Stage<
      never,
      unknown
    >[];
    for (let from = 0; from < draws; from += BATCH) {
      const to = Math.min(draws, from + BATCH);
      const parts = library.parts.map((part) => ({ ...part, index: selectRuns(part.index, from, to) }));
      let artefact: unknown = { substances: library.substances.slice(from, to), first: from, parts };
      for (const { run } of stages) artefact = run(artefact as never, library.settings).artefact;
      for (const one of artefact as readonly unknown[]) see(one);
      emptyRoom();
    }
  } finally {
    rmSync(dir, { recursive: true });
  }
}

/** Of one number: how often it came, its mean, its spread and the root mean square of the u that it was given. */
export class Spread {
  draws = 0;
  private first = 0;
  private sum = 0;
  private squares = 0;
  private stated = 0;

  add(value: number, u: number): void {
    if (this.draws === 0) this.first = value;
    const x = value - this.first;
    this.draws++;
    this.sum += x;
    this.squares += x * x;
    this.stated += u * u;
  }

  get mean(): number {
    return this.first + this.sum / this.draws;
  }

  get deviation(): number {
    return Math.sqrt((this.squares - this.sum ** 2 / this.draws) / (this.draws - 1));
  }

  get statedU(): number {
    return Math.sqrt(this.stated / this.draws);
  }
}

/** Spreads of the stable crossings, `cr > l`, and of G, H and S at the grid's temperatures within the data, `G of cr at 400 K`. */
export class Spreads {
  readonly crossings = new Map<string, Spread>();
  readonly functions = new Map<string, Spread>();

  add({ crossings, functions, curves }: AssembledCase): void {
    for (const { from, to, temperatureK, uK, gas, stable } of crossings) {
      if (stable && gas !== 'real') spreadOf(this.crossings, `${from} > ${to}`).add(temperatureK, uK);
    }
    for (const rows of functions) {
      const { measuredFromK, measuredToK } = curves.find(({ phase }) => phase === rows.phase)!;
      for (let r = 0; r < rows.rows; r++) {
        const t = rows.temperatureK[r]!;
        if (t % 100 !== 0 || t < measuredFromK || t > measuredToK) continue;
        const at = `of ${rows.phase} at ${t} K`;
        spreadOf(this.functions, `G ${at}`).add(rows.gibbsEnergyJPerMol[r]!, rows.uGibbsEnergyJPerMol[r]!);
        spreadOf(this.functions, `H ${at}`).add(rows.enthalpyJPerMol[r]!, rows.uEnthalpyJPerMol[r]!);
        spreadOf(this.functions, `S ${at}`).add(rows.entropyJPerMolK[r]!, rows.uEntropyJPerMolK[r]!);
      }
    }
  }
}

function spreadOf(map: Map<string, Spread>, name: string): Spread {
  let one = map.get(name);
  if (one === undefined) {
    one = new Spread();
    map.set(name, one);
  }
  return one;
}
