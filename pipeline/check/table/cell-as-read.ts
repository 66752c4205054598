import type { Series, SeriesQuantity } from '../../../schemas/harmonised.js';
import type { NumberQuantity } from '../../../schemas/quantities.js';
import type { WholeColumns } from './column-cause.js';
import { type ColumnChange, quantityIn, type TableColumn, unchangedValue } from './column-change.js';
import type { SuspectCell } from './name-cells.js';

/** A cell that stands out of its column once that is put right, with its numbers as the column itself has them. */
export function cellAsRead(series: Series, whole: readonly WholeColumns[], cell: SuspectCell): SuspectCell {
  const asRead = <C extends { row: number; quantity: NumberQuantity; proposed: number; uProposed: number }>(
    one: C,
  ): C => {
    const changes = changesAt(whole, columnOf(one.quantity), one.row);
    let { proposed, uProposed } = one;
    for (const change of changes.toReversed()) {
      proposed = unchangedValue(series, one.quantity, one.row, proposed, change);
      uProposed /= Math.abs(change.factor);
    }
    return { ...one, proposed, uProposed };
  };
  const q = quantityIn(series, columnOf(cell.quantity)) as SeriesQuantity;
  return { ...asRead(cell), observed: q.values[cell.row], rivals: cell.rivals.map(asRead) };
}

function changesAt(whole: readonly WholeColumns[], column: TableColumn, row: number): ColumnChange[] {
  return whole
    .filter(({ run }) => run === null || run.rows.includes(row))
    .flatMap(({ changes }) => changes.filter((change) => change.column === column));
}

function columnOf(quantity: NumberQuantity): TableColumn {
  if (quantity === 'entropy') return 'entropy';
  if (quantity === 'gibbs-function') return 'gibbsFunction';
  return quantity === 'heat-capacity' ? 'heatCapacity' : 'enthalpy';
}
