import { existsSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { type Policy, policySchema } from '../../schemas/policy.js';
import { EXIT, Stop } from './exit-status.js';
import { didYouMean } from './nearest.js';

export interface PolicyFile {
  readonly policy: Policy;
  /** Where it was read; null: built in. */
  readonly path: string | null;
  readonly bytes: Uint8Array | null;
}

/**
 * The policy named on the command line, else `policy.json` in the sources, else the built-in one. Throws a `Stop` that
 * names each wrong key.
 */
export function readPolicy(named: string | null, sources: string | null): PolicyFile {
  const inSources = sources === null ? null : join(sources, 'policy.json');
  const path = named ?? (inSources !== null && existsSync(inSources) ? inSources : null);
  if (path === null) return { policy: policySchema.parse({}), path: null, bytes: null };
  let bytes: Uint8Array;
  try {
    bytes = readFileSync(path);
  } catch (error) {
    throw new Stop(
      `The policy ${path} cannot be read: ${(error as Error).message}.`,
      'Name another with --policy, or leave it out for the built-in policy.',
      named === null ? EXIT.nothing : EXIT.usage,
    );
  }
  return { policy: parsePolicy(path, new TextDecoder().decode(bytes)), path, bytes };
}

function parsePolicy(path: string, text: string): Policy {
  let value: unknown;
  try {
    value = JSON.parse(text);
  } catch (error) {
    throw new Stop(`The policy ${path} is not JSON: ${(error as Error).message}.`, 'Mend the file at that place.');
  }
  const parsed = policySchema.safeParse(value);
  if (parsed.success) return parsed.data;
  const defaults = policySchema.parse({}) as Readonly<Record<string, unknown>>;
  const lines = parsed.error.issues.map((issue) => {
    const place = issue.path.join('.');
    if (issue.code !== 'unrecognized_keys') return `${place || 'The file'}: ${issue.message}`;
    const around = issue.path.reduce<unknown>((part, key) => (part as Record<PropertyKey, unknown>)?.[key], defaults);
    const known = Object.keys((around ?? {}) as object);
    return issue.keys
      .map((key) => `${[...issue.path, key].join('.')} is no key of the policy. ${didYouMean(key, known)}`.trim())
      .join('\n');
  });
  throw new Stop(`The policy ${path} does not hold:\n${lines.join('\n')}`, 'Correct these keys, or leave them out.');
}
