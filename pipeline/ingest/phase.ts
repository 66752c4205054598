/** What a source calls a phase, as a label of the IUPAC Green Book's state symbols. */
import { nearestWords } from './nearest.js';
import type { TablePlan } from './plan.js';

const LABEL = /^(?:s|cr|l|g|am|vit|lc)(?:-[\p{L}\p{N}]+)*$/u;
const SYMBOLS = ['s', 'cr', 'l', 'g', 'am', 'vit', 'lc'];

/** The label, or null where neither the map nor the symbols know the word. */
export function resolvePhase(phases: TablePlan['phases'], substance: string, word: string): string | null {
  const nested = own(phases, substance);
  const mapped = (typeof nested === 'object' ? own(nested, word) : undefined) ?? own(phases, word);
  const label = typeof mapped === 'string' ? mapped : word;
  return LABEL.test(label) ? label : null;
}

/** True for `g` and its polymorph-like labels. */
export function isGasLabel(label: string): boolean {
  return /^g(?:-|$)/.test(label);
}

/** What a vapour pressure's phase may be. */
export const CONDENSED_WANTED = 'the condensed phase that the vapour stands over, such as l or cr';

export const phaseWanted = (word: string, phases: TablePlan['phases']): string =>
  `one of ${SYMBOLS.join(', ')}, optionally with a polymorph label (cr-alpha), or a word of the source's "phases" map${nearestWords(
    word,
    [
      ...SYMBOLS,
      ...Object.entries(phases).flatMap(([key, value]) => (typeof value === 'string' ? [key] : Object.keys(value))),
    ],
  )}`;

function own<T>(record: Readonly<Record<string, T>>, key: string): T | undefined {
  return Object.hasOwn(record, key) ? record[key] : undefined;
}
