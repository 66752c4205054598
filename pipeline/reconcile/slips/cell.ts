/** A suspect cell with its digits read, and how a corrected number would stand in its column. */
import { lastPlaceOf, type PrintedNumber, readPrinted, writeLike } from './printed-number.js';
import type { Candidate, SuspectCell, SuspectContext } from './slip.js';

/** null where the unit's factor, the offset or the observed value is no number. */
export function readCell(context: SuspectContext): SuspectCell | null {
  const { factor, offset, observed } = context;
  if (!Number.isFinite(observed) || !Number.isFinite(offset) || !Number.isFinite(factor) || factor === 0) return null;
  const expected = (observed - offset) / factor;
  const read = readPrinted(context.printed, expected);
  const number = read !== null && leadsTo(read, context) ? read : null;
  const value = number?.value ?? expected;
  // A temperature scale or a gas's pressure may have moved the observed value after its unit was applied.
  const shift = observed - (value * factor + offset);
  return {
    ...context,
    number,
    value,
    lastPlace: number === null ? Math.max(1e-6 * Math.abs(expected), 1e-9) : lastPlaceOf(number),
    toSi: (other) => other * factor + offset + shift,
  };
}

/**
 * The candidate as it would stand in the column: with the decimals of the row above, or of the cell itself, but no more
 * of them than `step` supports.
 */
export function printCandidate(cell: SuspectCell, candidate: Candidate): string {
  if (candidate.printed !== undefined) return candidate.printed();
  if (cell.number === null) return String(Number(candidate.value.toPrecision(7)));
  const known = Math.ceil(cell.number.exponent - Math.log10(candidate.step) - 1e-9);
  return writeLike(cell.number, candidate.value, Math.min(usualDecimals(cell, cell.number, candidate, known), known));
}

/** Where the printed digits say much more than the cell's decimals hold (joules brought to kilojoules), they are kept. */
function usualDecimals(cell: SuspectCell, number: PrintedNumber, { step }: Candidate, known: number): number {
  const above = readAbove(cell);
  if (above !== null && above.exponent === number.exponent) return above.decimals;
  if (step < 0.2 * cell.lastPlace) return known;
  return number.decimals;
}

function readAbove(cell: SuspectCell): PrintedNumber | null {
  if (cell.rowAbove === null) return null;
  return readPrinted(cell.rowAbove.printed, (cell.rowAbove.observed - cell.offset) / cell.factor);
}

/** Within a twentieth of the observed value: scales and pressures move a value by less, a logarithm by more. */
function leadsTo(number: PrintedNumber, { factor, offset, observed }: SuspectContext): boolean {
  return Math.abs(number.value * factor + offset - observed) <= 0.05 * Math.abs(observed) + Number.MIN_VALUE;
}
