/** Slips on the published sets and on synthetic substances, over several rounds. */
import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import type { DesignName } from '../synthetic/designs.js';
import { writeSyntheticLibrary } from '../synthetic/write-library.js';
import { type CleanLibrary, cleanRun, type Scored, spoilAll } from './campaign.js';
import type { Seen } from './seen.js';
import type { SlipKind } from './slip-kinds.js';
import { SLIP_KINDS } from './slip-maker.js';
import type { Cleanness } from './slip-rates.js';

export interface Study {
  readonly one: readonly Scored[];
  readonly two: readonly Scored[];
  readonly clean: Cleanness;
  /** Of the substances left clean beside spoilt ones, those with a new fault or doubt. */
  readonly bystanders: number;
  readonly accused: readonly string[];
}

export interface StudyOptions {
  /** Rounds of one slip in each substance, and of two. */
  readonly rounds: number;
  readonly pairRounds: number;
  readonly firstSeed: number;
  readonly kinds?: readonly SlipKind[];
}

type Run = (sourcesDir: string) => Promise<Seen>;

/** @param folders sources folders, each a design of its own name */
export async function studyPublished(
  folders: Readonly<Record<string, string>>,
  run: Run,
  options: StudyOptions,
): Promise<Study> {
  const studies: Study[] = [];
  for (const [design, folder] of Object.entries(folders)) {
    const clean = await cleanRun(folder, folder, run, () => design);
    studies.push(await study([clean], options));
  }
  return joined(studies);
}

/** Each round of single slips has substances of its own. */
export async function studySynthetic(
  substances: number,
  run: Run,
  options: StudyOptions,
  designs?: readonly DesignName[],
): Promise<Study> {
  const scratch = mkdtempSync(join(tmpdir(), 'synthetic-'));
  try {
    const libraries: CleanLibrary[] = [];
    for (let round = 0; round < Math.max(options.rounds, options.pairRounds); round++) {
      const folder = join(scratch, String(round));
      const seed = options.firstSeed + round;
      const written = writeSyntheticLibrary(folder, {
        seed,
        substances,
        vapourPressures: true,
        ...(designs === undefined ? {} : { designs }),
      });
      const designOf = new Map(written.map(({ id, design }) => [id, design]));
      libraries.push(await cleanRun(`synthetic ${seed}`, folder, run, (id) => designOf.get(id)!));
    }
    return await study(libraries, options);
  } finally {
    rmSync(scratch, { recursive: true });
  }
}

/** Rounds take the libraries in turn. */
async function study(libraries: readonly CleanLibrary[], options: StudyOptions): Promise<Study> {
  const { rounds, pairRounds, firstSeed, kinds = SLIP_KINDS } = options;
  const one: Scored[] = [];
  const two: Scored[] = [];
  const accused: string[] = [];
  let bystanders = 0;
  let turn = 0;
  for (let round = 0; round < rounds + pairRounds; round++) {
    const pair = round >= rounds;
    const library = libraries[(pair ? round - rounds : round) % libraries.length]!;
    const campaign = await spoilAll(library, firstSeed + round, { firstKind: turn, slipsEach: pair ? 2 : 1, kinds });
    (pair ? two : one).push(...campaign.scored);
    bystanders += campaign.bystanders;
    accused.push(...campaign.accused.map((id) => `${firstSeed + round} ${id}`));
    // A step that shares no factor with the number of kinds, so that every substance meets every kind.
    turn += library.library.substances.length + 1;
  }
  return { one, two, bystanders, accused, clean: cleanness(libraries) };
}

function cleanness(libraries: readonly CleanLibrary[]): Cleanness {
  const all = libraries.flatMap(({ library, findings }) =>
    library.substances.map(({ id }) => ({ id, severities: findings.of(id).map(({ severity }) => severity) })),
  );
  const grave = all.filter(({ severities }) => severities.some((severity) => severity !== 'note'));
  return {
    substances: all.length,
    accused: grave.map(({ id }) => id),
    noted: all.filter(({ severities }) => severities.length > 0).length - grave.length,
  };
}

function joined(studies: readonly Study[]): Study {
  return {
    one: studies.flatMap(({ one }) => one),
    two: studies.flatMap(({ two }) => two),
    bystanders: studies.reduce((sum, { bystanders }) => sum + bystanders, 0),
    accused: studies.flatMap(({ accused }) => accused),
    clean: {
      substances: studies.reduce((sum, { clean }) => sum + clean.substances, 0),
      accused: studies.flatMap(({ clean }) => clean.accused),
      noted: studies.reduce((sum, { clean }) => sum + clean.noted, 0),
    },
  };
}
