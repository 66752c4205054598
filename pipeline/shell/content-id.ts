/** The content id: a hash of all that decides what a release holds. Same id, same bytes (the dated files apart). */
import { createHash } from 'node:crypto';
import type { InputFile } from '../../schemas/contents.js';

export interface ContentIdInput {
  readonly inputs: readonly Pick<InputFile, 'source' | 'file' | 'sha256'>[];
  readonly policy: unknown;
  /** The acceptances in force on the release date. */
  readonly acceptances: readonly unknown[];
  readonly version: string;
}

/** SHA-256, hexadecimal. The order of inputs, acceptances and object keys does not matter. */
export function contentId({ inputs, policy, acceptances, version }: ContentIdInput): string {
  const facts = {
    inputs: inputs.map(({ source, file, sha256 }) => canonical([source, file, sha256])).sort(),
    policy,
    acceptances: acceptances.map(canonical).sort(),
    version,
  };
  return createHash('sha256').update(canonical(facts)).digest('hex');
}

/** Name of the release's folder. */
export function releaseName(id: string): string {
  return id.slice(0, 12);
}

function canonical(value: unknown): string {
  return JSON.stringify(value, (_, part: unknown) =>
    part !== null && typeof part === 'object' && !Array.isArray(part)
      ? Object.fromEntries(Object.entries(part).sort(([a], [b]) => (a < b ? -1 : 1)))
      : part,
  );
}
