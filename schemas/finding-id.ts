/** Names of findings that stay the same from night to night, and hashes of the printed cells behind them. */
import type { EvidenceCell, RuleName } from './finding.js';

/** What a finding's name is made of: never a line, never a value. */
export interface FindingParts {
  readonly rule: RuleName;
  readonly substance?: string;
  /** The phases concerned, in order; a transition's are `from` and `to`. */
  readonly phases?: readonly (string | null)[];
  /** Tells transitions apart that join the same two phases (another pressure, another table). */
  readonly transition?: string;
  readonly source?: string;
  /** The quantity, or any other words that tell two findings of one rule apart. */
  readonly quantity?: string;
}

/** 16 hexadecimal digits from rule, substance, phases, transition, source and quantity. */
export function findingId(parts: FindingParts): string {
  return hash64([
    parts.rule,
    parts.substance ?? '',
    ...(parts.phases ?? []).map((phase) => phase ?? ''),
    '>',
    parts.transition ?? '',
    parts.source ?? '',
    parts.quantity ?? '',
  ]);
}

/** 16 hexadecimal digits from the printed cells (source, file, column and text, not the line), in any order. */
export function evidenceHash(cells: readonly EvidenceCell[]): string {
  return hash64(
    cells.map((cell) => `${cell.source}\u0001${cell.file}\u0001${cell.column}\u0001${cell.printed}`).sort(),
  );
}

/** 64-bit FNV-1a (Fowler, Noll, Vo; offset basis and prime of RFC 9923) over UTF-16 code units, low byte first; each word is closed by a zero unit. */
export function hash64(words: readonly string[]): string {
  let high = 0xcbf29ce4;
  let low = 0x84222325;
  const take = (byte: number): void => {
    low = (low ^ byte) >>> 0;
    // h * (2^40 + 0x1b3) modulo 2^64, in two halves.
    const product = low * 0x1b3;
    high = (high * 0x1b3 + Math.floor(product / 0x100000000) + ((low << 8) >>> 0)) >>> 0;
    low = product >>> 0;
  };
  for (const word of words) {
    for (let i = 0; i < word.length; i++) {
      const unit = word.charCodeAt(i);
      take(unit & 0xff);
      take(unit >>> 8);
    }
    take(0);
    take(0);
  }
  return high.toString(16).padStart(8, '0') + low.toString(16).padStart(8, '0');
}
