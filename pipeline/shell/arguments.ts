import { availableParallelism } from 'node:os';
import { parseArgs } from 'node:util';
import { COMMANDS, type CommandName, type CommandPage } from './commands.js';
import { EXIT, Stop } from './exit-status.js';
import { didYouMean } from './nearest.js';

export type LogStyle = 'text' | 'json';

/** What a person asked for; paths as typed, defaults filled in. */
export interface Request {
  readonly command: CommandName | 'help' | 'version';
  /** For `help`: the command that help is wanted for, or null. */
  readonly about: CommandName | null;
  readonly operand: string | null;
  /** The words after the operand: for `trace` the phase and the temperature. */
  readonly further: readonly string[];
  readonly sources: string;
  readonly out: string;
  readonly policy: string | null;
  /** YYYY-MM-DD. */
  readonly date: string;
  readonly strict: boolean;
  readonly acceptLosses: boolean;
  readonly jobs: number;
  /** null: all substances. */
  readonly only: readonly string[] | null;
  readonly pressure: string | null;
  /** For `correct`: which suspect, counted from 1, and the cell as it should be; null: as proposed. */
  readonly suspect: number;
  readonly value: string | null;
  /** For `correct` and `accept`. */
  readonly reason: string | null;
  readonly by: string | null;
  /** YYYY-MM-DD. */
  readonly until: string | null;
  readonly yes: boolean;
  readonly all: boolean;
  readonly log: LogStyle;
}

/** Reads the words after the program's name. Throws a `Stop` with status 2 that says what to type instead. */
export function readArguments(words: readonly string[], today: string): Request {
  const base: Request = {
    command: 'help',
    about: null,
    operand: null,
    further: [],
    sources: './sources',
    out: './out',
    policy: null,
    date: today,
    strict: false,
    acceptLosses: false,
    jobs: availableParallelism(),
    only: null,
    pressure: null,
    suspect: 1,
    value: null,
    reason: null,
    by: null,
    until: null,
    yes: false,
    all: false,
    log: 'text',
  };
  const [first, ...rest] = words;
  if (first === undefined || first === '--help' || first === '-h') return base;
  if (first === '--version' || first === '-V') return { ...base, command: 'version' };
  if (first === 'help') return { ...base, about: rest[0] === undefined ? null : commandPage(rest[0]).name };
  const page = commandPage(first);
  if (rest.includes('--help') || rest.includes('-h')) return { ...base, about: page.name };
  return { ...base, command: page.name, ...readOptions(page, rest) };
}

function commandPage(name: string): CommandPage {
  const page = COMMANDS.find((command) => command.name === name);
  if (page) return page;
  const names = COMMANDS.map((command) => command.name);
  throw usage(
    `There is no command "${name}".`,
    `${didYouMean(name, names)} The commands are ${names.join(', ')}; "cuspline --help" explains them.`.trim(),
  );
}

function readOptions(page: CommandPage, words: readonly string[]): Partial<Request> {
  const known = page.options.map((option) => `--${option.name}`);
  const { tokens: parsed } = parseArgs({
    args: words.map(shielded),
    strict: false,
    allowPositionals: true,
    tokens: true,
    options: Object.fromEntries(
      page.options.map(({ name, value }) => [
        name,
        { type: value === null ? ('boolean' as const) : ('string' as const) },
      ]),
    ),
  });
  const tokens = parsed.map((token) =>
    token.kind === 'option-terminator' || token.value === undefined ? token : { ...token, value: bare(token.value) },
  );
  const asked: Partial<Record<keyof Request, unknown>> = {};
  const only: string[] = [];
  const loose: string[] = [];
  let gathering = false;
  for (const token of tokens) {
    if (token.kind === 'positional') (gathering ? only : loose).push(token.value);
    if (token.kind !== 'option') continue;
    const option = page.options.find(({ name }) => `--${name}` === token.rawName);
    if (!option) {
      throw usage(
        `"${page.name}" has no option ${token.rawName}.`,
        `${didYouMean(token.rawName, known)} "cuspline ${page.name} --help" lists its options.`.trim(),
      );
    }
    gathering = option.many === true;
    if (option.value === null && token.value !== undefined) {
      throw usage(`--${option.name} takes no value, and "${token.value}" was given.`, `Write --${option.name} alone.`);
    }
    // A value that starts with a dash is far more often the next option, typed where a value was forgotten.
    if (option.value !== null && (token.value === undefined || (!token.inlineValue && token.value.startsWith('--')))) {
      throw usage(`--${option.name} needs a value.`, `Write --${option.name} ${option.value}: ${option.means}.`);
    }
    if (option.name === 'only') only.push(...token.value!.split(','));
    else Object.assign(asked, readOption(option.name, token.value));
  }
  if (only.length > 0) asked.only = [...new Set(only.filter((word) => word !== ''))];
  return { ...asked, ...readOperands(page, loose) } as Partial<Request>;
}

