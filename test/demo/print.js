/** Numbers and tables as people print them. */

/** Fixed decimals, no negative zero. */
export function fixed(value, decimals) {
  const text = value.toFixed(decimals);
  return Number(text) === 0 ? text.replace('-', '') : text;
}

/** Decimal comma, typographic minus. */
export const continental = (text) => text.replace('.', ',').replace('-', '\u2212');

/**
 * A raw file before it becomes bytes: `before` are the lines above the header, cells are text.
 * A row may be a lone string, a comment line.
 * @typedef {object} Sheet
 * @property {string} source
 * @property {string} file
 * @property {string} delimiter
 * @property {string} newline
 * @property {boolean} [mark] a byte-order mark in front
 * @property {readonly string[]} before
 * @property {readonly string[]} header
 * @property {(string[] | string)[]} rows
 */

/** 1-based line of a row, header and comments counted. @param {Sheet} sheet */
export const lineOf = (sheet, row) => sheet.before.length + 2 + row;

/** @param {Sheet} sheet */
export function sheetText(sheet) {
  const cell = (text) =>
    /["\r\n]/.test(text) || text.includes(sheet.delimiter) ? `"${text.replaceAll('"', '""')}"` : text;
  const line = (row) => (typeof row === 'string' ? row : row.map(cell).join(sheet.delimiter));
  const lines = [...sheet.before, line(sheet.header), ...sheet.rows.map(line)];
  return (sheet.mark ? '\ufeff' : '') + lines.map((text) => text + sheet.newline).join('');
}

/** JSON as a person would lay it out: what fits a line stays on it. */
export function descriptorText(value, indent = '', room = 118) {
  const flat = inline(value);
  if (value === null || typeof value !== 'object' || indent.length + flat.length <= room - 40) return flat;
  const inner = `${indent}  `;
  const parts = Array.isArray(value)
    ? value.map((item) => inner + descriptorText(item, inner, room))
    : Object.entries(value).map(
        ([key, item]) => `${inner}${JSON.stringify(key)}: ${descriptorText(item, inner, room)}`,
      );
  const [open, shut] = Array.isArray(value) ? '[]' : '{}';
  return `${open}\n${parts.join(',\n')}\n${indent}${shut}`;
}

function inline(value) {
  if (value === null || typeof value !== 'object') return JSON.stringify(value);
  if (Array.isArray(value)) return `[${value.map(inline).join(', ')}]`;
  const pairs = Object.entries(value).map(([key, item]) => `${JSON.stringify(key)}: ${inline(item)}`);
  return pairs.length === 0 ? '{}' : `{ ${pairs.join(', ')} }`;
}
