#!/usr/bin/env node
import { performance } from 'node:perf_hooks';
import { type LogStyle, type Request, readArguments } from './arguments.js';
import { EXIT, type ExitStatus, Stop } from './exit-status.js';
import { helpFor } from './help.js';
import { type Log, makeLog } from './log.js';
import { programVersion } from './version.js';

/** Runs one command and ends with its status. Commands are loaded when they are asked for, so that help is quick. */
async function main(words: readonly string[]): Promise<ExitStatus> {
  const style = words.join(' ').match(/--log[ =]json\b/) ? 'json' : 'text';
  let log = logIn(style);
  try {
    const request = readArguments(words, today());
    log = logIn(request.log);
    return await run(request, log);
  } catch (error) {
    const stop = error instanceof Stop ? error : asStop(error);
    log.fail(stop);
    return stop.status;
  }
}

async function run(request: Request, log: Log): Promise<ExitStatus> {
  switch (request.command) {
    case 'help':
      log.tell({ event: 'help', about: request.about }, helpFor(request.about));
      return EXIT.done;
    case 'version':
      log.tell({ event: 'version', version: programVersion() }, [`cuspline ${programVersion()}`]);
      return EXIT.done;
    case 'nightly':
      await import('./tier-up.js');
      return (await import('./nightly.js')).nightly(request, log);
    case 'check':
      return (await import('./check-command.js')).check(request, log);
    case 'show':
      return (await import('./show-command.js')).show(request, log);
    case 'trace':
      return (await import('./trace-command.js')).traceCommand(request, log);
    case 'correct':
      return (await import('./correct-command.js')).correct(request, log);
    case 'accept':
      return (await import('./accept-command.js')).accept(request, log);
    case 'rules':
      return (await import('./rules-command.js')).rules(request, log);
    case 'verify':
      return (await import('./verify-command.js')).verify(request, log);
  }
}

function logIn(style: LogStyle): Log {
  return makeLog({ style, out: process.stdout, err: process.stderr, nowMs: () => performance.now() });
}

/** The day by this machine's clock and time zone, YYYY-MM-DD. */
function today(): string {
  const now = new Date();
  const two = (part: number): string => String(part).padStart(2, '0');
  return `${now.getFullYear()}-${two(now.getMonth() + 1)}-${two(now.getDate())}`;
}

/** Anything that nobody foresaw: a full disk, or a fault of the program. The release that stands is untouched. */
function asStop(error: unknown): Stop {
  const { code, message, stack } = error as NodeJS.ErrnoException;
  if (code !== undefined && /^E[A-Z]+$/.test(code)) {
    return new Stop(message, 'Nothing was published. Mend this and run the command again.');
  }
  return new Stop(
    `The program broke down: ${message}`,
    `Nothing was published. This is a fault of the program; please report it with these lines:\n${stack}`,
  );
}

// A reader such as `head` may close the pipe early; that is no error of ours.
process.stdout.on('error', (error: NodeJS.ErrnoException) => {
  if (error.code !== 'EPIPE') throw error;
  process.exit(process.exitCode ?? EXIT.done);
});
process.exitCode = await main(process.argv.slice(2));
