/** How a file is cut into cells: what the descriptor says, else what the file's name says. */
import type { TableDescriptor } from '../../schemas/source.js';
import type { Layout } from './plan.js';

/** `table` may be one that failed its schema; keys of the wrong kind are passed over. */
export function layoutOf(table: Partial<TableDescriptor>, file: string): Layout {
  const decimal = table.decimal === ',' ? ',' : '.';
  const tabs = /\.(?:tsv|tab)(?:\.gz)?$/i.test(file);
  const usual = tabs ? '\t' : decimal === ',' ? ';' : ',';
  const given = typeof table.delimiter === 'string' && table.delimiter.length === 1 ? table.delimiter : usual;
  const spaces = table.delimiter === 'spaces';
  const missing = Array.isArray(table.missing) ? table.missing.filter((mark) => typeof mark === 'string') : [];
  return {
    delimiter: spaces ? ' ' : given,
    spaces,
    skipLines: typeof table.skipLines === 'number' ? table.skipLines : 0,
    headerless: table.headerless === true,
    comment: typeof table.comment === 'string' ? table.comment : null,
    decimal,
    missing: missing.map((mark) => mark.trim()),
  };
}
