import { spawnSync } from 'node:child_process';
import { existsSync } from 'node:fs';
import { dirname, join } from 'node:path';
import { fileURLToPath } from 'node:url';

export const ROOT = join(dirname(fileURLToPath(import.meta.url)), '..', '..');
const CLI = join(ROOT, '.build/pipeline/shell/cli.js');

/** Runs the compiled program as a person would. */
export function cuspline(...words: string[]): { status: number | null; stdout: string; stderr: string } {
  if (!existsSync(CLI)) throw new Error('the program is not compiled: npm run build');
  const { status, stdout, stderr } = spawnSync(process.execPath, [CLI, ...words], { encoding: 'utf8', cwd: ROOT });
  return { status, stdout, stderr };
}
