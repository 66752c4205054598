import { createInterface } from 'node:readline/promises';
import type { Request } from './arguments.js';

/** Asks a person a question that is answered by yes or no; null where nobody can be asked. */
export type Ask = ((question: string) => Promise<boolean>) | null;

/** The terminal, where there is one on both sides and nobody reads the output as JSON. An interrupt is a no. */
export function askOnTerminal({ log }: Pick<Request, 'log'>): Ask {
  if (log === 'json' || process.stdin.isTTY !== true || process.stderr.isTTY !== true) return null;
  return async (question) => {
    const terminal = createInterface({ input: process.stdin, output: process.stderr });
    const closed = new Promise<string>((resolve) => terminal.once('close', () => resolve('')));
    const answer = await Promise.race([terminal.question(`${question} [y/N] `), closed]);
    terminal.close();
    return /^\s*y(es)?\s*$/i.test(answer);
  };
}
