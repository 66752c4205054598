import { existsSync } from 'node:fs';
import { join } from 'node:path';
import type { Request } from './arguments.js';
import { EXIT, type ExitStatus, Stop } from './exit-status.js';
import type { Log } from './log.js';
import { count } from './text.js';
import { verifyRelease } from './verify.js';

/** `cuspline verify RELEASE`: a folder, a release id, or `current`. */
export async function verify(request: Request, log: Log): Promise<ExitStatus> {
  const folder = folderOf(request.operand!, request.out);
  const problems = await verifyRelease(folder);
  const status = problems.length === 0 ? EXIT.done : EXIT.nothing;
  const lines =
    problems.length === 0
      ? [`${folder} is whole: every file is as contents.json lists it, and both formats of each table agree.`]
      : [
          `${folder} is damaged: ${count(problems.length, 'problem')}.`,
          ...problems.map(({ file, problem }) => `  ${file}: ${problem}`),
          'Do not use it. Run cuspline nightly again to make it anew, or move OUT/current to another release.',
        ];
  log.tell({ event: 'verified', folder, whole: problems.length === 0, problems, status }, lines);
  return status;
}

function folderOf(named: string, out: string): string {
  const places = [named, join(out, named), join(out, 'releases', named)];
  const found = places.find((place) => existsSync(join(place, 'contents.json')));
  if (found !== undefined) return found;
  // A release that has lost its contents.json is damaged, not misnamed.
  const folder = places.slice(1).find((place) => existsSync(place));
  if (folder !== undefined) return folder;
  throw new Stop(
    `There is no release "${named}", neither as a folder nor in ${join(out, 'releases')}.`,
    'Name a folder that holds contents.json, a release by its id, or "current"; --out says where releases are kept.',
    EXIT.usage,
  );
}
