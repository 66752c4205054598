import { join } from 'node:path';
import { type Acceptance, acceptanceSchema } from '../../schemas/accepted.js';
import { sayFinding } from '../report/report.js';
import type { Request } from './arguments.js';
import { beforeAfterLines } from './before-after.js';
import { EXIT, type ExitStatus, Stop } from './exit-status.js';
import { findFinding, listFindings } from './find-finding.js';
import { readJsonList, withEntry, writeAtomically } from './json-list.js';
import type { Log } from './log.js';
import { ACCEPTED_FILE } from './sources.js';
import { count, wrap } from './text.js';

/** `cuspline accept FINDING`: lets a disagreement stand until a day, and says what follows from that. */
export async function accept(request: Request, log: Log): Promise<ExitStatus> {
  if (request.operand === null) {
    await listFindings(request, log);
    return EXIT.done;
  }
  const terms = termsOf(request);
  const { finding, before, library, again } = await findFinding(request, log);
  const entry = acceptanceSchema.parse({ finding: finding.id, evidenceHash: finding.evidenceHash, ...terms });
  const accepted = [...library.settings.accepted.filter((old) => old.finding !== finding.id), entry];
  const after = again(library.parts, { ...library.settings, accepted });
  if (after.findings.find(({ id }) => id === finding.id)?.accepted !== true) {
    throw new Stop(
      `Finding ${finding.id} cannot be accepted: ${sayFinding(finding)}`,
      `Mend what it names; see cuspline show ${finding.substance}.`,
    );
  }
  const list = readJsonList(join(request.sources, ACCEPTED_FILE));
  const isOlder = (old: unknown): boolean => (old as Partial<Acceptance> | null)?.finding === finding.id;
  const replaced = list.entries.filter(isOlder) as Acceptance[];
  writeAtomically(list.path, withEntry(list, entry, isOlder));
  const next = dayAfter(entry.until);
  log.tell(
    {
      event: 'acceptance',
      written: true,
      path: list.path,
      entry,
      replaced,
      substance: finding.substance,
      verdictBefore: before.verdict,
      verdictAfter: after.verdict,
      lapses: next,
    },
    [
      `${finding.id}  ${finding.substance}  ${finding.severity}  ${finding.rule}`,
      ...wrap(sayFinding(finding), 76).map((line) => `  ${line}`),
      '',
      `Written to ${list.path}${replaced.length === 0 ? '' : `, in the place of ${count(replaced.length, 'older entry', 'older entries')}`}.`,
      '',
      `${finding.substance} from ${entry.date}`,
      ...beforeAfterLines(before, after).map((line) => `  ${line}`),
      '',
      ...wrap(consequence(before.verdict, after.verdict, finding.severity), 80),
      ...wrap(
        `It lapses on ${next}, or as soon as ${cells(finding.evidence.length)} changes; the finding then counts again, and a note says why.`,
        80,
      ),
    ],
  );
  return EXIT.done;
}

interface Terms {
  readonly reason: string;
  readonly by: string;
  readonly date: string;
  readonly until: string;
}

function termsOf({ reason, by, until, date }: Request): Terms {
  const given = { reason, by, until };
  const missing = Object.entries(given).filter(([, value]) => value === null || value.trim() === '');
  if (missing.length > 0) {
    throw new Stop(
      `An acceptance needs ${missing.map(([name]) => `--${name}`).join(', ')}.`,
      'For example: cuspline accept FINDING --reason "new sample" --by Kim --until 2027-06-30',
      EXIT.usage,
    );
  }
  if (until! < date) {
    throw new Stop(
      `--until is ${until}, and that is before ${date}: the acceptance would be over before it began.`,
      'Name a day to come, the last on which it is to hold.',
      EXIT.usage,
    );
  }
  return { reason: reason!, by: by!, date, until: until! };
}

function consequence(before: string, after: string, severity: string): string {
  if (severity === 'note') return 'It is a note, which withholds nothing: the verdict is what it was.';
  if (before === after && after === 'withheld')
    return 'Other findings still withhold the substance; see cuspline show.';
  if (before === after) return `The verdict is what it was: ${after}.`;
  return `From the next night the substance is ${after}; it was ${before}.`;
}

function cells(n: number): string {
  return n === 0 ? 'its evidence' : n === 1 ? 'the printed cell behind it' : `one of the ${n} printed cells behind it`;
}

function dayAfter(day: string): string {
  return new Date(Date.parse(`${day}T00:00:00Z`) + 86_400_000).toISOString().slice(0, 10);
}
