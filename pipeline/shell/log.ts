import type { LogStyle } from './arguments.js';
import type { Stop } from './exit-status.js';
import { duration, pace, progressLine, type Stage } from './progress.js';
import { count } from './text.js';

/** A stream that text can be written to. */
export interface Sink {
  readonly write: (text: string) => unknown;
  readonly isTTY?: boolean;
  readonly columns?: number;
}

export interface LogOptions {
  readonly style: LogStyle;
  readonly out: Sink;
  readonly err: Sink;
  /** Milliseconds of a clock that only goes forward. */
  readonly nowMs: () => number;
}

/** Where a command speaks: results on standard output, progress on standard error; with `json` everything on standard output, one object a line. */
export interface Log {
  readonly begin: (name: string, total: number, unit: string) => void;
  /** `done` so far, of the stage begun last. */
  readonly advance: (done: number) => void;
  /** `total`: where it was not known before. */
  readonly end: (total?: number) => void;
  /** A result: an object for programs, and the same as lines for people. */
  readonly tell: (
    event: Readonly<Record<string, unknown>> & { readonly event: string },
    lines: readonly string[],
  ) => void;
  readonly fail: (stop: Stop) => void;
}

/** The log in the style asked for: JSON lines, a line that rewrites itself on a terminal, or plain lines. */
export function makeLog(options: LogOptions): Log {
  if (options.style === 'json') return jsonLog(options);
  return textLog(options, options.err.isTTY === true);
}

const REWRITE_MS = 100;
const PLAIN_MS = 10_000;

function textLog({ out, err, nowMs }: LogOptions, terminal: boolean): Log {
  let stage: Stage | null = null;
  let done = 0;
  let drawnMs = 0;
  const clear = (): void => {
    if (terminal && stage !== null) err.write('\r\x1b[K');
  };
  return {
    begin: (name, total, unit) => {
      stage = { name, total, unit, startedMs: nowMs() };
      done = 0;
      drawnMs = terminal ? Number.NEGATIVE_INFINITY : stage.startedMs;
    },
    advance: (count) => {
      done = count;
      const now = nowMs();
      if (stage === null || now - drawnMs < (terminal ? REWRITE_MS : PLAIN_MS)) return;
      drawnMs = now;
      const line = progressLine(stage, pace(stage, done, now), (err.columns ?? 80) - 1);
      err.write(terminal ? `\r${line}\x1b[K` : `${line}\n`);
    },
    end: (total) => {
      if (stage === null) return;
      const seconds = (nowMs() - stage.startedMs) / 1000;
      clear();
      err.write(`${stage.name}: ${count(total ?? stage.total, stage.unit)} in ${duration(seconds)}\n`);
      stage = null;
    },
    tell: (_event, lines) => {
      clear();
      for (const line of lines) out.write(`${line}\n`);
    },
    fail: ({ message, next }) => {
      clear();
      err.write(`${message}\n${next === '' ? '' : `${next}\n`}`);
    },
  };
}

function jsonLog({ out, nowMs }: LogOptions): Log {
  let stage: Stage | null = null;
  let drawnMs = 0;
  const write = (event: Readonly<Record<string, unknown>>): void => {
    out.write(`${JSON.stringify(event)}\n`);
  };
  return {
    begin: (name, total, unit) => {
      stage = { name, total, unit, startedMs: nowMs() };
      drawnMs = stage.startedMs;
      write({ event: 'stage-begins', stage: name, total, unit });
    },
    advance: (count) => {
      const now = nowMs();
      if (stage === null || now - drawnMs < 1000) return;
      drawnMs = now;
      const { done, rate, secondsLeft } = pace(stage, count, now);
      write({ event: 'progress', stage: stage.name, done, total: stage.total, perSecond: rate, secondsLeft });
    },
    end: () => {
      if (stage === null) return;
      write({
        event: 'stage-ends',
        stage: stage.name,
        total: stage.total,
        seconds: (nowMs() - stage.startedMs) / 1000,
      });
      stage = null;
    },
    tell: (event) => write(event),
    fail: ({ message, next, status }) => write({ event: 'error', message, next, status }),
  };
}
