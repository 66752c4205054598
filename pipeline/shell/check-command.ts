import type { Finding, Suspect } from '../../schemas/finding.js';
import { sayFinding, sayPlace, saySuspects } from '../report/report.js';
import type { Request } from './arguments.js';
import { EXIT, type ExitStatus } from './exit-status.js';
import { openLibrary } from './library.js';
import type { Log } from './log.js';
import { withCrew, workThrough } from './night.js';
import type { FoundOut } from './night-work.js';
import type { Crew } from './pool.js';
import { cautionLines, tally, verdictLines } from './summary-lines.js';
import { wrap } from './text.js';
import { declaredUnitLines, declaredUnits } from './unit-lines.js';

/** `cuspline check`: all that nightly does but publishing; every finding is printed. */
export function check(request: Request, log: Log): Promise<ExitStatus> {
  return withCrew(request, (crew) => checkWith(request, log, crew));
}

async function checkWith(request: Request, log: Log, crew: Crew | null): Promise<ExitStatus> {
  const library = openLibrary(request, log);
  const units = declaredUnits(library.parts.map(({ plan }) => plan.meaning));
  log.tell({ event: 'units', columns: units }, ['Units as declared', ...declaredUnitLines(units).map(indented), '']);
  const work = library.work({ release: null, findings: true });
  const results = await workThrough(work, crew, log, () => {
    throw new Error('check writes nothing');
  });
  for (const finding of library.general(results)) tellFinding(log, finding, []);
  for (const found of results.flatMap(({ said }) => said)) tellFound(log, found);
  const lines = results.flatMap((result) => result.lines);
  const counts = tally(lines);
  const status = request.strict && counts.withheld > 0 ? EXIT.withheld : EXIT.done;
  log.tell({ event: 'summary', outcome: 'checked', status, substances: lines.length, ...counts }, [
    ...verdictLines(lines),
    '',
    'Nothing was written.',
    ...cautionLines(),
  ]);
  return status;
}

/** Findings in their order, each followed by those that follow from it. */
function tellFound(log: Log, { findings, suspects }: FoundOut): void {
  const ids = new Set(findings.map(({ id }) => id));
  const roots = findings.filter(({ cause }) => cause === null || !ids.has(cause));
  for (const root of roots) {
    for (const finding of [root, ...findings.filter(({ cause }) => cause === root.id)]) {
      tellFinding(
        log,
        finding,
        suspects.filter((suspect) => suspect.finding === finding.id),
        finding === root ? '' : '  ',
      );
    }
  }
}

function tellFinding(log: Log, finding: Finding, suspects: readonly Suspect[], indent = ''): void {
  const message = sayFinding(finding);
  const { substance, severity, rule, address } = finding;
  const place = address === null ? '' : `  ${sayPlace(address)}`;
  const lines = [
    `${substance === '' ? 'source' : substance}  ${severity}  ${rule}${place}  [${finding.id.slice(0, 8)}]`,
    ...wrap(message, 76 - indent.length).map(indented),
    ...saySuspects(suspects).map(indented),
    '',
  ];
  log.tell(
    { event: 'finding', message, ...finding, suspects },
    lines.map((line) => (line === '' ? '' : `${indent}${line}`)),
  );
}

function indented(line: string): string {
  return `  ${line}`;
}
