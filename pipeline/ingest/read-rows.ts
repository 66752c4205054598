/** Reads the rows of `anchors`, `transitions` and `vapour-pressures` tables. */
import type { NumberQuantity, TextQuantity } from '../../schemas/quantities.js';
import type { RawCell, RawRow } from '../../schemas/raw.js';
import { CONDENSED_WANTED, isGasLabel } from './phase.js';
import type { IngestPart, WordFrom } from './plan.js';
import type { RowReader } from './row-reader.js';
import { readPhase, wordOf } from './row-words.js';
import { neededNumbers } from './table-quantities.js';

const ORDERS: Readonly<Record<string, string>> = {
  '': 'first',
  first: 'first',
  'first order': 'first',
  'first-order': 'first',
  continuous: 'continuous',
  lambda: 'continuous',
  second: 'continuous',
  'second order': 'continuous',
  'second-order': 'continuous',
  glass: 'glass',
};

/** The rows of substance `id` in the given runs, in file order. */
export function readRows(part: IngestPart, reader: RowReader, id: string, runs: readonly number[]): RawRow[] {
  const { plan, index } = part;
  const rows: RawRow[] = [];
  for (const run of runs) {
    reader.start(index.runs.byteStart[run]!, index.runs.byteEnd[run]!, index.runs.firstLine[run]!);
    while (reader.next()) {
      if (reader.isBlank()) continue;
      const words = wordsOf(part, reader, id);
      const cells = readCells(part, reader);
      if (words === null || cells === null) continue;
      const row = { table: plan.meaning, line: reader.line, cells, words };
      rows.push(plan.meaning.holds === 'transitions' ? { ...row, printedPhases: printedPhases(part, reader) } : row);
    }
  }
  return rows;
}

type Words = Partial<Record<TextQuantity, string>>;

function wordsOf(part: IngestPart, reader: RowReader, id: string): Words | null {
  switch (part.plan.meaning.holds) {
    case 'transitions':
      return transitionWords(part, reader, id);
    case 'vapour-pressures':
      return vapourWords(part, reader, id);
    default:
      return anchorWords(part, reader, id);
  }
}

function anchorWords(part: IngestPart, reader: RowReader, id: string): Words | null {
  const phase = readPhase(part, reader, id, 'phase');
  return phase === null ? null : { ...otherWords(part, reader), phase };
}

function vapourWords(part: IngestPart, reader: RowReader, id: string): Words | null {
  const words = anchorWords(part, reader, id);
  if (words === null || !isGasLabel(words.phase!)) return words;
  report(part, reader, 'phase', wordOf(reader, part.plan.words.phase), CONDENSED_WANTED);
  return null;
}

function transitionWords(part: IngestPart, reader: RowReader, id: string): Words | null {
  const { words } = part.plan;
  const from = readPhase(part, reader, id, 'from-phase');
  const to = readPhase(part, reader, id, 'to-phase');
  const order = wordOf(reader, words.order);
  const gas = wordOf(reader, words.gas).toLowerCase();
  const known = ORDERS[order.toLowerCase()];
  if (known === undefined) report(part, reader, 'order', order, 'first, continuous (lambda, second order) or glass');
  const hasGas = [from, to].some((phase) => phase !== null && isGasLabel(phase));
  if (gas === '' && hasGas)
    report(
      part,
      reader,
      'gas',
      gas,
      "real (a measured boiling or sublimation point) or ideal (a handbook's fugacity of 1 bar), where a phase is g",
    );
  else if (gas !== '' && gas !== 'real' && gas !== 'ideal') report(part, reader, 'gas', gas, 'real or ideal');
  else if (from !== null && to !== null && known !== undefined)
    return {
      ...otherWords(part, reader),
      'from-phase': from,
      'to-phase': to,
      order: known,
      ...(hasGas ? { gas } : {}),
    };
  return null;
}

function printedPhases({ plan }: IngestPart, reader: RowReader): NonNullable<RawRow['printedPhases']> {
  const printed = (from: WordFrom | undefined): string | null =>
    from === undefined || 'constant' in from ? null : reader.printed(from.column);
  return { from: printed(plan.words['from-phase']), to: printed(plan.words['to-phase']) };
}

function otherWords(part: IngestPart, reader: RowReader): Words {
  const { note } = part.plan.words;
  return note === undefined ? {} : { note: wordOf(reader, note) };
}

function report(
  part: IngestPart,
  reader: RowReader,
  quantity: 'phase' | 'order' | 'gas',
  read: string,
  wanted: string,
): void {
  const from = part.plan.words[quantity];
  const address =
    from !== undefined && 'column' in from ? reader.address(from.column) : { ...reader.address(-1), column: quantity };
  reader.readings().add({
    problem: 'required-missing',
    address,
    read,
    wanted,
    remedy: `give a column "is": "${quantity}" or "constants": { "${quantity}": … }; the row is not used`,
  });
}

/** null where a number that the row cannot do without is missing, or where it gives no number at all. */
function readCells(part: IngestPart, reader: RowReader): RawRow['cells'] | null {
  const { columns, holds } = part.plan.meaning;
  const cells: Partial<Record<NumberQuantity, RawCell>> = {};
  for (const [quantity, constant] of Object.entries(part.plan.numbers) as [
    NumberQuantity,
    { value: number; decimals: number; printed: string },
  ][])
    cells[quantity] = {
      column: -1,
      ...constant,
      usualDecimals: constant.decimals,
      corrected: false,
      uncertainty: null,
    };
  const uncertainty = new Map<NumberQuantity, number>();
  for (const [position, column] of columns.entries())
    if (column.is === 'uncertainty' && reader.number(position, false))
      uncertainty.set(column.of!, reader.numbers.value);
  for (const [position, column] of columns.entries()) {
    if (column.unit === null || column.is === 'uncertainty') continue;
    const is = column.is as NumberQuantity;
    if (!reader.number(position, false)) continue;
    const { value, decimals } = reader.numbers;
    cells[is] = {
      column: position,
      value,
      decimals,
      usualDecimals: part.index.usualDecimals[position]!,
      printed: reader.printed(position),
      corrected: reader.corrected?.has(position) ?? false,
      uncertainty: uncertainty.get(is) ?? null,
    };
  }
  const lacking = neededNumbers(holds).filter((quantity) => cells[quantity] === undefined);
  for (const quantity of lacking) {
    const position = columns.findIndex((column) => column.is === quantity);
    const read = reader.printed(position);
    if (read === '' || part.plan.layout.missing.includes(read))
      reader.readings().add({
        problem: 'required-missing',
        address: reader.address(position),
        read,
        wanted: `a ${quantity.replace('-', ' ')} in every row`,
        remedy: 'give it by an entry in corrections.json, or withdraw the row there ("column": null)',
      });
  }
  return lacking.length === 0 ? cells : null;
}
