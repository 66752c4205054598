import { existsSync, readFileSync } from 'node:fs';
import { dirname, join } from 'node:path';
import { fileURLToPath } from 'node:url';

/** The version in the package's own package.json, above this file whether compiled or not. */
export function programVersion(): string {
  let folder = dirname(fileURLToPath(import.meta.url));
  while (!existsSync(join(folder, 'package.json'))) {
    const above = dirname(folder);
    if (above === folder) throw new Error('The program has lost its package.json; install it again.');
    folder = above;
  }
  return (JSON.parse(readFileSync(join(folder, 'package.json'), 'utf8')) as { version: string }).version;
}
