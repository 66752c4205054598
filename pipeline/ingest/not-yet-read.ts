/** Layouts that a descriptor may declare and that nobody reads yet: named one by one, never passed over. */
export interface NotYet {
  /** Inside the table. */
  readonly path: readonly PropertyKey[];
  readonly remedy: string;
}

const KEYS: Readonly<Record<string, string>> = {
  widths: 'save the table with a delimiter between its columns',
  lines: 'use skipLines and comment, or keep the rows wanted with "where"',
  header: 'leave one header line and skip those above it with skipLines',
  joinLines: 'put each row on one line',
  thousands: 'take the thousands separators out (thin spaces are read)',
  fillDown: 'repeat the cell in every row',
  cells: 'put uncertainties into a column of their own (is: uncertainty) and take the marks out',
};

/** All that `table` (keys of the source merged in) asks for and that is not read yet. */
export function notYetRead(table: Readonly<Record<string, unknown>>): NotYet[] {
  const found: NotYet[] = [];
  for (const [key, remedy] of Object.entries(KEYS)) if (key in table) found.push({ path: [key], remedy });
  const { others, phase, substance, columns, file } = table;
  if (isObject(others))
    found.push({ path: ['others'], remedy: 'give each column an entry under "columns", or "others": "ignored"' });
  if (isObject(phase) && !('column' in phase))
    found.push({ path: ['phase'], remedy: 'put the phase into a column: "phase": { "column": "…" }' });
  if (isObject(substance) && 'columns' in substance)
    found.push({ path: ['substance', 'columns'], remedy: 'name one column: "substance": { "column": "…" }' });
  if (typeof file === 'string' && /\.parquet$/i.test(file))
    found.push({ path: ['file'], remedy: 'save the table as CSV or TSV' });
  if (!isObject(columns)) return found;
  for (const [header, column] of Object.entries(columns)) {
    if (!isObject(column)) continue;
    if ('as' in column)
      found.push({ path: ['columns', header, 'as'], remedy: 'print the quantity itself in a column' });
    if ('split' in column || Array.isArray(column.is))
      found.push({ path: ['columns', header], remedy: 'put the two words into two columns' });
    const { uncertainty } = column;
    const parts = Array.isArray(uncertainty) ? uncertainty : [uncertainty];
    if (parts.some((part) => isObject(part) && ('below' in part || 'above' in part)))
      found.push({
        path: ['columns', header, 'uncertainty'],
        remedy: 'split the table with "where", one uncertainty a part',
      });
  }
  return found;
}

export function isObject(value: unknown): value is Record<string, unknown> {
  return typeof value === 'object' && value !== null && !Array.isArray(value);
}
