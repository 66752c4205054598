/** Stretches of consecutive lines of one substance. */
import type { RowIndex, Runs } from './plan.js';

export class RunList {
  count = 0;
  private substance = new Uint32Array(64);
  private byteStart = new Uint32Array(64);
  private byteEnd = new Uint32Array(64);
  private firstLine = new Uint32Array(64);

  add(substance: number, byteStart: number, byteEnd: number, firstLine: number): void {
    if (this.count === this.substance.length) this.grow();
    this.substance[this.count] = substance;
    this.byteStart[this.count] = byteStart;
    this.byteEnd[this.count] = byteEnd;
    this.firstLine[this.count++] = firstLine;
  }

  runs(): Runs {
    const { count } = this;
    return {
      count,
      substance: this.substance.slice(0, count),
      byteStart: this.byteStart.slice(0, count),
      byteEnd: this.byteEnd.slice(0, count),
      firstLine: this.firstLine.slice(0, count),
    };
  }

  private grow(): void {
    for (const key of ['substance', 'byteStart', 'byteEnd', 'firstLine'] as const) {
      const longer = new Uint32Array(this[key].length * 2);
      longer.set(this[key]);
      this[key] = longer;
    }
  }
}

/** The same index with only the runs of the substances `from` up to, not including, `to`; its findings are left behind. */
export function selectRuns(index: RowIndex, from: number, to: number): RowIndex {
  const { runs } = index;
  const list = new RunList();
  for (let i = 0; i < runs.count; i++) {
    const substance = runs.substance[i]!;
    if (substance >= from && substance < to)
      list.add(substance, runs.byteStart[i]!, runs.byteEnd[i]!, runs.firstLine[i]!);
  }
  return { ...index, runs: list.runs(), findings: [] };
}

/** Adds to `bytesOf`, by substance, the bytes that a table's runs hold. */
export function addRunBytes(index: RowIndex, bytesOf: Float64Array): void {
  const { runs } = index;
  for (let i = 0; i < runs.count; i++) bytesOf[runs.substance[i]!]! += runs.byteEnd[i]! - runs.byteStart[i]!;
}
