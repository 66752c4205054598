/**
 * A small reading of delimiter files that knows where each cell stands in the text, so that one cell can be replaced and
 * every other byte stays. Shares no code with the pipeline.
 */
import { readFileSync, writeFileSync } from 'node:fs';
import { gunzipSync, gzipSync } from 'node:zlib';

export interface CellPlace {
  /** Offsets into the text, quotes excluded. */
  readonly from: number;
  readonly to: number;
  readonly text: string;
}

export interface DelimitedRow {
  /** 1-based line in the file, header included. */
  readonly line: number;
  /** Offsets of the whole line, its end excluded. */
  readonly from: number;
  readonly to: number;
  readonly cells: readonly CellPlace[];
}

export interface DelimitedFile {
  readonly text: string;
  readonly header: readonly string[];
  readonly rows: readonly DelimitedRow[];
}

export interface Layout {
  readonly delimiter: string;
  readonly skipLines: number;
  readonly comment: string | null;
}

/** UTF-8, gzip or not; quotes hold delimiters, never line ends. */
export function readDelimited(path: string, layout: Layout): DelimitedFile {
  const bytes = readFileSync(path);
  const text = (path.endsWith('.gz') ? gunzipSync(bytes) : bytes).toString('utf8');
  const rows: DelimitedRow[] = [];
  let start = text.startsWith('\uFEFF') ? 1 : 0;
  for (let line = 1; start < text.length; line++) {
    const newline = text.indexOf('\n', start);
    const next = newline < 0 ? text.length : newline + 1;
    let end = newline < 0 ? text.length : newline;
    if (text[end - 1] === '\r') end--;
    const isComment = layout.comment !== null && text.startsWith(layout.comment, start);
    if (line > layout.skipLines && !isComment && text.slice(start, end).trim() !== '') {
      rows.push({ line, from: start, to: end, cells: splitLine(text, start, end, layout.delimiter) });
    }
    start = next;
  }
  const [first, ...rest] = rows;
  return { text, header: first === undefined ? [] : first.cells.map((cell) => cell.text.trim()), rows: rest };
}

export interface Edit {
  readonly path: string;
  readonly contents: DelimitedFile;
  /** Offsets into the text as it was read. */
  readonly from: number;
  readonly to: number;
  readonly text: string;
}

/** Writes the files again with the edits made, all other bytes left as they are. Edits may not overlap. */
export function applyEdits(edits: readonly Edit[]): void {
  const byPath = new Map<string, Edit[]>();
  for (const edit of edits) byPath.set(edit.path, [...(byPath.get(edit.path) ?? []), edit]);
  for (const [path, own] of byPath) {
    const { text } = own[0]!.contents;
    let written = '';
    let at = 0;
    for (const edit of own.sort((a, b) => a.from - b.from)) {
      if (edit.from < at) throw new Error(`${path}: two edits overlap at ${edit.from}`);
      written += text.slice(at, edit.from) + edit.text;
      at = edit.to;
    }
    written += text.slice(at);
    writeFileSync(path, path.endsWith('.gz') ? gzipSync(written) : written);
  }
}

function splitLine(text: string, start: number, end: number, delimiter: string): CellPlace[] {
  const cells: CellPlace[] = [];
  let at = start;
  for (;;) {
    const quoted = text[at] === '"';
    const from = quoted ? at + 1 : at;
    const close = text.indexOf(quoted ? '"' : delimiter, from);
    const to = close < 0 || close > end ? end : close;
    cells.push({ from, to, text: text.slice(from, to) });
    at = quoted ? to + 1 : to;
    if (at >= end) return cells;
    at += delimiter.length;
  }
}
