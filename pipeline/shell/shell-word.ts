/** A word as a POSIX shell takes it: in quotation marks where it needs them. */
export function shellWord(word: string): string {
  return /^[\w./:@=,+-]+$/.test(word) ? word : `'${word.replaceAll("'", "'\\''")}'`;
}
