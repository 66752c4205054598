/**
 * What the adjustment of one substance costs, beside the stages that come before it in the same run:
 *
 *     npm run bench:adjustment
 *
 * Synthetic substances of each design; the middle one of many runs of each.
 */
import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { adjusted, adjustmentOutcomes } from '../../pipeline/reconcile/adjustment-closes.js';
import { systemOf } from '../../pipeline/reconcile/system/system.js';
import { openLibrary } from '../../pipeline/shell/library.js';
import { STAGES, type Stage } from '../../pipeline/shell/stages.js';
import type { CheckedCase } from '../../schemas/checked.js';
import { DESIGN_NAMES, type DesignName } from '../synthetic/designs.js';
import { writeSyntheticLibrary } from '../synthetic/write-library.js';

const SUBSTANCES = 40;
const RUNS = 60;
const quiet = { begin: () => {}, advance: () => {}, end: () => {}, tell: () => {}, fail: () => {} };

const middle = (values: number[]): number => values.sort((a, b) => a - b)[Math.floor(values.length / 2)]!;

function timesOf(run: () => unknown): number {
  const times = Array.from({ length: RUNS }, () => {
    const begin = performance.now();
    run();
    return performance.now() - begin;
  });
  return 1000 * middle(times);
}

function measured(design: DesignName): string {
  const dir = mkdtempSync(join(tmpdir(), 'bench-adjustment-'));
  try {
    writeSyntheticLibrary(dir, { seed: 700_001, substances: SUBSTANCES, designs: [design] });
    const library = openLibrary({ sources: dir, policy: null, date: '2024-01-01', only: null }, quiet);
    const { policy } = library.settings;
    const before = STAGES.slice(0, -1) as readonly Stage<never, unknown>[];
    const allBefore = (): readonly CheckedCase[] => {
      let artefact: unknown = { substances: library.substances, first: 0, parts: library.parts };
      for (const { run } of before) artefact = run(artefact as never, library.settings).artefact;
      return artefact as readonly CheckedCase[];
    };
    const floor = timesOf(allBefore) / SUBSTANCES;
    const cases = allBefore();
    const adjust = (one: CheckedCase) => adjustmentOutcomes(adjusted(systemOf(one, null), 20, policy));
    for (const one of cases) timesOf(() => adjust(one));
    const each = cases.map((one) => timesOf(() => adjust(one)));
    const conditions = middle(cases.map((one) => systemOf(one, null).m));
    const own = middle(each);
    return `${design.padEnd(18)} ${String(conditions).padStart(10)} ${own.toFixed(0).padStart(10)} ${floor.toFixed(0).padStart(22)} ${(own / floor).toFixed(3).padStart(8)}`;
  } finally {
    rmSync(dir, { recursive: true });
  }
}

console.log('design             conditions  adjust/µs  stages before it/µs    ratio');
for (const design of DESIGN_NAMES) console.log(measured(design));
