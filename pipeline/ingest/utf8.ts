/** Text from UTF-8 bytes and back. The platform's own coders are not part of the language, so stages carry these. */
export function decodeUtf8(bytes: Uint8Array, start = 0, end = bytes.length): string {
  let result = '';
  let i = start;
  while (i < end) {
    const units: number[] = [];
    while (i < end && units.length < 4096) {
      const b = bytes[i++]!;
      if (b < 0x80) units.push(b);
      else {
        const more = b >= 0xf0 ? 3 : b >= 0xe0 ? 2 : b >= 0xc2 ? 1 : 0;
        let code = b & (0x3f >> more);
        let taken = 0;
        while (taken < more && i < end && (bytes[i]! & 0xc0) === 0x80) {
          code = (code << 6) | (bytes[i++]! & 0x3f);
          taken++;
        }
        if (more === 0 || taken < more || code > 0x10ffff) units.push(0xfffd);
        else if (code < 0x10000) units.push(code);
        else units.push(0xd7c0 + (code >> 10), 0xdc00 + (code & 0x3ff));
      }
    }
    result += String.fromCharCode(...units);
  }
  return result;
}

/** The UTF-8 bytes of `text`; lone surrogates become U+FFFD. */
export function encodeUtf8(text: string): Uint8Array {
  const bytes: number[] = [];
  for (const character of text) {
    let code = character.codePointAt(0)!;
    if (code >= 0xd800 && code < 0xe000) code = 0xfffd;
    if (code < 0x80) bytes.push(code);
    else if (code < 0x800) bytes.push(0xc0 | (code >> 6), 0x80 | (code & 0x3f));
    else if (code < 0x10000) bytes.push(0xe0 | (code >> 12), 0x80 | ((code >> 6) & 0x3f), 0x80 | (code & 0x3f));
    else
      bytes.push(0xf0 | (code >> 18), 0x80 | ((code >> 12) & 0x3f), 0x80 | ((code >> 6) & 0x3f), 0x80 | (code & 0x3f));
  }
  return Uint8Array.from(bytes);
}
