/** Breaks a paragraph at spaces into lines of at most `width` columns; a longer word keeps a line of its own. */
export function wrap(paragraph: string, width: number): string[] {
  const lines: string[] = [];
  let line = '';
  for (const word of paragraph.split(/\s+/).filter((part) => part !== '')) {
    if (line !== '' && line.length + 1 + word.length > width) {
      lines.push(line);
      line = word;
    } else line = line === '' ? word : `${line} ${word}`;
  }
  if (line !== '' || lines.length === 0) lines.push(line);
  return lines;
}

/** Rows as aligned columns, two spaces apart; `right` lists the columns that are flush right. */
export function table(rows: readonly (readonly string[])[], right: readonly number[] = []): string[] {
  const columns = Math.max(0, ...rows.map((row) => row.length));
  const widths = Array.from({ length: columns }, (_, j) => Math.max(...rows.map((row) => (row[j] ?? '').length)));
  return rows.map((row) =>
    widths
      .map((width, j) => (right.includes(j) ? (row[j] ?? '').padStart(width) : (row[j] ?? '').padEnd(width)))
      .join('  ')
      .trimEnd(),
  );
}

/** `1 substance`, `24 substances`. */
export function count(n: number, one: string, many = `${one}s`): string {
  return `${grouped(n)} ${n === 1 ? one : many}`;
}

/** A whole number with commas between its thousands. */
export function grouped(n: number): string {
  return String(Math.round(n)).replace(/\B(?=(\d{3})+$)/g, ',');
}
