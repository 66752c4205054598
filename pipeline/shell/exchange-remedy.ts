import { join } from 'node:path';
import type { Correction } from '../../schemas/corrections.js';
import type { Suspect } from '../../schemas/finding.js';
import type { Address, StatedTransition } from '../../schemas/harmonised.js';
import { CORRECTIONS_FILE } from '../ingest/ingest.js';
import { sayExplanation } from '../report/report.js';
import type { Request } from './arguments.js';
import { plannedCorrection } from './correction-entry.js';
import { EXIT, Stop } from './exit-status.js';
import type { FoundFinding } from './find-finding.js';

/** A printed cell of a transition's row. */
interface Cell {
  readonly address: Address;
  readonly printed: string;
}

/**
 * Two cells of a transition exchanged need two entries in corrections.json. Throws a `Stop` that shows them, or that says what
 * to exchange in the descriptor where that gives the phases; returns where the suspect is no such pair.
 */
export function refuseExchange(found: FoundFinding, suspect: Suspect, request: Request): void {
  const { explanation, cells, address } = suspect;
  if (cells <= 1 || (explanation !== 'from-and-to-exchanged' && explanation !== 'enthalpy-and-entropy-exchanged'))
    return;
  const stated = transitionAt(found, address);
  if (stated === undefined) return;
  const phases = explanation === 'from-and-to-exchanged';
  const pair = phases ? phaseCells(stated) : sizeCells(stated);
  if (pair === null) throw inDescriptor(stated, suspect, request.sources);
  const reason = request.reason ?? `${sayExplanation(explanation)}; finding ${found.finding.id}`;
  const [first, second] = pair;
  const entries = [
    [first, second],
    [second, first],
  ].map(([cell, other]): Correction => {
    const one = { ...suspect, address: cell!.address, printed: cell!.printed };
    return plannedCorrection({ ...request, reason }, found.finding, one, other!.printed).entry;
  });
  const { file, line } = address;
  const path = join(request.sources, address.source, CORRECTIONS_FILE);
  throw new Stop(
    `Two cells of one row are concerned (${sayExplanation(explanation)}); one entry would leave the row half exchanged, so none is written.`,
    `Exchange ${phases ? 'the two phases' : 'ΔH and ΔS'} of line ${line} of ${file}, columns "${first.address.column}" and ` +
      `"${second.address.column}". Compare with the original, then add both entries to the list in ${path}:\n` +
      entries.map((entry) => JSON.stringify(entry, null, 2)).join(',\n'),
    EXIT.nothing,
  );
}

function transitionAt({ before }: FoundFinding, { source, file, line }: Address): StatedTransition | undefined {
  return before.checked.assembled.examined.harmonised.transitions.find(
    ({ temperature, table }) => table.source === source && table.file === file && temperature.address.line === line,
  );
}

/** Null where a constant of the table gives a phase. */
function phaseCells({ table, temperature, printedFrom, printedTo }: StatedTransition): readonly [Cell, Cell] | null {
  const column = (is: string): string | undefined => table.columns.find((one) => one.is === is)?.header;
  const from = column('from-phase');
  const to = column('to-phase');
  if (from === undefined || to === undefined || printedFrom === null || printedTo === null) return null;
  return [
    { address: { ...temperature.address, column: from }, printed: printedFrom },
    { address: { ...temperature.address, column: to }, printed: printedTo },
  ];
}

function sizeCells({ enthalpy, entropy }: StatedTransition): readonly [Cell, Cell] | null {
  return enthalpy === null || entropy === null ? null : [enthalpy, entropy];
}

function inDescriptor({ from, to, table }: StatedTransition, { address }: Suspect, sources: string): Stop {
  return new Stop(
    `The phases of line ${address.line} of ${table.file}, ${from} and ${to}, seem to be exchanged; the descriptor gives them, so no entry in ${CORRECTIONS_FILE} can exchange them.`,
    `Exchange "from-phase" and "to-phase" in ${join(sources, table.source, 'source.json')}; rows that are right as they are ` +
      'need an entry of their own under "tables", parted by "where".',
    EXIT.nothing,
  );
}
