import type { ReconciledCase } from '../../schemas/checked.js';
import type { Finding, Suspect } from '../../schemas/finding.js';
import type { IngestPart } from '../ingest/ingest.js';
import { sayFinding, saySuspects } from '../report/report.js';
import type { Request } from './arguments.js';
import { EXIT, Stop } from './exit-status.js';
import { type Library, openLibrary } from './library.js';
import type { Log } from './log.js';
import { nearest } from './nearest.js';
import { withCrew, workThrough } from './night.js';
import { judge } from './night-work.js';
import type { Crew } from './pool.js';
import type { StageSettings } from './stages.js';
import { count, wrap } from './text.js';

/** What the present sources say, calculated anew: every finding, and the library to calculate with again. */
export interface FoundInLibrary {
  readonly library: Library;
  readonly findings: readonly Finding[];
  readonly suspects: readonly Suspect[];
}

/** A finding with its substance as it stands, and a way to see it with something changed. */
export interface FoundFinding {
  readonly library: Library;
  readonly finding: Finding;
  readonly before: ReconciledCase;
  /** The substance calculated again with other parts or other settings. */
  readonly again: (parts: readonly IngestPart[], settings: StageSettings) => ReconciledCase;
}

/** Every finding of the library, or of `--only`. */
export function findAll(request: Request, log: Log): Promise<FoundInLibrary> {
  return withCrew(request, (crew) => findAllWith(request, log, crew));
}

async function findAllWith(request: Request, log: Log, crew: Crew | null): Promise<FoundInLibrary> {
  const library = openLibrary(request, log);
  const results = await workThrough(library.work({ release: null, findings: true }), crew, log, () => {
    throw new Error('looking for findings writes nothing');
  });
  const said = results.flatMap((result) => result.said);
  return {
    library,
    findings: [...library.general(results), ...said.flatMap(({ findings }) => findings)],
    suspects: said.flatMap(({ suspects }) => suspects),
  };
}

/** The finding that is meant by an id or the beginning of one. Throws a `Stop` that names the nearest ones. */
export async function findFinding(request: Request, log: Log): Promise<FoundFinding> {
  const { library, findings } = await findAll(request, log);
  const finding = meant(request, findings);
  if (finding.substance === '') {
    throw new Stop(
      `Finding ${finding.id} belongs to no substance: ${sayFinding(finding)}`,
      `Mend what it names; "${request.command}" has no hold on it.`,
    );
  }
  const at = library.substances.findIndex(({ id }) => id === finding.substance);
  const again = (parts: readonly IngestPart[], settings: StageSettings): ReconciledCase =>
    judge({ substances: library.substances, settings }, parts, at, at + 1).cases[0]!;
  return { library, finding, before: again(library.parts, library.settings), again };
}

function meant({ operand, command }: Request, findings: readonly Finding[]): Finding {
  const sought = operand!.toLowerCase();
  const fitting = [...new Map(findings.filter(({ id }) => id.startsWith(sought)).map((one) => [one.id, one])).values()];
  if (fitting.length === 1) return fitting[0]!;
  if (fitting.length > 1) {
    throw new Stop(
      `${fitting.length} findings begin with "${operand}": ${fitting
        .slice(0, 5)
        .map(({ id, substance }) => `${id} (${substance})`)
        .join(', ')}${fitting.length > 5 ? ' …' : ''}.`,
      'Write more of the id.',
      EXIT.usage,
    );
  }
  const near = nearest(
    sought,
    findings.map(({ id }) => id),
  );
  throw new Stop(
    `The present sources give no finding "${operand}".`,
    `${near.length === 0 ? '' : `The nearest ${near.length === 1 ? 'is' : 'are'} ${near.join(', ')}. `}` +
      `"cuspline ${command}" alone lists the findings with their ids; "cuspline check --log json" gives all of each.`,
    EXIT.usage,
  );
}

const MOST_LISTED = 50;

/** What there is to correct or to accept: faults and doubts that follow from no other, each with its id. */
export async function listFindings(request: Request, log: Log): Promise<void> {
  const { findings, suspects } = await findAll(request, log);
  const open = findings.filter(
    ({ severity, accepted, substance }) => severity !== 'note' && !accepted && substance !== '',
  );
  const ids = new Set(open.map(({ id }) => id));
  const roots = open.filter(({ cause }) => cause === null || !ids.has(cause));
  const shown = roots.slice(0, MOST_LISTED);
  const lines = shown.flatMap((finding) => {
    const { id, substance, severity, rule } = finding;
    const own = suspects.filter((suspect) => suspect.finding === id);
    const said = own.length > 0 ? saySuspects(own) : wrap(sayFinding(finding), 76);
    return [`${id}  ${substance}  ${severity}  ${rule}`, ...said.map((line) => `    ${line}`)];
  });
  const more = roots.length - shown.length;
  log.tell({ event: 'findings', findings: roots, suspects: suspects.filter(({ finding }) => ids.has(finding)) }, [
    ...(roots.length === 0 ? [`There is no open finding to ${request.command}.`] : lines),
    ...(more > 0 ? ['', `and ${more} more; --only SUBSTANCE narrows the list`] : []),
    ...(roots.length === 0
      ? []
      : ['', `${count(roots.length, 'finding')}. Name one by its id, or by the beginning of it.`]),
  ]);
}
