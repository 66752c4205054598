/** Plants slips one at a time, runs the pipeline on each spoilt library in process, and gathers the scores by kind. */
import { cpSync, mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { seededRandom } from './random.js';
import { materialLimit, plantSlip, SLIP_KINDS, type Slip, type SlipKind } from './slip-maker.js';
import { leastFrom, type Seen, type SlipScore, scoreSlip } from './slip-score.js';
import { listCells } from './source-cells.js';

export interface Studied {
  readonly seed: number;
  readonly slip: Slip;
  readonly score: SlipScore;
}

export interface Study {
  readonly studied: readonly Studied[];
  /** Seeds whose kind found no cell that can hold a slip large enough. */
  readonly without: readonly { readonly seed: number; readonly kind: SlipKind }[];
}

export interface StudyOptions {
  readonly kinds?: readonly SlipKind[];
  /** `printed`: slips from 1.5 times the printed smallest detectable error up; `material`: from what a user would notice up, though the clean run may say that so little would not be seen. */
  readonly sizes?: 'printed' | 'material';
}

/**
 * The kinds take turns with the seeds.
 * @param run everything that a run says about a sources folder
 */
export async function studySlips(
  sourcesDir: string,
  seeds: readonly number[],
  run: (sourcesDir: string) => Promise<Seen>,
  { kinds = SLIP_KINDS, sizes = 'printed' }: StudyOptions = {},
): Promise<Study> {
  const clean = await run(sourcesDir);
  const cells = listCells(sourcesDir);
  const least = sizes === 'printed' ? leastFrom(clean) : materialLimit;
  const studied: Studied[] = [];
  const without: { seed: number; kind: SlipKind }[] = [];
  for (const [turn, seed] of seeds.entries()) {
    const kind = kinds[turn % kinds.length]!;
    const scratch = mkdtempSync(join(tmpdir(), 'slips-'));
    try {
      const copy = join(scratch, 'sources');
      cpSync(sourcesDir, copy, { recursive: true });
      const slip = plantSlip(copy, { kind, random: seededRandom(seed), least }, cells);
      if (slip === null) without.push({ seed, kind });
      else studied.push({ seed, slip, score: scoreSlip(slip, clean, await run(copy)) });
    } finally {
      rmSync(scratch, { recursive: true });
    }
  }
  return { studied, without };
}

/** As a table by kind, with a line for each slip that was not found, not there only, or not in the first group. */
export function studyTable({ studied, without }: Study): string {
  const lines = [
    'kind | slips | found | there only | first suspect | first group | good',
    '--- | --: | --: | --: | --: | --: | --:',
  ];
  const row = (name: string, list: readonly Studied[]) => {
    const count = (keep: (score: SlipScore) => boolean) => list.filter(({ score }) => keep(score)).length;
    const good = count((s) => s.good);
    const share = list.length === 0 ? '' : ` (${((100 * good) / list.length).toFixed(1)} %)`;
    const there = count((s) => s.elsewhere.length === 0);
    const counts = [count((s) => s.found), there, count((s) => s.first), count((s) => s.firstGroup)];
    lines.push(`${name} | ${list.length} | ${counts.join(' | ')} | ${good}${share}`);
  };
  for (const kind of SLIP_KINDS)
    row(
      kind,
      studied.filter(({ slip }) => slip.kind === kind),
    );
  row('all', studied);
  for (const { seed, slip, score } of studied) {
    if (score.good) continue;
    const { kind, substance, file, line, column, clean, printed, timesLeast } = slip;
    const said = score.found ? `first: ${score.firstSuspect ?? 'no suspect'} (${score.rootRule})` : 'not found';
    const others = score.elsewhere.length > 0 ? `; also accused: ${score.elsewhere.join(', ')}` : '';
    lines.push(
      `seed ${seed}, ${kind}, ${substance}: ${file}:${line} ${column} ${clean} → ${printed} (${timesLeast.toFixed(1)} × least): ${said}${others}`,
    );
  }
  for (const { seed, kind } of without) lines.push(`seed ${seed}, ${kind}: no cell can hold a slip large enough`);
  return lines.join('\n');
}
