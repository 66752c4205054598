import type { ReconciledCase } from '../../schemas/checked.js';
import type { Finding, Suspect } from '../../schemas/finding.js';
import type { Address } from '../../schemas/harmonised.js';
import { sayFinding, saySuspect } from '../report/report.js';
import type { Request } from './arguments.js';
import { type Ask, askOnTerminal } from './ask.js';
import { beforeAfterLines, newFindings } from './before-after.js';
import { refuseWholeColumn } from './column-remedy.js';
import {
  chosenSuspect,
  type PlannedCorrection,
  plannedCorrection,
  suspectsToCorrect,
  valuesToTry,
  withCorrection,
} from './correction-entry.js';
import { refuseExchange } from './exchange-remedy.js';
import { EXIT, type ExitStatus, Stop } from './exit-status.js';
import { type FoundFinding, findFinding, listFindings } from './find-finding.js';
import { withEntry, writeAtomically } from './json-list.js';
import type { Log } from './log.js';
import { shellWord } from './shell-word.js';
import { wrap } from './text.js';

/** `cuspline correct FINDING`: shows what an entry in corrections.json would change, and writes it when that is confirmed. */
export async function correct(request: Request, log: Log, ask: Ask = askOnTerminal(request)): Promise<ExitStatus> {
  if (request.operand === null) {
    await listFindings(request, log);
    return EXIT.done;
  }
  const found = await findFinding(request, log);
  const { finding, before } = found;
  const suspects = suspectsToCorrect(found);
  const suspect = chosenSuspect(suspects, request);
  refuseExchange(found, suspect, request);
  refuseWholeColumn(found, suspect, request.sources);
  const { planned, after, first } = bestOf(request, found, suspect);
  refuseUnreadable(after, suspect.address, planned);
  const event = {
    event: 'correction',
    finding: finding.id,
    substance: finding.substance,
    path: planned.list.path,
    entry: planned.entry,
    suspects,
    before: inShort(before),
    after: inShort(after),
  };
  log.tell({ ...event, written: false }, [
    ...findingLines(finding),
    ...suspectLines(suspects, suspect),
    ...entryLines(planned),
    ...(first.planned === planned
      ? []
      : wrap(
          `With ${first.planned.entry.corrected} the substance would be ${first.after.verdict}: the printed cell may have too few digits to be converted. Hence ${planned.entry.corrected}, where the system closes.`,
          80,
        )),
    '',
    `${finding.substance}, without and with this entry`,
    ...beforeAfterLines(before, after).map(indented),
    ...brokenLines(before, after),
    '',
  ]);
  const confirmed = request.yes || (ask !== null && (await ask(`Write this entry to ${planned.list.path}?`)));
  if (!confirmed) {
    const next = commandAgain(request, finding);
    log.tell({ event: 'summary', outcome: 'not-written', status: EXIT.nothing, next }, [
      'Nothing was written. To write the entry:',
      `  ${next}`,
    ]);
    return EXIT.nothing;
  }
  writeAtomically(planned.list.path, withEntry(planned.list, planned.entry));
  log.tell({ ...event, written: true }, [
    `Written to ${planned.list.path}.`,
    ...wrap('The raw file is as it was; the next cuspline nightly uses the entry. To take it back, remove it.', 80),
  ]);
  return EXIT.done;
}

const VERDICTS = ['cleared', 'flagged', 'withheld'];

/** An entry, and the substance with it in force. */
interface Tried {
  readonly planned: PlannedCorrection;
  readonly after: ReconciledCase;
}

/**
 * The value that explains the cell, unless the one that closes the system leaves a better verdict: a figure converted from
 * few digits keeps their rounding.
 */
function bestOf(
  request: Request,
  { finding, library, again }: FoundFinding,
  suspect: Suspect,
): Tried & { readonly first: Tried } {
  const tried = valuesToTry(request, suspect).map((value): Tried => {
    const planned = plannedCorrection(request, finding, suspect, value);
    return { planned, after: again(withCorrection(library, planned), library.settings) };
  });
  const rank = ({ after }: Tried): number => VERDICTS.indexOf(after.verdict);
  const best = tried.reduce((a, b) => (rank(b) < rank(a) ? b : a));
  return { ...best, first: tried[0]! };
}

