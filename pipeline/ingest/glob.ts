/** File names inside a source's folder by a path or a glob: `*` and `?` within one folder name, nothing else. */
export function matchFiles(pattern: string, fileNames: readonly string[]): readonly string[] {
  const wanted = pattern.replace(/^\.\//, '').normalize('NFC');
  if (!/[*?]/.test(wanted)) return fileNames.filter((name) => name.normalize('NFC') === wanted);
  const source = wanted
    .replace(/[.+^${}()|[\]\\]/g, '\\$&')
    .replaceAll('*', '[^/]*')
    .replaceAll('?', '[^/]');
  const expression = new RegExp(`^${source}$`, 'u');
  return fileNames.filter((name) => expression.test(name.normalize('NFC')));
}
