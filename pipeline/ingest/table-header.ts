/** Finds a table's header line and the cells that its columns stand in. */
import type { Finding } from '../../schemas/finding.js';
import { tidyHeader } from './column-meaning.js';
import { nearestWords } from './nearest.js';
import type { TablePlan } from './plan.js';
import { readingFinding } from './reading.js';
import type { RowSplitter } from './row-splitter.js';

export interface TableHeader {
  /** First byte and line of the data. */
  readonly dataStart: number;
  readonly dataLine: number;
  readonly cells: number;
  /** Empty where the table has no header line. */
  readonly headers: readonly string[];
  readonly cellAt: Int32Array;
  readonly whereAt: Int32Array;
  /** Columns that the descriptor names and the file lacks: nothing of the table can be used. */
  readonly missing: Finding | null;
  /** Columns of the file that nobody names. */
  readonly unknown: readonly Finding[];
}

export function readHeader(plan: TablePlan, bytes: Uint8Array, splitter: RowSplitter): TableHeader {
  const { layout, meaning } = plan;
  let at = 0;
  let line = 1;
  for (let skipped = 0; skipped < layout.skipLines && at < bytes.length; skipped++) {
    at = splitter.lineEnd(bytes, at, bytes.length);
    line++;
  }
  let found = false;
  let headerLine = line;
  let next = at;
  while (!found && next < bytes.length) {
    headerLine = line;
    at = next;
    found = splitter.split(bytes, at, bytes.length);
    next = splitter.next;
    line += splitter.lines;
  }
  const cells = found ? splitter.count : 0;
  const headers = layout.headerless ? [] : Array.from({ length: cells }, (_, cell) => tidyHeader(splitter.text(cell)));
  const address = (column: string) => ({ source: meaning.source, file: plan.file, line: headerLine, column });

  const place = (header: string): number => {
    const byPosition = /^#(\d+)$/.exec(header);
    if (byPosition !== null && !headers.includes(header)) {
      const cell = Number(byPosition[1]) - 1;
      return cell < cells ? cell : -1;
    }
    return headers.indexOf(header);
  };
  const named = meaning.columns.map((column) => column.header);
  const cellAt = Int32Array.from(named, place);
  const whereAt = Int32Array.from(plan.where, (clause) => place(clause.header));

  let missing: Finding | null = null;
  for (const header of [...named, ...plan.where.map((clause) => clause.header)]) {
    if (missing !== null || place(header) >= 0) continue;
    missing = readingFinding({
      problem: 'column-missing',
      address: address(header),
      read: found
        ? headers.join(' | ') || `${cells} columns without a header`
        : 'nothing: the file ends before a header line',
      wanted: `a column "${header}"${nearestWords(header, headers)}`,
      remedy: `write the column's name as the file has it under tables[${meaning.table.replace('#', '')}].columns in source.json, or mend skipLines and delimiter there; until then nothing of this table is used`,
    });
  }
  const known = new Set([...named, ...plan.where.map((clause) => clause.header), ...plan.namedElsewhere]);
  const unknown: Finding[] = [];
  for (const [cell, header] of headers.entries()) {
    const twice = headers.indexOf(header) !== cell && known.has(header) && header !== '';
    if (plan.othersIgnored && !twice) continue;
    if (!twice && (known.has(header) || known.has(`#${cell + 1}`) || header === '')) continue;
    unknown.push(
      readingFinding({
        problem: 'column-unknown',
        address: address(header),
        read: twice ? `"${header}" twice` : header,
        wanted: twice ? 'each header once' : `a column that the descriptor names${nearestWords(header, known)}`,
        remedy: twice
          ? `name the columns by position, "#${headers.indexOf(header) + 1}" and "#${cell + 1}"`
          : `say what "${header}" is under "columns", or { "is": "ignored" }`,
      }),
    );
  }
  return {
    dataStart: layout.headerless ? at : next,
    dataLine: layout.headerless ? headerLine : line,
    cells,
    headers,
    cellAt,
    whereAt,
    missing,
    unknown,
  };
}
