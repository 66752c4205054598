import { createHash } from 'node:crypto';
import { existsSync, readdirSync, readFileSync } from 'node:fs';
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

/**
 * The version and a hash of the program's own files: what a release's content id counts as its maker, so that a changed
 * program never takes an older one's release for its own.
 */
export function programIdentity(): string {
  const pipeline = dirname(dirname(fileURLToPath(import.meta.url)));
  const hash = createHash('sha256');
  for (const folder of [pipeline, join(dirname(pipeline), 'schemas')]) {
    const files = readdirSync(folder, { recursive: true, encoding: 'utf8' });
    for (const file of files.filter((name) => /(?<!\.d)\.[jt]s$/.test(name)).sort()) {
      hash.update(file).update(readFileSync(join(folder, file)));
    }
  }
  return `${programVersion()}+${hash.digest('hex').slice(0, 12)}`;
}