function findingLines(finding: Finding): string[] {
  const { id, substance, severity, rule } = finding;
  return [`${id}  ${substance}  ${severity}  ${rule}`, ...wrap(sayFinding(finding), 76).map(indented), ''];
}

/** Numbered as `--suspect` takes them; cells of one group cannot be told apart. */
function suspectLines(suspects: readonly Suspect[], chosen: Suspect): string[] {
  const alike = suspects.filter((one) => one.group === chosen.group && one !== chosen);
  return [
    suspects.length === 1 ? 'The suspect cell' : 'The suspect cells',
    ...suspects.map((one, i) => `${one === chosen ? '>' : ' '} ${i + 1}  ${saySuspect(one)}`),
    ...(alike.length === 0
      ? []
      : wrap(
          `The data cannot tell ${alike.length === 1 ? 'the other one' : 'the others'} of its group from it: ` +
            `${alike.map((one) => suspects.indexOf(one) + 1).join(', ')}. Compare with the original, and choose with --suspect.`,
          80,
        )),
    '',
  ];
}

function entryLines({ list, entry }: PlannedCorrection): string[] {
  const { file, line, column, printed, corrected, reason, who, date } = entry;
  const rows = { file, line, column, printed, corrected, reason, who, date };
  return [
    `${list.text === null ? 'A new file, ' : 'One more entry in '}${list.path}`,
    ...Object.entries(rows).flatMap(([key, value]) =>
      wrap(String(value), 66).map((text, i) => `  ${(i === 0 ? key : '').padEnd(11)}${text}`),
    ),
  ];
}

function brokenLines(before: ReconciledCase, after: ReconciledCase): string[] {
  const broken = newFindings(before, after);
  if (broken.length === 0) return [];
  return ['', 'What this entry brings about', ...broken.flatMap((one) => wrap(sayFinding(one), 76).map(indented))];
}

/** A value that cannot be read would only put another finding in the place of this one. */
function refuseUnreadable(after: ReconciledCase, address: Address, { entry }: PlannedCorrection): void {
  const bad = after.findings.find(
    ({ detail, address: at }) =>
      detail.code === 'reading' &&
      (detail.problem === 'cell-not-a-number' || detail.problem === 'cell-not-finite') &&
      at?.source === address.source &&
      at.file === address.file &&
      at.line === address.line &&
      at.column === address.column,
  );
  if (bad === undefined || bad.detail.code !== 'reading') return;
  throw new Stop(
    `"${entry.corrected}" cannot be read there; expected was ${bad.detail.wanted}.`,
    `Write the cell as its column prints it; now it says ${entry.printed}.`,
    EXIT.usage,
  );
}

/** The same command with what makes it write. */
function commandAgain(request: Request, { id }: Finding): string {
  const { suspect, value, reason, by, sources, policy } = request;
  const words = ['cuspline', 'correct', id];
  if (suspect !== 1) words.push('--suspect', String(suspect));
  for (const [name, text] of Object.entries({ value, reason, by, policy })) {
    if (text !== null) words.push(`--${name}`, text);
  }
  if (sources !== './sources') words.push('--sources', sources);
  return [...words, '--yes'].map(shellWord).join(' ');
}

function inShort({ verdict, findings, checked: { judged } }: ReconciledCase) {
  return {
    verdict,
    findings: findings.map(({ id, rule, severity, accepted }) => ({ id, rule, severity, accepted })),
    transitions: judged.map(({ stated, computedK, uComputedK, outcome }) => ({
      from: stated.from,
      to: stated.to,
      statedK: stated.temperature.value,
      computedK,
      uComputedK,
      outcome,
    })),
  };
}

function indented(line: string): string {
  return `  ${line}`;
}
