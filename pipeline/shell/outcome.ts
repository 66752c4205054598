import type { Summary } from '../../schemas/summary.js';
import type { LossGuardResult } from '../publish/publish.js';
import { EXIT, type ExitStatus } from './exit-status.js';
import { count } from './text.js';

export type OutcomeKind = 'published' | 'nothing-to-publish' | 'held-back';

export interface NightFacts {
  readonly cleared: number;
  readonly flagged: number;
  readonly withheld: number;
  /** The release that stands: its name, and its summary where it can be read. */
  readonly standing: { readonly release: string; readonly summary: Summary | 'unreadable' } | null;
  /** Substances of this run. */
  readonly substances: readonly string[];
  /** The run was limited by `--only`. */
  readonly limited: boolean;
  readonly guard: LossGuardResult;
  readonly acceptLosses: boolean;
  readonly strict: boolean;
  /** Of the new release, for people. */
  readonly release: string;
  readonly path: string;
  readonly current: string;
}

export interface NightOutcome {
  readonly kind: OutcomeKind;
  readonly status: ExitStatus;
  /** Published before and lost by the new release, where that held it back. */
  readonly lost: readonly string[];
  readonly lines: readonly string[];
}

/** Whether the new release becomes the current one, and the words and the status that say so. */
export function outcomeOf(facts: NightFacts): NightOutcome {
  const { standing, release, path, guard } = facts;
  const stands = standing === null ? 'There is no older release.' : `Release ${standing.release} still stands.`;
  if (facts.cleared + facts.flagged === 0) {
    return {
      kind: 'nothing-to-publish',
      status: EXIT.nothing,
      lost: [],
      lines: [
        `Nothing could be published: every substance is withheld. ${stands}`,
        `What was found is kept in ${path}.`,
      ],
    };
  }
  const held = facts.acceptLosses ? null : reasonToHold(facts);
  if (held !== null) {
    return {
      kind: 'held-back',
      status: EXIT.heldBack,
      lost: held.lost,
      lines: [`Held back: ${held.why} ${stands}`, `The new release is kept in ${path}. ${held.next}`],
    };
  }
  return {
    kind: 'published',
    status: facts.strict && facts.withheld > 0 ? EXIT.withheld : EXIT.done,
    lost: [],
    lines: [
      `Release ${release} is in ${path}, and ${facts.current} leads to it.`,
      ...(guard.lost.length > 0 ? [`Cleared before and withheld now: ${guard.lost.join(', ')}.`] : []),
    ],
  };
}

interface Held {
  readonly why: string;
  readonly next: string;
  readonly lost: readonly string[];
}

function reasonToHold({ standing, guard, limited, substances }: NightFacts): Held | null {
  if (standing === null) return null;
  const { summary } = standing;
  if (summary === 'unreadable') {
    return {
      why: 'the release that stands is damaged, so nobody can say what would be lost.',
      next: `Look at it with cuspline verify current, or replace it with --accept-losses.`,
      lost: [],
    };
  }
  if (guard.held) {
    return {
      why: `${guard.lost.length} of ${guard.clearedBefore} substances that are cleared now would be withheld.`,
      next: 'Mend the tables, or publish it with --accept-losses.',
      lost: guard.lost,
    };
  }
  // Readers of `current` would find only the few substances that somebody tried out.
  const here = new Set(substances);
  const missing = Object.keys(summary.verdicts).filter((id) => summary.verdicts[id] !== 'withheld' && !here.has(id));
  if (!limited || missing.length === 0) return null;
  return {
    why: `the run was limited by --only, and ${count(missing.length, 'published substance')} would be missing.`,
    next: 'Read it there, or name another folder with --out; --accept-losses publishes it all the same.',
    lost: missing,
  };
}
