/** Keeps the rows that a table's `where` asks for. */
import { NumberReader, READ_EMPTY, READ_NUMBER } from './number.js';
import type { TablePlan } from './plan.js';
import type { RowSplitter } from './row-splitter.js';

/** `whereAt[k]`: the cell of clause k. A cell that should be a number and is none is kept, so that its fault is seen. */
export function rowFilter(plan: TablePlan, whereAt: Int32Array): ((row: RowSplitter) => boolean) | null {
  const { where } = plan;
  if (where.length === 0) return null;
  const reader = new NumberReader(plan.layout.decimal);
  const missing = new Set(plan.layout.missing);
  return (row) => {
    for (const [position, clause] of where.entries()) {
      const cell = whereAt[position]!;
      const text = row.text(cell);
      if (clause.is !== null && !clause.is.includes(text)) return false;
      if (clause.not?.includes(text)) return false;
      if (clause.from === null && clause.to === null) continue;
      if (cell >= row.count || missing.has(text)) return false;
      const code = reader.read(row.bytes, row.starts[cell]!, row.ends[cell]!);
      if (code === READ_EMPTY) return false;
      if (code !== READ_NUMBER) continue;
      if (clause.from !== null && reader.value < clause.from) return false;
      if (clause.to !== null && reader.value > clause.to) return false;
    }
    return true;
  };
}
