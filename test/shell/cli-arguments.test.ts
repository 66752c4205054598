import { describe, expect, it } from 'vitest';
import { readArguments } from '../../pipeline/shell/arguments.js';
import { COMMANDS } from '../../pipeline/shell/commands.js';
import { Stop } from '../../pipeline/shell/exit-status.js';
import { helpFor } from '../../pipeline/shell/help.js';
import { didYouMean, nearest } from '../../pipeline/shell/nearest.js';

const read = (...words: string[]) => readArguments(words, '2026-03-31');

function refusal(...words: string[]): Stop {
  try {
    read(...words);
  } catch (error) {
    if (error instanceof Stop) return error;
    throw error;
  }
  throw new Error(`"${words.join(' ')}" was accepted`);
}

describe('the arguments of nightly', () => {
  it('have defaults: ./sources, ./out, today, every substance', () => {
    expect(read('nightly')).toMatchObject({
      command: 'nightly',
      sources: './sources',
      out: './out',
      policy: null,
      date: '2026-03-31',
      strict: false,
      acceptLosses: false,
      only: null,
      log: 'text',
    });
    expect(read('nightly').jobs).toBeGreaterThanOrEqual(1);
  });

  it('are all read, with --only followed by several words', () => {
    const words = '--sources a --out b --policy p.json --date 2025-12-01 --strict --accept-losses --jobs 3 --log json';
    expect(read('nightly', ...words.split(' '), '--only', 'lead', 'tin', 'lead', '--only=zinc,iron')).toMatchObject({
      sources: 'a',
      out: 'b',
      policy: 'p.json',
      date: '2025-12-01',
      strict: true,
      acceptLosses: true,
      jobs: 3,
      log: 'json',
      only: ['lead', 'tin', 'zinc', 'iron'],
    });
  });

  it.each([
    [['nightly', '--strikt'], /no option --strikt/, /--strict/],
    [['nightly', '--only'], /--only needs a value/, /--only SUBSTANCE/],
    [['nightly', '--sources', '--strict'], /--sources needs a value/, /--sources DIR/],
    [['nightly', '--strict=yes'], /takes no value/, /--strict alone/],
    [['nightly', '--jobs', '0'], /--jobs is "0"/, /every core/],
    [['nightly', '--date', '2026-02-30'], /--date is "2026-02-30"/, /today/],
    [['nightly', '--log', 'xml'], /--log is "xml"/, /--log json/],
    [['nightly', 'lead'], /"lead".*--only lead/, /nightly --help/],
    [['nightly', '--only', 'lead', '--strict', 'tin'], /"tin"/, /nightly --help/],
    [['nightli'], /no command "nightli"/, /Did you mean nightly\?/],
    [['show'], /needs a SUBSTANCE/, /cuspline show lead/],
    [['show', 'lead', 'tin'], /"tin" is a second/, /one at a time/],
    [['verify'], /needs a RELEASE/, /verify current/],
    [['check', '--accept-losses'], /no option --accept-losses/, /check --help/],
  ])('%j is refused with status 2 and says what to type instead', (words, message, next) => {
    const stop = refusal(...words);
    expect(stop.status).toBe(2);
    expect(stop.message).toMatch(message);
    expect(stop.next).toMatch(next);
  });
});

describe('help', () => {
  it('is given without a command, for a command, and on --help anywhere', () => {
    expect(read()).toMatchObject({ command: 'help', about: null });
    expect(read('--help')).toMatchObject({ command: 'help', about: null });
    expect(read('help', 'rules')).toMatchObject({ command: 'help', about: 'rules' });
    expect(read('show', '--help')).toMatchObject({ command: 'help', about: 'show' });
    expect(read('--version')).toMatchObject({ command: 'version' });
  });

  it('names every command in the overview', () => {
    const text = helpFor(null).join('\n');
    for (const { name, does } of COMMANDS) {
      expect(text).toContain(name);
      expect(text).toContain(does);
    }
    for (const line of helpFor(null)) expect(line.length).toBeLessThanOrEqual(80);
  });

  it.each(COMMANDS.map(({ name }) => name))('of %s shows each option, an example and fits 80 columns', (name) => {
    const page = COMMANDS.find((command) => command.name === name)!;
    const lines = helpFor(name);
    for (const option of page.options) expect(lines.join('\n')).toContain(`--${option.name}`);
    expect(lines.join('\n')).toContain(page.examples[0]!.line);
    for (const line of lines) expect(line.length).toBeLessThanOrEqual(80);
  });

  it('shows only examples that the parser accepts', () => {
    for (const { examples } of COMMANDS) {
      for (const { line } of examples) {
        const words = [...line.matchAll(/"([^"]*)"|(\S+)/g)].map((match) => match[1] ?? match[2]!).slice(1);
        expect(() => read(...words)).not.toThrow();
      }
    }
  });
});

describe('nearest words', () => {
  it('are found through a missing letter, an exchange and a beginning', () => {
    expect(nearest('gibbs-continous', ['gibbs-continuous', 'entropy-rises'])).toEqual(['gibbs-continuous']);
    expect(nearest('laed', ['lead', 'tin'])).toEqual(['lead']);
    expect(nearest('sod', ['sodium-chloride', 'lead'])).toEqual(['sodium-chloride']);
  });

  it('are none where nothing is near', () => {
    expect(didYouMean('xyzzy', ['lead', 'water'])).toBe('');
    expect(didYouMean('led', ['lead', 'red'])).toBe('Did you mean lead or red?');
  });
});