/** A negative number is no option. The shield is a character that no argument of a process can hold. */
function shielded(word: string): string {
  return /^-[\d.,]/.test(word) ? `\u0000${word}` : word;
}

function bare(word: string): string {
  return word.startsWith('\u0000') ? word.slice(1) : word;
}

function readOption(name: string, value: string | undefined): Partial<Record<keyof Request, unknown>> {
  switch (name) {
    case 'strict':
      return { strict: true };
    case 'accept-losses':
      return { acceptLosses: true };
    case 'jobs': {
      if (!/^[1-9]\d{0,3}$/.test(value!)) {
        throw usage(`--jobs is "${value}"; a whole number from 1 was expected.`, 'Leave it out to use every core.');
      }
      return { jobs: Number(value) };
    }
    case 'date':
      return { date: readDate('date', value!, 'Leave it out for today.') };
    case 'until':
      return { until: readDate('until', value!, 'Name the last day on which it is to hold.') };
    case 'yes':
      return { yes: true };
    case 'all':
      return { all: true };
    case 'suspect': {
      if (!/^[1-9]\d{0,3}$/.test(value!)) {
        throw usage(`--suspect is "${value}"; a whole number from 1 was expected.`, 'Leave it out for the first.');
      }
      return { suspect: Number(value) };
    }
    case 'log': {
      if (value !== 'text' && value !== 'json') {
        throw usage(`--log is "${value}"; text or json was expected.`, 'Write --log json for one JSON object a line.');
      }
      return { log: value };
    }
    default:
      return { [name]: value };
  }
}

function readDate(option: string, text: string, next: string): string {
  const time = /^\d{4}-\d{2}-\d{2}$/.test(text) ? Date.parse(`${text}T00:00:00Z`) : Number.NaN;
  if (Number.isNaN(time) || new Date(time).toISOString().slice(0, 10) !== text) {
    throw usage(`--${option} is "${text}"; a day such as 2026-03-31 was expected.`, next);
  }
  return text;
}

function readOperands(page: CommandPage, loose: readonly string[]): Pick<Request, 'operand' | 'further'> {
  const [first, second] = loose;
  if (page.operand === null) {
    if (first === undefined) return { operand: null, further: [] };
    const meant = page.options.some(({ name }) => name === 'only') ? ` Did you mean --only ${loose.join(' ')}?` : '';
    throw usage(
      `"${page.name}" does not know what to do with "${first}".${meant}`,
      `See cuspline ${page.name} --help.`,
    );
  }
  const { further = [] } = page;
  if (second !== undefined && further.length === 0) {
    throw usage(`"${page.name}" takes one ${page.operand.name}, and "${second}" is a second.`, 'Name one at a time.');
  }
  if (first === undefined && page.operand.required) {
    throw usage(
      `"${page.name}" needs a ${page.operand.name}: ${page.operand.means}.`,
      `For example: ${page.examples[0]!.line}`,
    );
  }
  const [, ...rest] = loose;
  const missing = further[rest.length];
  if (missing !== undefined) {
    throw usage(
      `"${page.name}" needs a ${missing.name} after "${loose.join(' ')}": ${missing.means}.`,
      `For example: ${page.examples[0]!.line}`,
    );
  }
  const last = Math.max(0, further.length - 1);
  const words = further.length === 0 ? [] : [...rest.slice(0, last), rest.slice(last).join(' ')];
  return { operand: first ?? null, further: words };
}

function usage(message: string, next: string): Stop {
  return new Stop(message, next, EXIT.usage);
}
