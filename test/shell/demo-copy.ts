import { cpSync, mkdtempSync, readFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { type Request, readArguments } from '../../pipeline/shell/arguments.js';
import { openLibrary } from '../../pipeline/shell/library.js';
import type { Log } from '../../pipeline/shell/log.js';
import { judge } from '../../pipeline/shell/night-work.js';
import type { ReconciledCase } from '../../schemas/checked.js';
import { ROOT } from './run-cli.js';

export const TODAY = '2026-03-31';

export interface PlantedSlip {
  readonly medium: string;
  readonly source: string;
  readonly file: string;
  readonly line: number;
  readonly column: string;
  readonly printed: string;
  readonly clean: string;
  readonly about: string;
}

export const SLIPS: readonly PlantedSlip[] = JSON.parse(
  readFileSync(join(ROOT, 'test/demo/planted-slips.json'), 'utf8'),
);

/** The demo's sources, to be written to. */
export function demoCopy(): string {
  const sources = join(mkdtempSync(join(tmpdir(), 'cuspline-demo-')), 'sources');
  cpSync(join(ROOT, 'sources'), sources, { recursive: true });
  return sources;
}

/** A request as the command line would make it. */
export function asked(sources: string, ...words: string[]): Request {
  return readArguments([...words, '--sources', sources, '--jobs', '1'].filter(fits(words[0]!)), TODAY);
}

/** `trace` calculates one substance and has no --jobs. */
function fits(command: string): (word: string, i: number, all: readonly string[]) => boolean {
  return (word, i, all) => command !== 'trace' || (word !== '--jobs' && all[i - 1] !== '--jobs');
}

/** A log that keeps what it was told. */
export function recorder(): Log & { readonly events: Record<string, unknown>[]; readonly text: () => string } {
  const events: Record<string, unknown>[] = [];
  const said: string[] = [];
  return {
    events,
    text: () => said.join('\n'),
    begin: () => {},
    advance: () => {},
    end: () => {},
    tell: (event, lines) => {
      events.push(event);
      said.push(...lines);
    },
    fail: () => {},
  };
}

/** One substance as the sources now have it. */
export function judged(sources: string, substance: string, date = TODAY): ReconciledCase {
  const library = openLibrary({ sources, policy: null, date, only: null }, recorder());
  const at = library.substances.findIndex(({ id }) => id === substance);
  return judge(library, library.parts, at, at + 1).cases[0]!;
}

/** The finding that everything else about the substance follows from. */
export function rootOf(sources: string, substance: string): string {
  return judged(sources, substance).findings.find(({ cause, severity }) => cause === null && severity !== 'note')!.id;
}
