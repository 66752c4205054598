/** Brings the bytes of a text file to UTF-8: UTF-16 and Latin-1 are told by the bytes themselves. */
export type Encoding =
  | 'UTF-8'
  | 'UTF-8 with a byte-order mark'
  | 'UTF-16 (little-endian)'
  | 'UTF-16 (big-endian)'
  | 'Latin-1';

export interface Utf8Text {
  /** Without a byte-order mark; shared memory. */
  readonly bytes: Uint8Array;
  readonly encoding: Encoding;
}

/** `raw` unchanged where it is UTF-8; else a converted copy. */
export function toUtf8(raw: Uint8Array): Utf8Text {
  if (raw[0] === 0xef && raw[1] === 0xbb && raw[2] === 0xbf)
    return { bytes: raw.subarray(3), encoding: 'UTF-8 with a byte-order mark' };
  const order = byteOrder(raw);
  if (order !== null) {
    const text = new TextDecoder(order === 'little' ? 'utf-16le' : 'utf-16be').decode(raw);
    return { bytes: shared(new TextEncoder().encode(text)), encoding: `UTF-16 (${order}-endian)` };
  }
  if (isUtf8(raw)) return { bytes: raw, encoding: 'UTF-8' };
  // windows-1252 is Latin-1 with letters in place of control codes, as such files have them.
  return { bytes: shared(new TextEncoder().encode(new TextDecoder('windows-1252').decode(raw))), encoding: 'Latin-1' };
}

/** A copy in memory that workers can share. */
export function shared(bytes: Uint8Array): Uint8Array {
  const copy = new Uint8Array(new SharedArrayBuffer(bytes.length));
  copy.set(bytes);
  return copy;
}

/** By the byte-order mark, else by where the zero bytes of plain letters stand. */
function byteOrder(raw: Uint8Array): 'little' | 'big' | null {
  if (raw[0] === 0xff && raw[1] === 0xfe) return 'little';
  if (raw[0] === 0xfe && raw[1] === 0xff) return 'big';
  const length = Math.min(raw.length, 512) & ~1;
  if (length < 4) return null;
  let even = 0;
  let odd = 0;
  for (let i = 0; i < length; i += 2) {
    if (raw[i] === 0) even++;
    if (raw[i + 1] === 0) odd++;
  }
  if (odd > length * 0.3 && even === 0) return 'little';
  return even > length * 0.3 && odd === 0 ? 'big' : null;
}

function isUtf8(raw: Uint8Array): boolean {
  const { length } = raw;
  for (let i = 0; i < length; i++) {
    const b = raw[i]!;
    if (b < 0x80) continue;
    const more = b >= 0xf0 && b < 0xf5 ? 3 : b >= 0xe0 ? 2 : b >= 0xc2 ? 1 : 0;
    if (more === 0 || b >= 0xf5) return false;
    for (let k = 1; k <= more; k++) if ((raw[i + k]! & 0xc0) !== 0x80) return false;
    i += more;
  }
  return true;
}
