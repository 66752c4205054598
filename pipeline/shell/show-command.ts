import { sayFinding } from '../report/report.js';
import type { Request } from './arguments.js';
import { EXIT, type ExitStatus } from './exit-status.js';
import { openLibrary } from './library.js';
import type { Log } from './log.js';
import { judge } from './night-work.js';
import { readPressure } from './pressure.js';
import { showLines } from './show.js';
import { cautionLines } from './summary-lines.js';

/** `cuspline show SUBSTANCE`: calculated anew from the sources, at the pressure asked for. */
export async function show(request: Request, log: Log): Promise<ExitStatus> {
  const pressurePa = request.pressure === null ? null : readPressure(request.pressure);
  const library = openLibrary({ ...request, only: [request.operand!] }, log);
  const policy = { ...library.settings.policy, ...(pressurePa === null ? {} : { pressurePa }) };
  const at = library.substances.findIndex(({ id }) => id === request.operand);
  const { cases } = judge(
    { substances: library.substances, settings: { ...library.settings, policy } },
    library.parts,
    at,
    at + 1,
  );
  const shown = cases[0]!;
  const { assembled, judged } = shown.checked;
  log.tell(
    {
      event: 'substance',
      substance: assembled.examined.harmonised.substance,
      verdict: shown.verdict,
      pressurePa: policy.pressurePa,
      phases: assembled.curves.map(({ phase, family, measuredFromK, measuredToK }) => ({
        phase,
        ...family,
        measuredFromK,
        measuredToK,
      })),
      transitions: judged.map(({ stated, ...rest }) => ({
        from: stated.from,
        to: stated.to,
        order: stated.order,
        gas: stated.gas,
        pressurePa: stated.pressurePa,
        statedK: stated.temperature.value,
        ...rest,
      })),
      crossings: assembled.crossings,
      findings: shown.findings.map((finding) => ({ ...finding, message: sayFinding(finding) })),
      suspects: shown.suspects,
    },
    [...showLines(shown, policy.pressurePa), '', ...cautionLines()],
  );
  return EXIT.done;
}
