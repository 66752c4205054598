/** Cuts one row of bytes into cells, without making text of them. */
import papaparse from 'papaparse/papaparse.js';
import type { Layout } from './plan.js';
import { decodeUtf8, encodeUtf8 } from './utf8.js';

const QUOTE = 34;
const LINE_FEED = 10;
const CARRIAGE_RETURN = 13;
/** A quoted cell longer than this is taken for a quote that nobody closed. */
const LONGEST_QUOTE = 65536;

/** Line feed, or carriage return where the first part of a file has returns and no line feed. */
export function newlineOf(bytes: Uint8Array): number {
  if (bytes.indexOf(LINE_FEED) >= 0) return LINE_FEED;
  return bytes.indexOf(CARRIAGE_RETURN) >= 0 ? CARRIAGE_RETURN : LINE_FEED;
}

/**
 * After `split`, cell k is `bytes[starts[k] ... ends[k])`, quotes taken off. A quoted cell may hold delimiters and line
 * breaks; one with doubled quotes inside goes through papaparse. A quote that does not enclose its whole cell, or that
 * nobody closes, is an ordinary character.
 */
export class RowSplitter {
  bytes: Uint8Array = new Uint8Array(0);
  starts = new Int32Array(64);
  ends = new Int32Array(64);
  count = 0;
  /** First byte after the row. */
  next = 0;
  /** Physical lines that the row takes. */
  lines = 1;
  private readonly delimiter: number;
  private readonly comment: Uint8Array;
  private doubled = false;

  constructor(
    private readonly layout: Layout,
    private readonly newline: number,
  ) {
    this.delimiter = layout.delimiter.charCodeAt(0);
    this.comment = encodeUtf8(layout.comment ?? '');
  }

  /** Cuts the row at `start`; false for a comment or a blank line, which has no cells. */
  split(bytes: Uint8Array, start: number, limit: number): boolean {
    this.bytes = bytes;
    this.lines = 1;
    this.count = 0;
    if (this.comment.length > 0 && this.startsComment(bytes, start, limit)) {
      this.next = this.lineEnd(bytes, start, limit);
      return false;
    }
    if (this.layout.spaces) return this.splitSpaces(bytes, start, limit);
    const { delimiter, newline } = this;
    let { starts, ends } = this;
    let n = 0;
    let i = start;
    this.doubled = false;
    for (;;) {
      if (n === starts.length) {
        this.grow();
        ({ starts, ends } = this);
      }
      starts[n] = i;
      const closed = i < limit && bytes[i] === QUOTE ? this.closingQuote(bytes, i, limit) : -1;
      if (closed >= 0) {
        starts[n] = i + 1;
        ends[n] = closed;
        i = closed + 1;
        if (i < limit && bytes[i] === CARRIAGE_RETURN && newline === LINE_FEED) i++;
      } else {
        let c = 0;
        while (i < limit) {
          c = bytes[i]!;
          if (c === delimiter || c === newline) break;
          i++;
        }
        ends[n] = i;
      }
      n++;
      if (i >= limit || bytes[i] === newline) break;
      i++;
    }
    this.next = i < limit ? i + 1 : limit;
    this.count = n;
    const last = n - 1;
    if (newline === LINE_FEED && ends[last]! > starts[last]! && bytes[ends[last]! - 1] === CARRIAGE_RETURN)
      ends[last]!--;
    if (n === 1 && this.isBlank(0)) {
      this.count = 0;
      return false;
    }
    if (this.doubled) this.replace(this.byPapaparse(decodeUtf8(bytes, start, i)));
    return true;
  }

  /** The cell's text, without the blanks around it; '' where the row has no such cell. */
  text(cell: number): string {
    if (cell < 0 || cell >= this.count) return '';
    return decodeUtf8(this.bytes, this.starts[cell]!, this.ends[cell]!).trim();
  }

  isBlank(cell: number): boolean {
    for (let i = this.starts[cell]!; i < this.ends[cell]!; i++) {
      const c = this.bytes[i]!;
      if (c !== 32 && c !== 9 && c !== CARRIAGE_RETURN) return false;
    }
    return true;
  }

  /** True where every cell from `from` on is empty. */
  isBlankFrom(from: number): boolean {
    for (let cell = from; cell < this.count; cell++) if (!this.isBlank(cell)) return false;
    return true;
  }

  /** Puts other cells in the place of those that were cut (a correction). */
  replace(cells: readonly string[]): void {
    const pieces = cells.map(encodeUtf8);
    const bytes = new Uint8Array(pieces.reduce((sum, piece) => sum + piece.length, 0));
    while (this.starts.length < cells.length) this.grow();
    let at = 0;
    for (const [cell, piece] of pieces.entries()) {
      bytes.set(piece, at);
      this.starts[cell] = at;
      at += piece.length;
      this.ends[cell] = at;
    }
    this.count = cells.length;
    this.bytes = bytes;
  }

  /** First byte of the next line. */
  lineEnd(bytes: Uint8Array, start: number, limit: number): number {
    const end = bytes.indexOf(this.newline, start);
    return end < 0 || end >= limit ? limit : end + 1;
  }

  startsComment(bytes: Uint8Array, start: number, limit: number): boolean {
    const { comment } = this;
    if (comment.length === 0 || start + comment.length > limit) return false;
    for (let i = 0; i < comment.length; i++) if (bytes[start + i] !== comment[i]) return false;
    return true;
  }

  /** Position of the quote that closes the cell opened at `open`, or -1 where it encloses no whole cell. */
  private closingQuote(bytes: Uint8Array, open: number, limit: number): number {
    const { newline } = this;
    const end = Math.min(limit, open + LONGEST_QUOTE);
    let lines = 0;
    let doubled = false;
    for (let i = open + 1; i < end; i++) {
      const c = bytes[i]!;
      if (c === newline) lines++;
      if (c !== QUOTE) continue;
      if (i + 1 < limit && bytes[i + 1] === QUOTE) {
        doubled = true;
        i++;
        continue;
      }
      const after = i + 1 < limit ? bytes[i + 1] : newline;
      if (after !== newline && after !== this.delimiter && after !== CARRIAGE_RETURN) return -1;
      this.lines += lines;
      if (doubled) this.doubled = true;
      return i;
    }
    return -1;
  }

  private byPapaparse(row: string): readonly string[] {
    const { data } = papaparse.parse(row.replace(/\r$/, ''), {
      delimiter: this.layout.delimiter,
      newline: this.newline === LINE_FEED ? '\n' : '\r',
    });
    return data[0] ?? [];
  }

  private splitSpaces(bytes: Uint8Array, start: number, limit: number): boolean {
    const next = this.lineEnd(bytes, start, limit);
    let n = 0;
    let inside = false;
    for (let i = start; i < next; i++) {
      const c = bytes[i]!;
      const blank = c === 32 || c === 9 || c === LINE_FEED || c === CARRIAGE_RETURN;
      if (blank === inside) {
        if (blank) this.ends[n++] = i;
        else {
          if (n === this.starts.length) this.grow();
          this.starts[n] = i;
        }
        inside = !blank;
      }
    }
    if (inside) this.ends[n++] = next;
    this.next = next;
    this.count = n;
    return n > 0;
  }

  private grow(): void {
    const starts = new Int32Array(this.starts.length * 2);
    const ends = new Int32Array(this.ends.length * 2);
    starts.set(this.starts);
    ends.set(this.ends);
    this.starts = starts;
    this.ends = ends;
  }
}
