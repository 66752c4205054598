import type { ReconciledCase } from '../../schemas/checked.js';
import type { Correction } from '../../schemas/corrections.js';
import type { PhaseCurve } from '../../schemas/curves.js';
import type { Address } from '../../schemas/harmonised.js';
import type { RawCase } from '../../schemas/raw.js';
import { type IngestPart, ingest, selectRuns } from '../ingest/ingest.js';
import { figure, sayPlace } from '../report/report.js';
import type { Request } from './arguments.js';
import { EXIT, type ExitStatus, Stop } from './exit-status.js';
import { type Library, openLibrary } from './library.js';
import type { Log } from './log.js';
import { didYouMean } from './nearest.js';
import { judge } from './night-work.js';
import { readTemperature } from './temperature.js';
import { wrap } from './text.js';
import { type Trace, trace } from './trace.js';
import { traceLines } from './trace-lines.js';

/** `cuspline trace SUBSTANCE PHASE TEMPERATURE`: the raw numbers behind H, S and G, calculated anew from the sources. */
export async function traceCommand(request: Request, log: Log): Promise<ExitStatus> {
  const [phase = '', temperature = ''] = request.further;
  const temperatureK = readTemperature(temperature);
  const library = openLibrary({ ...request, only: [request.operand!] }, log);
  const { raw, judged } = caseOf(library, request.operand!);
  const curves = curvesAt(judged, phase, temperatureK);
  let begun = false;
  const traces = curves.map((curve) =>
    trace(raw, judged, curve, temperatureK, library.settings.policy, (done, total) => {
      if (!begun) log.begin('trace', curves.length * total, 'cell');
      begun = true;
      log.advance(curves.indexOf(curve) * total + done);
    }),
  );
  if (begun) log.end();
  const { name, id } = judged.checked.assembled.examined.harmonised.substance;
  const standing = judged.verdict === 'withheld' ? 'withheld, so that none of this is published' : judged.verdict;
  const correctionAt = (address: Address): Correction | null => correctionIn(library.parts, address);
  log.tell(
    {
      event: 'trace',
      substance: id,
      verdict: judged.verdict,
      phase,
      temperatureK,
      curves: traces.map((one) => forPrograms(one, correctionAt)),
      leftOut: leftOut(judged, phase),
    },
    [
      `${name} (${id}): ${standing}`,
      ...traces.flatMap((one) => ['', ...traceLines(one, request.all, correctionAt)]),
      ...leftOutLines(judged, phase),
    ],
  );
  return EXIT.done;
}

function caseOf(library: Library, id: string): { raw: RawCase; judged: ReconciledCase } {
  const { substances, parts, settings } = library;
  const at = substances.findIndex((one) => one.id === id);
  const { cases } = judge({ substances, settings }, parts, at, at + 1);
  const ours = parts.map((part) => ({ ...part, index: selectRuns(part.index, at, at + 1) }));
  const { artefact } = ingest({ substances: substances.slice(at, at + 1), first: at, parts: ours });
  return { raw: artefact[0]!, judged: cases[0]! };
}

/** The phase's curves, one a pressure, that reach the temperature. Throws a `Stop` that says what there is. */
function curvesAt(judged: ReconciledCase, phase: string, temperatureK: number): PhaseCurve[] {
  const { curves, examined } = judged.checked.assembled;
  const { id } = examined.harmonised.substance;
  const own = curves.filter((curve) => curve.phase === phase);
  if (own.length === 0) {
    const phases = [...new Set(curves.map((curve) => curve.phase))];
    throw new Stop(
      `${id} has no curve of a phase "${phase}".`,
      phases.length === 0
        ? `No phase of it has one; cuspline show ${id} says why.`
        : `${didYouMean(phase, phases)} It has ${phases.join(', ')}.`.trim(),
      EXIT.usage,
    );
  }
  const reaching = own.filter(({ knotK }) => temperatureK >= knotK[0]! && temperatureK <= knotK.at(-1)!);
  if (reaching.length > 0) return reaching;
  const ranges = own.map(({ knotK }) => `${figure(knotK[0]!)} to ${figure(knotK.at(-1)!)} K`);
  throw new Stop(
    `The curve of ${phase} does not reach ${figure(temperatureK)} K.`,
    `Name a temperature from ${ranges.join(', or from ')}.`,
    EXIT.usage,
  );
}

function correctionIn(parts: readonly IngestPart[], { source, file, line, column }: Address): Correction | null {
  for (const { plan, corrections } of parts) {
    if (plan.meaning.source !== source || plan.file !== file) continue;
    const entry = corrections.find((one) => one.line === line && one.column === column);
    if (entry !== undefined) return entry;
  }
  return null;
}

interface LeftOut extends Address {
  readonly printed: string;
  readonly finding: string;
}

/** More of one column are told by the first of them. */
const MOST_LEFT_OUT = 3;

/** Cells of the phase that the checks name: the curve is made without them. */
function leftOut(judged: ReconciledCase, phase: string): LeftOut[] {
  const { named, harmonised } = judged.checked.assembled.examined;
  return named.flatMap(({ series, row, quantity, finding }) => {
    const one = harmonised.series[series]!;
    if (one.phase !== phase) return [];
    const { table, line } = one;
    const column = table.columns.findIndex(({ is }) => is === quantity);
    const header = table.columns[column]?.header ?? quantity;
    const address = { source: table.source, file: table.file, line: line[row]!, column: header };
    return [{ ...address, printed: one.text(row, column), finding }];
  });
}

function leftOutLines(judged: ReconciledCase, phase: string): string[] {
  const cells = leftOut(judged, phase);
  if (cells.length === 0) return [];
  const columns = new Map<string, LeftOut[]>();
  for (const cell of cells) {
    const key = `${cell.finding} ${cell.file} ${cell.column}`;
    columns.set(key, [...(columns.get(key) ?? []), cell]);
  }
  const said = [...columns.values()].flatMap((column) => {
    const [first] = column as [LeftOut];
    if (column.length > MOST_LEFT_OUT)
      return [`${sayPlace(first)} and ${column.length - 1} more (finding ${first.finding})`];
    return column.map((cell) => `${sayPlace(cell)} = ${cell.printed} (finding ${cell.finding})`);
  });
  return ['', ...wrap(`Left out of the curve, since the checks name it: ${said.join('; ')}.`, 80)];
}

function forPrograms(one: Trace, correctionAt: (address: Address) => Correction | null) {
  const { curve, weights, shared, ...values } = one;
  return {
    ...curve.family,
    ...values,
    numbers: weights.map(({ of, weightJPerMol, share }) => ({
      ...of.address,
      printed: of.printed,
      corrected: correctionAt(of.address)?.corrected ?? null,
      quantity: of.quantity,
      place: of.place,
      temperatureK: of.temperatureK,
      value: of.value,
      u: of.u,
      sensitivity: of.sensitivity,
      weightJPerMol,
      share,
    })),
    calibrations: shared.map(({ first, cells, relative, weightJPerMol }) => ({
      ...first.address,
      line: 0,
      cells,
      relative,
      weightJPerMol,
    })),
  };
}
