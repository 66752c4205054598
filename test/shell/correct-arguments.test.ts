import { describe, expect, it } from 'vitest';
import { readArguments } from '../../pipeline/shell/arguments.js';
import { helpFor } from '../../pipeline/shell/help.js';
import { shellWord } from '../../pipeline/shell/shell-word.js';

const read = (...words: string[]) => readArguments(words, '2026-03-31');

describe('the arguments of correct, accept and trace', () => {
  it('are read, negative numbers among them', () => {
    const words = ['--value', '-373.909', '--reason', 'page 12', '--by', 'Kim', '--suspect', '2', '--yes'];
    expect(read('correct', 'bb82', ...words)).toMatchObject({
      command: 'correct',
      operand: 'bb82',
      value: '-373.909',
      reason: 'page 12',
      by: 'Kim',
      suspect: 2,
      yes: true,
      date: '2026-03-31',
    });
    expect(read('accept', 'bb82', '--until', '2026-12-31', '--date', '2026-04-01')).toMatchObject({
      until: '2026-12-31',
      date: '2026-04-01',
    });
  });

  it('need no finding, and ask for nothing by default', () => {
    expect(read('correct')).toMatchObject({
      operand: null,
      value: null,
      reason: null,
      by: null,
      suspect: 1,
      yes: false,
    });
  });

  it('are a substance, a phase and a temperature that may have a space or a sign', () => {
    expect(read('trace', 'water', 'cr', '-10', 'Cel', '--all')).toMatchObject({
      operand: 'water',
      further: ['cr', '-10 Cel'],
      all: true,
    });
  });

  it.each([
    [['correct', 'bb82', '--suspect', '0'], /--suspect is "0"/],
    [['correct', 'bb82', 'cc91'], /"cc91" is a second/],
    [['correct', 'bb82', '--value'], /--value needs a value/],
    [['accept', 'bb82', '--until', '2026-02-30'], /--until is "2026-02-30"/],
    [['accept', 'bb82', '--yes'], /no option --yes/],
    [['trace', 'water'], /needs a PHASE after "water"/],
    [['trace', 'water', 'l'], /needs a TEMPERATURE after "water l"/],
    [['trace', 'water', 'l', '300', '--jobs', '2'], /no option --jobs/],
  ])('%j is refused', (words, message) => {
    expect(() => read(...words)).toThrow(message);
  });
});

it('the usage line of trace names all three words', () => {
  expect(helpFor('trace')).toContain('Usage: cuspline trace SUBSTANCE PHASE TEMPERATURE [options]');
});

it('a word for a shell is quoted where it must be', () => {
  expect(['598.60', '-373.909', "it's so", '', '$x'].map(shellWord)).toEqual([
    '598.60',
    '-373.909',
    "'it'\\''s so'",
    "''",
    "'$x'",
  ]);
});
