/** The words of a row: from a column, or the table's constant. */
import type { TextQuantity } from '../../schemas/quantities.js';
import { phaseWanted, resolvePhase } from './phase.js';
import type { IngestPart, WordFrom } from './plan.js';
import type { RowReader } from './row-reader.js';

/** The phase label that a row gives for `quantity`, '' where a column of increments is empty; null where it is unknown, and reported. */
export function readPhase(
  part: IngestPart,
  reader: RowReader,
  substance: string,
  quantity: TextQuantity,
): string | null {
  const { words, phases } = part.plan;
  const from = words[quantity];
  const word = wordOf(reader, from);
  if (word === '' && quantity === 'increments-from') return '';
  const label = resolvePhase(phases, substance, word);
  if (label !== null) return label;
  reader.readings().add({
    problem: 'phase-unmapped',
    subject: word,
    address:
      from !== undefined && 'column' in from
        ? reader.address(from.column)
        : { ...reader.address(-1), column: quantity },
    read: word,
    wanted: phaseWanted(word, phases),
    remedy: `add "${word}" to "phases" in source.json; its rows are not used`,
  });
  return null;
}

export function wordOf(reader: RowReader, from: WordFrom | undefined): string {
  if (from === undefined) return '';
  return 'constant' in from ? from.constant : reader.text(from.column);
}
