/** Substance, phase and the other words of a table: a constant each, or a column. */
import { TEXT_QUANTITIES, type TextQuantity } from '../../schemas/quantities.js';
import type { TableDescriptor } from '../../schemas/source.js';
import type { ColumnMeaning } from '../../schemas/table-meaning.js';
import { tidyHeader, wordMeaning } from './column-meaning.js';
import { CONDENSED_WANTED, isGasLabel, phaseWanted, resolvePhase } from './phase.js';
import type { TablePlan, WordFrom } from './plan.js';
import type { Fault } from './table-plan.js';
import { type Kind, WORDS } from './table-quantities.js';

type Words = Partial<Record<TextQuantity, WordFrom>>;

/** `columns` grows by those that only `substance` and `phase` name. */
export function tableWords(table: TableDescriptor, kind: Kind, columns: ColumnMeaning[], fault: Fault): Words {
  const words: Words = {};
  for (const [position, { is }] of columns.entries())
    if ((TEXT_QUANTITIES as readonly string[]).includes(is)) words[is as TextQuantity] = { column: position };

  const set = (quantity: TextQuantity, from: WordFrom, path: readonly PropertyKey[]): void => {
    const known = words[quantity];
    if (!WORDS[kind].includes(quantity)) fault(path, `no "${quantity}" in a table of ${kind}`);
    else if (known !== undefined && !('column' in known && 'column' in from && known.column === from.column))
      fault(path, `"${quantity}" said once: a column holds it already`);
    else words[quantity] = from;
  };
  for (const key of ['substance', 'phase'] as const) {
    const from = table[key];
    if (typeof from === 'string') set(key, { constant: from }, [key]);
    else if (from !== undefined && 'column' in from) set(key, columnCalled(columns, from.column, key), [key]);
    else if (from !== undefined && 'fileName' in from && key === 'substance') {
      // The word itself differs from file to file.
      if (hasOneGroup(from.fileName)) words.substance = { constant: '' };
      else fault([key, 'fileName'], 'a regular expression with one group in brackets');
    }
  }
  if (table.incrementsFrom !== undefined)
    set('increments-from', { constant: table.incrementsFrom }, ['incrementsFrom']);
  for (const [key, constant] of Object.entries(table.constants ?? {})) {
    if (!(WORDS[kind] as readonly string[]).includes(key)) continue;
    if (typeof constant === 'string') set(key as TextQuantity, { constant }, ['constants', key]);
    else fault(['constants', key], 'a word in double quotes');
  }
  checkPhases(table, kind, words, table.phases ?? {}, fault);
  return words;
}

/** A constant phase is looked up at once, unless its meaning waits for the substance. */
function checkPhases(
  table: TableDescriptor,
  kind: Kind,
  words: Words,
  phases: TablePlan['phases'],
  fault: Fault,
): void {
  if (Object.values(phases).some((value) => typeof value === 'object')) return;
  for (const quantity of ['phase', 'from-phase', 'to-phase', 'increments-from'] as const) {
    const from = words[quantity];
    if (from === undefined || 'column' in from) continue;
    const label = resolvePhase(phases, '', from.constant);
    const gas = kind === 'vapour-pressures' && label !== null && isGasLabel(label);
    if (label !== null && !gas) continue;
    const key = quantity === 'increments-from' ? 'incrementsFrom' : quantity;
    const wanted = gas ? CONDENSED_WANTED : phaseWanted(from.constant, phases);
    fault(key in table ? [key] : ['constants', quantity], wanted);
  }
}

function columnCalled(columns: ColumnMeaning[], header: string, is: TextQuantity): WordFrom {
  const position = columns.findIndex((column) => column.header === tidyHeader(header));
  if (position < 0) return { column: columns.push(wordMeaning(header, is)) - 1 };
  if (columns[position]!.is === 'ignored') columns[position] = wordMeaning(header, is);
  return { column: position };
}

function hasOneGroup(expression: string): boolean {
  try {
    return new RegExp(`${expression}|`, 'u').exec('')!.length === 2;
  } catch {
    return false;
  }
}
