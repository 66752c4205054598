import { describe, expect, it } from 'vitest';
import { EXIT, Stop } from '../../pipeline/shell/exit-status.js';
import { makeLog } from '../../pipeline/shell/log.js';
import { duration } from '../../pipeline/shell/progress.js';

function record(style: 'text' | 'json', isTTY = false) {
  const written = { out: '', err: '' };
  let ms = 0;
  const log = makeLog({
    style,
    out: { write: (text: string) => (written.out += text) },
    err: { write: (text: string) => (written.err += text), isTTY, columns: 60 },
    nowMs: () => ms,
  });
  log.begin('calculate', 1000, 'substance');
  ms = 2000;
  log.advance(250);
  ms = 15_000;
  log.advance(500);
  ms = 20_000;
  log.end();
  log.tell({ event: 'summary', cleared: 3 }, ['3 cleared']);
  log.fail(new Stop('No substances.csv.', 'Write one.', EXIT.nothing));
  return written;
}

describe('the log', () => {
  it('gives one JSON object a line on standard output, and nothing else', () => {
    const { out, err } = record('json');
    expect(err).toBe('');
    expect(
      out
        .trimEnd()
        .split('\n')
        .map((line) => JSON.parse(line).event),
    ).toEqual(['stage-begins', 'progress', 'progress', 'stage-ends', 'summary', 'error']);
  });

  it('rewrites one line on a terminal, with count, rate and time left', () => {
    const { out, err } = record('text', true);
    expect(err).toContain('\rcalculate  250 of 1,000 substances  125/s  6 s left\x1b[K');
    expect(err).toContain('calculate: 1,000 substances in 20 s\n');
    expect(out).toBe('3 cleared\n');
  });

  it('writes plain lines, ten seconds apart, where there is no terminal', () => {
    const { out, err } = record('text');
    expect(err).toBe(
      'calculate  500 of 1,000 substances  33/s  15 s left\ncalculate: 1,000 substances in 20 s\nNo substances.csv.\nWrite one.\n',
    );
    expect(out).toBe('3 cleared\n');
  });

  it('says durations as people do', () => {
    expect([0.423, 21.4, 200, 7500].map(duration)).toEqual(['0.42 s', '21 s', '3 min 20 s', '2 h 5 min']);
  });
});
