import { COMMANDS, type CommandName } from './commands.js';
import { wrap } from './text.js';

const WIDTH = 80;

/** The help that a person reads: an overview, or one command with its options and examples. Lines of at most 80 columns. */
export function helpFor(command: CommandName | null): string[] {
  return command === null ? overview() : commandHelp(command);
}

function overview(): string[] {
  return [
    ...wrap(
      'cuspline turns raw tables of pure substances (heat capacity, entropy, enthalpy, transitions) into checked, consistent property data, or says what is wrong where.',
      WIDTH,
    ),
    '',
    'Usage: cuspline COMMAND [options]',
    '',
    ...COMMANDS.flatMap(({ name, does }) => entry(name, does, 10)),
    '',
    ...wrap(
      'A library is a folder with substances.csv and one folder a source; each source holds its tables as received and a source.json that says what the columns are.',
      WIDTH,
    ),
    '',
    'Start here:',
    '  cuspline nightly                 publish ./sources into ./out',
    '  cuspline check --only SUBSTANCE  look at one substance, write nothing',
    '  cuspline COMMAND --help          options, with examples',
  ];
}

function commandHelp(name: CommandName): string[] {
  const {
    does,
    operand,
    further = [],
    options,
    teaches,
    examples,
  } = COMMANDS.find((command) => command.name === name)!;
  const first = operand === null ? '' : operand.required ? ` ${operand.name}` : ` [${operand.name}]`;
  const word = [first, ...further.map((one) => one.name)].join(' ');
  const width = Math.max(...options.map(({ name: option, value }) => `--${option} ${value ?? ''}`.length)) + 2;
  return [
    `cuspline ${name}: ${does}`,
    '',
    `Usage: cuspline ${name}${word} [options]`,
    ...teaches.flatMap((paragraph) => ['', ...wrap(paragraph, WIDTH)]),
    '',
    ...[...(operand === null ? [] : [operand]), ...further].flatMap((one) => entry(one.name, one.means, width)),
    ...options.flatMap(({ name: option, value, means }) => entry(`--${option} ${value ?? ''}`.trim(), means, width)),
    '',
    examples.length === 1 ? 'Example:' : 'Examples:',
    ...examples.flatMap(({ line, does: effect }) => [`  ${line}`, `      ${effect}`]),
  ];
}

function entry(term: string, means: string, width: number): string[] {
  const lines = wrap(means, WIDTH - width - 2);
  return lines.map((line, i) => `  ${(i === 0 ? term : '').padEnd(width)}${line}`);
}
