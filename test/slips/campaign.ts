/** Plants a slip in each of many substances of one copy of a library, runs it once, and scores all of them. */
import { cpSync, mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { Detectable } from './detectable.js';
import { type Random, seededRandom } from './random.js';
import type { Seen } from './seen.js';
import type { SlipKind } from './slip-kinds.js';
import { readLibrary, type SlipLibrary, type SlipSubstance } from './slip-library.js';
import { draftSlip, plantSlips, SLIP_KINDS, type Slip } from './slip-maker.js';
import { Findings, type SlipScore, scoreSlip } from './slip-score.js';

export interface Scored {
  readonly seed: number;
  /** Name of the clean library. */
  readonly library: string;
  readonly design: string;
  readonly slip: Slip;
  readonly testable: boolean;
  readonly score: SlipScore;
}

export interface Campaign {
  readonly scored: readonly Scored[];
  /** Substances that were left clean although others in the library were spoilt, and how many got a new fault or doubt. */
  readonly bystanders: number;
  readonly accused: readonly string[];
}

/** A library with what the run on it says. */
export interface CleanLibrary {
  readonly name: string;
  readonly library: SlipLibrary;
  readonly findings: Findings;
  readonly detectable: Detectable;
  readonly designOf: (substance: string) => string;
  readonly run: (sourcesDir: string) => Promise<Seen>;
}

export async function cleanRun(
  name: string,
  sourcesDir: string,
  run: (sourcesDir: string) => Promise<Seen>,
  designOf: (substance: string) => string,
): Promise<CleanLibrary> {
  const seen = await run(sourcesDir);
  const library = readLibrary(sourcesDir);
  return { name, library, findings: new Findings(seen), detectable: new Detectable(seen, library), designOf, run };
}

/** Every so many substances one is left clean: it must stay so. */
const BYSTANDER_EVERY = 10;

/**
 * One copy, one run: in each substance one slip, or two of which each is one cell. The kinds take turns, from `firstKind` on.
 */
export async function spoilAll(
  clean: CleanLibrary,
  seed: number,
  { firstKind = 0, slipsEach = 1 as 1 | 2, kinds = SLIP_KINDS as readonly SlipKind[] } = {},
): Promise<Campaign> {
  const { library } = clean;
  const random = seededRandom(seed);
  const planted: Slip[][] = [];
  const left: string[] = [];
  let turn = firstKind;
  library.substances.forEach((substance, i) => {
    if (library.substances.length > BYSTANDER_EVERY && i % BYSTANDER_EVERY === BYSTANDER_EVERY - 1) {
      left.push(substance.id);
      return;
    }
    const slips = slipsEach === 1 ? oneSlip(clean, substance, random, kinds, turn) : twoSlips(clean, substance, random);
    turn++;
    if (slips.length === slipsEach) planted.push(slips);
    else left.push(substance.id);
  });
  const seen = await runSpoilt(clean, planted.flat());
  const spoilt = new Findings(seen);
  const scored = planted.flatMap((slips) =>
    slips.map((slip) => ({
      ...{
        seed,
        library: clean.name,
        slip,
        design: clean.designOf(slip.substance),
        testable: clean.detectable.isTestable(slip),
      },
      score: scoreSlip(slip, clean.findings, spoilt, slips.length === 1),
    })),
  );
  const accused = left.filter((id) => spoilt.newSince(clean.findings, id).length > 0);
  return { scored, bystanders: left.length, accused };
}

/** Shares no factor with the number of kinds, so that what one kind cannot hold does not always fall to the same other. */
const STRIDE = 17;

/** The kind whose turn it is, or another one that the substance can hold. */
function oneSlip(
  clean: CleanLibrary,
  substance: SlipSubstance,
  random: Random,
  kinds: readonly SlipKind[],
  turn: number,
) {
  const least = clean.detectable.leastOf.bind(clean.detectable);
  for (let step = 0; step < kinds.length; step++) {
    const slip = draftSlip(kinds[(turn + step * STRIDE) % kinds.length]!, substance, random, least);
    if (slip !== null) return [slip];
  }
  return [];
}

const ATTEMPTS = 40;

/** Two of single cells, both to be seen by what the clean run says, in different rows. */
function twoSlips(clean: CleanLibrary, substance: SlipSubstance, random: Random): Slip[] {
  const least = clean.detectable.leastOf.bind(clean.detectable);
  const slips: Slip[] = [];
  for (let attempt = 0; attempt < ATTEMPTS && slips.length < 2; attempt++) {
    const slip = draftSlip(random.pick(SLIP_KINDS), substance, random, least);
    if (slip === null || slip.cells.length !== 1 || slip.cells[0]!.cell === null) continue;
    if (!clean.detectable.isTestable(slip)) continue;
    const [other] = slips;
    const [a, b] = [slip.cells[0]!, other?.cells[0]];
    if (a.source === b?.source && a.file === b.file && a.line === b.line) continue;
    slips.push(slip);
  }
  return slips;
}

async function runSpoilt({ library, run }: CleanLibrary, slips: readonly Slip[]): Promise<Seen> {
  const scratch = mkdtempSync(join(tmpdir(), 'slips-'));
  try {
    const copy = join(scratch, 'sources');
    cpSync(library.dir, copy, { recursive: true });
    plantSlips(copy, slips);
    return await run(copy);
  } finally {
    rmSync(scratch, { recursive: true });
  }
}
