/** Runs all stages on a sources folder in process, without publishing, and hands back what was found. */
import { openLibrary } from '../../pipeline/shell/library.js';
import type { Log } from '../../pipeline/shell/log.js';
import { judge } from '../../pipeline/shell/night-work.js';
import type { Seen } from './seen.js';

const DATE = '2024-01-01';
const quiet: Log = { begin: () => {}, advance: () => {}, end: () => {}, tell: () => {}, fail: () => {} };

export async function runPipeline(sourcesDir: string): Promise<Seen> {
  const library = openLibrary({ sources: sourcesDir, policy: null, date: DATE, only: null }, quiet);
  const work = library.work({ release: null, findings: true });
  const { cases } = judge(work, library.parts, 0, library.substances.length);
  return {
    findings: cases.flatMap((one) => one.findings.map((finding) => ({ ...finding, finding: finding.id }))),
    suspects: cases.flatMap((one) => one.suspects.map((suspect) => ({ ...suspect, ...suspect.address }))),
    coverage: cases.flatMap((one) => one.outcomes),
  };
}
